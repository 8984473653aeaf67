/**
 * The directories of a TIFF: which tags each page has and where their values lie.
 * Sources: TIFF Revision 6.0 (Adobe, 1992), section 2; BigTIFF (Aware Systems) for version 43.
 * Every offset and count is checked against the bytes that are really there.
 */
import { Problem } from '../problems/problem.ts';
import type { InputFile } from './input.ts';
import { textOf } from './text.ts';

/** Tag numbers that matter here. */
export const tags = {
  subfileType: 254, columns: 256, rows: 257, bitsPerSample: 258, compression: 259, photometric: 262, description: 270,
  stripOffsets: 273, orientation: 274, samplesPerPixel: 277, rowsPerStrip: 278, stripByteCounts: 279, xResolution: 282, yResolution: 283,
  pageName: 285, resolutionUnit: 296, predictor: 317, tileWidth: 322, tileLength: 323, tileOffsets: 324, tileByteCounts: 325,
  sampleFormat: 339, pixelScale: 33550, geoKeys: 34735, gdalMetadata: 42112, gdalNoData: 42113,
} as const;

interface Field { readonly type: number; readonly count: number; readonly offset: number }

/** Bytes per value of the types 1 to 18; 0 where the standard has none. */
const typeSizes = [0, 1, 1, 2, 4, 8, 1, 1, 2, 4, 8, 4, 8, 4, 0, 0, 8, 8, 8] as const;
/** More pages than any multi-channel scan has; a longer chain is a film or damage. */
const pageLimit = 256;

/** One page: its tags. `place` names it in sentences ("page 2"). */
export class TiffPage {
  readonly place: string;
  readonly littleEndian: boolean;
  private readonly file: InputFile;
  private readonly view: DataView;
  private readonly fields: ReadonlyMap<number, Field>;

  constructor(file: InputFile, view: DataView, littleEndian: boolean, place: string, fields: ReadonlyMap<number, Field>) {
    this.file = file;
    this.view = view;
    this.littleEndian = littleEndian;
    this.place = place;
    this.fields = fields;
  }

  has(tag: number): boolean {
    return this.fields.has(tag);
  }

  /** Number of values of a tag, 0 when absent; says nothing about whether their bytes are there. */
  count(tag: number): number {
    return this.fields.get(tag)?.count ?? 0;
  }

  /** All numbers of a tag (rationals as quotients), empty when the tag is absent. Throws when they lie outside the file. */
  numbers(tag: number): number[] {
    const field = this.fields.get(tag);
    if (field === undefined) return [];
    const size = typeSizes[field.type] ?? 0;
    if (size === 0) throw new Problem('tiff-damaged', { file: this.file.name, place: this.place, reason: `tag ${tag} has the unknown type ${field.type}` });
    this.checkBytes(tag, field, size);
    return Array.from({ length: field.count }, (_, i) => this.numberAt(field.type, field.offset + i * size));
  }

  /** First number of a tag, or `fallback` when the tag is absent or empty. */
  number(tag: number, fallback: number): number {
    return this.numbers(tag)[0] ?? fallback;
  }

  /** Text of a tag without its closing zeros, empty when absent. */
  text(tag: number): string {
    const field = this.fields.get(tag);
    if (field === undefined || (field.type !== 2 && field.type !== 1)) return '';
    this.checkBytes(tag, field, 1);
    return textOf(this.file.bytes.subarray(field.offset, field.offset + field.count)).replace(/\0[\s\S]*$/, '').trim();
  }

  private checkBytes(tag: number, field: Field, size: number): void {
    const end = field.offset + field.count * size;
    if (end > this.file.bytes.length) {
      throw new Problem('file-truncated', { file: this.file.name, place: `tag ${tag} of ${this.place}`, needed: end, present: this.file.bytes.length });
    }
  }

  private numberAt(type: number, at: number): number {
    const { view, littleEndian } = this;
    switch (type) {
      case 3: return view.getUint16(at, littleEndian);
      case 4: case 13: return view.getUint32(at, littleEndian);
      case 5: return view.getUint32(at, littleEndian) / view.getUint32(at + 4, littleEndian);
      case 6: return view.getInt8(at);
      case 8: return view.getInt16(at, littleEndian);
      case 9: return view.getInt32(at, littleEndian);
      case 10: return view.getInt32(at, littleEndian) / view.getInt32(at + 4, littleEndian);
      case 11: return view.getFloat32(at, littleEndian);
      case 12: return view.getFloat64(at, littleEndian);
      case 16: case 18: return Number(view.getBigUint64(at, littleEndian));
      case 17: return Number(view.getBigInt64(at, littleEndian));
      default: return view.getUint8(at);
    }
  }
}

/** Whether the bytes begin like a TIFF or BigTIFF. */
export function looksLikeTiff(bytes: Uint8Array): boolean {
  const [a, b, c, d] = bytes;
  if (a === 0x49 && b === 0x49) return (c === 42 || c === 43) && d === 0;
  return a === 0x4d && b === 0x4d && c === 0 && (d === 42 || d === 43);
}

/** The pages of a TIFF in file order. Throws `file-truncated` or `tiff-damaged`. */
export function tiffPages(file: InputFile): TiffPage[] {
  const { bytes, name } = file;
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const need = (end: number, place: string) => {
    if (!(end <= bytes.length)) throw new Problem('file-truncated', { file: name, place, needed: end, present: bytes.length });
  };
  const littleEndian = bytes[0] === 0x49;
  const big = bytes[2] === 43 || bytes[3] === 43;
  need(big ? 16 : 8, 'the header');
  if (big && view.getUint16(4, littleEndian) !== 8) throw new Problem('tiff-damaged', { file: name, place: 'the header', reason: 'its offsets are not of 8 bytes' });
  const pointer = (at: number) => (big ? Number(view.getBigUint64(at, littleEndian)) : view.getUint32(at, littleEndian));
  const [countSize, entrySize, inline] = big ? [8, 20, 8] : [2, 12, 4];

  const pages: TiffPage[] = [];
  const seen = new Set<number>();
  let at = pointer(big ? 8 : 4);
  while (at !== 0) {
    const place = `page ${pages.length + 1}`;
    if (seen.has(at)) throw new Problem('tiff-damaged', { file: name, place, reason: 'its list of pages runs in a circle' });
    if (pages.length === pageLimit) throw new Problem('tiff-damaged', { file: name, place, reason: `more than ${pageLimit} pages are a film, not a scan` });
    seen.add(at);
    need(at + countSize, `the directory of ${place}`);
    const entries = big ? Number(view.getBigUint64(at, littleEndian)) : view.getUint16(at, littleEndian);
    const end = at + countSize + entries * entrySize;
    need(end, `the directory of ${place}`);
    const fields = new Map<number, Field>();
    for (let entry = at + countSize; entry < end; entry += entrySize) {
      const type = view.getUint16(entry + 2, littleEndian);
      const count = pointer(entry + 4);
      const valueAt = entry + entrySize - inline;
      const fits = count * (typeSizes[type] ?? 0) <= inline;
      fields.set(view.getUint16(entry, littleEndian), { type, count, offset: fits ? valueAt : pointer(valueAt) });
    }
    pages.push(new TiffPage(file, view, littleEndian, place, fields));
    // Some writers end the file right after the last directory, without the closing zero.
    at = end + inline <= bytes.length ? pointer(end) : 0;
  }
  if (pages.length === 0) throw new Problem('tiff-damaged', { file: name, place: 'page 1', reason: 'it has no page' });
  return pages;
}
