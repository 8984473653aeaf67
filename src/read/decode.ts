/** Chooses the decoder by the file's first bytes, never by its name. */
import { Problem } from '../problems/problem.ts';
import type { DecodedMap } from './decoded-map.ts';
import type { InputFile } from './input.ts';
import { decodeMatrix } from './matrix.ts';
import { decodeNpy, looksLikeNpy } from './npy.ts';
import { looksLikeText } from './text.ts';
import { decodeTiff } from './tiff.ts';
import { looksLikeTiff } from './tiff-directory.ts';

/** Formats that are told apart only to say what a refused file is. */
const others: readonly (readonly [what: string, ...first: number[]])[] = [
  ['an HDF5 file', 0x89, 0x48, 0x44, 0x46],
  ['a NetCDF file', 0x43, 0x44, 0x46],
  ['a ZIP archive', 0x50, 0x4b, 0x03, 0x04],
  ['a PNG picture', 0x89, 0x50, 0x4e, 0x47],
  ['a JPEG picture', 0xff, 0xd8, 0xff],
  ['a PDF document', 0x25, 0x50, 0x44, 0x46],
];

/**
 * All maps in a file, each with what the file itself states. The file's bytes are not changed.
 * Throws `Problem`: `file-empty`, `file-unrecognised`, or what the decoder has to say.
 */
export async function decodeMaps(given: InputFile): Promise<DecodedMap[]> {
  // A plain view: in Node's own byte arrays slice() shares memory instead of copying.
  const bytes = new Uint8Array(given.bytes.buffer, given.bytes.byteOffset, given.bytes.byteLength);
  const { name } = given;
  const file = { name, bytes };
  if (bytes.length === 0) throw new Problem('file-empty', { file: name });
  if (looksLikeTiff(bytes)) return decodeTiff(file);
  if (looksLikeNpy(bytes)) return decodeNpy(file);
  const other = others.find(([, ...first]) => first.every((byte, i) => bytes[i] === byte));
  if (other !== undefined) throw new Problem('file-unrecognised', { file: name, why: other[0] });
  if (looksLikeText(bytes)) return decodeMatrix(file);
  throw new Problem('file-unrecognised', { file: name });
}
