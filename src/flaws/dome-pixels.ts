/** The pixels inside a circle, and whether their height is a dome's. */
import type { DomeInput, Point } from './dome-rim.ts';

export interface Ring extends Point {
  readonly radiusM: number;
}

export interface Circle extends Ring {
  /** By direction: the flawed ground ends here with the circle. */
  readonly free: readonly boolean[];
  /** It stands on the flank of something whose own fall adds to the dome's: that makes it more pointed. */
  readonly leaning: boolean;
}

/** Directions in which a circle is compared with the outline. */
export const directions = 48;
/** Largest rms deviation from a paraboloid, as a share of its height, beyond the noise. */
const mostDeviation = 0.12;
/** Fewer heights tell no shape. */
const leastHeights = 12;

/** Rows and columns that hold a circle, cut off at the map's border. */
interface Bounds {
  readonly firstRow: number;
  readonly lastRow: number;
  readonly firstColumn: number;
  readonly lastColumn: number;
  /** Number of pixels. */
  readonly room: number;
}

function boundsOf({ columns, rows, pitchXM, pitchYM }: DomeInput, { xM, yM, radiusM }: Ring): Bounds {
  const firstRow = Math.max(0, Math.floor((yM - radiusM) / pitchYM - 1));
  const lastRow = Math.min(rows - 1, Math.ceil((yM + radiusM) / pitchYM + 1));
  const firstColumn = Math.max(0, Math.floor((xM - radiusM) / pitchXM - 1));
  const lastColumn = Math.min(columns - 1, Math.ceil((xM + radiusM) / pitchXM + 1));
  return { firstRow, lastRow, firstColumn, lastColumn, room: Math.max(0, lastRow - firstRow + 1) * Math.max(0, lastColumn - firstColumn + 1) };
}

/** Flawed ground within a square of the distance from a circle's centre, in radii: ρ² of `most`, a little more than 1 at most. */
export function flawedInside(input: DomeInput, circle: Ring, most: number): Int32Array {
  const { columns, pitchXM, pitchYM, mask } = input;
  const { xM, yM, radiusM } = circle;
  const { firstRow, lastRow, firstColumn, lastColumn, room } = boundsOf(input, circle);
  const found = new Int32Array(room);
  let count = 0;
  for (let r = firstRow; r <= lastRow; r++) {
    for (let c = firstColumn; c <= lastColumn; c++) {
      if (mask[r * columns + c] === 0) continue;
      const dx = (c + 0.5) * pitchXM - xM;
      const dy = (r + 0.5) * pitchYM - yM;
      if ((dx * dx + dy * dy) / (radiusM * radiusM) <= most) found[count++] = r * columns + c;
    }
  }
  return found.subarray(0, count);
}

/** Whether the height inside a circle, in the directions where flawed ground ends with it, is a paraboloid rather than a block or a cone. */
export function isParaboloid(input: DomeInput, circle: Circle): boolean {
  const { heights, rho2 } = freeHeights(input, circle);
  const count = heights.length;
  if (count < leastHeights) return false;
  const shape = new Float64Array(count);
  for (let n = 0; n < count; n++) shape[n] = 1 - rho2[n]!;
  const dome = fitOf(heights, shape);
  for (let n = 0; n < count; n++) shape[n] = 1 - rho2[n]! * rho2[n]!;
  const block = fitOf(heights, shape);
  for (let n = 0; n < count; n++) shape[n] = 1 - Math.sqrt(rho2[n]!);
  const cone = fitOf(heights, shape);
  return dome.heightM > 0 && dome.rmsM < block.rmsM && (circle.leaning || dome.rmsM < cone.rmsM) && dome.rmsM < mostDeviation * dome.heightM + 2 * input.noiseM;
}

/** Known heights inside the circle in its free directions, with their ρ². */
function freeHeights(input: DomeInput, circle: Circle): { readonly heights: Float64Array; readonly rho2: Float64Array } {
  const { columns, pitchXM, pitchYM, rise } = input;
  const { xM, yM, radiusM, free } = circle;
  const { firstRow, lastRow, firstColumn, lastColumn, room } = boundsOf(input, circle);
  const heights = new Float64Array(room);
  const rho2 = new Float64Array(room);
  let count = 0;
  for (let r = firstRow; r <= lastRow; r++) {
    for (let c = firstColumn; c <= lastColumn; c++) {
      const dx = (c + 0.5) * pitchXM - xM;
      const dy = (r + 0.5) * pitchYM - yM;
      const square = (dx * dx + dy * dy) / (radiusM * radiusM);
      const height = rise[r * columns + c]!;
      if (square > 1 || height !== height) continue;
      const direction = Math.round(((Math.atan2(dy, dx) / (2 * Math.PI) + 1) % 1) * directions) % directions;
      if (free[direction] !== true) continue;
      heights[count] = height;
      rho2[count++] = square;
    }
  }
  return { heights: heights.subarray(0, count), rho2: rho2.subarray(0, count) };
}

/** Least-squares height of a shape, and what is left of the heights. */
function fitOf(heights: Float64Array, shape: Float64Array): { readonly heightM: number; readonly rmsM: number } {
  let both = 0;
  let square = 0;
  for (let n = 0; n < heights.length; n++) {
    both += heights[n]! * shape[n]!;
    square += shape[n]! ** 2;
  }
  const heightM = both / square;
  let rss = 0;
  for (let n = 0; n < heights.length; n++) rss += (heights[n]! - heightM * shape[n]!) ** 2;
  return { heightM, rmsM: Math.sqrt(rss / heights.length) };
}
