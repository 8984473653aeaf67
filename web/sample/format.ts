/** Numbers as the Sample place shows them: three significant digits, true minus, unit after a no-break space. */
const missing = '–';
const noBreak = '\u00a0';
const raised: Readonly<Record<string, string>> = {
  '-': '⁻', 0: '⁰', 1: '¹', 2: '²', 3: '³', 4: '⁴', 5: '⁵', 6: '⁶', 7: '⁷', 8: '⁸', 9: '⁹',
};
const prefixes: Readonly<Record<number, string>> = {
  [-18]: 'a', [-15]: 'f', [-12]: 'p', [-9]: 'n', [-6]: 'µ', [-3]: 'm', 0: '', 3: 'k', 6: 'M', 9: 'G',
};

/** `digits` significant digits; a power of ten outside 0.0001–99999; an en dash for NaN, infinite and undefined. */
export function figure(value: number | undefined, digits = 3): string {
  if (value === undefined || !Number.isFinite(value)) return missing;
  if (value === 0) return '0';
  const [mantissa = '', exponentText = '0'] = value.toExponential(digits - 1).split('e');
  const exponent = Number(exponentText);
  if (exponent < -4 || exponent > 4) return signed(`${mantissa}·10${Array.from(String(exponent), (letter) => raised[letter] ?? '').join('')}`);
  return signed(value.toFixed(Math.max(0, digits - 1 - exponent)));
}

/**
 * An area in a column whose entries add up to `total`: three significant digits, but no more decimals than a ten-thousandth of the whole asks for, so
 * that a cause of one pixel does not look the most exact of all. What is below that is "<0.01".
 */
export function ledgerFigure(value: number, total: number): string {
  const decimals = total > 0 ? Math.min(12, Math.max(0, 4 - Math.floor(Math.log10(total)))) : 2;
  const least = 10 ** -decimals;
  if (value > 0 && value < least) return `<${least.toFixed(decimals)}`;
  const text = figure(value);
  const own = /\.(\d+)$/.exec(text)?.[1]?.length ?? 0;
  return own > decimals ? fixed(value, decimals) : text;
}

/** A number as somebody gave it: up to six significant digits, no trailing zeros. */
export function plain(value: number | undefined): string {
  return value === undefined || !Number.isFinite(value) ? missing : signed(String(Number(value.toPrecision(6))));
}

/** A fixed number of decimals, for columns that must line up. */
export function fixed(value: number | undefined, decimals: number): string {
  return value === undefined || !Number.isFinite(value) ? missing : signed(value.toFixed(decimals));
}

/** A figure and its unit; the dash alone when there is no value, the figure alone without a unit. */
export function withUnit(value: number | undefined, unit: string, digits = 3): string {
  return joined(figure(value, digits), unit);
}

/** A value in the base unit with the SI prefix that leaves 1–999 before it: 1.18e-10 A is "118 pA". */
export function withPrefix(value: number | undefined, unit: string, digits = 3): string {
  if (value === undefined || !Number.isFinite(value)) return missing;
  if (value === 0) return joined('0', unit);
  const power = prefixPower(value, digits);
  return joined(figure(value / 10 ** power, digits), `${prefixes[power] ?? ''}${unit}`);
}

/**
 * A value and its standard error in one unit, the error to one digit and the value to the same place: "150.0 ± 0.3 fA". The value alone, to three digits, where
 * the error is missing or nothing.
 */
export function withError(value: number, error: number | undefined, unit: string): string {
  if (error === undefined || !Number.isFinite(error) || !(error > 0) || !Number.isFinite(value)) return withPrefix(value, unit);
  const power = unit === '' ? 0 : prefixPower(Math.max(Math.abs(value), error), 12);
  const inUnit = error / 10 ** power;
  // Rounded first: 0.96 is 1 and has no decimals.
  const place = Math.floor(Math.log10(Number(inUnit.toPrecision(1))));
  const decimals = Math.max(0, -place);
  return joined(`${fixed(value / 10 ** power, decimals)} ± ${fixed(Number(inUnit.toPrecision(1)), decimals)}`, `${prefixes[power] ?? ''}${unit}`);
}

/** A height of the map in nm: `digits` significant digits, but no finer than a tenth of the map's noise. */
export function heightText(nm: number | undefined, noiseNm: number | undefined, digits = 3): string {
  return joined(heightFigure(nm, noiseNm, digits), 'nm');
}

/** The same without its unit. */
export function heightFigure(nm: number | undefined, noiseNm: number | undefined, digits = 3): string {
  const text = figure(nm, digits);
  if (nm === undefined || !Number.isFinite(nm) || nm === 0 || noiseNm === undefined || !(noiseNm > 0)) return text;
  const decimals = Math.max(0, Math.floor(1 - Math.log10(noiseNm) + 1e-9));
  const own = digits - 1 - Math.floor(Math.log10(Math.abs(nm)));
  return own > decimals ? fixed(nm, decimals) : text;
}

/** An area in µm². */
export function area(um2: number | undefined): string {
  return withUnit(um2, 'µm²');
}

