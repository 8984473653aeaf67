/**
 * NumPy's array file: one 2-D array of plain real numbers.
 * Source: NumPy Enhancement Proposal 1 and numpy.lib.format, versions 1.0 to 3.0.
 */
import { Problem } from '../problems/problem.ts';
import { checkSize } from './decoded-map.ts';
import type { DecodedMap, Values } from './decoded-map.ts';
import type { InputFile } from './input.ts';
import { nativeLittleEndian, numbersFrom, swapBytes } from './numeric.ts';
import type { NumberKind } from './numeric.ts';
import { textOf } from './text.ts';

interface NpyHeader {
  readonly descr: string;
  readonly fortranOrder: boolean;
  readonly shape: readonly number[];
  /** Where the values begin. */
  readonly dataAt: number;
}

/** Whether the bytes begin like an .npy file. */
export function looksLikeNpy(bytes: Uint8Array): boolean {
  return bytes[0] === 0x93 && bytes[1] === 0x4e && bytes[2] === 0x55 && bytes[3] === 0x4d && bytes[4] === 0x50 && bytes[5] === 0x59;
}

/** The map in an .npy file; it states neither unit nor size. Throws `Problem` for other shapes and types and for missing bytes. */
export function decodeNpy(file: InputFile): DecodedMap[] {
  const header = npyHeader(file);
  const { kind, size, littleEndian } = npyType(file.name, header.descr);
  const { shape } = header;
  if (shape.length !== 2) {
    throw new Problem('npy-shape', { file: file.name, dimensions: shape.length, shape: `(${shape.join(', ')}${shape.length === 1 ? ',' : ''})` });
  }
  const [rows, columns] = shape as [number, number];
  checkSize(file.name, columns, rows);
  const needed = header.dataAt + rows * columns * size;
  if (needed > file.bytes.length) {
    throw new Problem('file-truncated', { file: file.name, place: `an array of ${rows} × ${columns}`, needed, present: file.bytes.length });
  }
  const bytes = file.bytes.slice(header.dataAt, needed);
  if (size > 1 && littleEndian !== nativeLittleEndian) swapBytes(bytes, size);
  const stored = numbersFrom(bytes, kind, size);
  return [{ label: '', columns, rows, values: header.fortranOrder ? byRows(stored, columns, rows) : stored, pitches: [] }];
}

function npyHeader(file: InputFile): NpyHeader {
  const { bytes, name } = file;
  const damaged = (reason: string) => new Problem('npy-damaged', { file: name, reason });
  const need = (end: number) => {
    if (end > bytes.length) throw new Problem('file-truncated', { file: name, place: 'the header', needed: end, present: bytes.length });
  };
  need(10);
  const version = bytes[6]!;
  if (version < 1 || version > 3) throw damaged(`array file version ${version} is not known`);
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const textAt = version === 1 ? 10 : 12;
  need(textAt);
  const length = version === 1 ? view.getUint16(8, true) : view.getUint32(8, true);
  need(textAt + length);
  const text = textOf(bytes.subarray(textAt, textAt + length));
  const structured = /'descr':\s*\[/.test(text);
  const descr = structured ? 'structured' : /'descr':\s*'([^']*)'/.exec(text)?.[1];
  const order = /'fortran_order':\s*(True|False)/.exec(text)?.[1];
  const shape = /'shape':\s*\(([\d\s,L]*)\)/.exec(text)?.[1];
  if (descr === undefined || order === undefined || shape === undefined) throw damaged('its header cannot be understood');
  const sides = shape.split(',').map((side) => side.replace(/[\sL]/g, '')).filter((side) => side !== '').map(Number);
  return { descr, fortranOrder: order === 'True', shape: sides, dataAt: textAt + length };
}

const kinds: Readonly<Record<string, NumberKind>> = { b: 'unsigned', u: 'unsigned', i: 'signed', f: 'float' };

function npyType(file: string, descr: string): { kind: NumberKind; size: number; littleEndian: boolean } {
  const parts = /^([<>|=])?([buif])(\d+)$/.exec(descr);
  const kind = kinds[parts?.[2] ?? ''];
  const size = Number(parts?.[3]);
  const sizes = kind === 'float' ? [2, 4, 8] : parts?.[2] === 'b' ? [1] : [1, 2, 4, 8];
  if (parts === null || kind === undefined || !sizes.includes(size)) throw new Problem('npy-type', { file, type: descr });
  return { kind, size, littleEndian: parts[1] !== '>' };
}

/** Column by column (Fortran order) to row by row. */
function byRows(stored: Values, columns: number, rows: number): Values {
  const out = stored instanceof Float32Array ? new Float32Array(stored.length) : new Float64Array(stored.length);
  for (let c = 0; c < columns; c++) {
    for (let r = 0, from = c * rows, to = c; r < rows; r++, from++, to += columns) out[to] = stored[from]!;
  }
  return out;
}
