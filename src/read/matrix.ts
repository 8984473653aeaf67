/** A map as text: one line per row, cells parted by tab, semicolon, comma or blanks. */
import { Problem } from '../problems/problem.ts';
import { cellNumber, cellsOf, delimitingOf, isNumberRow } from './cells.ts';
import type { Delimiting } from './cells.ts';
import { checkSize } from './decoded-map.ts';
import type { DecodedMap } from './decoded-map.ts';
import type { InputFile } from './input.ts';
import { textOf } from './text.ts';

/** Lines at the top that may be headers. */
const headerLimit = 200;

/**
 * The map in a text file. Lines above the first row of numbers and lines that begin with # or % are
 * skipped and nothing is guessed from them. Empty cells, nan and inf are missing. The decimal mark is
 * a point, or a comma where tab, semicolon or blanks part the cells. The file states no unit and no size.
 * Throws `Problem` naming the line for ragged rows and cells that are no number.
 */
export function decodeMatrix(file: InputFile): DecodedMap[] {
  const lines = textOf(file.bytes).split(/\r\n|\n|\r/);
  while (lines.length > 0 && lines.at(-1)!.trim() === '') lines.pop();
  const start = firstRow(lines);
  if (start === undefined) throw new Problem('file-unrecognised', { file: file.name, why: 'text without rows of numbers' });
  refuseOtherTables(file.name, lines, start.line);
  const how = settle(lines, start.line, start.how);

  const columns = cellsOf(lines[start.line]!, how).length;
  let first = start.line;
  // Rows of empty cells above the first number belong to the map.
  while (first > 0 && isEmptyRow(lines[first - 1]!, how, columns)) first--;
  const rowLines: number[] = [];
  for (let i = first; i < lines.length; i++) if (!isSkipped(lines[i]!)) rowLines.push(i);
  if (columns <= 3 && rowLines.length > columns * 2) {
    throw new Problem('file-unrecognised', { file: file.name, why: `${columns} columns are a list of points, not a map` });
  }
  const values = new Float64Array(columns * rowLines.length);
  let at = 0;
  for (const line of rowLines) {
    const cells = cellsOf(lines[line]!, how);
    if (cells.length !== columns) {
      throw new Problem('matrix-ragged', { file: file.name, line: line + 1, found: cells.length, firstLine: start.line + 1, expected: columns });
    }
    for (let c = 0; c < columns; c++) {
      const value = cellNumber(cells[c]!, how.decimalComma);
      if (value === undefined) throw new Problem('matrix-value', { file: file.name, line: line + 1, column: c + 1, value: cells[c]!.trim().slice(0, 32) });
      values[at++] = value;
    }
  }
  checkSize(file.name, columns, rowLines.length);
  return [{ label: '', columns, rows: rowLines.length, values, pitches: [] }];
}

/** Whether the head of a text file (its last line may be cut) has two rows of the same number of cells, at least four. */
export function looksLikeMatrix(head: Uint8Array): boolean {
  const lines = textOf(head.subarray(0, 1 << 18)).split(/\r\n|\n|\r/);
  const start = firstRow(lines);
  if (start === undefined || /^\s*ncols\s/i.test(lines[0]!)) return false;
  const columns = cellsOf(lines[start.line]!, start.how).length;
  if (columns < 4) return false;
  const next = lines.slice(start.line + 1).find((line) => !isSkipped(line));
  // One long line may fill the head: then the one row has to do.
  return next === undefined || start.line + 2 >= lines.length || isNumberRow(cellsOf(next, start.how), start.how.decimalComma);
}

function isSkipped(line: string): boolean {
  return line.trim() === '' ? !line.includes('\t') && !line.includes(';') && !line.includes(',') : /^\s*[#%]/.test(line);
}

function isEmptyRow(line: string, how: Delimiting, columns: number): boolean {
  if (how.delimiter === ' ' || !line.includes(how.delimiter)) return false;
  const cells = cellsOf(line, how);
  return cells.length === columns && cells.every((cell) => cell.trim() === '');
}

function firstRow(lines: readonly string[]): { line: number; how: Delimiting } | undefined {
  for (let i = 0; i < Math.min(lines.length, headerLimit); i++) {
    const line = lines[i]!;
    if (isSkipped(line)) continue;
    const how = delimitingOf(line);
    if (how !== undefined) return { line: i, how };
  }
  return undefined;
}

/** One line may not show which mark is the decimal one ("1;2;3"), nor whether rows are closed by a delimiter: a few dozen do. */
export function settle(lines: readonly string[], first: number, how: Delimiting): Delimiting {
  const sample = lines.slice(first, first + 64).filter((line) => !isSkipped(line));
  const decimalComma = how.delimiter !== ',' && sample.some((line) => line.includes(',')) && !sample.some((line) => line.includes('.'));
  const closed = how.delimiter !== ' ' && sample.every((line) => line.endsWith(how.delimiter));
  return { ...how, decimalComma, closed };
}

/** Grids of maps (ncols, nrows …) and standard surface files are other formats, not rows of numbers with a header. */
function refuseOtherTables(file: string, lines: readonly string[], start: number): void {
  const header = lines.slice(0, Math.max(start, 1)).map((line) => line.trim().toLowerCase());
  if (/^[{[<]/.test(header[0]!)) throw new Problem('file-unrecognised', { file, why: 'structured text, not rows of numbers' });
  if (header.some((line) => /^ncols\s/.test(line))) throw new Problem('file-unrecognised', { file, why: 'a grid with a header of its own' });
  if (header.some((line) => line.startsWith('iso/tc 201'))) throw new Problem('file-unrecognised', { file, why: 'an ISO 28600 file' });
}
