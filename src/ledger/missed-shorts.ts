import type { Grid } from '../grid/maps.ts';
import { poissonInterval, poissonUpperBound } from '../stats/poisson.ts';
import type { MissedShorts } from './ledger.ts';

/**
 * What a scan of lines a pitch apart cannot have seen: a point short is crossed by a contact of diameter d only in the share d/p of cases (1 when the
 * lines lie closer than the contact is wide). Seen n, expect n·(p/d − 1) missed; the density's interval is the exact Poisson one divided by
 * the share crossed, with none seen its one-sided upper bound.
 *
 * @param seen shorts seen; @param areaM2 ground on which one would have been seen; @param contactAreaM2 area of the contact.
 */
export function missedShorts(seen: number, areaM2: number, grid: Grid, contactAreaM2: number): MissedShorts {
  const diameterM = 2 * Math.sqrt(contactAreaM2 / Math.PI);
  const crossedShare = Math.min(1, diameterM / grid.pitchYM);
  const { low, high } = seen === 0 ? { low: 0, high: poissonUpperBound(0, 0.95) } : poissonInterval(seen, 0.95);
  const effective = areaM2 * crossedShare;
  return {
    seen,
    crossedShare,
    expectedMissed: seen / crossedShare - seen,
    densityPerM2: effective > 0 ? seen / effective : 0,
    low95PerM2: effective > 0 ? low / effective : 0,
    high95PerM2: effective > 0 ? high / effective : 0,
  };
}
