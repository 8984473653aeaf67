/** How the pixels of one TIFF page are stored; refuses what is not a map of numbers before anything is allocated. */
import { Problem } from '../problems/problem.ts';
import { checkSize } from './decoded-map.ts';
import type { InputFile } from './input.ts';
import type { NumberKind } from './numeric.ts';
import { tags } from './tiff-directory.ts';
import type { TiffPage } from './tiff-directory.ts';
import { packedLength, packedLimit } from './tiff-packed.ts';

/** One strip or tile: where its bytes lie and which pixels they hold. */
export interface TiffBlock {
  readonly offset: number;
  /** Bytes that belong to it, never more than the file has; 0 for a block that was left out. */
  readonly length: number;
  readonly firstRow: number;
  readonly firstColumn: number;
}

export interface TiffLayout {
  readonly columns: number;
  readonly rows: number;
  readonly kind: NumberKind;
  readonly size: number;
  readonly compression: number;
  readonly predictor: number;
  readonly tiled: boolean;
  readonly blockColumns: number;
  readonly blockRows: number;
  readonly blocks: readonly TiffBlock[];
}

/** Codes of tag 259 that are read, and the most bytes that one stored byte can stand for. */
const expansion: ReadonlyMap<number, number> = new Map([[1, 1], [5, 2800], [8, 1032], [32946, 1032], [32773, 64]]);
const kinds: ReadonlyMap<number, NumberKind> = new Map([[1, 'unsigned'], [2, 'signed'], [3, 'float']]);

/** Layout of a page. Throws for colour, palettes, drawings, unread types and compressions, impossible sizes and missing bytes. */
export function tiffLayout(file: InputFile, page: TiffPage): TiffLayout {
  const name = file.name;
  const { place } = page;
  const columns = page.number(tags.columns, 0);
  const rows = page.number(tags.rows, 0);
  refusePictures(name, page);
  checkSize(name, columns, rows);

  const bits = page.number(tags.bitsPerSample, 1);
  const format = page.number(tags.sampleFormat, 1);
  const kind = kinds.get(format);
  const size = bits / 8;
  const readable = kind === 'float' ? [2, 4, 8] : [1, 2, 4, 8];
  if (kind === undefined || !readable.includes(size)) {
    const word = kind ?? (format === 5 || format === 6 ? 'complex' : 'untyped');
    throw new Problem('tiff-type', { file: name, place, type: `${word} values of ${bits} bits` });
  }
  const compression = page.number(tags.compression, 1);
  const ratio = expansion.get(compression);
  if (ratio === undefined) throw new Problem('tiff-compression', { file: name, place, compression });
  const predictor = compression === 1 ? 1 : page.number(tags.predictor, 1);
  if (predictor < 1 || predictor > 3 || (predictor === 3 && kind !== 'float') || (predictor === 2 && size === 8)) {
    throw new Problem('tiff-damaged', { file: name, place, reason: `predictor ${predictor} does not fit ${bits}-bit values` });
  }
  const tiled = page.has(tags.tileWidth);
  const blockColumns = tiled ? page.number(tags.tileWidth, 0) : columns;
  const blockRows = tiled ? page.number(tags.tileLength, 0) : Math.min(page.number(tags.rowsPerStrip, rows), rows);
  if (!(blockColumns >= 1 && blockRows >= 1)) throw new Problem('tiff-damaged', { file: name, place, reason: 'its strips or tiles have no size' });
  checkSize(name, Math.max(blockColumns, 4), Math.max(blockRows, 4));

  const blocks = blockList(file, page, { columns, rows, blockColumns, blockRows, size, compression, ratio, tiled });
  return { columns, rows, kind, size, compression, predictor, tiled, blockColumns, blockRows, blocks };
}

function refusePictures(file: string, page: TiffPage): void {
  const { place } = page;
  const photometric = page.number(tags.photometric, 1);
  const samples = page.number(tags.samplesPerPixel, 1);
  // 2 RGB, 3 palette, 5 inks, 6 YCbCr, 8 CIELab
  if ([2, 3, 5, 6, 8].includes(photometric)) throw new Problem('tiff-colour', { file, place });
  const bits = page.number(tags.bitsPerSample, 1);
  if (bits < 8) throw new Problem('tiff-bilevel', { file, place, bits });
  if (samples !== 1) throw new Problem('tiff-samples', { file, place, samples });
}

