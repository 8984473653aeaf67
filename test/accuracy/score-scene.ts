/** Scores one answer against the truth about its scene. The result is plain data, so that it can cross threads. */
import { causes } from '../../src/ledger/ledger.ts';
import { codeOf } from '../../src/ledger/book-causes.ts';
import { planeResidualRms } from './plane.ts';
import type { RoundObject, Truth } from './paint-truth.ts';
import type { Answer } from './score-answer.ts';

/** Found objects among those there, and true ones among those claimed. */
export interface Count {
  readonly there: number;
  readonly found: number;
  readonly claimed: number;
  readonly true: number;
  /** Of those there, found ones of which most of what was found is a flaw of its own: no other object has most of its own in the same flaw. */
  readonly parted: number;
}

export interface SceneScore {
  /** Pixels by [truth code × 13 + found code]. */
  readonly confusion: readonly number[];
  readonly bubbles: Count;
  readonly shorts: Count;
  /** Found and true share that is usable. */
  readonly usable: readonly [found: number, truth: number];
  /** Root mean square of levelled minus clean height on unflawed ground, plane removed, over the white noise. */
  readonly levelRatio: number;
  readonly wear: readonly [found: number, truth: number];
  readonly lag: readonly [found: number | null, truth: number];
  readonly flawsReported: number;
  readonly interval: readonly [low: number, high: number] | null;
}

/** Share of unflawed measured ground that may lack a levelled height. */
const mostMissing = 0.02;
/** Bubbles are counted from this radius on, along the coarser pitch. */
export const leastRadiusPx = 3;
/** And from so many visible pixels, half the disc of that radius: of a sliver behind the map's edge nobody can tell what it is. */
export const leastVisiblePx = 14;

export function scoreScene(answer: Answer, truth: Truth): SceneScore {
  const side = causes.length;
  const confusion = Array.from({ length: side * side }, () => 0);
  for (let i = 0; i < truth.codes.length; i++) confusion[truth.codes[i]! * side + answer.codes[i]!]!++;
  const usable = codeOf('usable');
  return {
    confusion,
    bubbles: countBubbles(answer, truth),
    shorts: countShorts(answer, truth),
    usable: [usableShare(answer.codes, usable), usableShare(truth.codes, usable)],
    levelRatio: levelRatio(answer, truth),
    wear: [answer.wearDecades, truth.wearDecades],
    lag: [answer.lagPx ?? null, truth.lagPx],
    flawsReported: answer.flawCauses.filter((cause) => cause !== undefined).length,
    interval: answer.interval ?? null,
  };
}

function usableShare(codes: ArrayLike<number>, usable: number): number {
  let pixels = 0;
  for (let i = 0; i < codes.length; i++) if (codes[i] === usable) pixels++;
  return pixels / codes.length;
}

/** A bubble is found when at least half of its visible pixels are booked as bubble; one that is claimed is true when at least half of its pixels are bubble. */
function countBubbles(answer: Answer, truth: Truth): Count {
  const { grid } = truth;
  const code = codeOf('bubble');
  let [there, found] = [0, 0];
  const holders = new Map<number, number>();
  for (const pixels of visiblePixels(truth, 'bubble', leastRadiusPx * Math.max(grid.pitchXM, grid.pitchYM))) {
    if (pixels.length < leastVisiblePx) continue;
    there++;
    const booked = pixels.filter((i) => answer.codes[i] === code);
    if (2 * booked.length < pixels.length) continue;
    found++;
    const flaw = mostCommon(booked.map((i) => answer.flawLabels[i]!));
    holders.set(flaw, (holders.get(flaw) ?? 0) + 1);
  }
  const parted = [...holders].filter(([flaw, objects]) => flaw > 0 && objects === 1).length;
  const claims = claimedFlaws(answer, truth, 'bubble');
  return { there, found, parted, claimed: claims.length, true: claims.filter(({ pixels, right }) => 2 * right >= pixels).length };
}

