/** Parts raised ground by its peaks. */
import { highestFirst } from './highest-first.ts';
import { pixelsOf } from './mask-pixels.ts';

export interface PeaksInput {
  readonly columns: number;
  readonly rows: number;
  /** 1 on the ground to be parted. */
  readonly mask: Uint8Array;
  /** Height, lightly smoothed, metres; NaN counts as lowest. */
  readonly rise: Float32Array;
  /** Standard deviation of its noise, metres. */
  readonly noiseM: number;
  readonly minPixels: number;
}

/** Two peaks are two things when the saddle between them lies below this part of the lower one. */
const saddlePart = 0.8;
/** And below it by this many standard deviations of the noise. */
const saddleSigmas = 5;

/**
 * Watershed from the peaks down (Vincent & Soille, IEEE Trans. PAMI 13, 583, 1991, in its ordered form): pixels in order of height join the highest
 * neighbouring part, or start one. Where two parts meet, they become one unless the saddle lies clearly below both peaks. Parts of
 * fewer than `minPixels` join their neighbour. Neighbours are the eight around.
 */
export function partByPeaks({ columns, rows, mask, rise, noiseM, minPixels }: PeaksInput): { labels: Uint32Array; count: number } {
  const members = pixelsOf(mask);
  const part = new Int32Array(mask.length);
  const parts: Parts = { columns, rows, part, rise, parent: new Int32Array(members.length + 1), peak: new Float64Array(members.length + 1), size: new Int32Array(members.length + 1) };
  let count = 0;
  for (const i of highestFirst(members, rise)) {
    let own = joinAround(parts, i, noiseM, minPixels);
    if (own === 0) {
      own = ++count;
      parts.parent[own] = own;
      parts.peak[own] = heightOf(rise[i]!);
    }
    part[i] = own;
    parts.size[own]!++;
  }
  return numbered(parts, members, minPixels);
}

/** Parts on their way; peak and size are those of the parts that are their own parent. */
interface Parts {
  readonly columns: number;
  readonly rows: number;
  readonly rise: Float32Array;
  /** Part of each pixel from 1, 0 for none yet. */
  readonly part: Int32Array;
  readonly parent: Int32Array;
  readonly peak: Float64Array;
  readonly size: Int32Array;
}

function heightOf(rise: number): number {
  return rise === rise ? rise : Number.NEGATIVE_INFINITY;
}

function rootOf(parent: Int32Array, k: number): number {
  let root = k;
  while (parent[root] !== root) root = parent[root]!;
  parent[k] = root;
  return root;
}

/** The part that a pixel joins, 0 where no neighbour has one. Neighbours' parts that no clear saddle keeps apart become one. */
function joinAround(parts: Parts, i: number, noiseM: number, minPixels: number): number {
  const { columns, rows, part, rise, parent, peak, size } = parts;
  const c = i % columns;
  const r = (i - c) / columns;
  const here = heightOf(rise[i]!);
  let best = 0;
  for (let y = Math.max(0, r - 1); y <= Math.min(rows - 1, r + 1); y++) {
    for (let x = Math.max(0, c - 1); x <= Math.min(columns - 1, c + 1); x++) {
      const beside = part[y * columns + x]!;
      if (beside === 0) continue;
      const other = rootOf(parent, beside);
      if (best === 0) {
        best = other;
        continue;
      }
      if (other === best) continue;
      const higher = peak[other]! > peak[best]! ? other : best;
      const lower = higher === other ? best : other;
      const distinct = here < saddlePart * peak[lower]! && peak[lower]! - here > saddleSigmas * noiseM && size[lower]! >= minPixels;
      if (!distinct) {
        parent[lower] = higher;
        size[higher]! += size[lower]!;
      }
      // The pixel itself goes to the part on whose side it lies higher up.
      best = rootOf(parent, best);
      if (distinct && nearerTo(parts, i, best, other)) best = other;
    }
  }
  return best;
}

/** Whether the highest neighbour of a pixel belongs to `other` rather than to `best`. */
function nearerTo({ columns, rows, part, rise, parent }: Parts, i: number, best: number, other: number): boolean {
  const c = i % columns;
  const r = (i - c) / columns;
  let top = Number.NEGATIVE_INFINITY;
  let owner = best;
  for (let y = Math.max(0, r - 1); y <= Math.min(rows - 1, r + 1); y++) {
    for (let x = Math.max(0, c - 1); x <= Math.min(columns - 1, c + 1); x++) {
      const j = y * columns + x;
      if (part[j] === 0 || !(rise[j]! > top)) continue;
      const of = rootOf(parent, part[j]!);
      if (of !== best && of !== other) continue;
      top = rise[j]!;
      owner = of;
    }
  }
  return owner === other;
}

function numbered(parts: Parts, members: Int32Array, minPixels: number): { labels: Uint32Array; count: number } {
  const { part, parent, size } = parts;
  const labels = new Uint32Array(part.length);
  const numbers = new Uint32Array(parent.length);
  let count = 0;
  for (const i of members) {
    let root = rootOf(parent, part[i]!);
    if (size[root]! < minPixels) root = neighbour(parts, i, root);
    if (numbers[root] === 0) numbers[root] = ++count;
    labels[i] = numbers[root]!;
  }
  return { labels, count };
}

/** Another part beside a pixel of a tiny one, or its own. */
function neighbour({ columns, rows, part, parent }: Parts, i: number, own: number): number {
  const c = i % columns;
  const r = (i - c) / columns;
  for (let y = Math.max(0, r - 1); y <= Math.min(rows - 1, r + 1); y++) {
    for (let x = Math.max(0, c - 1); x <= Math.min(columns - 1, c + 1); x++) {
      const beside = part[y * columns + x]!;
      if (beside !== 0 && rootOf(parent, beside) !== own) return rootOf(parent, beside);
    }
  }
  return own;
}
