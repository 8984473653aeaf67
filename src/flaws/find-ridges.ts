/** Folds: long crests that fall off on both sides and keep their height along their length. */
import { labelComponents } from '../grid/label-components.ts';
import { pixelsOf } from './mask-pixels.ts';

export interface RidgeInput {
  readonly columns: number;
  readonly rows: number;
  readonly pitchXM: number;
  readonly pitchYM: number;
  /** 1 on flawed ground. */
  readonly mask: Uint8Array;
  /** Height above the local ground, lightly smoothed, metres; NaN missing. */
  readonly rise: Float32Array;
}

export interface Ridges {
  /** 1 on crests. */
  readonly crest: Uint8Array;
  /** Full width at half the crest's height, metres, on crests; 0 elsewhere. */
  readonly widthM: Float32Array;
}

/** Eight directions over a half-turn on square pixels; on others the steps that come nearest to their angles. */
const angles = [[1, 0], [2, 1], [1, 1], [1, 2], [0, 1], [-1, 2], [-1, 1], [-2, 1]].map(([dc, dr]) => Math.atan2(dr!, dc!));
/** Longest step in pixels along an axis, and in units of the larger pitch: a longer one would step over a fold's flank. */
const longestStep = 8;
const longestLength = 2.3;
/** A crest keeps half its height for at least this many times the width over which it falls to half. A round dome, or two that touch, keep it for up to 1.7 times. */
const longerThanWide = 2.5;
/** Along a crest the height rises to at most this many times what it is: the foot of a dome is a crest around the dome's side, but rises steeply towards the top. */
const steadyPart = 1.6;
/** Wider ridges are no folds of a few layers, metres. */
export const widestM = 0.25e-6;
/** Crest lines of fewer widths are no ridges. */
const leastWidths = 2.5;

/**
 * Crest pixels of ridges inside the mask. For eight directions the distances are taken at which the height has fallen to half of the pixel's own; the
 * direction with the smallest sum runs across the ridge, that with the largest along it. Leaving the mask counts as having fallen. Touching bubbles
 * in a row have no crest, because between them the height falls.
 */
export function findRidges(input: RidgeInput): Ridges {
  const { columns, mask, rise } = input;
  const crest = new Uint8Array(mask.length);
  const widthM = new Float32Array(mask.length);
  const reach = reaches(input.pitchXM, input.pitchYM);
  for (const i of pixelsOf(mask)) {
    // Most flawed ground is slope in every direction: no crest, whichever way lies across.
    if (!isCrestSomeWay(rise, columns, i, reach)) continue;
    const across = crestWidth(input, i, reach);
    if (across !== across) continue;
    crest[i] = 1;
    widthM[i] = across;
  }
  return withoutShort(crest, widthM, input);
}

/** Full width at half the height of the crest that runs through a pixel, metres; NaN where none does. */
function crestWidth(input: RidgeInput, i: number, reach: readonly Reach[]): number {
  const c = i % input.columns;
  const r = (i - c) / input.columns;
  let across = Number.POSITIVE_INFINITY;
  let acrossAt = 0;
  let along = 0;
  for (let k = 0; k < reach.length; k++) {
    const sum = bothFalls(input, r, c, reach[k]!);
    if (sum < across) {
      across = sum;
      acrossAt = k;
    }
    if (sum > along) along = sum;
  }
  return across < widestM && along >= longerThanWide * across && isCrestAlong(input.rise, input.columns, i, reach[acrossAt]!) ? across : Number.NaN;
}

/** Neither neighbour in a direction is higher; beyond the map nothing is. */
function isCrestAlong(rise: Float32Array, columns: number, i: number, { dc, dr }: Reach): boolean {
  const step = dr * columns + dc;
  const here = rise[i]!;
  const c = i % columns;
  return !(c + dc < columns && c + dc >= 0 && here < rise[i + step]!) && !(c - dc < columns && c - dc >= 0 && here < rise[i - step]!);
}

function isCrestSomeWay(rise: Float32Array, columns: number, i: number, reach: readonly Reach[]): boolean {
  for (let k = 0; k < reach.length; k++) if (isCrestAlong(rise, columns, i, reach[k]!)) return true;
  return false;
}

/** A direction: its step in columns and rows (downwards), that step's length, and how many to look ahead. */
interface Reach {
  readonly dc: number;
  readonly dr: number;
  readonly steps: number;
  readonly lengthM: number;
}