/** Pinholes on ground that does not saturate by itself: found when one of their pixels is booked short; a claimed short is true when one of its pixels is. */
function countShorts(answer: Answer, truth: Truth): Count {
  const code = codeOf('short');
  let [there, found] = [0, 0];
  for (const pixels of visiblePixels(truth, 'pinhole', 0)) {
    if (pixels.length === 0 || 2 * pixels.filter((i) => truth.saturatedGround[i] === 1).length > pixels.length) continue;
    there++;
    if (pixels.some((i) => answer.codes[i] === code)) found++;
  }
  const claims = claimedFlaws(answer, truth, 'short');
  return { there, found, parted: found, claimed: claims.length, true: claims.filter(({ right }) => right > 0).length };
}

function mostCommon(values: readonly number[]): number {
  const counts = new Map<number, number>();
  for (const value of values) counts.set(value, (counts.get(value) ?? 0) + 1);
  let best = 0;
  for (const [value, count] of counts) if (count > (counts.get(best) ?? 0)) best = value;
  return best;
}

/** Pixels of each round object that carry its code in the truth; where discs overlap a pixel belongs to the one in which it lies deeper. */
export function visiblePixels({ grid, codes, rounds }: Truth, kind: RoundObject['kind'], leastRadiusM: number): number[][] {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const code = codeOf(kind === 'bubble' ? 'bubble' : 'short');
  const chosen = rounds.filter((round) => round.kind === kind);
  const owner = new Map<number, { rho: number; object: number }>();
  chosen.forEach(({ xM, topM, radiusM }, object) => {
    for (let r = Math.max(0, Math.floor((topM - radiusM) / pitchYM)); r < Math.min(rows, (topM + radiusM) / pitchYM + 1); r++) {
      for (let c = Math.max(0, Math.floor((xM - radiusM) / pitchXM)); c < Math.min(columns, (xM + radiusM) / pitchXM + 1); c++) {
        const i = r * columns + c;
        const rho = Math.hypot((c + 0.5) * pitchXM - xM, (r + 0.5) * pitchYM - topM) / radiusM;
        const known = owner.get(i);
        if (rho < 1 && codes[i] === code && (known === undefined || rho < known.rho)) owner.set(i, { rho, object });
      }
    }
  });
  const pixels: number[][] = chosen.map(() => []);
  for (const [i, { object }] of owner) pixels[object]!.push(i);
  return pixels.filter((_, object) => chosen[object]!.radiusM >= leastRadiusM);
}

function claimedFlaws(answer: Answer, truth: Truth, cause: 'bubble' | 'short'): { pixels: number; right: number }[] {
  const code = codeOf(cause);
  const tallies = answer.flawCauses.map(() => ({ pixels: 0, right: 0 }));
  for (let i = 0; i < truth.codes.length; i++) {
    const flaw = answer.flawLabels[i]!;
    if (flaw === 0 || answer.flawCauses[flaw] !== cause) continue;
    tallies[flaw]!.pixels++;
    if (truth.codes[i] === code) tallies[flaw]!.right++;
  }
  return tallies.filter((_, flaw) => answer.flawCauses[flaw] === cause);
}

function levelRatio({ levelledNm }: Answer, { codes, cleanNm, whiteNm, grid }: Truth): number {
  const flawed = new Set(['bubble', 'residue', 'wrinkle', 'short'].map((cause) => causes.indexOf(cause as (typeof causes)[number])));
  const difference = Float64Array.from(codes, (code, i) => (flawed.has(code) ? Number.NaN : levelledNm[i]! - cleanNm[i]!));
  // A height that is not given is no perfect one: unflawed ground must be there, but for what the scan itself did not measure.
  const unmeasured = causes.indexOf('unmeasured');
  let [there, missing] = [0, 0];
  for (let i = 0; i < codes.length; i++) {
    if (flawed.has(codes[i]!) || codes[i] === unmeasured) continue;
    there++;
    if (Number.isNaN(levelledNm[i]!)) missing++;
  }
  if (missing > mostMissing * there) return Number.POSITIVE_INFINITY;
  return planeResidualRms(difference, grid.columns) / whiteNm;
}
