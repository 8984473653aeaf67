/** Writes an appraisal's files: a sample's folder appears complete or not at all. */
import { mkdir, rename, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { App, Appraised } from '../report/appraised.ts';
import { writeReport } from '../report/report.ts';
import { resultMaps } from '../report/result-maps.ts';
import { writeFlawsCsv, writeLedgerCsv } from '../report/tables.ts';
import { writeTrayPage } from '../report/tray-page.ts';
import { writeTrayCsv, writeTrayLines } from '../report/tray.ts';
import type { TrayRow } from '../report/tray.ts';
import { writeVerdict } from '../report/verdict.ts';

/** Kinds of files that `--only` names. */
export const resultKinds = ['json', 'csv', 'tif', 'html', 'gds', 'dxf', 'svg'] as const;
export type ResultKind = (typeof resultKinds)[number];

interface ResultFile {
  readonly file: string;
  readonly kind: ResultKind;
  readonly content: () => string | Uint8Array;
}

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
    for (const { file, content } of wanted(sampleFiles(appraised, app), options)) {
      options.signal?.throwIfAborted();
      await writeFile(join(partial, file), content());
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
    { file: 'tray.csv', kind: 'csv', content: () => writeTrayCsv(rows) },
    { file: 'tray.jsonl', kind: 'json', content: () => writeTrayLines(rows) },
    { file: 'tray.html', kind: 'html', content: () => writeTrayPage(rows, app) },
  ];
  await mkdir(directory, { recursive: true });
  for (const { file, content } of wanted(files, options)) {
    options.signal?.throwIfAborted();
    const partial = join(directory, `.${file}.partial`);
    await writeFile(partial, content());
    await rename(partial, join(directory, file));
  }
}

function sampleFiles(appraised: Appraised, app: App): ResultFile[] {
  return [
    ...resultMaps(appraised).map(({ file, bytes }): ResultFile => ({ file, kind: 'tif', content: bytes })),
    { file: 'ledger.csv', kind: 'csv', content: () => writeLedgerCsv(appraised.ledger) },
    { file: 'flaws.csv', kind: 'csv', content: () => writeFlawsCsv(appraised.flaws) },
    { file: 'report.html', kind: 'html', content: () => writeReport(appraised, app) },
    { file: 'verdict.json', kind: 'json', content: () => writeVerdict(appraised, app) },
  ];
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
