/** What a sample was read from, by content: equal records and an equal recipe give an equal sample. */
import { filesOf } from './pairing.ts';
import type { SampleGroup } from './pairing.ts';
import type { SourceRecord } from './sample.ts';
import { statedKeys } from './sidecar.ts';
import { bytesOfText } from './text.ts';

/**
 * Records of a group's files in the order of `filesOf`, and one of its manifest row, called by its place ("tray.csv line 2"). The row counts by what it
 * states and by the remarks on its manifest, not by the manifest's bytes, so that a change in another sample's row leaves this one as it was.
 */
export async function sourceRecords(group: SampleGroup, bytesOf: (name: string) => Uint8Array, sha256: (bytes: Uint8Array) => Promise<string>): Promise<SourceRecord[]> {
  const contents = filesOf(group).map((name) => ({ name, bytes: bytesOf(name) }));
  if (group.row !== undefined) contents.push({ name: group.row.by, bytes: bytesOfText(rowText(group, group.row)) });
  return Promise.all(contents.map(async ({ name, bytes }) => ({ name, sha256: await sha256(bytes), bytes: bytes.length })));
}

/** The row as text, whatever the order of its columns, its quotes and its decimal marks. */
function rowText(group: SampleGroup, { stated }: NonNullable<SampleGroup['row']>): string {
  const cells = statedKeys.flatMap((key) => (stated[key] === undefined ? [] : [[key, stated[key]] as const]));
  return JSON.stringify([Object.fromEntries(cells), group.warnings.map(({ message }) => message)]);
}
