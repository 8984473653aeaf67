/**
 * Does the current move with temperature as tunnelling does? Tunnelling through a barrier of some eV gains a few
 * per cent to a few ten per cent by room temperature (x/sin x of Murphy & Good, Phys. Rev. 102, 1464, 1956);
 * hopping between traps or emission from them goes as exp(−E/kT).
 */
import { boltzmannEvPerK } from '../barrier/model/constants.ts';
import { temperatureFactor } from '../barrier/model/temperature-factor.ts';
import type { BarrierMaterial } from '../barrier/model/tunnel-model.ts';
import { notice, sentence } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { activationOf } from './activation.ts';
import type { AnalysedCurve } from './analyse-curve.ts';
import { lnCurrentAt } from './current-at-bias.ts';
import type { TemperatureAnalysis } from './curve-analysis.ts';

/** Common practice: a current that changes by no more than this "does not move with temperature". */
const stillRatio = 1.3;
/** Contacts and drift may add this much to the model's factor. */
const factorAllowance = 1.5;
/** A span of temperatures that would not show this activation decides nothing. */
const tellingActivationEv = 0.1;
/** Temperatures closer than this are one. */
const distinctK = 2;
/** Where in the common range of biases the currents are compared: trap-assisted currents prevail at the low end. */
const places = [0.2, 0.8] as const;

export interface TemperatureOutcome {
  readonly temperature?: TemperatureAnalysis;
  readonly warnings: readonly Notice[];
}

/**
 * Compares all curves that state a temperature, at two biases within the range where all of them are above
 * the floor. Thermally activated when the current rises by more than tunnelling allows, by two
 * standard errors, at either bias; tunnelling when it stays within ×1.3 (or 1.5 times the logarithm of the
 * model's own factor, if that is more) at both, provided that the span of temperatures would show an
 * activation of 0.1 eV. Empty for fewer than two temperatures.
 *
 * @param thicknessNm for the field in the model's factor; absent: unknown.
 */
export function checkTemperatures(curves: readonly AnalysedCurve[], material: BarrierMaterial, thicknessNm: number | undefined): TemperatureOutcome {
  const stated = curves.filter((curve) => curve.analysis.temperatureK !== undefined && curve.polarity !== undefined);
  const temperatures = stated.map((curve) => curve.analysis.temperatureK!);
  const fromK = Math.min(...temperatures);
  const toK = Math.max(...temperatures);
  if (!(toK - fromK > distinctK)) return { warnings: [] };
  const sign = stated[0]!.polarity!.polarity.sign;
  const usable = stated.filter((curve) => curve.polarity!.polarity.sign === sign && curve.polarity!.usable.x.length > 0);
  if (usable.length < stated.length) return apart('some show no current above the floor at the same sign of the bias');
  const low = Math.max(...usable.map((curve) => curve.polarity!.usable.biasV.at(-1)!));
  const high = Math.min(...usable.map((curve) => curve.polarity!.usable.biasV[0]!));
  if (!(high > low)) return apart('no bias lies above the floor and below the limit in all of them');

  const found: TemperatureAnalysis[] = [];
  for (const place of places) {
    const biasV = low + place * (high - low);
    const values = usable.map((curve) => lnCurrentAt(curve.polarity!.usable, curve.polarity!.noise, biasV, low, high));
    const present = values.filter((value) => value !== undefined);
    if (present.length < values.length) return apart('fewer than five points of some lie in their common range of biases');
    found.push(judge(biasV * sign, temperatures, present, expectedLn(biasV, fromK, toK, material, thicknessNm)));
  }
  const order: readonly TemperatureAnalysis['verdict'][] = ['thermally-activated', 'unclear', 'tunnelling'];
  const temperature = [...found].sort((a, b) => order.indexOf(a.verdict) - order.indexOf(b.verdict))[0]!;
  return { temperature, warnings: temperature.verdict === 'tunnelling' ? [] : [{ code: codes[temperature.verdict], message: temperature.words }] };
}

const codes = { 'thermally-activated': 'iv-thermally-activated', unclear: 'iv-temperature-unclear' } as const;

function apart(reason: string): TemperatureOutcome {
  return { warnings: [notice('iv-temperature-apart', { reason })] };
}

/** Logarithm of the factor that tunnelling gains between two temperatures; undefined where the field is unknown or too low for the formula. */
function expectedLn(biasV: number, fromK: number, toK: number, { heightEv, massRatio }: BarrierMaterial, thicknessNm: number | undefined): number | undefined {
  if (thicknessNm === undefined) return undefined;
  const factor = (temperatureK: number): number => temperatureFactor(temperatureK, biasV / thicknessNm, heightEv, massRatio);
  const ln = Math.log(factor(toK) / factor(fromK));
  return Number.isFinite(ln) ? ln : undefined;
}

function judge(biasV: number, temperaturesK: readonly number[], currents: readonly { lnCurrent: number; se: number }[], expected: number | undefined): TemperatureAnalysis {
  const fromK = Math.min(...temperaturesK);
  const toK = Math.max(...temperaturesK);
  const { activationEv, activationSe } = activationOf(temperaturesK, currents);
  const span = 1 / (boltzmannEvPerK * fromK) - 1 / (boltzmannEvPerK * toK);
  const logs = currents.map((one) => one.lnCurrent);
  const spread = Math.max(...logs) - Math.min(...logs);
  const allowed = Math.max(Math.log(stillRatio), factorAllowance * (expected ?? 0));
  const rise = activationEv * span;
  const riseSe = activationSe * span;
  const shared = { spread: ratio(spread), biasV: digits(biasV), fromK: digits(fromK), toK: digits(toK) };
  const numbers = { spreadShare: Math.expm1(spread), biasV, fromK, toK, ...(expected === undefined ? {} : { expectedShare: Math.expm1(expected) }), activationEv, activationSe };
  const expectedWords = expected === undefined ? `${stillRatio} at most` : ratio(expected);
  const open = (reason: string): TemperatureAnalysis => ({ verdict: 'unclear', ...numbers, words: sentence('iv-temperature-unclear', { ...shared, reason }) });

  if (rise - 2 * riseSe > allowed) {
    const words = sentence('iv-thermally-activated', { ...shared, expected: expectedWords, activationMev: digits(activationEv * 1e3), activationSeMev: digits(activationSe * 1e3) });
    return { verdict: 'thermally-activated', ...numbers, words };
  }
  if (spread > allowed) {
    return open(rise > allowed ? `a rise beyond tunnelling's ×${expectedWords} is not certain` : 'not as an activated current rises: the contact, the humidity or the barrier may have changed between the curves');
  }
  if (2 * riseSe > allowed) return open('the noise would hide a change');
  if (allowed / span > tellingActivationEv) return open(`so small a span of temperatures would hide an activation of ${digits((allowed / span) * 1e3)} meV`);
  return { verdict: 'tunnelling', ...numbers, words: sentence('iv-tunnelling', { ...shared, expected: expectedWords }) };
}

function ratio(ln: number): string {
  return Math.exp(ln).toPrecision(3);
}

function digits(value: number): string {
  return String(Number(value.toPrecision(4)));
}
