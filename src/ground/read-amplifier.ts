import { quantile } from '../stats/quantile.ts';
import { markBrokenRuns } from './broken-runs.ts';
import { findLag, keptOf } from './lag.ts';
import type { Lag } from './lag.ts';
import type { GroundSection } from './recipe.ts';
import { findSaturation } from './saturation.ts';
import { undoLag } from './undo-lag.ts';
import type { Unlagged } from './undo-lag.ts';
import { findZeroCurrent } from './zero-current.ts';
import { thinned } from './zero-peak.ts';
import type { KnownOfZero, ZeroCurrent } from './zero-current.ts';

/** What an amplifier did to a current, and the current without its lag. */
export interface Amplifier {
  /** Clipping level, as read (offset included). */
  readonly saturation?: number;
  readonly zero: ZeroCurrent;
  /** Absent where none is told. */
  readonly lag?: Lag;
  /** Current with the offset still in it, lag undone where there is one. */
  readonly values: Float32Array;
  /** Current that a pixel cannot be told from nothing below, where a tail was taken off there; absent without lag. */
  readonly blind?: Float32Array;
}

/** A break of log current this large in decades, in units of the run rule's six sigmas. */
export const runNoiseDecades = 0.05;
/** Shortest broken run of a current, pixels along the fast axis. */
export const runLength = 8;
/** Part by which a reading may miss the clipping level and still be at it. */
const atLimit = 1e-4;

/** The level from which a reading counts as clipped. */
export const clippedFrom = (saturation: number | undefined): number => (saturation === undefined ? Number.POSITIVE_INFINITY : saturation * (1 - atLimit));

/**
 * Reads clipping level, offset, noise and lag of a current map, and undoes the lag.
 *
 * @param values current times the sign of the bias, row-major, NaN missing.
 * @param known what the height, the outlines and the recipe say of it; `saturation` as read.
 */
export function readAmplifier(values: Float32Array, columns: number, rows: number, section: GroundSection, known: KnownOfZero): Amplifier {
  const saturation = known.saturation ?? findSaturation(values);
  const withLimit = { ...known, saturation };
  const limit = clippedFrom(saturation);
  let zero = findZeroCurrent(values, columns, withLimit);
  const lag = lagOf(values, columns, rows, zero, limit, section);
  const base = saturation === undefined ? {} : { saturation };
  if (!lag) return { ...base, zero, values };
  // Tails fill the ground without current; without them its level and noise show better, and then the tails can be told from noise better.
  let undone: Unlagged = { values, blind: new Float32Array(0) };
  for (let round = 0; round < 2; round++) {
    const noise = quietNoise(zero, values);
    undone = undoLag(values, columns, lag, { noise, offset: zero.offset, limit }, lostContact(values, columns, rows, zero.offset, noise));
    const { blind } = undone;
    const { blocked } = known;
    const untouched = blocked && ((i: number) => blind[i] === 0 && blocked(i));
    const again = findZeroCurrent(undone.values, columns, { ...withLimit, blocked: untouched });
    const settled = zero.from !== 'assumed' || again.from === 'assumed';
    if (again.from !== 'assumed') zero = again;
    if (settled) break;
  }
  return { ...base, zero, lag, ...undone };
}

/**
 * Noise by which tails are told. Where no zero current shows, the weakest ground gave a noise that is that ground's own scatter; a far smaller one is then tried, a
 * hundred-thousandth of the larger currents.
 */
function quietNoise(zero: ZeroCurrent, values: Float32Array): number {
  return zero.from === 'assumed' ? Math.min(zero.noise, 1e-5 * quantile(thinned(values, () => true), 0.9)) : zero.noise;
}

function lagOf(values: Float32Array, columns: number, rows: number, zero: ZeroCurrent, limit: number, section: GroundSection): Lag | undefined {
  if (!section.lag) return undefined;
  if (section.lagPx !== undefined) {
    const [px, kept] = [Math.abs(section.lagPx), keptOf(Math.abs(section.lagPx))];
    return px === 0 ? undefined : { px, sePx: Number.NaN, kept, keptScatter: 0, direction: section.lagPx < 0 ? -1 : 1 };
  }
  return findLag(values, columns, rows, { offset: zero.offset, noise: quietNoise(zero, values) }, limit);
}

/** 1 on runs in which the current broke off at once: no amplifier draws them out, so they cannot have gone through it whole. */
function lostContact(values: Float32Array, columns: number, rows: number, offset: number, noise: number): Uint8Array {
  const least = Math.max(3 * noise, Number.MIN_VALUE);
  const log10 = values.map((value) => Math.log10(Math.max(value - offset, least)));
  return markBrokenRuns(log10, columns, rows, { noise: runNoiseDecades, minLength: runLength, only: 'below' });
}
