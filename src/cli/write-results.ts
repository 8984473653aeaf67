/** Writes an appraisal's files: a sample's folder appears complete or not at all. */
import { mkdir, rename, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { App, Appraised } from '../report/appraised.ts';
import { resultFiles } from '../report/result-files.ts';
import type { ResultFile, ResultKind } from '../report/result-files.ts';
import { writeTrayPage } from '../report/tray-page.ts';
import { writeTrayCsv, writeTrayLines } from '../report/tray.ts';
import type { TrayRow } from '../report/tray.ts';

export { resultKinds } from '../report/result-files.ts';
export type { ResultKind } from '../report/result-files.ts';

export interface WriteOptions {
  /** Only these kinds; all when absent. */
  readonly only?: ReadonlySet<ResultKind>;
  /** When it aborts, what is half written is removed and the signal's reason is thrown. */
  readonly signal?: AbortSignal;
}

/**
 * Writes one sample's files into `directory/folder` (a name from `folderNames`), replacing a folder that is
 * there. Everything goes to a hidden folder beside it first, which is renamed when the last file is closed,
 * so an interruption leaves the earlier results or none, never a part. Resolves to the folder's path.
 */
export async function writeResults(directory: string, folder: string, appraised: Appraised, app: App, options: WriteOptions = {}): Promise<string> {
  const partial = join(directory, `.${folder}.partial`);
  const target = join(directory, folder);
  await rm(partial, { recursive: true, force: true });
  await mkdir(partial, { recursive: true });
  try {
    for (const { name, content } of wanted(resultFiles(appraised, app), options)) {
      options.signal?.throwIfAborted();
      await writeFile(join(partial, name), content());
    }
    options.signal?.throwIfAborted();
    await replaceFolder(partial, target, join(directory, `.${folder}.replaced`));
  } catch (error) {
    await rm(partial, { recursive: true, force: true });
    throw error;
  }
  return target;
}

/** Writes tray.csv, tray.jsonl and tray.html beside the sample folders, each whole or not at all. */
export async function writeTray(directory: string, rows: readonly TrayRow[], app: App, options: WriteOptions = {}): Promise<void> {
  const files: ResultFile[] = [
    { name: 'tray.csv', kind: 'csv', content: () => writeTrayCsv(rows) },
    { name: 'tray.jsonl', kind: 'json', content: () => writeTrayLines(rows) },
    { name: 'tray.html', kind: 'html', content: () => writeTrayPage(rows, app) },
  ];
  await mkdir(directory, { recursive: true });
  for (const { name, content } of wanted(files, options)) {
    options.signal?.throwIfAborted();
    const partial = join(directory, `.${name}.partial`);
    await writeFile(partial, content());
    await rename(partial, join(directory, name));
  }
}

function wanted(files: readonly ResultFile[], { only }: WriteOptions): readonly ResultFile[] {
  return only === undefined ? files : files.filter(({ kind }) => only.has(kind));
}

/** Not one step on any system, so the old folder is kept under another name until the new one is in place. */
async function replaceFolder(from: string, to: string, aside: string): Promise<void> {
  await rm(aside, { recursive: true, force: true });
  const hadOld = await rename(to, aside).then(() => true, (error: unknown) => {
    if (isMissing(error)) return false;
    throw error;
  });
  try {
    await rename(from, to);
  } catch (error) {
    if (hadOld) await rename(aside, to);
    throw error;
  }
  await rm(aside, { recursive: true, force: true });
}

function isMissing(error: unknown): boolean {
  return error instanceof Error && 'code' in error && error.code === 'ENOENT';
}
