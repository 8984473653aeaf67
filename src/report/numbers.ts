/** Numbers as a reader sees them: few significant digits, true minus, unit after a no-break space. */
const missing = '–';
const noBreak = '\u00a0';
const raised: Readonly<Record<string, string>> = {
  '-': '⁻', 0: '⁰', 1: '¹', 2: '²', 3: '³', 4: '⁴', 5: '⁵', 6: '⁶', 7: '⁷', 8: '⁸', 9: '⁹',
};
const prefixes: readonly (readonly [exponent: number, prefix: string])[] = [
  [0, ''], [-3, 'm'], [-6, 'µ'], [-9, 'n'], [-12, 'p'], [-15, 'f'], [-18, 'a'],
];

/** `digits` significant digits; powers of ten outside 0.001–99999; an en dash for NaN, infinite and undefined. */
export function figure(value: number | undefined, digits = 3): string {
  if (value === undefined || !Number.isFinite(value)) return missing;
  if (value === 0) return '0';
  const [mantissa = '', exponentText = '0'] = value.toExponential(digits - 1).split('e');
  const exponent = Number(exponentText);
  if (exponent < -3 || exponent > 4) return `${signed(mantissa)}${noBreak}×${noBreak}10${powerText(exponent)}`;
  return signed(value.toFixed(Math.max(0, digits - 1 - exponent)));
}

/** A fixed number of decimals, for columns that must line up. */
export function fixed(value: number | undefined, decimals: number): string {
  return value === undefined || !Number.isFinite(value) ? missing : signed(value.toFixed(decimals));
}

/** A figure and its unit; only the dash when there is no value. */
export function withUnit(value: number | undefined, unit: string, digits = 3): string {
  const text = figure(value, digits);
  return text === missing || unit === '' ? text : `${text}${noBreak}${unit}`;
}

/** A number as somebody gave it (a bias, a round tick): up to six significant digits, no trailing zeros. */
export function plain(value: number | undefined): string {
  return value === undefined || !Number.isFinite(value) ? missing : signed(String(Number(value.toPrecision(6))));
}

/** A count and its noun. */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count}${noBreak}${count === 1 ? one : many}`;
}

/** A value in a unit that takes SI prefixes (1.18e-10 A → 118 pA). */
export function withPrefix(value: number | undefined, unit: string, digits = 3): string {
  if (value === undefined || !Number.isFinite(value)) return missing;
  if (value === 0) return `0${noBreak}${unit}`;
  const [exponent, prefix] = prefixOf(value, digits);
  return `${figure(value / 10 ** exponent, digits)}${noBreak}${prefix}${unit}`;
}

/**
 * A value and its standard error in one unit, the error to one digit and the value to the same place: "150.0 ± 0.3 fA". The value alone where the error is missing
 * or nothing. Without a unit no prefix is taken.
 */
export function withError(value: number, error: number | undefined, unit: string): string {
  if (error === undefined || !Number.isFinite(error) || !(error > 0) || !Number.isFinite(value)) return unit === '' ? figure(value) : withPrefix(value, unit);
  const larger = Math.max(Math.abs(value), error);
  const [exponent, prefix] = unit === '' ? [0, ''] : prefixOf(larger, 12);
  // Rounded first: 0.96 is 1 and has no decimals.
  const shown = Number((error / 10 ** exponent).toPrecision(1));
  const decimals = Math.max(0, -Math.floor(Math.log10(shown)));
  const text = `${fixed(value / 10 ** exponent, decimals)} ± ${fixed(shown, decimals)}`;
  return unit === '' ? text : `${text}${noBreak}${prefix}${unit}`;
}

/** A height in nm, no finer than a tenth of the map's noise. */
export function heightFigure(nm: number | undefined, noiseNm: number | undefined, digits = 3): string {
  const text = figure(nm, digits);
  if (nm === undefined || !Number.isFinite(nm) || nm === 0 || noiseNm === undefined || !(noiseNm > 0)) return text;
  const decimals = Math.max(0, Math.floor(1 - Math.log10(noiseNm) + 1e-9));
  const own = digits - 1 - Math.floor(Math.log10(Math.abs(nm)));
  return own > decimals ? fixed(nm, decimals) : text;
}

/** A current in amperes, or a bare figure when the file gave none. */
export function currentText(value: number | undefined, unit: 'A' | 'relative', digits = 3): string {
  return unit === 'A' ? withPrefix(value, 'A', digits) : figure(value, digits);
}

/** A share as per cent, one decimal below ten. */
export function percent(share: number | undefined): string {
  if (share === undefined || !Number.isFinite(share)) return missing;
  const value = share * 100;
  if (value > 0 && value < 0.05) return `<${noBreak}0.1${noBreak}%`;
  return `${value.toFixed(value < 9.95 && value > 0 ? 1 : 0)}${noBreak}%`;
}

/** `low – high unit`; a single dash where either end is missing. */
export function interval(low: number | undefined, high: number | undefined, unit: string, digits = 3): string {
  if (figure(low) === missing || figure(high) === missing) return missing;
  return `${figure(low, digits)}${noBreak}–${noBreak}${withUnit(high, unit, digits)}`;
}

/** Decimals that show one ten-thousandth of `largest`, so that a column's smallest entries are not all zero. */
export function decimalsFor(largest: number): number {
  return largest > 0 ? Math.min(8, Math.max(0, 4 - Math.ceil(Math.log10(largest)))) : 2;
}

/** Largest 1, 2 or 5 times a power of ten that is not above `value` (above 0). */
export function niceBelow(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value) + 1e-9);
  const lead = value / power;
  return Number(((lead >= 5 ? 5 : lead >= 2 ? 2 : 1) * power).toPrecision(1));
}

/** Rounded first, so that 999.6 pA becomes 1.00 nA. */
function prefixOf(value: number, digits: number): readonly [exponent: number, prefix: string] {
  const magnitude = Math.floor(Math.log10(Math.abs(Number(value.toPrecision(digits)))));
  return prefixes.find(([power]) => power <= magnitude) ?? prefixes[prefixes.length - 1] ?? [0, ''];
}

function signed(text: string): string {
  return /^-0(\.0*)?$/.test(text) ? text.slice(1) : text.replace('-', '−');
}

function powerText(exponent: number): string {
  return Array.from(String(exponent), (letter) => raised[letter] ?? '').join('');
}
