/** Parts a bubble from the wrinkle it sits on, and touching bubbles of unlike size: what is much wider than the rest stands alone. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';

/** Regions rounder than this are left whole. */
const wholeRoundness = 0.7;
/** A part at least this many times as wide as the region's usual half-width is a part of its own. */
const wider = 1.6;
/** Where it is cut off from the rest, in the same measure. */
const cutAt = 1.3;

export interface SplitInput {
  readonly columns: number;
  readonly rows: number;
  readonly mask: Uint8Array;
  readonly pitchXM: number;
  readonly pitchYM: number;
  /** Smaller remains join the part they touch. */
  readonly minPixels: number;
}

/**
 * Labels a mask's components (8) and splits off parts wider than the component's usual half-width (median of the
 * distance transform along its middle line): cores beyond `cutAt` half-widths are grown back by that distance.
 */
export function splitRegions(input: SplitInput): { labels: Uint32Array; count: number; distance2: Float32Array } {
  const { columns, rows, mask, pitchXM, pitchYM } = input;
  const whole = labelComponents(mask, columns, rows, 8);
  const distance2 = squaredDistance(mask, columns, rows, { pitchX: pitchXM, pitchY: pitchYM });
  const halfWidth = usualHalfWidths(input, whole.labels, whole.count, distance2);
  const core = new Uint8Array(mask.length);
  for (let i = 0; i < core.length; i++) {
    const w = halfWidth[whole.labels[i]!]!;
    if (w > 0 && distance2[i]! > (cutAt * w) ** 2) core[i] = 1;
  }
  const cores = labelComponents(core, columns, rows, 8);
  const widest = new Float64Array(cores.count + 1);
  for (let i = 0; i < core.length; i++) {
    const n = cores.labels[i]!;
    if (n > 0) widest[n] = Math.max(widest[n]!, Math.sqrt(distance2[i]!) / halfWidth[whole.labels[i]!]!);
  }
  for (let i = 0; i < core.length; i++) if (core[i] === 1 && widest[cores.labels[i]!]! < wider) core[i] = 0;

  if (!core.includes(1)) return { labels: whole.labels, count: whole.count, distance2 };
  const part = growBack(input, core, whole.labels, halfWidth);
  return { ...relabel(input, part), distance2 };
}

/** Per component: median distance along the middle line in metres; 0 for round or small components. */
function usualHalfWidths(input: SplitInput, labels: Uint32Array, count: number, distance2: Float32Array): Float64Array {
  const { columns, rows, pitchXM, pitchYM } = input;
  // Steps of the outline make short crests of their own, one pixel from the edge.
  const least2 = (1.5 * Math.max(pitchXM, pitchYM)) ** 2;
  const edges = new Float64Array(count + 1);
  const pixels = new Float64Array(count + 1);
  const middle: number[][] = Array.from({ length: count + 1 }, () => []);
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      const n = labels[i]!;
      if (n === 0) continue;
      pixels[n]!++;
      if (c === 0 || labels[i - 1] !== n) edges[n]! += pitchYM;
      if (c === columns - 1 || labels[i + 1] !== n) edges[n]! += pitchYM;
      if (r === 0 || labels[i - columns] !== n) edges[n]! += pitchXM;
      if (r === rows - 1 || labels[i + columns] !== n) edges[n]! += pitchXM;
      const d = distance2[i]!;
      const acrossX = c > 0 && c + 1 < columns && isCrest(distance2[i - 1]!, d, distance2[i + 1]!);
      const acrossY = r > 0 && r + 1 < rows && isCrest(distance2[i - columns]!, d, distance2[i + columns]!);
      if ((acrossX || acrossY) && d > least2) middle[n]!.push(Math.sqrt(d));
    }
  }
  return Float64Array.from(middle, (distances, n) => {
    const roundness = (4 * Math.PI * pixels[n]! * pitchXM * pitchYM) / ((Math.PI / 4) * edges[n]!) ** 2;
    if (n === 0 || roundness > wholeRoundness || distances.length < 8) return 0;
    distances.sort((a, b) => a - b);
    return distances[distances.length >> 1]!;
  });
}

/** Whether the middle of three values is a maximum; a plateau along the line does not count. */
function isCrest(before: number, here: number, after: number): boolean {
  return here >= before && here >= after && (here > before || here > after);
}

/** Numbers the grown cores from 1; 0 elsewhere. A pixel belongs to a core of its own component within `cutAt` half-widths. */
function growBack(input: SplitInput, core: Uint8Array, labels: Uint32Array, halfWidth: Float64Array): Uint8Array {
  const { columns, rows, pitchXM, pitchYM } = input;
  const away = squaredDistance(core.map((value) => 1 - value), columns, rows, { pitchX: pitchXM, pitchY: pitchYM });
  const part = new Uint8Array(core.length);
  for (let i = 0; i < part.length; i++) {
    const label = labels[i]!;
    if (label === 0) continue;
    const reach = cutAt * halfWidth[label]!;
    if (reach > 0 && away[i]! <= reach * reach) part[i] = 1;
  }
  return part;
}

/** Labels grown parts and remains apart; remains of fewer than `minPixels` join a part beside them. */
function relabel(input: SplitInput, part: Uint8Array): { labels: Uint32Array; count: number } {
  const { columns, rows, mask } = input;
  const rest = new Uint8Array(mask.length);
  for (let i = 0; i < rest.length; i++) rest[i] = mask[i] === 1 && part[i] === 0 ? 1 : 0;
  const remains = labelComponents(rest, columns, rows, 8);
  for (let i = 0; i < rest.length; i++) {
    if (rest[i] === 1 && remains.pixels[remains.labels[i]!]! < input.minPixels && touches(part, columns, i)) {
      rest[i] = 0;
      part[i] = 1;
    }
  }
  const parts = labelComponents(part, columns, rows, 8);
  const others = labelComponents(rest, columns, rows, 8);
  const labels = new Uint32Array(mask.length);
  for (let i = 0; i < labels.length; i++) labels[i] = part[i] === 1 ? parts.labels[i]! : rest[i] === 1 ? parts.count + others.labels[i]! : 0;
  return { labels, count: parts.count + others.count };
}

function touches(part: Uint8Array, columns: number, i: number): boolean {
  for (const step of [-columns - 1, -columns, -columns + 1, -1, 1, columns - 1, columns, columns + 1]) if (part[i + step] === 1) return true;
  return false;
}
