/** From files on offer to samples. */
import { filesOf, groupInputs, wantsContent } from '../src/read/pairing.ts';
import type { OfferedFile } from '../src/read/pairing.ts';
import { Problem } from '../src/problems/problem.ts';
import type { SourceFile } from './api.ts';
import type { Offers } from './local-compute.ts';

/** Texts larger than this are not looked into for grouping: no manifest or note is. */
const lookIntoBytes = 256 * 2 ** 20;

/** Groups files by manifest and name. Reads the texts among them; all others only when a sample is appraised. */
export async function offersOf(files: readonly SourceFile[]): Promise<Offers> {
  const byName = new Map<string, SourceFile>();
  const twice: { name: string; reason: string }[] = [];
  for (const file of files) {
    if (byName.has(file.name)) twice.push({ name: file.name, reason: 'another file of the same name was given with it' });
    else byName.set(file.name, file);
  }
  const unreadable: { name: string; message: string }[] = [];
  const offered: OfferedFile[] = [];
  for (const file of byName.values()) {
    try {
      offered.push(wantsContent(file.name) && sizeOf(file) <= lookIntoBytes ? { name: file.name, bytes: await bytesOf(file) } : { name: file.name });
    } catch (error) {
      if (!(error instanceof Problem)) throw error;
      unreadable.push({ name: file.name, message: error.message });
    }
  }
  const { samples, skipped, failed } = groupInputs(offered);
  return {
    samples: samples.map((group) => {
      const names = filesOf(group);
      return { name: group.name, files: names, source: { kind: 'files', group, files: names.flatMap((name) => byName.get(name) ?? []) } };
    }),
    skipped: [...skipped, ...twice],
    failed: [...failed.map(({ name, problem }) => ({ name, message: problem.message })), ...unreadable],
  };
}

/** @throws Problem `input-unreadable`, for example when a file on disk was changed after it was chosen. */
export async function bytesOf({ name, content }: SourceFile): Promise<Uint8Array> {
  if (content instanceof Uint8Array) return content;
  try {
    return new Uint8Array(await content.arrayBuffer());
  } catch (error) {
    throw new Problem('input-unreadable', { path: name, reason: error instanceof Error ? error.message : String(error) });
  }
}

function sizeOf({ content }: SourceFile): number {
  return content instanceof Uint8Array ? content.byteLength : content.size;
}
