import type { Lag } from './lag.ts';
import { keptOf } from './lag.ts';

export interface Unlagged {
  /** The current that an amplifier without lag would have shown, clipped where this one clips. */
  readonly values: Float32Array;
  /** Where something was taken off a pixel: below this its current cannot be told from nothing. 0 elsewhere. */
  readonly blind: Float32Array;
}

/** Changes from pixel to pixel below this many standard deviations of their noise are left alone. */
const leastSigmas = 3.5;
/** A rest counts as current when it is this many times the uncertainty of what was taken off. */
const blindSigmas = 3;

/**
 * Undoes the smear of a one-pole amplifier along the lines: from I'[n] = k·I'[n−1] + (1−k)·I[n] follows I[n] = (I'[n] − k·I'[n−1])/(1−k), which
 * also undoes the shift. Exact for one pole; constant currents and the offset stay what they are.
 *
 * - The first pixel of a line, and one behind a missing or `skip`ped pixel, stays as read.
 * - A pixel at the limit stays at the limit: behind another one its current is not known.
 * - The first pixel behind a stretch at the limit could be anything up to a bound, because the reading before is not known: it takes the value of the next
 *   pixel, if that is below the bound.
 * - Changes within the noise are left alone: undoing them would only enlarge it.
 * - `blind` grows with the noise, which the difference enlarges, and with the scatter of the kept share times the tail that was taken off.
 *
 * @param values current with or without offset, NaN missing; @param skip 1 where a reading did not go through the amplifier (broken runs); @param offset reading at zero current.
 */
export function undoLag(
  values: Float32Array, columns: number, lag: Pick<Lag, 'px' | 'direction' | 'keptScatter'>, known: { readonly noise: number; readonly offset: number; readonly limit: number }, skip?: Uint8Array,
): Unlagged {
  const kept = keptOf(lag.px);
  const { noise, offset, limit } = known;
  const { direction } = lag;
  const out = values.slice();
  const blind = new Float32Array(values.length);
  // Noise of the difference that `rest` takes, of two independent readings.
  const gain = Math.hypot(1, kept) / (1 - kept);
  const unsharp = leastSigmas * Math.SQRT2 * noise;
  const rest = (now: number, before: number): number => (now - kept * before) / (1 - kept);
  const rows = values.length / columns;
  for (let r = 0; r < rows; r++) {
    const start = direction === 1 ? r * columns : (r + 1) * columns - 1;
    for (let c = 1; c < columns; c++) {
      const i = start + direction * c;
      const now = values[i]!;
      const before = values[i - direction]!;
      // Written so that NaN stays as read.
      if (!(now < limit) || !(Math.abs(now - before) > unsharp) || skip?.[i] === 1 || skip?.[i - direction] === 1) continue;
      if (before >= limit) {
        const bound = rest(now, limit);
        const next = c + 1 < columns ? values[i + direction]! : Number.NaN;
        const then = next < limit ? rest(next, now) : Number.NaN;
        out[i] = Number.isNaN(then) ? Math.min(now, bound) : Math.min(then, bound);
      } else out[i] = Math.min(rest(now, before), limit);
      const error = (lag.keptScatter * Math.abs(Math.min(before, limit) - offset)) / (1 - kept);
      blind[i] = blindSigmas * Math.hypot(error, gain * noise);
    }
  }
  return { values: out, blind };
}
