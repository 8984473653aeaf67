/** The numbers of one TIFF page: decoded by geotiff, then orientation and missing values applied. */
import type { GeoTIFFImage, TypedArray } from 'geotiff';
import { Problem } from '../problems/problem.ts';
import type { Values } from './decoded-map.ts';
import type { InputFile } from './input.ts';
import { mirrorMap } from './mirror.ts';
import { numbersFrom } from './numeric.ts';
import { boundedDecoders } from './tiff-decoders.ts';
import { tags } from './tiff-directory.ts';
import type { TiffPage } from './tiff-directory.ts';
import type { TiffLayout } from './tiff-layout.ts';

const formats = { unsigned: 1, signed: 2, float: 3 } as const;

/** Values of a page, row 0 at the top, NaN where the file says missing. The file's bytes are not changed. */
export async function tiffValues(file: InputFile, page: TiffPage, layout: TiffLayout): Promise<Values> {
  // Loaded only when a TIFF is read.
  const geotiff = await import('geotiff');
  const image = await openImage(geotiff, file, page, layout);
  let stored: TypedArray;
  try {
    const pool = layout.compression === 1 ? null : boundedDecoders(geotiff);
    stored = (await image.readRasters({ interleave: false, pool }))[0]!;
  } catch (error) {
    // Uncompressed blocks have been checked to the last byte: then it is not the file.
    if (layout.compression === 1) throw error;
    throw new Problem('tiff-damaged', { file: file.name, place: page.place, reason: 'its compressed data are damaged or end too early' });
  }
  const out = toValues(stored, page, layout);
  leaveOut(out, layout);
  markMissing(out, page.text(tags.gdalNoData));
  orient(file.name, page, layout, out);
  return out;
}

/** Integers of 64 bits, which geotiff does not know, are read as pairs of words. */
function inPairs(layout: TiffLayout): boolean {
  return layout.size === 8 && layout.kind !== 'float';
}

/** geotiff 3.0.5 undoes predictor 2 in the machine's byte order, wrong for big-endian files: it then only reads the differences. */
function inDifferences(page: TiffPage, layout: TiffLayout): boolean {
  return layout.predictor === 2 && layout.size > 1 && !page.littleEndian;
}

/** geotiff 3.0.5 fails where a block of half floats is left out and holds an odd number of them: they are read as words. */
function inHalves(layout: TiffLayout): boolean {
  return layout.size === 2 && layout.kind === 'float';
}

/**
 * The page as geotiff sees it: with a directory of the checked numbers only. Its own parsing believes every count,
 * allocates for it, and misreads long lists of strips in big-endian files.
 */
async function openImage(geotiff: typeof import('geotiff'), file: InputFile, page: TiffPage, layout: TiffLayout): Promise<GeoTIFFImage> {
  const { fromArrayBuffer, GeoTIFFImage, ImageFileDirectory } = geotiff;
  const { bytes } = file;
  const whole = bytes.byteLength === bytes.buffer.byteLength ? bytes : bytes.slice();
  const { source } = await fromArrayBuffer(whole.buffer as ArrayBuffer);

  const { columns, rows, kind, size, compression, predictor, blockColumns, blockRows, blocks, tiled } = layout;
  const words = inPairs(layout) ? 2 : 1;
  const differences = inDifferences(page, layout);
  const offsets = blocks.map((block) => block.offset);
  const counts = blocks.map((block) => block.length);
  const directory = new Map<number | string, number | number[]>([
    [tags.columns, columns * words], [tags.rows, rows], [tags.samplesPerPixel, 1], [tags.bitsPerSample, [8 * size / words]],
    [tags.sampleFormat, [words === 2 || differences || inHalves(layout) ? formats.unsigned : formats[kind]]],
    [tags.compression, compression], [tags.predictor, differences ? 1 : predictor],
  ]);
  if (tiled) directory.set(tags.tileWidth, blockColumns * words).set(tags.tileLength, blockRows).set(tags.tileOffsets, offsets).set(tags.tileByteCounts, counts);
  else directory.set(tags.rowsPerStrip, blockRows).set(tags.stripOffsets, offsets).set(tags.stripByteCounts, counts);
  // Undoing predictor 3 leaves the numbers low byte first, whatever the file's order; geotiff 3.0.5 forgets that.
  const littleEndian = page.littleEndian || predictor === 3;
  return new GeoTIFFImage(new ImageFileDirectory(directory, new Map(), new Map(), 0), littleEndian, false, source);
}

/** Types of at most 16 bits and single floats as Float32Array (exact), all others as Float64Array (beyond 2^53 rounded). */
function toValues(stored: TypedArray, page: TiffPage, layout: TiffLayout): Values {
  const { columns, blockColumns, kind, size } = layout;
  if (inPairs(layout)) return joinPairs(stored, kind === 'signed', page.littleEndian);
  if (inDifferences(page, layout)) {
    for (let i = 1; i < stored.length; i++) if ((i % columns) % blockColumns !== 0) stored[i] = stored[i]! + stored[i - 1]!;
  }
  if (inDifferences(page, layout) || inHalves(layout)) return numbersFrom(new Uint8Array(stored.buffer), kind, size);
  if (stored instanceof Float32Array || stored instanceof Float64Array) return stored;
  return size <= 2 ? new Float32Array(stored) : new Float64Array(stored);
}

function joinPairs(words: TypedArray, signed: boolean, lowFirst: boolean): Float64Array {
  const out = new Float64Array(words.length / 2);
  for (let i = 0; i < out.length; i++) {
    const high = words[2 * i + (lowFirst ? 1 : 0)]!;
    out[i] = (signed ? high | 0 : high) * 2 ** 32 + words[2 * i + (lowFirst ? 0 : 1)]!;
  }
  return out;
}

/** Blocks that the file leaves out hold nothing; geotiff gives zeros. */
function leaveOut(values: Values, layout: TiffLayout): void {
  const { columns, rows, blockColumns, blockRows } = layout;
  for (const { length, firstRow, firstColumn } of layout.blocks) {
    if (length > 0) continue;
    const width = Math.min(blockColumns, columns - firstColumn);
    for (let r = firstRow; r < Math.min(firstRow + blockRows, rows); r++) {
      values.fill(Number.NaN, r * columns + firstColumn, r * columns + firstColumn + width);
    }
  }
}

/** GDAL's convention: tag 42113 holds the number that stands for missing, as text. */
function markMissing(values: Values, text: string): void {
  const stated = Number(text);
  if (text === '' || Number.isNaN(stated)) return;
  const missing = values instanceof Float32Array ? Math.fround(stated) : stated;
  for (let i = 0; i < values.length; i++) if (values[i] === missing) values[i] = Number.NaN;
}

/** Tag 274: 1 is as stored, 2 to 4 are mirrored, 5 to 8 lie on their side. */
function orient(file: string, page: TiffPage, layout: TiffLayout, values: Values): void {
  const orientation = page.number(tags.orientation, 1);
  if (orientation >= 5 && orientation <= 8) {
    throw new Problem('tiff-damaged', { file, place: page.place, reason: `its orientation tag (${orientation}) lays the picture on its side` });
  }
  mirrorMap(values, layout.columns, layout.rows, orientation === 2 || orientation === 3, orientation === 3 || orientation === 4);
}
