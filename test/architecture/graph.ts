/** The import graph of the project's own files. */
import { readFileSync, readdirSync } from 'node:fs';
import { join, posix } from 'node:path';
import { importsOf } from './imports-of.ts';
import type { Reference, References } from './imports-of.ts';

export interface Link {
  /** A path of the project (`src/grid/maps.ts`), or a package's name (`lit`, `node:fs`). */
  readonly to: string;
  readonly outside: boolean;
  readonly kind: Reference['kind'];
}

export interface Source {
  readonly path: string;
  readonly lines: number;
  readonly links: readonly Link[];
  readonly unreadable: readonly string[];
}

/** By path, with `/` between folders. */
export type Graph = ReadonlyMap<string, Source>;

const folders = ['src', 'workers', 'web', 'test'];

/**
 * Reads every source below src, workers, web and test; `root` is the project's folder.
 * @throws Error when one does not parse, unless `lenient`: it then counts as importing nothing
 */
export function readGraph(root: string, lenient = false): Graph {
  const texts: Record<string, string> = {};
  for (const folder of folders) {
    for (const name of readdirSync(join(root, folder), { recursive: true })) {
      const path = `${folder}/${String(name).replaceAll('\\', '/')}`;
      if (isSource(path)) texts[path] = readFileSync(join(root, path), 'utf8');
    }
  }
  return graphOf(texts, lenient);
}

/** The graph of files given by path and text. */
export function graphOf(texts: Readonly<Record<string, string>>, lenient = false): Graph {
  return new Map(Object.entries(texts).map(([path, text]) => [path, sourceOf(path, text, lenient)]));
}

function sourceOf(path: string, text: string, lenient: boolean): Source {
  const lines = text.replace(/\n$/, '').split('\n').length;
  const { found, unreadable } = referencesOf(path, text, lenient);
  return { path, lines, unreadable, links: found.map((reference) => linkOf(path, reference)) };
}

function referencesOf(path: string, text: string, lenient: boolean): References {
  const none = { found: [], unreadable: [] };
  if (!/\.(ts|mjs)$/.test(path)) return none;
  try {
    return importsOf(path, text);
  } catch (error) {
    if (lenient) return none;
    throw error;
  }
}

function linkOf(path: string, { target, kind }: Reference): Link {
  const own = target.startsWith('.') || kind === 'url';
  return { to: own ? posix.join(posix.dirname(path), target.replace(/[?#].*$/, '')) : target, outside: !own, kind };
}

/** AssemblyScript is another language with imports of its own. */
function isSource(path: string): boolean {
  return /\.(ts|mjs|css|html)$/.test(path) && !path.startsWith('src/kernels/assembly/');
}
