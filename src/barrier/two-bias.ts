/** Thickness from currents at two or more biases over the same ground: their ratio does not know the contact's area. */
import { findRoot } from '../stats/root.ts';
import { fowlerNordheimB } from './model/constants.ts';
import { defaultThicknessRange, usableRange } from './model/inverse.ts';
import type { ThicknessRange } from './model/inverse.ts';
import { densityTable } from './model/table.ts';
import type { DensityTable } from './model/table.ts';
import type { BarrierMaterial, TunnelModel } from './model/tunnel-model.ts';

/**
 * √m·φ^1.5·d in eV^1.5 nm from ln(I₂/I₁) at biases above the barrier's height, by Fowler–Nordheim's formula
 * (Lenzlinger & Snow, J. Appl. Phys. 40, 278, 1969): ln(I₂/I₁) = 2 ln(V₂/V₁) + B·√m·φ^1.5·d·(1/V₁ − 1/V₂).
 * Its error is the ratio's times `perLn`. NaN for equal or zero biases.
 */
export function steepnessFromRatio(lnRatio: number, firstV: number, secondV: number): { readonly steepnessEv15Nm: number; readonly perLn: number } {
  const [v1, v2] = [Math.abs(firstV), Math.abs(secondV)];
  const perLn = 1 / (fowlerNordheimB * (1 / v1 - 1 / v2));
  return Number.isFinite(perLn) ? { steepnessEv15Nm: (lnRatio - 2 * Math.log(v2 / v1)) * perLn, perLn: Math.abs(perLn) } : { steepnessEv15Nm: Number.NaN, perLn: Number.NaN };
}

/**
 * Thickness in metres at which the model's ln(J(V₂)/J(V₁)) is `lnRatio`; the ratio of the higher to the lower bias grows with thickness. NaN where the model does not hold or no thickness in
 * `range` fits.
 */
export function thicknessFromRatio(model: TunnelModel, material: BarrierMaterial, firstV: number, secondV: number, lnRatio: number, range: ThicknessRange = defaultThicknessRange): number {
  const [one, two] = [usableRange(model, material, firstV, range), usableRange(model, material, secondV, range)];
  if (!one || !two || Math.abs(firstV) === Math.abs(secondV)) return Number.NaN;
  const { heightEv, massRatio } = material;
  const excess = (nm: number): number => {
    const barrier = { heightEv, massRatio, thicknessM: nm * 1e-9 };
    return model.lnDensity(barrier, secondV) - model.lnDensity(barrier, firstV) - lnRatio;
  };
  return findRoot(excess, Math.max(one.minM, two.minM) * 1e9, Math.min(one.maxM, two.maxM) * 1e9, 1e-12) * 1e-9;
}

/** Where Newton's method starts, metres, and what ends it: so small a step, or so many. */
const start = 4e-9;
const ends = { stepM: 1e-15, rounds: 30 } as const;

/** Solves one pixel after the other. */
export interface BiasSolver {
  /**
   * Thickness in metres from ln currents in the order of the biases, any common factor in them (the contact's area) left free; `variances` are
   * those of the ln currents. NaN where a current is missing or no thickness in the models' range fits.
   */
  thicknessM(lnCurrents: ArrayLike<number>, variances: ArrayLike<number>): number;
  /** Standard error of that thickness from the variances, at a thickness; metres. */
  errorM(thicknessM: number, variances: ArrayLike<number>): number;
}

/**
 * Weighted least squares of ln I_k = a + ln J(V_k, d) with a and d free, by Gauss–Newton over tables of the model. With two biases this is
 * the solution of the ratio. Undefined where the model does not hold at one of the biases, or with fewer than two.
 */
export function biasSolver(model: TunnelModel, material: BarrierMaterial, biasesV: readonly number[]): BiasSolver | undefined {
  const tables = biasesV.map((biasV) => densityTable(model, material, biasV)).filter((table): table is DensityTable => table !== undefined);
  if (tables.length < 2 || tables.length < biasesV.length) return undefined;
  const minM = Math.max(...tables.map(({ range }) => range.minM));
  const maxM = Math.min(...tables.map(({ range }) => range.maxM));
  const slopes = new Float64Array(tables.length);
  /** Σ w (g − ḡ)² for the slopes g at a thickness, and with residuals the step of least squares. */
  const spreadAt = (thicknessM: number, variances: ArrayLike<number>, lnCurrents?: ArrayLike<number>): { sum: number; step: number } => {
    let [weight, meanSlope, meanRest] = [0, 0, 0];
    for (let k = 0; k < tables.length; k++) {
      const w = 1 / variances[k]!;
      slopes[k] = tables[k]!.lnSlopePerM(thicknessM);
      weight += w;
      meanSlope += w * slopes[k]!;
      if (lnCurrents) meanRest += w * (lnCurrents[k]! - Math.LN10 * tables[k]!.log10Density(thicknessM));
    }
    meanSlope /= weight;
    meanRest /= weight;
    let [sum, product] = [0, 0];
    for (let k = 0; k < tables.length; k++) {
      const from = slopes[k]! - meanSlope;
      sum += (from * from) / variances[k]!;
      if (lnCurrents) product += (from * (lnCurrents[k]! - Math.LN10 * tables[k]!.log10Density(thicknessM) - meanRest)) / variances[k]!;
    }
    return { sum, step: product / sum };
  };
  return {
    thicknessM(lnCurrents, variances) {
      let at = Math.min(maxM, Math.max(minM, start));
      for (let round = 0; round < ends.rounds; round++) {
        const { step } = spreadAt(at, variances, lnCurrents);
        if (Number.isNaN(step)) return Number.NaN;
        const next = Math.min(maxM, Math.max(minM, at + step));
        // Held at an end: nothing in the range fits.
        if (next === at && step !== 0 && (at === minM || at === maxM)) return Number.NaN;
        const moved = Math.abs(next - at);
        at = next;
        if (moved < ends.stepM) return at;
      }
      return Number.NaN;
    },
    errorM: (thicknessM, variances) => 1 / Math.sqrt(spreadAt(thicknessM, variances).sum),
  };
}
