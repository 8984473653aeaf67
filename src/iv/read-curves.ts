/** I–V tables: one line per point under a header that names quantities and units. */
import { notice, Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { cellNumber, cellsOf, delimitingOf } from '../read/cells.ts';
import type { Delimiting } from '../read/cells.ts';
import type { InputFile } from '../read/input.ts';
import { settle } from '../read/matrix.ts';
import { textOf } from '../read/text.ts';
import type { IvCurve } from './curve.ts';
import { readHeader } from './table-header.ts';
import type { IvColumn, IvHeader } from './table-header.ts';
import { temperatureGroups } from './temperature-groups.ts';

/** Lines at the top that may be titles. */
const titleLimit = 200;

/**
 * The curves of a text file. The first line that names a bias or a current is the header, such as
 * `bias_V,current_nA`; lines above it and lines that begin with # or % are skipped. Every current
 * column is a curve; a column `temperature_K` parts each into one curve per temperature. Cells are
 * parted by tab, semicolon, comma or blanks, with a decimal comma where the comma does not part them;
 * empty cells and nan are missing, and a point without bias or current is left out. Sweeps keep the
 * order of the lines. Throws `Problem` naming file, line and value.
 */
export function readCurves(file: InputFile): { curves: readonly IvCurve[]; warnings: readonly Notice[] } {
  const lines = textOf(file.bytes).split(/\r\n|\n|\r/);
  if (lines.every((line) => line.trim() === '')) throw new Problem('file-empty', { file: file.name });
  const { header, headerLine } = findHeader(file.name, lines);
  const rows = readRows(file.name, lines, header, headerLine);
  const stem = file.name.replace(/(?:[._-]iv)?\.[a-z]{3}$/i, '') || file.name;
  const curves = header.currents.flatMap((column, k) => curvesOf(rows, header, column, header.currents.length > 1 ? `${stem} ${labelOf(header.currents, k)}` : stem));
  if (curves.every((curve) => curve.biasV.length === 0)) throw new Problem('iv-no-points', { file: file.name });
  const warnings = header.ignored.length === 0 ? [] : [notice('iv-columns-ignored', { file: file.name, columns: header.ignored.join(', ') })];
  return { curves, warnings };
}

function findHeader(file: string, lines: readonly string[]): { header: IvHeader; headerLine: number } {
  for (let i = 0; i < Math.min(lines.length, titleLimit); i++) {
    if (delimitingOf(lines[i]!) !== undefined) break;
    const header = readHeader(file, i + 1, lines[i]!);
    if (header !== undefined) return { header, headerLine: i };
  }
  throw new Problem('iv-header', { file });
}

/** Numbers of all rows in SI, by column number; columns that are not used stay NaN. */
function readRows(file: string, lines: readonly string[], header: IvHeader, headerLine: number): Float64Array[] {
  const used = [header.bias, ...header.currents, ...(header.temperature === undefined ? [] : [header.temperature])];
  const columns = Math.max(...used.map((column) => column.index)) + 1;
  const how = rowDelimiting(lines, headerLine + 1);
  const rows: Float64Array[] = [];
  for (let i = headerLine + 1; i < lines.length; i++) {
    const text = lines[i]!;
    if (text.trim() === '' || /^\s*[#%]/.test(text)) continue;
    const cells = how === undefined ? [text] : cellsOf(text, how);
    // Rows may leave out what is missing at their end, and hold more than the header names.
    if (cells.length <= header.bias.index || (how === undefined && columns > 1)) throw new Problem('iv-row', { file, line: i + 1, row: text.trim().slice(0, 32), columns });
    const row = new Float64Array(columns).fill(Number.NaN);
    for (const column of used) row[column.index] = numberOf(file, i + 1, column, cells[column.index] ?? '', how?.decimalComma === true);
    rows.push(row);
  }
  return rows;
}

function rowDelimiting(lines: readonly string[], start: number): Delimiting | undefined {
  for (let i = start; i < lines.length; i++) {
    const how = /^\s*[#%]/.test(lines[i]!) ? undefined : delimitingOf(lines[i]!);
    if (how !== undefined) return settle(lines, i, how);
  }
  return undefined;
}

function numberOf(file: string, line: number, column: IvColumn, cell: string, decimalComma: boolean): number {
  const raw = cellNumber(cell.trim().replace(/^"(.*)"$/, '$1'), decimalComma);
  if (raw === undefined) throw new Problem('iv-value', { file, line, column: column.label, value: cell.trim().slice(0, 32) });
  const value = column.toSi(raw);
  if (column.quantity === 'temperature' && value <= 0) throw new Problem('iv-temperature', { file, line, value: cell.trim().slice(0, 32) });
  return Number.isFinite(value) ? value : Number.NaN;
}

/** Equal labels are told apart by their number. */
function labelOf(currents: readonly IvColumn[], k: number): string {
  const label = currents[k]!.label;
  const alike = currents.filter((column) => column.label === label);
  return alike.length > 1 ? `${label} ${alike.indexOf(currents[k]!) + 1}` : label;
}

function curvesOf(rows: readonly Float64Array[], header: IvHeader, column: IvColumn, name: string): IvCurve[] {
  const present = rows.filter((row) => row[header.bias.index]! + row[column.index]! === row[header.bias.index]! + row[column.index]!);
  const { temperature } = header;
  const groups = temperature === undefined ? [{ rows: present, temperatureK: column.temperatureK }] : temperatureGroups(present, (row) => row[temperature.index]!);
  return groups.map(({ rows: points, temperatureK }) => ({
    name: groups.length > 1 ? `${name} ${temperatureK === undefined ? 'without temperature' : `${Number(temperatureK.toPrecision(5))} K`}` : name,
    biasV: Float64Array.from(points, (row) => row[header.bias.index]!),
    currentA: Float64Array.from(points, (row) => row[column.index]!),
    ...(temperatureK === undefined ? {} : { temperatureK }),
  }));
}
