/** Times of the command line from its start to its last file, as a person waits for it. */
import { spawnSync } from 'node:child_process';
import { mkdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { InputFile } from '../../src/read/input.ts';
import { timed, timesOf } from './times.ts';
import type { Times } from './times.ts';

const launcher = fileURLToPath(new URL('../../src/cli/evenglow.mjs', import.meta.url));

export interface CommandPace {
  /** `evenglow --version`: Node, the TypeScript loader and the imports. */
  readonly startUp: Times;
  readonly appraise: Times;
}

/** Writes the files into `directory`, appraises them there once to warm the file caches and then `repeats` times. */
export async function commandPace(files: readonly InputFile[], directory: string, repeats: number): Promise<CommandPace> {
  const scans = join(directory, 'scans');
  await mkdir(scans, { recursive: true });
  for (const { name, bytes } of files) await writeFile(join(scans, name), bytes);
  const paths = files.map(({ name }) => join(scans, name));
  const measure = (args: readonly string[]): Times => {
    run(args);
    return timesOf(Array.from({ length: repeats }, () => timed(() => run(args))));
  };
  return {
    startUp: measure(['--version']),
    appraise: measure(['appraise', ...paths, '--out', join(directory, 'results'), '--set', 'stack.biasV=4']),
  };
}

function run(args: readonly string[]): void {
  const done = spawnSync(process.execPath, [launcher, ...args], { encoding: 'utf8' });
  if (done.error) throw done.error;
  if (done.status !== 0) throw new Error(`evenglow ${args[0]} ended with code ${done.status}:\n${done.stderr}`);
}
