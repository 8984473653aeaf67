/** Steps of a digitised current. */

/** Readings looked at. */
const mostReadings = 20_000;
/** Levels that are compared, from the lowest up: rounding of the file's numbers grows with the value, and so does what a unit's conversion adds. */
const mostLevels = 200;
/** A level is read this often on average, or the readings are not in steps. */
const leastRepeats = 4;
/** Gaps between levels are whole numbers of steps to this part of a step. */
const wholeWithin = 0.1;
/** Share of gaps that must be whole. */
const wholeShare = 0.95;
/** Two numbers that differ by less than this part of the larger are one level: a float32 keeps six digits. */
const sameLevel = 1e-6;

/**
 * Step between neighbouring levels of readings that an amplifier or a file has rounded to whole steps (16 bits over ±10 V are 65 536 levels), or undefined for
 * readings without steps. A digitiser rounds everything to whole steps, so the lowest levels of the map lie whole steps apart and are read again and
 * again; numbers of a continuous scale hardly repeat.
 *
 * @param values any order; NaN missing.
 */
export function quantisationStep(values: ArrayLike<number>): number | undefined {
  const stride = Math.max(1, Math.floor(values.length / mostReadings));
  const taken: number[] = [];
  for (let i = 0; i < values.length; i += stride) if (!Number.isNaN(values[i]!)) taken.push(values[i]!);
  const sorted = Float64Array.from(taken).sort();
  const levels: number[] = [];
  let readings = 0;
  for (const value of sorted) {
    const last = levels[levels.length - 1];
    if (last === undefined || value - last > sameLevel * Math.max(Math.abs(value), Math.abs(last))) {
      if (levels.length === mostLevels) break;
      levels.push(value);
    }
    readings++;
  }
  if (levels.length < 3 || readings < leastRepeats * levels.length) return undefined;
  const gaps = levels.slice(1).map((level, k) => level - levels[k]!);
  const least = Math.min(...gaps);
  const whole = gaps.filter((gap) => Math.abs(gap / least - Math.round(gap / least)) < wholeWithin * Math.max(1, Math.round(gap / least) * 0.1));
  if (whole.length < wholeShare * gaps.length) return undefined;
  // The mean over all steps is better than the least gap, which rounding made the least.
  const steps = gaps.map((gap) => Math.round(gap / least));
  const near = steps.reduce((sum, n, k) => (n <= 3 ? { gaps: sum.gaps + gaps[k]!, steps: sum.steps + n } : sum), { gaps: 0, steps: 0 });
  return near.gaps / near.steps;
}
