import type { Grid } from '../grid/maps.ts';
import { poissonInterval, poissonUpperBound } from '../stats/poisson.ts';
import type { MissedShorts } from './ledger.ts';

/** Shorts by how the scan met them. */
export interface SeenShorts {
  /** On one scan line only: smaller than the distance between lines, as far as can be told. */
  readonly onOneLine: number;
  /** On two lines or more: wider than the distance between lines, so that none of their kind can be missed. */
  readonly onMoreLines: number;
}

/**
 * What a scan of lines a pitch apart cannot have seen: a point short is crossed by a contact of diameter d only in the share d/p of cases (1 when the
 * lines lie closer than the contact is wide). Of point shorts, n seen mean n·(p/d − 1) missed; those seen on several lines are no points and
 * miss none. The density's interval is the exact Poisson one of all seen, scaled like the estimate; with none seen it is the one-sided upper bound
 * for point shorts.
 *
 * @param areaM2 ground on which one would have been seen; @param contactAreaM2 area of the contact.
 */
export function missedShorts(shorts: SeenShorts, areaM2: number, grid: Grid, contactAreaM2: number): MissedShorts {
  const diameterM = 2 * Math.sqrt(contactAreaM2 / Math.PI);
  const crossedShare = Math.min(1, diameterM / grid.pitchYM);
  const seen = shorts.onOneLine + shorts.onMoreLines;
  const present = shorts.onOneLine / crossedShare + shorts.onMoreLines;
  const { low, high } = seen === 0 ? { low: 0, high: poissonUpperBound(0, 0.95) } : poissonInterval(seen, 0.95);
  const perSeen = (seen === 0 ? 1 / crossedShare : present / seen) / areaM2;
  const density = (count: number): number => (areaM2 > 0 ? count * perSeen : 0);
  return { seen, crossedShare, expectedMissed: present - seen, densityPerM2: density(seen), low95PerM2: density(low), high95PerM2: density(high) };
}
