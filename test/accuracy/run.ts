/**
 * `npm run accuracy`: how well the default recipe books scenes whose truth is known, beside a plain script. Scenes are painted afresh from a seed; the
 * same seed gives the same table.
 */
import { shareOut } from './crew.ts';
import { defaultSeed, readOptions, usage } from './options.ts';
import type { Options } from './options.ts';
import { kinds } from './paint-kinds.ts';
import { poolScores } from './score-pool.ts';
import { sharedNames } from './shared-scenes.ts';
import { both, kindTable, mainTable, worstList } from './table.ts';
import type { SceneResult, SceneTask } from './work.ts';

/** Scenes of each kind in a full run, and small ones (a quarter of the area at the same pitch) for the interval. */
const fullScenes = { family: 24, harder: 8, clean: 20, interval: 200 } as const;
const intervalShare = 0.5;

const options = readOptions(process.argv.slice(2));
if (!options) print(usage);
else if (options.shared) await runShared(options);
else await runPainted(options);

async function runShared({ jobs, worst }: Options): Promise<void> {
  const names = sharedNames();
  if (names.length === 0) return print('There is no folder ../shared/scenes beside the project.');
  const results = await work(names.map((shared) => ({ shared, baseline: true })), jobs);
  print(`${results.length} scenes of ../shared/scenes\n`);
  print(kindTable([
    { name: 'all', pool: poolScores(results.map(({ ours }) => ours)) },
    { name: 'baseline', pool: poolScores(results.flatMap(({ baseline }) => baseline ?? [])) },
    ...results.map(({ name, ours }) => ({ name, pool: poolScores([ours]) })),
  ]));
  if (worst) print(`\n${worstList(results)}`);
}

async function runPainted(chosen: Options): Promise<void> {
  const groups = tasksOf(chosen);
  const results = await work(groups.flatMap(({ tasks }) => tasks), chosen.jobs);
  let next = 0;
  const done = groups.map(({ name, tasks }) => ({ name, results: results.slice(next, (next += tasks.length)) }));
  const of = (wanted: (name: string) => boolean): SceneResult[] => done.filter(({ name }) => wanted(name)).flatMap((group) => group.results);
  const special = ['family', 'clean', 'interval'];
  print(`${results.length} scenes, seed ${chosen.seed}${chosen.seed === defaultSeed ? ' (the default)' : ''}: ${done.map((group) => `${group.results.length} ${group.name}`).join(', ')}\n`);
  print(mainTable({
    family: both(of((name) => name === 'family')), harder: both(of((name) => !special.includes(name))), clean: both(of((name) => name === 'clean')), intervals: both(of((name) => name === 'interval')),
  }));
  print(`\nBy kind, ours\n\n${kindTable(done.map((group) => ({ name: group.name, pool: poolScores(group.results.map(({ ours }) => ours)) })))}`);
  if (chosen.worst) print(`\n${worstList(results)}`);
}

interface Group {
  readonly name: string;
  readonly tasks: readonly SceneTask[];
}

function tasksOf({ kind, scenes, seed, quick }: Options): Group[] {
  const number = (full: number): number => scenes ?? (quick ? Math.ceil(full / 10) : full);
  const groups: Group[] = [];
  for (const { name } of kinds) {
    if (kind !== undefined && kind !== name) continue;
    const count = number(name === 'family' || name === 'clean' ? fullScenes[name] : fullScenes.harder);
    groups.push({ name, tasks: Array.from({ length: count }, (_, k) => ({ kind: name, seed: `${seed}-${k + 1}`, baseline: true })) });
  }
  if (kind === undefined || kind === 'interval') {
    groups.push({ name: 'interval', tasks: Array.from({ length: number(fullScenes.interval) }, (_, k) => ({ kind: 'family', seed: `${seed}-interval-${k + 1}`, share: intervalShare, baseline: false })) });
  }
  return groups;
}

function print(text: string): void {
  process.stdout.write(`${text}\n`);
}

/** Progress goes to standard error, so that the table can be piped; long runs tell of every tenth scene. */
function work(tasks: readonly SceneTask[], jobs: number): Promise<SceneResult[]> {
  const every = tasks.length > 50 ? 10 : 1;
  return shareOut(tasks, jobs, (done, { name, timeMs }) => {
    if (done % every === 0 || done === tasks.length) process.stderr.write(`${done} of ${tasks.length}: ${name}, ${timeMs.toFixed(0)} ms\n`);
  });
}
