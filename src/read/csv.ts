/** Records of a CSV text. Source: RFC 4180 (2005), with any one-character delimiter. */

/** Cells of one record and the line (from 1) on which it begins. */
export interface CsvRecord {
  readonly line: number;
  readonly cells: readonly string[];
}

/**
 * Records of a CSV: quoted cells may hold delimiters, line ends and doubled quotes. Cells outside quotes are
 * trimmed; lines without any text are left out. A quote that is never closed runs to the end of the text.
 */
export function csvRecords(text: string, delimiter: string): CsvRecord[] {
  const records: CsvRecord[] = [];
  let cells: string[] = [];
  let cell = '';
  let quoted = false;
  let wasQuoted = false;
  let line = 1;
  let begins = 1;
  const endCell = () => {
    cells.push(wasQuoted ? cell : cell.trim());
    cell = '';
    wasQuoted = false;
  };
  const endRecord = () => {
    endCell();
    if (cells.some((c) => c !== '')) records.push({ line: begins, cells });
    cells = [];
    begins = line + 1;
  };
  for (let i = 0; i < text.length; i++) {
    const character = text[i]!;
    if (quoted) {
      if (character === '\n') line++;
      if (character !== '"') cell += character;
      else if (text[i + 1] === '"') { cell += '"'; i++; } else quoted = false;
    } else if (character === '"' && cell.trim() === '') {
      quoted = true;
      wasQuoted = true;
      cell = '';
    } else if (character === delimiter) {
      endCell();
    } else if (character === '\n' || character === '\r') {
      if (character === '\r' && text[i + 1] === '\n') i++;
      endRecord();
      line++;
    } else if (!wasQuoted || character.trim() !== '') {
      cell += character;
    }
  }
  if (cell !== '' || cells.length > 0) endRecord();
  return records;
}
