/** A manifest: a CSV whose first header is `sample`, one row per sample, columns as a sidecar's keys. */
import { Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { csvRecords } from './csv.ts';
import type { InputFile } from './input.ts';
import { checkStated, statedKeys, statedNumbers, unknownKeys } from './sidecar.ts';
import type { Stated, StatedKey } from './sidecar.ts';
import { textOf } from './text.ts';

export interface ManifestRow {
  /** Line in the manifest, from 1. */
  readonly line: number;
  readonly sample: string;
  /** The row's statements, or why they cannot be used: then only this sample fails. */
  readonly stated: Stated | Problem;
}

export interface Manifest {
  readonly file: string;
  readonly rows: readonly ManifestRow[];
  readonly warnings: readonly Notice[];
}

const delimiters = [',', ';', '\t'] as const;

/** Whether a text file is a manifest: its first cell is the word `sample`. */
export function isManifest(bytes: Uint8Array): boolean {
  const start = textOf(bytes.subarray(0, 256));
  // A tray's own table of results begins alike.
  return /^\uFEFF?\s*"?sample"?\s*(?:[,;\t\r\n]|$)/.test(start) && !start.startsWith('sample,group,rank,');
}

/**
 * Reads a manifest. Wrong values spoil their own row only; a row without a name, or with the name of an
 * earlier row, or longer than the header is such a row too. Unknown columns are ignored with a remark.
 * With semicolons as delimiter numbers may have a decimal comma. Throws `manifest-sample` when there is no row.
 */
export function readManifest(file: InputFile): Manifest {
  const text = textOf(file.bytes);
  const firstLine = /^[^\r\n]*/.exec(text)![0];
  const delimiter = delimiters.find((mark) => firstLine.includes(mark)) ?? ',';
  const [header, ...records] = csvRecords(text, delimiter);
  if (header === undefined || records.length === 0) throw new Problem('manifest-sample', { file: file.name, line: 1, reason: 'the manifest has no row; add one line per sample' });
  const columns = header.cells;
  const seen = new Set<string>();
  const rows = records.map(({ line, cells }, i): ManifestRow => {
    const sample = cells[0] ?? '';
    const bad = (reason: string) => new Problem('manifest-sample', { file: file.name, line, reason });
    const fallback = sample === '' ? `row-${i + 1}` : sample;
    if (sample === '') return { line, sample: fallback, stated: bad('the row names no sample; fill its first column') };
    if (seen.has(sample)) return { line, sample: fallback, stated: bad(`sample ${sample} is named twice; give each sample one row`) };
    seen.add(sample);
    if (cells.length > columns.length) return { line, sample, stated: bad(`the row has ${cells.length} cells under ${columns.length} headers; quote cells that hold a "${delimiter}"`) };
    try {
      const value = Object.fromEntries(columns.map((key, c) => [key, cellValue(key, cells[c] ?? '', delimiter)] as const).filter(([, cell]) => cell !== ''));
      return { line, sample, stated: checkStated(file.name, value, (key) => `line ${line}, ${key}`) };
    } catch (error) {
      if (error instanceof Problem) return { line, sample, stated: error };
      throw error;
    }
  });
  const unknown = columns.filter((key) => key !== '' && !statedKeys.includes(key as StatedKey));
  return { file: file.name, rows, warnings: unknown.length === 0 ? [] : [unknownKeys(file.name, unknown)] };
}

/** A number where the column holds numbers and the cell is one; the text otherwise, which the check then refuses by name. */
function cellValue(key: string, cell: string, delimiter: string): string | number {
  if (cell === '' || !statedNumbers.includes(key as StatedKey)) return cell;
  const value = Number(delimiter === ',' ? cell : cell.replace(',', '.'));
  return Number.isNaN(value) ? cell : value;
}