/** Densities that nA/µm² would make hard to read. */
function asksForPrefix(naPerUm2: number): boolean {
  return naPerUm2 !== 0 && (Math.abs(naPerUm2) < 0.01 || Math.abs(naPerUm2) >= 1e4);
}

/** A current density given in nA/µm²; prefixes other than nano when they read better. */
export function density(naPerUm2: number | undefined): string {
  if (naPerUm2 === undefined || !Number.isFinite(naPerUm2)) return missing;
  return asksForPrefix(naPerUm2) ? withPrefix(naPerUm2 * 1e-9, 'A/µm²', 2) : withUnit(naPerUm2, 'nA/µm²', 2);
}

/** The interval of a density beside it: bare numbers in the density's own unit, or both ends with theirs where that is not nA/µm². */
export function densitySpan(naPerUm2: number, low: number, high: number): string {
  if (!asksForPrefix(naPerUm2)) return span(low, high, 2);
  return `${withPrefix(low * 1e-9, 'A/µm²', 2)} – ${withPrefix(high * 1e-9, 'A/µm²', 2)}`;
}

/** A bias: one decimal, more when it was given with more. */
export function volts(value: number | undefined): string {
  if (value === undefined || !Number.isFinite(value)) return missing;
  const rounded = Math.round(value * 100) / 100;
  return joined(fixed(rounded, Number.isInteger(Math.round(rounded * 1000) / 100) ? 1 : 2), 'V');
}

/** A device's bias: as given, or to three digits where it is proposed; the verdict's sentence prints it so too. */
export function biasText({ biasV, proposed }: { readonly biasV: number; readonly proposed: boolean }): string {
  return joined(plain(proposed ? Number(biasV.toPrecision(3)) : biasV), 'V');
}

/** A share as per cent: one decimal below ten, "<0.1 %" for what rounds to nothing. */
export function percent(share: number | undefined): string {
  if (share === undefined || !Number.isFinite(share)) return missing;
  const value = share * 100;
  if (value > 0 && value < 0.05) return `<0.1${noBreak}%`;
  return `${value.toFixed(value < 9.95 && value > 0 ? 1 : 0)}${noBreak}%`;
}

/** "37.9–43.2"; a single dash where either end is missing. */
export function span(low: number | undefined, high: number | undefined, digits = 3): string {
  const from = figure(low, digits);
  const to = figure(high, digits);
  return from === missing || to === missing ? missing : `${from}–${to}`;
}

/**
 * A value of a map in the unit that the computation speaks in: amperes and metres get an SI prefix, everything else a plain figure.
 *
 * @param unit `A`, `nm`, or empty for pure numbers; `relative` (a current of unknown scale) is shown as a bare figure.
 */
export function mapValue(value: number | undefined, unit: string): string {
  return unit === 'A' || unit === 'm' ? withPrefix(value, unit) : withUnit(value, unit === 'relative' ? '' : unit);
}

/** A round value on an axis: as `mapValue`, without trailing zeros. */
export function tickText(value: number, unit: string): string {
  return mapValue(value, unit).replace(/(\.\d*?)0+(?=\D|$)/, '$1').replace(/\.(?=\D|$)/, '');
}

/** How sure a class is, in a word: from 0.5 (as likely another) to 1. By the two decimals that are shown, so that word and number never disagree. */
export function confidenceWord(confidence: number): 'certain' | 'likely' | 'could be another' {
  const shown = Math.round(confidence * 100);
  return shown >= 90 ? 'certain' : shown >= 65 ? 'likely' : 'could be another';
}

/** The same for a flaw, or that a person said so; an ambiguous one says what else it could be. */
export function sureness({ byHand, confidence, other }: { readonly byHand?: true; readonly confidence: number; readonly other?: string }): string {
  return byHand ? 'by hand' : other === undefined ? confidenceWord(confidence) : `could be ${other}`;
}

/** "1 bubble", "34 bubbles", "no shorts". */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count === 0 ? 'no' : String(count)} ${count === 1 ? one : many}`;
}

/** A number as typed: comma or point, spaces and a true minus allowed. NaN where it is not a number. */
export function typedNumber(text: string): number {
  const cleaned = text.replaceAll(/\s/g, '').replace('−', '-').replace(',', '.');
  return cleaned === '' ? Number.NaN : Number(cleaned);
}

/** Power of ten of the prefix that leaves 1–999 before it. Rounded first, so that 999.6 pA becomes 1.00 nA and not 1000 pA. */
function prefixPower(value: number, digits = 3): number {
  const exponent = Number(value.toExponential(digits - 1).split('e')[1] ?? '0');
  return Math.min(9, Math.max(-18, Math.floor(exponent / 3) * 3));
}

function joined(text: string, unit: string): string {
  return text === missing || unit === '' ? text : `${text}${noBreak}${unit}`;
}

function signed(text: string): string {
  return /^-0(\.0*)?$/.test(text) ? text.slice(1) : text.replace(/^-/, '−');
}
