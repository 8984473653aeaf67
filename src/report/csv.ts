/** Comma-separated tables (RFC 4180) that a spreadsheet opens without running anything in them. */
export type Cell = string | number | boolean | undefined;

/**
 * A table as text: header first, comma, decimal point, line feed after every line, UTF-8 without a
 * byte-order mark. Missing numbers (NaN, infinite) and undefined cells are empty. Text with a comma,
 * quote or line break is quoted; text that a spreadsheet would take for a formula gets a leading apostrophe.
 * Throws a RangeError when a row is not as long as the header.
 */
export function writeCsv(header: readonly string[], rows: readonly (readonly Cell[])[]): string {
  const lines = [header, ...rows].map((row, index) => {
    if (row.length !== header.length) throw new RangeError(`row ${index} has ${row.length} cells, the header ${header.length}`);
    return `${row.map(cellText).join(',')}\n`;
  });
  return lines.join('');
}

function cellText(cell: Cell): string {
  if (cell === undefined) return '';
  // Numbers stay numbers, so a negative one must not meet the guard against formulas.
  if (typeof cell === 'number') return Number.isFinite(cell) ? String(cell === 0 ? 0 : cell) : '';
  if (typeof cell === 'boolean') return String(cell);
  return quoted(withoutFormula(cell));
}

/** Full-width signs are included: spreadsheets in some locales read them as formulas too. */
function withoutFormula(text: string): string {
  return /^(\s*[=+\-@＝＋－＠]|[\t\r\n])/u.test(text) ? `'${text}` : text;
}

function quoted(text: string): string {
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
