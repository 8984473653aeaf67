/** Folds: long crests that fall off on both sides and keep their height along their length. */
import { labelComponents } from '../grid/label-components.ts';

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

/** Eight directions over a half-turn, in pixels. */
const directions = [[1, 0], [2, 1], [1, 1], [1, 2], [0, 1], [-1, 2], [-1, 1], [-2, 1]] as const;
/** A crest keeps half its height for at least this many times the width over which it falls to half. A round dome, or two that touch, keep it for up to 1.7 times. */
const longerThanWide = 2.5;
/** Along a crest the height rises to at most this many times what it is: the foot of a dome is a crest around the dome's side, but rises steeply towards the top. */
const steadyPart = 1.6;
/** Wider ridges are no folds of a few layers, metres. */
const widestM = 0.25e-6;
/** Crest lines of fewer widths are no ridges. */
const leastWidths = 2.5;

/**
 * Crest pixels of ridges inside the mask. For eight directions the distances are taken at which the height has fallen to half of the pixel's own; the
 * direction with the smallest sum runs across the ridge, that with the largest along it. Leaving the mask counts as having fallen. Touching bubbles
 * in a row have no crest, because between them the height falls.
 */
export function findRidges(input: RidgeInput): Ridges {
  const { columns, rows, mask, rise } = input;
  const crest = new Uint8Array(mask.length);
  const widthM = new Float32Array(mask.length);
  const reach = reaches(input);
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) {
      const i = r * columns + c;
      if (mask[i] === 0) continue;
      // Most flawed ground is slope in every direction: no crest, whichever way lies across.
      if (!isCrestSomeWay(rise, columns, i)) continue;
      let across = Number.POSITIVE_INFINITY;
      let acrossAt = 0;
      let along = 0;
      for (let k = 0; k < directions.length; k++) {
        const sum = bothFalls(input, r, c, k, reach[k]!);
        if (sum < across) {
          across = sum;
          acrossAt = k;
        }
        if (sum > along) along = sum;
      }
      if (!(across < widestM && along >= longerThanWide * across)) continue;
      if (!isCrestAlong(rise, columns, i, acrossAt)) continue;
      crest[i] = 1;
      widthM[i] = across;
    }
  }
  return withoutShort(crest, widthM, input);
}

/** Neither neighbour in a direction is higher; beyond the map nothing is. */
function isCrestAlong(rise: Float32Array, columns: number, i: number, k: number): boolean {
  const [dc, dr] = directions[k]!;
  const step = dr * columns + dc;
  const here = rise[i]!;
  return !(i + step >= 0 && i + step < rise.length && here < rise[i + step]!) && !(i - step >= 0 && i - step < rise.length && here < rise[i - step]!);
}

function isCrestSomeWay(rise: Float32Array, columns: number, i: number): boolean {
  for (let k = 0; k < directions.length; k++) if (isCrestAlong(rise, columns, i, k)) return true;
  return false;
}

interface Reach {
  readonly steps: number;
  readonly lengthM: number;
}

/** Steps to look ahead per direction: as far as the widest ridge has to be long. */
function reaches({ pitchXM, pitchYM }: RidgeInput): Reach[] {
  return directions.map(([dc, dr]) => {
    const lengthM = Math.hypot(dc * pitchXM, dr * pitchYM);
    return { steps: Math.max(2, Math.ceil((longerThanWide * widestM) / 2 / lengthM)), lengthM };
  });
}

/** Sum of the distances to both sides at which the height has fallen to half. Where the map ends before that on one side, the other side stands for both. */
function bothFalls(input: RidgeInput, r: number, c: number, k: number, reach: Reach): number {
  const ahead = fall(input, r, c, k, 1, reach);
  const back = fall(input, r, c, k, -1, reach);
  if (ahead >= 0 && back >= 0) return ahead + back;
  if (ahead < 0 && back < 0) return -ahead - back;
  return 2 * Math.max(ahead, back, -Math.min(ahead, back));
}

/** Distance at which the height has fallen to half, linear between pixels, metres; where it rises too far before that, the distance to there; minus the distance to the map's border where that comes first. */
function fall({ columns, rows, mask, rise }: RidgeInput, r: number, c: number, k: number, sense: 1 | -1, { steps, lengthM }: Reach): number {
  const [dc, dr] = directions[k]!;
  const here = rise[r * columns + c]!;
  const half = here / 2;
  const most = steadyPart * here;
  let before = here;
  for (let n = 1; n <= steps; n++) {
    const row = r + sense * n * dr;
    const column = c + sense * n * dc;
    if (row < 0 || row >= rows || column < 0 || column >= columns) return -(n - 0.5) * lengthM;
    const at = row * columns + column;
    const value = rise[at]!;
    if (mask[at] === 0 || !(value > half)) return (n - 1 + (value < half ? (before - half) / (before - value) : 0.5)) * lengthM;
    if (value > most) return (n - 1) * lengthM;
    before = value;
  }
  return steps * lengthM;
}

function withoutShort(crest: Uint8Array, widthM: Float32Array, { columns, rows, pitchXM, pitchYM }: RidgeInput): Ridges {
  const { labels, count, pixels } = labelComponents(crest, columns, rows, 8);
  const widths = new Float64Array(count + 1);
  for (let i = 0; i < labels.length; i++) widths[labels[i]!]! += widthM[i]!;
  const pitch = Math.sqrt(pitchXM * pitchYM);
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label === 0 || pixels[label]! * pitch >= leastWidths * (widths[label]! / pixels[label]!)) continue;
    crest[i] = 0;
    widthM[i] = 0;
  }
  return { crest, widthM };
}
