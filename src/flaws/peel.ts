/** Parts things that lean on a higher one without a peak of their own: a film beside a bubble, a small dome on the flank of a large one. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';

export interface PeelInput {
  readonly columns: number;
  readonly rows: number;
  readonly labels: Uint32Array;
  readonly count: number;
  /** Height, lightly smoothed, metres. */
  readonly rise: Float32Array;
  readonly minPixels: number;
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
  const members = membersOf(labels, input.count);
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

function membersOf(labels: Uint32Array, count: number): Int32Array[] {
  const sizes = new Uint32Array(count + 1);
  for (let i = 0; i < labels.length; i++) sizes[labels[i]!]!++;
  const lists = Array.from(sizes, (size, label) => new Int32Array(label === 0 ? 0 : size));
  const used = new Uint32Array(count + 1);
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label > 0) lists[label]![used[label]!++] = i;
  }
  return lists;
}

function remainsOf({ columns, rise, minPixels }: PeelInput, members: Int32Array): Int32Array[] {
  const least = Math.max(12, minPixels);
  if (members.length < 2 * least) return [];
  const heights = Float64Array.from(members, (i) => (rise[i] === rise[i] ? rise[i]! : 0)).sort().reverse();
  const top = Math.max(leastTop, Math.round(topShare * heights.length));
  let peak = 0;
  for (let k = 0; k < top; k++) peak += heights[k]! / top;
  if (!(peak > 0)) return [];

  let [left, right, upper, lower] = [columns, 0, Number.POSITIVE_INFINITY, 0];
  for (const i of members) {
    const c = i % columns;
    const r = (i - c) / columns;
    left = Math.min(left, c);
    right = Math.max(right, c);
    upper = Math.min(upper, r);
    lower = Math.max(lower, r);
  }
  const width = right - left + 1;
  const height = lower - upper + 1;
  const place = (i: number): number => (Math.floor(i / columns) - upper) * width + (i % columns) - left;
  // Distance from the outline at half height, over the part's own box.
  const beyond = new Uint8Array(width * height).fill(1);
  let half = 0;
  let upperHalf = 0;
  for (const i of members) {
    if (!(rise[i]! > 0.5 * peak)) continue;
    beyond[place(i)] = 0;
    half++;
    if (rise[i]! > 0.75 * peak) upperHalf++;
  }
  if (half === 0) return [];
  const radius = Math.sqrt(half / Math.PI);
  const reach = (upperHalf / half < foot.between ? foot.dome : foot.block) * radius + furtherPx;
  const away = squaredDistance(beyond, width, height, {});
  const far = new Uint8Array(beyond.length);
  const at = new Int32Array(beyond.length);
  for (const i of members) {
    const k = place(i);
    at[k] = i;
    if (away[k]! > reach * reach) far[k] = 1;
  }
  const parts = labelComponents(far, width, height, 8);
  if (parts.count === 0) return [];
  const widest = new Float64Array(parts.count + 1);
  const inside = squaredDistance(far, width, height, {});
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
