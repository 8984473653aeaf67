/** Points of a Fowler–Nordheim plot that may take part in its line. */
import type { LowBias } from './low-bias.ts';

/** One polarity of a curve, by falling bias; magnitudes. */
export interface PlotPoints {
  readonly biasV: Float64Array;
  /** Offset and ohmic part removed, A. */
  readonly currentA: Float64Array;
  /** 1/V, rising. */
  readonly x: Float64Array;
  /** ln(I/V²), I in A and V in V. */
  readonly y: Float64Array;
  /** Number of the point in the curve. */
  readonly index: Int32Array;
  /** What one standard deviation of each error of the offset and ohmic part does to the current, A; all points share them. */
  readonly sharedErrorsA: readonly Float64Array[];
}

export interface Polarity {
  readonly sign: 1 | -1;
  /** All points of this polarity by falling bias: magnitudes, offset and ohmic part removed. */
  readonly biasV: Float64Array;
  readonly currentA: Float64Array;
  readonly index: Int32Array;
  readonly sharedErrorsA: readonly Float64Array[];
  /** Points at the amplifier's limit, from the top. */
  readonly saturated: number;
  /** Magnitude above which the points count: current above the floor, ohmic part small; Infinity when there is none. */
  readonly floorBiasV: number;
}

/** A point counts from this many standard deviations of the amplifier's noise. */
export const floorFactor = 5;
/** Where the ohmic part is a larger share than this the point does not count. */
const ohmicShare = 0.05;
/** At the amplifier's limit points agree within this share of the largest current. */
const limitShare = 0.002;
/** Standard errors from which an ohmic part counts as seen. */
export const ohmicErrors = 4;

/**
 * One polarity of a curve. Offset, displacement current and ohmic part are taken off and the sign is turned so
 * that the current rises with the bias. Whether points are above the floor is decided by the running
 * median of five, and by bias: above the bias all points take part, so that no point is chosen for
 * its own noise. Undefined without a point at this sign of the bias.
 *
 * @param turn +1 or −1: sign of the current over that of the bias.
 * @param noiseA amplifier's noise where it is known from elsewhere than `low`.
 */
export function polarityOf(biasV: Float64Array, currentA: Float64Array, direction: Int8Array, sign: 1 | -1, turn: 1 | -1, low: LowBias | undefined, noiseA = low?.noiseA ?? 0): Polarity | undefined {
  const index = Int32Array.from(Array.from(biasV.keys()).filter((i) => biasV[i]! * sign > 0).sort((a, b) => Math.abs(biasV[b]!) - Math.abs(biasV[a]!) || a - b));
  if (index.length === 0) return undefined;
  const bias = Float64Array.from(index, (i) => Math.abs(biasV[i]!));
  const current = Float64Array.from(index, (i) => (currentA[i]! - (low?.at(biasV[i]!, direction[i]!) ?? 0)) * sign * turn);
  const errors = Array.from(index, (i) => low?.errorsAt(biasV[i]!, direction[i]!) ?? []);
  const sharedErrorsA = (errors[0] ?? []).map((_, j) => Float64Array.from(errors, (one) => one[j]!));
  const saturated = saturatedCount(Float64Array.from(index, (i) => Math.abs(currentA[i]!)), bias);
  const conductanceS = seenOhmicS(low, turn);
  const least = (k: number): number => Math.max(floorFactor * noiseA, (conductanceS * bias[k]!) / ohmicShare);
  let floorBiasV = Number.POSITIVE_INFINITY;
  for (let k = saturated; k < index.length; k++) {
    const typical = runningMedian(current, k, saturated);
    if (!(typical > 0 && typical >= least(k))) break;
    floorBiasV = bias[k]!;
  }
  return { sign, biasV: bias, currentA: current, index, sharedErrorsA, saturated, floorBiasV };
}

/** The ohmic conductance where it is seen beyond its error, else 0, S; positive when the current follows the bias. */
export function seenOhmicS(low: LowBias | undefined, turn: 1 | -1): number {
  const ohmic = low?.ohmic;
  if (ohmic === undefined || !(ohmic.conductanceS * turn > ohmicErrors * ohmic.seS)) return 0;
  return ohmic.conductanceS * turn;
}

/** The points that count, at most those for which `keep` holds. */
export function plotPoints(polarity: Polarity, keep: (index: number) => boolean = () => true): PlotPoints {
  const chosen: number[] = [];
  for (let k = polarity.saturated; k < polarity.index.length; k++) {
    if (polarity.biasV[k]! < polarity.floorBiasV) break;
    if (polarity.currentA[k]! > 0 && keep(polarity.index[k]!)) chosen.push(k);
  }
  const biasV = Float64Array.from(chosen, (k) => polarity.biasV[k]!);
  const currentA = Float64Array.from(chosen, (k) => polarity.currentA[k]!);
  return {
    biasV, currentA,
    x: biasV.map((v) => 1 / v),
    y: biasV.map((v, k) => Math.log(currentA[k]! / v ** 2)),
    index: Int32Array.from(chosen, (k) => polarity.index[k]!),
    sharedErrorsA: polarity.sharedErrorsA.map((values) => Float64Array.from(chosen, (k) => values[k]!)),
  };
}

/**
 * Points from the top that lie at the amplifier's limit: all points above some bias agree within 0.2 %
 * with the largest current, over at least three different biases, or two with exactly the same current.
 * The limit is one of the raw current, before the offset is taken off.
 */
function saturatedCount(currentA: Float64Array, biasV: Float64Array): number {
  let limit = 0;
  for (const value of currentA) limit = Math.max(limit, value);
  let count = 0;
  while (count < currentA.length && currentA[count]! >= limit * (1 - limitShare)) count += 1;
  const top = Array.from(biasV.subarray(0, count));
  const alike = currentA.subarray(0, count).every((value) => value === limit);
  return new Set(top).size >= (alike ? 2 : 3) ? count : 0;
}

function runningMedian(values: Float64Array, k: number, first: number): number {
  const window = Array.from(values.subarray(Math.max(first, k - 2), k + 3)).sort((a, b) => a - b);
  const half = window.length >> 1;
  return window.length % 2 === 1 ? window[half]! : (window[half - 1]! + window[half]!) / 2;
}