/** The eight directions, looking ahead as far as the widest ridge has to be long. */
function reaches(pitchXM: number, pitchYM: number): Reach[] {
  return angles.map((angle) => {
    const { dc, dr } = stepTowards(angle, pitchXM, pitchYM);
    const lengthM = Math.hypot(dc * pitchXM, dr * pitchYM);
    return { dc, dr, lengthM, steps: Math.max(2, Math.ceil((longerThanWide * widestM) / 2 / lengthM)) };
  });
}

/** The step whose angle in metres is nearest, of those that are not too long; the shortest of those as near. */
function stepTowards(angle: number, pitchXM: number, pitchYM: number): { dc: number; dr: number } {
  const longestM = longestLength * Math.max(pitchXM, pitchYM);
  let best = { dc: 1, dr: 0, off: Number.POSITIVE_INFINITY };
  for (let reach = 1; reach <= longestStep; reach++) {
    for (let dr = 0; dr <= reach; dr++) {
      for (let dc = -reach; dc <= reach; dc++) {
        if (Math.max(Math.abs(dc), dr) !== reach || (dr === 0 && dc < 0) || Math.hypot(dc * pitchXM, dr * pitchYM) > longestM) continue;
        const off = Math.abs(Math.atan2(dr * pitchYM, dc * pitchXM) - angle);
        if (off < best.off - 1e-9) best = { dc, dr, off };
      }
    }
  }
  return best;
}

/** Sum of the distances to both sides at which the height has fallen to half. Where the map ends before that on one side, the other side stands for both. */
function bothFalls(input: RidgeInput, r: number, c: number, reach: Reach): number {
  const ahead = fall(input, r, c, 1, reach);
  const back = fall(input, r, c, -1, reach);
  if (ahead >= 0 && back >= 0) return ahead + back;
  if (ahead < 0 && back < 0) return -ahead - back;
  return 2 * Math.max(ahead, back, -Math.min(ahead, back));
}

/** Distance at which the height has fallen to half, linear between pixels, metres; where it rises too far before that, the distance to there; minus the distance to the map's border where that comes first. */
function fall({ columns, rows, mask, rise }: RidgeInput, r: number, c: number, sense: 1 | -1, reach: Reach): number {
  const { steps, lengthM } = reach;
  const dc = sense * reach.dc;
  const dr = sense * reach.dr;
  const here = rise[r * columns + c]!;
  const half = here / 2;
  const most = steadyPart * here;
  // Steps that stay on the map.
  const room = Math.min(roomAlong(c, dc, columns), roomAlong(r, dr, rows));
  const step = dr * columns + dc;
  const last = Math.min(steps, room);
  let at = r * columns + c;
  let before = here;
  for (let n = 1; n <= last; n++) {
    at += step;
    const value = rise[at]!;
    if (mask[at] === 0 || !(value > half)) return (n - 1 + (value < half ? (before - half) / (before - value) : 0.5)) * lengthM;
    if (value > most) return (n - 1) * lengthM;
    before = value;
  }
  return room < steps ? -(room + 0.5) * lengthM : steps * lengthM;
}

/** How often one can go on by `step` from a place without leaving 0…length − 1. */
function roomAlong(place: number, step: number, length: number): number {
  if (step === 0) return length;
  return Math.floor((step > 0 ? length - 1 - place : place) / Math.abs(step));
}

/** Drops crest lines that are short against their width. A line is as long as the diagonal of the box around it, and as its pixels set side by side. */
function withoutShort(crest: Uint8Array, widthM: Float32Array, { columns, rows, pitchXM, pitchYM }: RidgeInput): Ridges {
  const { labels, count, pixels } = labelComponents(crest, columns, rows, 8);
  const crests = pixelsOf(crest);
  const widths = new Float64Array(count + 1);
  const [left, right, top, bottom] = [columns, 0, rows, 0].map((start) => new Int32Array(count + 1).fill(start)) as [Int32Array, Int32Array, Int32Array, Int32Array];
  for (const i of crests) {
    const label = labels[i]!;
    widths[label]! += widthM[i]!;
    const c = i % columns;
    const r = (i - c) / columns;
    if (c < left[label]!) left[label] = c;
    if (c > right[label]!) right[label] = c;
    if (r < top[label]!) top[label] = r;
    if (r > bottom[label]!) bottom[label] = r;
  }
  const pitch = Math.min(pitchXM, pitchYM);
  for (const i of crests) {
    const label = labels[i]!;
    const lengthM = Math.max(pixels[label]! * pitch, Math.hypot((right[label]! - left[label]! + 1) * pitchXM, (bottom[label]! - top[label]! + 1) * pitchYM));
    if (lengthM >= leastWidths * (widths[label]! / pixels[label]!)) continue;
    crest[i] = 0;
    widthM[i] = 0;
  }
  return { crest, widthM };
}
