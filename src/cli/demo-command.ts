import { readFile, rename, rm, writeFile } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import type { DemoFile } from '../demo/demo-samples.ts';
import { demoFiles, demoSamples } from '../demo/demo-samples.ts';
import { Problem } from '../problems/problem.ts';
import type { Command, Parsed } from './command.ts';
import { exitCodes } from './command.ts';
import type { Output } from './output.ts';
import { Progress } from './output.ts';
import { prepareOutput } from './prepare-output.ts';

/** `evenglow demo`: the demo samples as files. */
export const demoCommand: Command = {
  name: 'demo',
  summary: 'Writes the six demo samples as files: height and current maps that differ in what is wrong with them.',
  usage: ['evenglow demo DIR [--force]'],
  options: { force: { type: 'boolean' } },
  optionText: { '--force': 'replaces files in DIR that differ from the demo’s' },
  notes: [
    'The samples are invented: painted from a seed by the tunnelling model, not measured. Each is NAME.height.tif (nm, as scanned), NAME.current.tif (A) and NAME.json; one has NAME.outlines.geojson.',
    'Then: npx evenglow appraise DIR --out RESULTS',
  ],
  run: runDemo,
};

async function runDemo({ values, positionals }: Parsed, output: Output): Promise<number> {
  const [directory, surplus] = positionals;
  if (directory === undefined || directory === '') throw new Problem('option-absent', { command: 'demo', option: 'a folder to write to' });
  if (surplus !== undefined) throw new Problem('command-surplus', { command: 'demo', surplus });

  await prepareOutput(resolve(directory), directory);
  const progress = new Progress(output, demoSamples.length);
  const samples = demoSamples.map(({ name, title }) => {
    progress.at(name, 'painting');
    const files = demoFiles(name);
    progress.finished(name, 'painted');
    return { name, title, files };
  });
  const states = await statesOf(directory, samples.flatMap(({ files }) => files));
  const differing = [...states].filter(([, state]) => state === 'differs').map(([file]) => join(directory, file));
  if (differing.length > 0 && values['force'] !== true) throw new Problem('demo-differs', { path: differing[0]!, others: differing.length - 1 });

  for (const { name, title, files } of samples) {
    const pending = files.filter((file) => states.get(file.name) !== 'same');
    for (const file of pending) await writeWhole(directory, file);
    const kept = files.length - pending.length;
    output.out(`${name.padEnd(10)} ${title.padEnd(34)} ${pending.length} ${pending.length === 1 ? 'file' : 'files'} written${kept > 0 ? `, ${kept} there already` : ''}\n`);
  }
  output.out(`\nThe samples are invented, painted from a seed by the tunnelling model; nothing was measured.\nNext: npx evenglow appraise ${directory} --out RESULTS\n`);
  return exitCodes.good;
}

type State = 'absent' | 'same' | 'differs';

/** What lies in the folder under each file's name. */
async function statesOf(directory: string, files: readonly DemoFile[]): Promise<Map<string, State>> {
  const states = new Map<string, State>();
  for (const { name, bytes } of files) {
    try {
      states.set(name, Buffer.compare(await readFile(join(directory, name)), bytes) === 0 ? 'same' : 'differs');
    } catch (error) {
      // Anything but a plain absence (a folder of that name, no permission) shows itself in the writing, with its reason.
      states.set(name, error instanceof Error && 'code' in error && error.code === 'EISDIR' ? 'differs' : 'absent');
    }
  }
  return states;
}

/** A file appears whole or not at all. */
async function writeWhole(directory: string, { name, bytes }: DemoFile): Promise<void> {
  const partial = join(directory, `.${name}.partial`);
  await writable(join(directory, name), async () => {
    try {
      await writeFile(partial, bytes);
      await rename(partial, join(directory, name));
    } catch (error) {
      await rm(partial, { force: true });
      throw error;
    }
  });
}

async function writable(path: string, write: () => Promise<unknown>): Promise<void> {
  try {
    await write();
  } catch (error) {
    throw new Problem('demo-unwritable', { path, reason: error instanceof Error ? error.message : String(error) });
  }
}
