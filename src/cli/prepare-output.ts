/** Makes sure that results can be written before any work is done for them. */
import { mkdir, rm, stat, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { Problem } from '../problems/problem.ts';

/**
 * Creates a folder with its parents and writes a first file into it, which is removed again.
 *
 * @param folder absolute path; @throws Problem `output-unwritable` naming the path as the person gave it.
 */
export async function prepareOutput(folder: string, given: string): Promise<void> {
  try {
    await createFolder(folder);
    const probe = join(folder, '.writable');
    await writeFile(probe, '');
    await rm(probe);
  } catch (error) {
    throw new Problem('output-unwritable', { path: given, reason: reasonOf(error) });
  }
}

/** One level at a time: a recursive call does not come back on file systems that refuse folders without saying so. */
async function createFolder(folder: string): Promise<void> {
  const found = await stat(folder).catch(() => undefined);
  if (found) {
    if (!found.isDirectory()) throw new Error('it is a file');
    return;
  }
  if (dirname(folder) !== folder) await createFolder(dirname(folder));
  await mkdir(folder).catch((error: unknown) => {
    // Somebody else may have made it meanwhile.
    if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error;
  });
}

function reasonOf(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : '';
  const words: Readonly<Record<string, string>> = { EACCES: 'no permission', EPERM: 'no permission', EROFS: 'the disk is read-only', ENOSPC: 'the disk is full', ENOENT: 'the place takes no folders', ENOTDIR: 'a part of it is a file' };
  return words[code] ?? (error instanceof Error ? error.message : String(error));
}
