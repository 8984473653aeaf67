/** The header of an I–V table: which column holds what, in which unit. */
import { Problem } from '../problems/problem.ts';
import type { Delimiting } from '../read/cells.ts';
import { knownUnit, siFactor } from '../read/units.ts';

/** One column; `toSi` turns the number in the file into V, A or K. */
export interface IvColumn {
  readonly quantity: 'bias' | 'current' | 'temperature';
  /** The header without its unit, as the file spells it. */
  readonly label: string;
  /** Number of the column, from 0. */
  readonly index: number;
  readonly toSi: (value: number) => number;
  /** Kelvin that the label itself states ("current_300K_nA"). */
  readonly temperatureK?: number;
}

export interface IvHeader {
  readonly bias: IvColumn;
  readonly currents: readonly IvColumn[];
  readonly temperature?: IvColumn;
  /** Headers of columns that are not used. */
  readonly ignored: readonly string[];
}

const words = {
  bias: /^(?:sample|tip)?[\s_-]*(?:bias|voltage|volts?|v|u)(?![a-z])/i,
  current: /^(?:current|i)(?![a-z])/i,
  temperature: /^(?:temperature|temp|t)(?![a-z])/i,
} as const;
const biasUnits: Readonly<Record<string, number>> = { kV: 1e3, V: 1, mV: 1e-3, uV: 1e-6 };
const celsius = /^(?:°\s*C|deg ?C|C)$/;

/**
 * The columns that a line names, undefined when it does not name both a bias and a current (then it is
 * a title or a row of numbers). Throws `Problem` for a unit that is missing or not one of the quantity,
 * and for a bias or temperature that stands there twice.
 */
export function readHeader(file: string, line: number, text: string): IvHeader | undefined {
  const cells = headerCells(text);
  const quantities = cells.map((cell) => quantityOf(splitUnit(cell).label));
  if (!quantities.includes('bias') || !quantities.includes('current')) return undefined;
  const columns: IvColumn[] = [];
  const ignored: string[] = [];
  cells.forEach((cell, index) => {
    const quantity = quantities[index];
    if (quantity === undefined) ignored.push(cell);
    else columns.push(columnOf(file, line, cell, quantity, index));
  });
  const of = (quantity: IvColumn['quantity']): IvColumn[] => columns.filter((column) => column.quantity === quantity);
  for (const quantity of ['bias', 'temperature'] as const) {
    const [first, second] = of(quantity);
    if (first && second) throw new Problem('iv-column-twice', { file, line, quantity, first: cells[first.index]!, second: cells[second.index]! });
  }
  const [temperature] = of('temperature');
  return { bias: of('bias')[0]!, currents: of('current'), ignored, ...(temperature === undefined ? {} : { temperature }) };
}

/** A header may be a comment ("# bias_V,current_nA"), quoted, and closed by a delimiter. */
function headerCells(text: string): string[] {
  const line = text.replace(/^\s*[#%]\s*/, '');
  const mark = (['\t', ';', ','] as const satisfies readonly Delimiting['delimiter'][]).find((one) => line.includes(one));
  // Blanks part columns only where no unit is set off by one: "bias_V current_nA", not "bias (V)".
  const cells = (mark === undefined ? line.trim().split(/\s+/) : line.split(mark)).map((cell) => cell.trim().replace(/^"(.*)"$/, '$1').trim());
  while (cells.length > 0 && cells.at(-1) === '') cells.pop();
  return cells;
}

/** "current (nA)", "current [nA]", "current / nA", "current_nA", "current nA". */
function splitUnit(cell: string): { label: string; unit?: string } {
  const parts = /^(.*?)[\s_]*[([]([^()[\]]+)[)\]]$/.exec(cell) ?? /^(.*?)\s*\/\s*(\S+)$/.exec(cell) ?? /^(.+)[\s_]([^\s_]+)$/.exec(cell);
  return parts === null ? { label: cell } : { label: parts[1]!.trim(), unit: parts[2]!.trim() };
}

function quantityOf(label: string): IvColumn['quantity'] | undefined {
  return (['bias', 'current', 'temperature'] as const).find((quantity) => words[quantity].test(label.replaceAll('_', ' ')));
}

function columnOf(file: string, line: number, cell: string, quantity: IvColumn['quantity'], index: number): IvColumn {
  const { label, unit } = splitUnit(cell);
  const toSi = unit === undefined ? undefined : conversion(quantity, unit.replace(/[µμ]/g, 'u'));
  if (toSi === undefined) throw new Problem('iv-unit', { file, line, column: cell, quantity });
  const stated = quantity === 'current' ? /(?:^|[\s_@])(\d+(?:\.\d+)?)\s?K(?![a-z])/i.exec(label) : null;
  return { quantity, label, index, toSi, ...(stated === null || !(Number(stated[1]) > 0) ? {} : { temperatureK: Number(stated[1]) }) };
}

/** Undefined for a unit that is none of the quantity. */
function conversion(quantity: IvColumn['quantity'], unit: string): ((value: number) => number) | undefined {
  switch (quantity) {
    case 'bias': {
      const factor = Object.hasOwn(biasUnits, unit) ? biasUnits[unit] : undefined;
      return factor === undefined ? undefined : scaled(factor);
    }
    case 'current': {
      const known = knownUnit(unit);
      // A current without amperes gives a slope, but no intercept, no floor and no density.
      return known?.quantity === 'current' && known.unit !== 'relative' ? scaled(siFactor(known)) : undefined;
    }
    case 'temperature':
      if (unit === 'K') return (value) => value;
      if (unit === 'mK') return scaled(1e-3);
      return celsius.test(unit) ? (value) => value + 273.15 : undefined;
  }
}

/** Dividing by a whole power of ten is exact where multiplying by its inverse is not. */
function scaled(factor: number): (value: number) => number {
  const inverse = Math.round(1 / factor);
  return factor < 1 ? (value) => value / inverse : (value) => value * factor;
}
