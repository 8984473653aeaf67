/**
 * A table of log10 density against thickness at one bias, read both ways, for maps: millions of
 * look-ups for some thousand evaluations of the model.
 */
import { defaultThicknessRange, thicknessFromLnDensity, usableRange } from './inverse.ts';
import type { ThicknessRange } from './inverse.ts';
import type { BarrierMaterial, TunnelModel } from './tunnel-model.ts';

const forwardKnots = 513;
const backwardKnots = 513;

/** Both ways agree with the model to better than 1e-4 of the density (tested for every model); NaN outside `range`. */
export interface DensityTable {
  readonly biasV: number;
  /** Thicknesses the table covers, metres; the model's own bound is taken out. */
  readonly range: ThicknessRange;
  /** Log10 density (A/m²) at the thin and the thick end. */
  readonly highLog10: number;
  readonly lowLog10: number;
  /** Log10 of the density in A/m² at a thickness in metres. */
  log10Density(thicknessM: number): number;
  /** Change of ln density per metre of thickness, from the same cubic (to about 1e-4 of itself). */
  lnSlopePerM(thicknessM: number): number;
  /** Thickness in metres at a log10 density. */
  thicknessM(log10Density: number): number;
}

/**
 * Builds the table (about 10 ms with the default model). Undefined where the model does not hold
 * at this bias. Interpolation is cubic through four neighbouring knots, on knots even in
 * √thickness one way and even in the root of the decades below the thin end the other: so the knots
 * crowd at thin barriers, where the density bends most.
 */
export function densityTable(model: TunnelModel, material: BarrierMaterial, biasV: number, range: ThicknessRange = defaultThicknessRange): DensityTable | undefined {
  const usable = usableRange(model, material, biasV, range);
  if (usable === undefined) return undefined;
  const { heightEv, massRatio } = material;
  const lnAt = (thicknessM: number): number => model.lnDensity({ thicknessM, heightEv, massRatio }, biasV);

  const { minM, maxM } = usable;
  const rootMin = Math.sqrt(minM);
  const rootStep = (Math.sqrt(maxM) - rootMin) / (forwardKnots - 1);
  const logs = new Float64Array(forwardKnots);
  for (let k = 0; k < forwardKnots; k++) logs[k] = lnAt(k === forwardKnots - 1 ? maxM : (rootMin + k * rootStep) ** 2) / Math.LN10;

  const highLog10 = logs[0]!;
  const lowLog10 = logs[forwardKnots - 1]!;
  const dropStep = Math.sqrt(highLog10 - lowLog10) / (backwardKnots - 1);
  const thicknesses = new Float64Array(backwardKnots);
  thicknesses[0] = minM;
  thicknesses[backwardKnots - 1] = maxM;
  let bracket = 0;
  for (let k = 1; k < backwardKnots - 1; k++) {
    const wanted = highLog10 - (k * dropStep) ** 2;
    while (logs[bracket + 1]! > wanted) bracket += 1;
    const between = { minM: (rootMin + bracket * rootStep) ** 2 * (1 - 1e-9), maxM: (rootMin + (bracket + 1) * rootStep) ** 2 * (1 + 1e-9) };
    thicknesses[k] = thicknessFromLnDensity(model, material, biasV, wanted * Math.LN10, between);
  }

  return {
    biasV,
    range: usable,
    highLog10,
    lowLog10,
    log10Density: (thicknessM) => cubicAt(logs, (Math.sqrt(thicknessM) - rootMin) / rootStep),
    lnSlopePerM: (thicknessM) => (Math.LN10 * cubicSlopeAt(logs, (Math.sqrt(thicknessM) - rootMin) / rootStep)) / (2 * rootStep * Math.sqrt(thicknessM)),
    thicknessM: (log10Density) => cubicAt(thicknesses, Math.sqrt(highLog10 - log10Density) / dropStep),
  };
}

/** Cubic through the four knots around a fractional index; NaN outside the knots (1e-9 of a step of slack at the ends, for rounding). */
function cubicAt(knots: Float64Array, index: number): number {
  const first = firstKnot(knots, index);
  if (first < 0) return Number.NaN;
  const t = index - first;
  const { a, ab, abc, abcd } = newtonForm(knots, first);
  return a + t * (ab + ((t - 1) / 2) * (abc + ((t - 2) / 3) * abcd));
}

/** Derivative of that cubic by the index. */
function cubicSlopeAt(knots: Float64Array, index: number): number {
  const first = firstKnot(knots, index);
  if (first < 0) return Number.NaN;
  const t = index - first;
  const { ab, abc, abcd } = newtonForm(knots, first);
  return ab + (t - 0.5) * abc + ((3 * t * t - 6 * t + 2) / 6) * abcd;
}

/** First of the four knots around an index; −1 outside. */
function firstKnot(knots: Float64Array, index: number): number {
  const last = knots.length - 1;
  return index >= -1e-9 && index <= last + 1e-9 ? Math.min(Math.max(Math.floor(index) - 1, 0), last - 3) : -1;
}

/** Newton's form of the cubic through t = 0, 1, 2, 3. */
function newtonForm(knots: Float64Array, first: number): { a: number; ab: number; abc: number; abcd: number } {
  const a = knots[first]!;
  const b = knots[first + 1]!;
  const c = knots[first + 2]!;
  const d = knots[first + 3]!;
  return { a, ab: b - a, abc: c - 2 * b + a, abcd: d - 3 * c + 3 * b - a };
}
