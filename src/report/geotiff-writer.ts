/**
 * One map as one uncompressed, striped, little-endian TIFF page (TIFF 6.0) with GeoTIFF scale and
 * tie point (OGC 19-008r4, sections 7.1.2 and 7.1.3), in µm: what any image library and any GIS opens.
 */
import type { Grid } from '../grid/maps.ts';
import { toUm } from './units.ts';

export type TiffValues = Uint8Array | Uint32Array | Float32Array;

const SHORT = 3;
const LONG = 4;
const ASCII = 2;
const DOUBLE = 12;
const entryBytes = 12;
const headerBytes = 8;
const stripTargetBytes = 65536;
const fileLimitBytes = 2 ** 32 - 1;
/** GeoKeys: version 1.1.0, two keys; model type user-defined (32767, no place on Earth), a pixel is an area (1). */
const geoKeys = [1, 1, 0, 2, 1024, 0, 1, 32767, 1025, 0, 1, 1];

interface Entry {
  readonly tag: number;
  readonly type: typeof SHORT | typeof LONG | typeof ASCII | typeof DOUBLE;
  readonly values: readonly number[];
}

/**
 * @param grid map size and pitch; row 0 of the values is the picture's top
 * @param values row-major, length rows·columns, written bit for bit (NaN included)
 * @param description text of the ImageDescription tag; characters outside ASCII are not allowed by TIFF
 * @returns the file. Pixel (0,0)'s outer corner is tied to (0, map height) in µm, so x grows right and y up
 *   from the lower-left corner. Float maps declare NaN as their missing value (GDAL_NODATA).
 * Throws a RangeError when the length does not fit, the description is not ASCII, or the file would pass 4 GiB.
 */
export function writeGeoTiff(grid: Grid, values: TiffValues, description: string): Uint8Array {
  const { columns, rows } = grid;
  if (values.length !== columns * rows) throw new RangeError(`a map of ${columns} × ${rows} pixels needs ${columns * rows} values, got ${values.length}`);
  const rowBytes = columns * values.BYTES_PER_ELEMENT;
  const rowsPerStrip = Math.max(1, Math.min(rows, Math.floor(stripTargetBytes / rowBytes)));
  const strips = Math.ceil(rows / rowsPerStrip);
  const stripBytes = Array.from({ length: strips }, (_, strip) => Math.min(rowsPerStrip, rows - strip * rowsPerStrip) * rowBytes);
  const isFloat = values instanceof Float32Array;
  const pitchY = toUm(grid.pitchYM);
  const entries = (firstStrip: number): Entry[] => [
    { tag: 256, type: LONG, values: [columns] },
    { tag: 257, type: LONG, values: [rows] },
    { tag: 258, type: SHORT, values: [values.BYTES_PER_ELEMENT * 8] },
    { tag: 259, type: SHORT, values: [1] },
    { tag: 262, type: SHORT, values: [1] },
    { tag: 270, type: ASCII, values: asciiBytes(description) },
    { tag: 273, type: LONG, values: stripBytes.map((_, strip) => firstStrip + strip * rowsPerStrip * rowBytes) },
    { tag: 277, type: SHORT, values: [1] },
    { tag: 278, type: LONG, values: [rowsPerStrip] },
    { tag: 279, type: LONG, values: stripBytes },
    { tag: 339, type: SHORT, values: [isFloat ? 3 : 1] },
    { tag: 33550, type: DOUBLE, values: [toUm(grid.pitchXM), pitchY, 0] },
    { tag: 33922, type: DOUBLE, values: [0, 0, 0, 0, toUm(rows * grid.pitchYM), 0] },
    { tag: 34735, type: SHORT, values: geoKeys },
    ...(isFloat ? [{ tag: 42113, type: ASCII, values: asciiBytes('nan') } satisfies Entry] : []),
  ];
  const pixelStart = directoryEnd(entries(0));
  const total = pixelStart + rows * rowBytes;
  if (total > fileLimitBytes) throw new RangeError(`a TIFF of ${total} bytes would pass the format's limit of 4 GiB`);
  const file = new Uint8Array(total);
  writeDirectory(new DataView(file.buffer), entries(pixelStart));
  writePixels(file, pixelStart, values);
  return file;
}

/** Where pixels may start: after the directory and its outlying values, on a multiple of four. */
function directoryEnd(entries: readonly Entry[]): number {
  const outlying = entries.map(bytesOf).filter((bytes) => bytes > 4).reduce((sum, bytes) => sum + even(bytes), 0);
  return Math.ceil((outlyingStart(entries) + outlying) / 4) * 4;
}

const outlyingStart = (entries: readonly Entry[]): number => headerBytes + 2 + entries.length * entryBytes + 4;
const even = (bytes: number): number => bytes + (bytes % 2);

function bytesOf(entry: Entry): number {
  const size = { [SHORT]: 2, [LONG]: 4, [ASCII]: 1, [DOUBLE]: 8 }[entry.type];
  return entry.values.length * size;
}

function writeDirectory(view: DataView, entries: readonly Entry[]): void {
  view.setUint16(0, 0x4949, true);
  view.setUint16(2, 42, true);
  view.setUint32(4, headerBytes, true);
  view.setUint16(headerBytes, entries.length, true);
  let outlying = outlyingStart(entries);
  entries.forEach((entry, index) => {
    const at = headerBytes + 2 + index * entryBytes;
    view.setUint16(at, entry.tag, true);
    view.setUint16(at + 2, entry.type, true);
    view.setUint32(at + 4, entry.values.length, true);
    if (bytesOf(entry) <= 4) {
      writeValues(view, at + 8, entry);
      return;
    }
    view.setUint32(at + 8, outlying, true);
    writeValues(view, outlying, entry);
    outlying += even(bytesOf(entry));
  });
}

function writeValues(view: DataView, start: number, { type, values }: Entry): void {
  values.forEach((value, index) => {
    if (type === SHORT) view.setUint16(start + index * 2, value, true);
    else if (type === LONG) view.setUint32(start + index * 4, value, true);
    else if (type === DOUBLE) view.setFloat64(start + index * 8, value, true);
    else view.setUint8(start + index, value);
  });
}

function writePixels(file: Uint8Array, start: number, values: TiffValues): void {
  const hostIsLittleEndian = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1;
  const bytes = new Uint8Array(values.buffer, values.byteOffset, values.byteLength);
  file.set(bytes, start);
  if (hostIsLittleEndian || values.BYTES_PER_ELEMENT === 1) return;
  for (let at = start; at < file.length; at += 4) file.subarray(at, at + 4).reverse();
}

/** Character codes with the closing zero that TIFF asks for. */
function asciiBytes(text: string): number[] {
  const codes = Array.from(text, (letter) => letter.charCodeAt(0));
  if (codes.some((code) => code === 0 || code > 126)) throw new RangeError('a TIFF description may only hold ASCII characters');
  return [...codes, 0];
}
