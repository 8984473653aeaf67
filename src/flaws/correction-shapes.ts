/** Pixels and links that a stroke, an outline or a line drawn on the map means. Points are in metres, x right, y up, origin at the map's lower-left corner. */
import type { Grid } from '../grid/maps.ts';
import { pixelCount } from '../grid/maps.ts';
import { pixelAt } from '../grid/pixel-at.ts';
import { fillPolygon } from '../read/footprint.ts';

export type Point = readonly [xM: number, yM: number];
export type Path = readonly Point[];

/** A rectangle of pixels, both ends included; empty where an end lies before its start. */
export interface PixelBox {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/** Pixels of the map whose centre lies no further than `reachM` from the box around some points. */
export function boxAround({ columns, rows, pitchXM, pitchYM }: Grid, points: Path, reachM: number): PixelBox {
  const xs = points.map(([xM]) => xM);
  const ys = points.map(([, yM]) => yM);
  return {
    left: Math.max(0, Math.ceil((least(xs) - reachM) / pitchXM - 0.5)),
    right: Math.min(columns - 1, Math.floor((most(xs) + reachM) / pitchXM - 0.5)),
    top: Math.max(0, Math.ceil(rows - 0.5 - (most(ys) + reachM) / pitchYM)),
    bottom: Math.min(rows - 1, Math.floor(rows - 0.5 - (least(ys) - reachM) / pitchYM)),
  };
}

/**
 * Pixels under a stroke: those whose centre is no further than half the width from the path, and those that hold a point of the path, looked at every quarter of a
 * pixel, so that a stroke thinner than a pixel leaves no gaps. In raster order; parts beyond the map are cut off.
 */
export function strokePixels(grid: Grid, path: Path, widthM: number): Int32Array {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const radiusM = widthM / 2;
  const found = new Set<number>();
  for (const [from, to] of segmentsOf(path)) {
    const box = boxAround(grid, [from, to], radiusM);
    for (let r = box.top; r <= box.bottom; r++) {
      for (let c = box.left; c <= box.right; c++) {
        if (distance2([(c + 0.5) * pitchXM, (rows - r - 0.5) * pitchYM], from, to) <= radiusM * radiusM) found.add(r * columns + c);
      }
    }
    for (const point of alongSegment(grid, from, to)) {
      const index = pixelAt(grid, point);
      if (index !== undefined) found.add(index);
    }
  }
  return Int32Array.from(found).sort();
}

/** Pixels whose centre lies inside an outline that closes by itself (even-odd), in raster order. */
export function outlinePixels(grid: Grid, corners: Path): Int32Array {
  const mask = new Uint8Array(pixelCount(grid));
  fillPolygon(grid, { rings: [[...corners, corners[0]!]] }, mask);
  let count = 0;
  for (const value of mask) count += value;
  const found = new Int32Array(count);
  for (let i = 0, k = 0; i < mask.length; i++) if (mask[i] === 1) found[k++] = i;
  return found;
}

/** Points along a path, no further apart than a quarter of the smaller pitch, its corners included; what lies beyond the map is left out. */
export function* alongPath(grid: Grid, path: Path): Generator<Point> {
  for (const [from, to] of segmentsOf(path)) yield* alongSegment(grid, from, to);
}

/**
 * Whether a line drawn on the map passes between two pixels: it crosses the straight link of their centres. A centre exactly on the line counts to
 * its left side, so that every pixel is on one side.
 */
export function crosses(path: Path, a: Point, b: Point): boolean {
  let crossings = 0;
  for (let k = 0; k + 1 < path.length; k++) {
    const [from, to] = [path[k]!, path[k + 1]!];
    if (left(from, to, a) !== left(from, to, b) && left(a, b, from) !== left(a, b, to)) crossings++;
  }
  // A line that goes there and back again leaves both on the same side.
  return crossings % 2 === 1;
}

/** The path with its first and last piece prolonged straight on by a share of the whole length. */
export function prolonged(path: Path, share: number): Path {
  const lengthM = segmentsOf(path).reduce((sum, [from, to]) => sum + Math.hypot(to[0] - from[0], to[1] - from[1]), 0);
  const beyond = (end: Point, before: Point): Point => {
    const pieceM = Math.hypot(end[0] - before[0], end[1] - before[1]);
    const factor = pieceM > 0 ? (share * lengthM) / pieceM : 0;
    return [end[0] + factor * (end[0] - before[0]), end[1] + factor * (end[1] - before[1])];
  };
  return [beyond(path[0]!, path[1]!), ...path.slice(1, -1), beyond(path.at(-1)!, path.at(-2)!)];
}

/** Whether a point lies left of the line from one point to another, or on it. */
function left(from: Point, to: Point, point: Point): boolean {
  return (to[0] - from[0]) * (point[1] - from[1]) - (to[1] - from[1]) * (point[0] - from[0]) >= 0;
}

function segmentsOf(path: Path): readonly (readonly [Point, Point])[] {
  return path.length === 1 ? [[path[0]!, path[0]!]] : path.slice(1).map((to, k) => [path[k]!, to] as const);
}

function* alongSegment(grid: Grid, from: Point, to: Point): Generator<Point> {
  const clipped = clip(grid, from, to);
  if (!clipped) return;
  const [start, end] = clipped;
  const steps = Math.max(1, Math.ceil(((end - start) * Math.hypot(to[0] - from[0], to[1] - from[1])) / (Math.min(grid.pitchXM, grid.pitchYM) / 4)));
  for (let k = 0; k <= steps; k++) {
    const t = start + ((end - start) * k) / steps;
    yield [from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])];
  }
}

/** Part of a segment on the map as shares of its length (Liang & Barsky, ACM Trans. Graph. 3, 1, 1984); undefined when there is none. */
function clip({ columns, rows, pitchXM, pitchYM }: Grid, from: Point, to: Point): readonly [number, number] | undefined {
  let [start, end] = [0, 1];
  for (const [at, step, length] of [[from[0], to[0] - from[0], columns * pitchXM], [from[1], to[1] - from[1], rows * pitchYM]] as const) {
    if (step === 0) {
      if (at < 0 || at > length) return undefined;
      continue;
    }
    const [first, second] = step > 0 ? [-at / step, (length - at) / step] : [(length - at) / step, -at / step];
    start = Math.max(start, first);
    end = Math.min(end, second);
  }
  return start <= end ? [start, end] : undefined;
}

function distance2([x, y]: Point, from: Point, to: Point): number {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const length2 = dx * dx + dy * dy;
  const t = length2 > 0 ? Math.min(1, Math.max(0, ((x - from[0]) * dx + (y - from[1]) * dy) / length2)) : 0;
  return (x - from[0] - t * dx) ** 2 + (y - from[1] - t * dy) ** 2;
}

function least(values: readonly number[]): number {
  return values.reduce((a, b) => Math.min(a, b));
}

function most(values: readonly number[]): number {
  return values.reduce((a, b) => Math.max(a, b));
}
