/** Parts things that lean on a higher one without a peak of their own: a film beside a bubble, a small dome on the flank of a large one. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import { membersOf } from './mask-pixels.ts';

export interface PeelInput {
  readonly columns: number;
  readonly rows: number;
  readonly pitchXM: number;
  readonly pitchYM: number;
  readonly labels: Uint32Array;
  readonly count: number;
  /** Height, lightly smoothed, metres. */
  readonly rise: Float32Array;
  readonly minPixels: number;
  /** Pixels that hold all labelled ones, in raster order; sought where they are not given. */
  readonly pixels?: Int32Array;
}

/** Share of the pixels that stand for the peak, and least number of them. */
const topShare = 0.05;
const leastTop = 3;
/**
 * How far the foot lies beyond the outline at half height, in radii of that outline: 0.41 for a paraboloid, about 0.19 for what is as steep as ρ⁴. What the
 * shape is, the areas above three quarters and above half of the height tell: 1/2 of each other for a paraboloid, 0.7 for the other.
 */
const foot = { dome: 0.45, block: 0.24, between: 0.61 } as const;
/** Further reach, for the tip and the smoothing, pixels. */
const furtherPx = 1.5;
/** Remains that are nowhere wider than twice this are a fringe, pixels. */
const leastHalfPx = 2;

/**
 * Takes from every part what lies too far outside its half-height outline to belong to the same thing, and makes parts of those remains, which are peeled
 * in turn. Remains of fewer than `minPixels` (12 at least) or that are narrow stay. Changes `labels`.
 *
 * @returns the new number of parts.
 */
export function peelParts(input: PeelInput): number {
  const { labels } = input;
  const members = membersOf(labels, input.count, input.pixels);
  let count = input.count;
  for (let label = 1; label <= count; label++) {
    for (const remains of remainsOf(input, members[label]!)) {
      count++;
      members[count] = remains;
      for (const i of remains) labels[i] = count;
      const taken = new Set(remains);
      members[label] = members[label]!.filter((i) => !taken.has(i));
    }
  }
  return count;
}

/** A part's own box: its size, and where in it each of its members lies. */
interface Box {
  readonly width: number;
  readonly height: number;
  readonly places: Int32Array;
}

function remainsOf({ columns, pitchXM, pitchYM, rise, minPixels }: PeelInput, members: Int32Array): Int32Array[] {
  const least = Math.max(12, minPixels);
  if (members.length < 2 * least) return [];
  const peak = peakOf(rise, members);
  if (!(peak > 0)) return [];

  const { width, height, places } = boxOf(members, columns);
  // Lengths in units of a pixel of the same area.
  const pixelM = Math.sqrt(pitchXM * pitchYM);
  const pitch = { pitchX: pitchXM / pixelM, pitchY: pitchYM / pixelM };
  // Distance from the outline at half height, over the part's own box.
  const beyond = new Uint8Array(width * height).fill(1);
  const half = clearHigher(rise, members, places, 0.5 * peak, beyond);
  if (half === 0) return [];
  const radius = Math.sqrt(half / Math.PI);
  const reach = (higherThan(rise, members, 0.75 * peak) / half < foot.between ? foot.dome : foot.block) * radius + furtherPx;
  const away = squaredDistance(beyond, width, height, pitch);
  const far = new Uint8Array(beyond.length);
  const at = new Int32Array(beyond.length);
  let any = false;
  for (let n = 0; n < members.length; n++) {
    const k = places[n]!;
    at[k] = members[n]!;
    if (!(away[k]! > reach * reach)) continue;
    far[k] = 1;
    any = true;
  }
  if (!any) return [];
  const parts = labelComponents(far, width, height, 8);
  const widest = new Float64Array(parts.count + 1);
  const inside = squaredDistance(far, width, height, pitch);
  for (let k = 0; k < far.length; k++) if (far[k] === 1 && inside[k]! > widest[parts.labels[k]!]!) widest[parts.labels[k]!] = inside[k]!;
  const out: Int32Array[] = [];
  for (let n = 1; n <= parts.count; n++) {
    if (parts.pixels[n]! < least || widest[n]! <= leastHalfPx ** 2) continue;
    const list: number[] = [];
    for (let k = 0; k < far.length; k++) if (parts.labels[k] === n) list.push(at[k]!);
    out.push(Int32Array.from(list));
  }
  return out;
}

/** Mean of the highest few, metres; what is missing counts as 0. */
function peakOf(rise: Float32Array, members: Int32Array): number {
  const heights = new Float64Array(members.length);
  for (let n = 0; n < heights.length; n++) {
    const value = rise[members[n]!]!;
    heights[n] = value === value ? value : 0;
  }
  heights.sort();
  const top = Math.max(leastTop, Math.round(topShare * heights.length));
  let peak = 0;
  for (let k = 1; k <= top; k++) peak += heights[heights.length - k]! / top;
  return peak;
}

function boxOf(members: Int32Array, columns: number): Box {
  let left = columns;
  let right = 0;
  for (let n = 0; n < members.length; n++) {
    const c = members[n]! % columns;
    if (c < left) left = c;
    if (c > right) right = c;
  }
  // Members are in raster order.
  const upper = Math.floor(members[0]! / columns);
  const lower = Math.floor(members[members.length - 1]! / columns);
  const width = right - left + 1;
  const places = new Int32Array(members.length);
  for (let n = 0; n < places.length; n++) {
    const c = members[n]! % columns;
    places[n] = ((members[n]! - c) / columns - upper) * width + c - left;
  }
  return { width, height: lower - upper + 1, places };
}

/** Sets the mask of the box to 0 on members higher than `least`. @returns how many there are. */
function clearHigher(rise: Float32Array, members: Int32Array, places: Int32Array, least: number, mask: Uint8Array): number {
  let count = 0;
  for (let n = 0; n < members.length; n++) {
    if (!(rise[members[n]!]! > least)) continue;
    mask[places[n]!] = 0;
    count++;
  }
  return count;
}

function higherThan(rise: Float32Array, members: Int32Array, least: number): number {
  let count = 0;
  for (let n = 0; n < members.length; n++) if (rise[members[n]!]! > least) count++;
  return count;
}
