/** Lines of text to cells, and cells to numbers; how a table of numbers is delimited is found from the lines themselves. */

/** How the cells of a line are parted and written. */
export interface Delimiting {
  readonly delimiter: '\t' | ';' | ',' | ' ';
  readonly decimalComma: boolean;
  /** Every row ends with a delimiter, which then closes the row and is no empty cell. */
  readonly closed: boolean;
}

const missingWords = /^(?:|[+-]?(?:nan|inf|infinity)|na|n\/a|null|-?1\.#.*)$/i;

/** The number in a cell, NaN where it says missing, undefined where it is something else. */
export function cellNumber(cell: string, decimalComma: boolean): number | undefined {
  const text = decimalComma ? cell.replace(',', '.') : cell;
  const value = Number(text);
  if (value === value) {
    // Number() takes blanks for 0 and understands 0x, 0b, 0o, which no table means.
    const second = text.charCodeAt(1) | 32;
    if (second === 120 || second === 98 || second === 111) return undefined;
    if (text.trim() !== '') return value;
  }
  return missingWords.test(text.trim()) ? Number.NaN : undefined;
}

/** Cells of one line. */
export function cellsOf(line: string, how: Delimiting): string[] {
  if (how.delimiter === ' ') return line.trim().split(/\s+/);
  const cells = line.split(how.delimiter);
  if (how.closed) cells.pop();
  return cells;
}

/**
 * How a line of numbers is delimited; undefined when no way of parting it gives at least two cells
 * that are all numbers or missing, at least one of them a number. Tab before semicolon before comma
 * before blanks, so that "1,5;2,5" is two numbers with a decimal comma.
 */
export function delimitingOf(line: string): Delimiting | undefined {
  for (const delimiter of ['\t', ';', ',', ' '] as const) {
    for (const decimalComma of delimiter === ',' ? [false] : [false, true]) {
      const how = { delimiter, decimalComma, closed: false };
      const cells = cellsOf(line, how);
      if (cells.length >= 2 && isNumberRow(cells, decimalComma)) return how;
    }
  }
  return undefined;
}

/** Whether all cells are numbers or missing and at least one is a number. */
export function isNumberRow(cells: readonly string[], decimalComma: boolean): boolean {
  let numbers = 0;
  for (const cell of cells) {
    const value = cellNumber(cell, decimalComma);
    if (value === undefined) return false;
    if (value === value || cell.trim() !== '') numbers++;
  }
  return numbers > 0;
}
