/** The numbers of one TIFF page: blocks put together, orientation and missing values applied. */
import { Problem } from '../problems/problem.ts';
import type { Values } from './decoded-map.ts';
import type { InputFile } from './input.ts';
import { emptyValues, numbersFrom } from './numeric.ts';
import { mirrorMap } from './mirror.ts';
import { tags } from './tiff-directory.ts';
import type { TiffPage } from './tiff-directory.ts';
import type { TiffLayout } from './tiff-layout.ts';
import { undoPredictor, unpackBlock } from './tiff-unpack.ts';

/** Values of a page, row 0 at the top, NaN where the file says missing. Each block is decoded once. */
export async function tiffValues(file: InputFile, page: TiffPage, layout: TiffLayout): Promise<Values> {
  const { columns, rows, kind, size, blockColumns } = layout;
  const out = emptyValues(kind, size, columns * rows);
  for (const block of layout.blocks) {
    if (block.length === 0) continue;
    const expected = block.storedRows * blockColumns * size;
    const stored = file.bytes.subarray(block.offset, block.offset + block.length);
    const bytes = await unpackBlock(file.name, page.place, stored, layout.compression, expected);
    if (bytes.length < expected) {
      throw new Problem('file-truncated', { file: file.name, place: `a block of ${page.place}`, needed: expected, present: bytes.length });
    }
    undoPredictor(bytes, layout.predictor, blockColumns, size, page.littleEndian);
    const values = numbersFrom(bytes, kind, size);
    if (blockColumns === columns) {
      out.set(values.subarray(0, Math.min(values.length, (rows - block.firstRow) * columns)), block.firstRow * columns);
      continue;
    }
    const keptRows = Math.min(block.storedRows, rows - block.firstRow);
    const keptColumns = Math.min(blockColumns, columns - block.firstColumn);
    for (let r = 0; r < keptRows; r++) {
      out.set(values.subarray(r * blockColumns, r * blockColumns + keptColumns), (block.firstRow + r) * columns + block.firstColumn);
    }
  }
  markMissing(out, page.text(tags.gdalNoData));
  orient(file.name, page, layout, out);
  return out;
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
