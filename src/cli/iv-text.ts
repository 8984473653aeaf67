/** An I–V analysis for a reader at the terminal. */
import type { IvOptions } from '../iv/analyse-curves.ts';
import type { CurveAnalysis, CurvesAnalysis } from '../iv/curve-analysis.ts';

/** A block of lines per curve, and the temperature check. */
export function ivInWords({ curves, temperature }: CurvesAnalysis, options: IvOptions): string {
  const blocks = curves.map((curve) => [curve.name, ...linesOf(curve, options)].join('\n'));
  if (temperature !== undefined) blocks.push(`temperature: ${temperature.verdict.replace('-', ' ')}\n  ${temperature.words}`);
  blocks.push('Caution: a sweep stresses the barrier; hBN breaks down near 1.2 V/nm. Raise a bias slowly, with a current limit.');
  return `${blocks.join('\n\n')}\n`;
}

function linesOf(curve: CurveAnalysis, { heightEv = 2.5, massRatio = 0.5 }: IvOptions): string[] {
  const lines: [string, string | undefined][] = [
    ['points', `${curve.points}${curve.temperatureK === undefined ? '' : ` at ${digits(curve.temperatureK)} K`}${curve.polarity === 'negative' ? ', negative bias' : ''}`],
    ['line', curve.used && `${curve.usedPoints} points, ${digits(curve.used[0])} to ${digits(curve.used[1])} V${curve.fieldVPerNm === undefined ? '' : `, ${digits(curve.fieldVPerNm[0])}–${digits(curve.fieldVPerNm[1])} V/nm`}`],
    ['slope', curve.slopeV === undefined ? 'no line' : `${withError(curve.slopeV, curve.slopeSe)} V, intercept ${withError(curve.intercept!, curve.interceptSe)} of ln(I/V²) over 1/V`],
    ['height', curve.barrierEv === undefined ? undefined : `${withError(curve.barrierEv, curve.barrierSe)} eV at ${digits(curve.thicknessNm!)} nm, mass ${massRatio}`],
    ['thickness', curve.thicknessSe === undefined ? undefined : `${withError(curve.thicknessNm!, curve.thicknessSe)} nm at ${heightEv} eV, mass ${massRatio}`],
    ['area', curve.effectiveAreaNm2 === undefined ? undefined : `${areaWords(curve.effectiveAreaNm2)} by the intercept, ×/÷ ${digits(Math.exp(2 * curve.effectiveAreaLnSe!), 2)} (95 %)`],
    ['onset', curve.onsetV === undefined ? undefined : `${digits(curve.onsetV, 3)} V (above five times the noise of ${digits(curve.noiseA!, 2)} A)`],
    ['leakage', curve.leakage && (curve.leakage.seen ? `${digits(curve.leakage.conductanceS, 3)} S, ohmic at low bias` : 'no ohmic part seen')],
    ['hysteresis', curve.hysteresis && (curve.hysteresis.seen ? `×${digits(Math.exp(curve.hysteresis.lnRatio), 3)} on the way down` : 'none seen')],
  ];
  return lines.flatMap(([name, text]) => (text === undefined ? [] : [`  ${name.padEnd(10)}  ${text}`]));
}

function areaWords(areaNm2: number): string {
  return areaNm2 < 1e5 ? `${digits(areaNm2, 3)} nm²` : `${digits(areaNm2 * 1e-6, 3)} µm²`;
}

/** To as many decimals as the error has with two digits. */
function withError(value: number, se = 0): string {
  if (!(se > 1e-6 * Math.abs(value))) return digits(value, 7);
  const decimals = Math.min(10, Math.max(0, 1 - Math.floor(Math.log10(se))));
  return `${value.toFixed(decimals)} ± ${se.toFixed(decimals)}`;
}

function digits(value: number, count = 4): string {
  return String(Number(value.toPrecision(count)));
}
