/** Which terrace the map is measured against. */
import type { DensityWithInterval } from './anchor.ts';
import type { MeasuredRung } from './terraces.ts';
import { quantifiedOverFloor } from '../ground/current-limits.ts';

/** A terrace that could be the reference. */
export interface Candidate extends MeasuredRung {
  readonly areaM2: number;
  /** Density at the device's bias with its 95 % interval, A/m²; absent when not known in amperes. */
  readonly density?: DensityWithInterval;
}

export interface ReferenceRule {
  /** Range of densities known to glow, A/m². */
  readonly minAPerM2: number;
  readonly maxAPerM2: number;
  readonly bandFactor: number;
  readonly terraceMinM2: number;
  readonly floor: number;
}

export interface ReferenceChoice {
  readonly chosen: Candidate;
  /** True when its density's centre lies in the range; absent when densities are not known. */
  readonly inRange?: boolean;
  /** True when only its interval reaches into the range. */
  readonly reaches?: boolean;
  /** Second largest of the candidates, when its area is within 10 % of the chosen one's. */
  readonly runnerUp?: Candidate;
  /** Terraces in range (and no smaller than the smallest terrace) that were passed over because they are too rare or too near the floor. */
  readonly passedOver: readonly Candidate[];
  /** Terrace that would be the reference by its density if it were not that the known layer count belongs to the reference. */
  readonly outranking?: Candidate;
}

/** A terrace below this share of the flawless ground is a patch, not what the flake is made of. */
const leastShare = 0.05;

/**
 * Chooses the reference: the largest terrace whose density at the device's bias lies within the range (its 95 % interval reaches into it, since no
 * density is known better than that); if none does, the most common one.
 *
 * Only terraces that can carry a band count: not censored, at least the smallest terrace and a twentieth of the flawless ground, and
 * bright enough that the band's lower edge is still quantifiable (10σ of the noise; Currie, Anal. Chem. 40, 586, 1968).
 * Without any such terrace the largest uncensored one is taken; where all ground is censored there is no reference (undefined).
 */
export function chooseReference(candidates: readonly Candidate[], rule: ReferenceRule): ReferenceChoice | undefined {
  if (candidates.length === 0) return undefined;
  const total = candidates.reduce((sum, candidate) => sum + candidate.areaM2, 0);
  const quantified = Math.log10(rule.floor * quantifiedOverFloor) + Math.log10(rule.bandFactor);
  const byArea = [...candidates].sort((a, b) => b.areaM2 - a.areaM2);
  const fit = byArea.filter(
    (c) => c.bound === 'exact' && c.areaM2 >= Math.max(rule.terraceMinM2, leastShare * total) && c.medianLog10 >= quantified,
  );
  const reaching = fit.filter((c) => reaches(c, rule));
  // A map too small for a terrace, or all near the floor, still has a most common ground; specks of noise above the floor are none.
  const common = byArea.filter((c) => c.bound === 'exact' && c.areaM2 >= leastShare * total);
  const pool = reaching.length > 0 ? reaching : fit.length > 0 ? fit : common;
  const chosen = pool[0];
  if (!chosen) return undefined;
  const second = pool[1];
  const density = chosen.density;
  return {
    chosen,
    ...(density ? { inRange: density.median >= rule.minAPerM2 && density.median <= rule.maxAPerM2, reaches: reaches(chosen, rule) } : {}),
    ...(second && second.areaM2 > 0.9 * chosen.areaM2 ? { runnerUp: second } : {}),
    passedOver: reaching.length > 0 ? [] : byArea.filter((c) => c !== chosen && c.bound === 'exact' && c.areaM2 >= rule.terraceMinM2 && reaches(c, rule)),
  };
}

function reaches(candidate: Candidate, rule: ReferenceRule): boolean {
  const d = candidate.density;
  return d !== undefined && d.high95 >= rule.minAPerM2 && d.low95 <= rule.maxAPerM2;
}