interface Tiling {
  readonly columns: number; readonly rows: number; readonly blockColumns: number; readonly blockRows: number;
  readonly size: number; readonly compression: number; readonly ratio: number; readonly tiled: boolean;
}

function blockList(file: InputFile, page: TiffPage, t: Tiling): TiffBlock[] {
  const { place } = page;
  const [offsetTag, countTag] = t.tiled ? [tags.tileOffsets, tags.tileByteCounts] : [tags.stripOffsets, tags.stripByteCounts];
  const across = Math.ceil(t.columns / t.blockColumns);
  const down = Math.ceil(t.rows / t.blockRows);
  const what = t.tiled ? 'tiles' : 'strips';
  if (page.count(offsetTag) < across * down) {
    throw new Problem('tiff-damaged', { file: file.name, place, reason: `it lists ${page.count(offsetTag)} ${what} where its size needs ${across * down}` });
  }
  const offsets = page.numbers(offsetTag);
  const counts = page.numbers(countTag);
  const blocks: TiffBlock[] = [];
  const present = file.bytes.length;
  const whole = t.blockRows * t.blockColumns * t.size;
  let stored = 0;
  let needed = 0;
  for (let i = 0; i < across * down; i++) {
    const firstRow = Math.floor(i / across) * t.blockRows;
    // A tile stores all its rows, even beyond the map's edge; the last strip only those of the map.
    const full = (t.tiled ? t.blockRows : Math.min(t.blockRows, t.rows - firstRow)) * t.blockColumns * t.size;
    const offset = offsets[i]!;
    const stated = counts[i];
    const leftOut = offset === 0 && (stated ?? 0) === 0;
    // Files in the wild overstate the count of uncompressed strips; what the pixels need is what counts.
    const wanted = t.ratio === 1 ? full : Math.min(stated ?? Infinity, 2 * whole + 65536);
    const length = leftOut ? 0 : Math.max(0, Math.min(wanted, present - offset));
    if (!leftOut && t.ratio === 1 && stated !== undefined && stated < full) {
      throw new Problem('tiff-damaged', { file: file.name, place, reason: `it gives a block ${stated} bytes where its pixels need ${full}` });
    }
    if (!leftOut && length * t.ratio < full) {
      throw new Problem('file-truncated', { file: file.name, place: `the data of ${place}`, needed: offset + Math.ceil(full / t.ratio), present });
    }
    stored += length;
    needed += leftOut ? 0 : full;
    blocks.push({ offset, length, firstRow, firstColumn: (i % across) * t.blockColumns });
  }
  // Many blocks may point at the same bytes to claim more pixels than the file can hold.
  if (needed > Math.min(stored, present) * t.ratio) {
    throw new Problem('file-truncated', { file: file.name, place: `the data of ${place}`, needed: Math.ceil(needed / t.ratio), present });
  }
  if (needed === 0) throw new Problem('channel-missing', { file: file.name });
  return t.compression === 5 || t.compression === 32773 ? walkedBlocks(file, place, blocks, t) : blocks;
}

/** The same blocks, each cut to the bytes that its pixels need. */
function walkedBlocks(file: InputFile, place: string, blocks: readonly TiffBlock[], t: Tiling): TiffBlock[] {
  const damaged = (reason: string) => new Problem('tiff-damaged', { file: file.name, place, reason });
  const whole = t.blockRows * t.blockColumns * t.size;
  if (whole > packedLimit) throw damaged(`a block of ${whole} bytes is too large for compression ${t.compression} (at most ${packedLimit})`);
  return blocks.map((block) => {
    if (block.length === 0) return block;
    const full = t.tiled ? whole : Math.min(whole, (t.rows - block.firstRow) * t.blockColumns * t.size);
    const length = packedLength(file.bytes.subarray(block.offset, block.offset + block.length), t.compression, full, whole + 65536);
    if (length === undefined) throw damaged('its compressed data are damaged or end too early');
    return { ...block, length };
  });
}
