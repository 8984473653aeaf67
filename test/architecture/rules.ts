/** Who may import whom. Each breach is one sentence: the file, what it does, what is allowed. */
import type { Graph, Link, Source } from './graph.ts';
import { cyclesOf } from './cycles.ts';

const base = ['problems', 'schema', 'grid', 'stats'];
const stages = ['read', 'ground', 'flaws', 'barrier', 'iv', 'sheet', 'ledger', 'plan', 'report'];
const above = ['recipe', 'evaluate', 'demo'];

const lineLimit = 300;
const emptyNames = ['utils', 'util', 'common', 'helpers', 'helper', 'misc'];
/** They read files or make code from text: the page's own thread must never load them. */
const notOnThePage = ['ndarray', 'ndarray-ops', 'geotiff', 'fast-png'];

/** Package names as package.json declares them. */
export interface Declared {
  readonly dependencies: readonly string[];
  readonly devDependencies: readonly string[];
}

/** All breaches of the rules; empty when there are none. */
export function breaches(graph: Graph, declared: Declared): readonly string[] {
  const found: string[] = [];
  for (const source of graph.values()) {
    found.push(...shapeBreaches(source));
    for (const link of source.links) {
      const reason = link.outside ? packageBreach(source.path, link.to, declared) : linkBreach(source.path, link);
      if (reason) found.push(`${source.path} imports ${link.to}: ${reason}`);
    }
  }
  for (const cycle of cyclesOf(graph)) found.push(`imports run in a circle: ${cycle.join(' → ')}`);
  return [...found, ...pageBreaches(graph)];
}

/** Name, length, and imports that cannot be read. */
function shapeBreaches(source: Source): readonly string[] {
  const found: string[] = [];
  const folder = source.path.split('/').slice(0, -1).find((name) => emptyNames.includes(name.toLowerCase()));
  if (folder) found.push(`${source.path} lies in a folder called ${folder}, which says nothing`);
  if (realm(source.path) !== 'test' && source.lines > lineLimit) found.push(`${source.path} has ${source.lines} lines, more than ${lineLimit}`);
  if (realm(source.path) === 'src' && level(source.path) === undefined) found.push(`${source.path} lies in no folder of the design`);
  // Tests name data by computed addresses; nothing imports them.
  if (!isTool(source.path) && realm(source.path) !== 'test') for (const text of source.unreadable) found.push(`${source.path} hides what it imports: ${text}`);
  return found;
}

/** Why one file of the project may not import another; undefined when it may. */
function linkBreach(from: string, link: Link): string | undefined {
  const to = link.to;
  if (isTool(from)) return realm(from) === 'src' && ['web', 'test'].includes(realm(to)) ? 'src imports neither web nor test' : undefined;
  switch (realm(from)) {
    case 'web':
      if (realm(to) === 'web' || to === 'workers/client.ts' || to === 'workers/api.ts') return undefined;
      return 'web imports only web, workers/client.ts and workers/api.ts';
    case 'workers':
      if (from === 'workers/compute.ts' && to.endsWith('.worker.ts')) return 'compute.ts knows of no worker';
      return ['workers', 'src'].includes(realm(to)) && !to.startsWith('src/cli/') ? undefined : 'workers import only workers and src without src/cli';
    case 'src':
      return realm(to) === 'src' ? scienceBreach(from, to) : 'src without src/cli imports only src';
    default:
      return undefined;
  }
}

function scienceBreach(from: string, to: string): string | undefined {
  const lower = level(from);
  const upper = level(to);
  if (from.startsWith('src/problems/') && !/\/(problem|catalogue)\.ts$/.test(from)) return 'a file of sentences imports nothing';
  if (lower === undefined || upper === undefined) return 'only the folders of the design may be imported';
  if (folderOf(from) === folderOf(to)) return undefined;
  // Numbers and typed arrays only: the lowest floor, on which the base folders stand too.
  if (folderOf(from) === 'kernels') return 'kernels import nothing of src';
  if (folderOf(to) === 'kernels') return undefined;
  if (folderOf(from) === 'recipe' && stages.includes(folderOf(to))) {
    return to.endsWith('/recipe.ts') ? undefined : 'recipe takes only recipe.ts from a stage';
  }
  if (base.includes(folderOf(from))) return base.includes(folderOf(to)) ? undefined : `a base folder imports only ${base.join(', ')}`;
  return upper < lower ? undefined : `${folderOf(from)} comes before ${folderOf(to)}`;
}

/** Why a file may not import a package. */
function packageBreach(from: string, specifier: string, declared: Declared): string | undefined {
  const name = specifier.startsWith('@') ? specifier.split('/').slice(0, 2).join('/') : (specifier.split('/')[0] ?? specifier);
  if (specifier.startsWith('node:')) {
    if (from.startsWith('test/browser/')) return 'a browser has no Node modules';
    return isTool(from) || realm(from) === 'test' ? undefined : 'only src/cli imports Node modules';
  }
  if (isTool(from) || realm(from) === 'test') {
    return [...declared.dependencies, ...declared.devDependencies].includes(name) ? undefined : 'package.json does not name this package';
  }
  if (!declared.dependencies.includes(name)) return 'it is no dependency in package.json';
  if (realm(from) === 'web') return ['lit', 'comlink'].includes(name) ? undefined : 'web imports no packages but lit and comlink';
  if (name === 'lit') return 'only web draws';
  if (name === 'comlink' && (realm(from) === 'src' || from === 'workers/compute.ts')) return 'only the wire between page and worker uses comlink';
  return undefined;
}

/** What the page loads on its own thread, followed through every file, lazy imports too. */
function pageBreaches(graph: Graph): readonly string[] {
  const found: string[] = [];
  const cameFrom = new Map<string, string>();
  const queue = [...graph.keys()].filter((path) => realm(path) === 'web' && !isTool(path));
  for (const path of queue) {
    for (const link of graph.get(path)?.links ?? []) {
      // Types vanish, and a worker named by its address runs on a thread of its own.
      if (link.kind === 'type' || link.kind === 'url') continue;
      if (notOnThePage.includes(link.to)) found.push(`the page loads ${link.to}, which belongs into a worker: ${wayTo(path, cameFrom)} → ${link.to}`);
      if (link.outside || cameFrom.has(link.to) || realm(link.to) === 'web') continue;
      cameFrom.set(link.to, path);
      queue.push(link.to);
    }
  }
  return found;
}

function wayTo(path: string, cameFrom: ReadonlyMap<string, string>): string {
  const before = cameFrom.get(path);
  return before === undefined ? path : `${wayTo(before, cameFrom)} → ${path}`;
}

/** First folder of a path. */
function realm(path: string): string {
  return path.split('/')[0] ?? '';
}

/** Folder below src. */
function folderOf(path: string): string {
  return path.split('/')[1] ?? '';
}

/** Programs around the project: the command line with its set-up, and the page's build. */
function isTool(path: string): boolean {
  return path.startsWith('src/cli/') || path === 'web/vite.config.ts';
}

/** Height of a src folder: it may import what is lower. Undefined when the design knows no such folder. */
function level(path: string): number | undefined {
  const order = ['kernels', ...base, ...stages, ...above, 'cli'];
  const at = order.indexOf(folderOf(path));
  return at < 0 || path.split('/').length < 3 ? undefined : at;
}
