/** The border of a mask as polygons with few vertices. */
import { contours } from 'd3-contour';
import type { Grid } from './maps.ts';

/** A closed ring in metres (x right, y up, origin at the map's lower-left corner); the first point comes again as the last. */
export type TracedRing = readonly (readonly [xM: number, yM: number])[];

export interface TraceOptions {
  /** Furthest that a left-out vertex may lie from the drawn border, in pixels of each axis; half a pixel by default. */
  readonly tolerancePx?: number;
  /** Most vertices of all rings together, closing points not counted; 500 by default. The tolerance grows until they suffice. */
  readonly mostVertices?: number;
}

type Pixels = readonly (readonly [x: number, y: number])[];

/**
 * Polygons around the non-zero pixels of a row-major mask: first ring the outer one, anticlockwise, then holes, clockwise (the order
 * of RFC 7946). Where the mask meets the map's border the polygon follows the border. The border is traced by marching squares
 * (d3-contour) and thinned by Douglas & Peucker (Cartographica 10, 112, 1973)
 * in pixel units. Thinning may drop rings of a pixel or two; an empty mask gives no polygon.
 *
 * @throws RangeError when the mask is not columns × rows.
 */
export function traceOutline(mask: Uint8Array, grid: Grid, options: TraceOptions = {}): TracedRing[][] {
  const { columns, rows, pitchXM, pitchYM } = grid;
  if (mask.length !== columns * rows) throw new RangeError(`a mask of ${columns} × ${rows} pixels needs ${columns * rows} values, got ${mask.length}`);
  // The tracer only indexes its values, so a typed array serves although its types ask for a plain one.
  const traced = contours().size([columns, rows]).smooth(false).contour(mask as unknown as number[], 1);
  const polygons = traced.coordinates.map((polygon) => polygon.map((ring) => openRing(ring)));
  const most = options.mostVertices ?? 500;
  let tolerance = options.tolerancePx ?? 0.5;
  for (;;) {
    const thinned = polygons.map((polygon) => polygon.map((ring) => thin(ring, tolerance)));
    // A polygon whose outer ring vanished takes its holes along.
    const kept = thinned.filter((polygon) => polygon[0]!.length >= 3).map((polygon) => polygon.filter((ring) => ring.length >= 3));
    if (kept.flat().reduce((sum, ring) => sum + ring.length, 0) <= most) {
      return kept.map((polygon) => polygon.map((ring, k) => inMetres(turned(ring, k === 0), pitchXM, pitchYM, rows)));
    }
    tolerance *= 1.5;
  }
}

/**
 * The ring without its closing point, and with the corners that the tracer cut between two straight runs. Stairs of single pixels keep
 * their cuts: these lie on the slanted border that the stairs stand for.
 */
function openRing(ring: readonly (readonly number[])[]): Pixels {
  const points = ring.slice(0, -1).map((point): readonly [number, number] => [point[0]!, point[1]!]);
  const n = points.length;
  const cut = points.map(([x, y], i) => x !== points[(i + 1) % n]![0] && y !== points[(i + 1) % n]![1]);
  return points.flatMap((point, i) => {
    if (!cut[i] || cut[(i + n - 1) % n] || cut[(i + 1) % n]) return [point];
    const next = points[(i + 1) % n]!;
    // Each end lies on a pixel's side, halfway along: the corner takes the whole number of either.
    const corner: readonly [number, number] = Number.isInteger(point[0]) ? [point[0], next[1]] : [next[0], point[1]];
    return [point, corner];
  });
}

/** Douglas–Peucker on a closed ring, split at two far ends. Fewer than three points are left of a ring thinner than the tolerance. */
function thin(ring: Pixels, tolerance: number): Pixels {
  const n = ring.length;
  const start = farthest(ring, 0);
  const points = ring.map((_, i) => ring[(start + i) % n]!);
  points.push(points[0]!);
  const middle = farthest(points, 0);
  const keep = new Uint8Array(n + 1);
  keep[0] = 1;
  keep[middle] = 1;
  const open: [number, number][] = [[0, middle], [middle, n]];
  for (let span = open.pop(); span; span = open.pop()) {
    const [from, to] = span;
    let worst = tolerance;
    let at = -1;
    for (let i = from + 1; i < to; i++) {
      const d = distance(points[i]!, points[from]!, points[to]!);
      if (d > worst) {
        worst = d;
        at = i;
      }
    }
    if (at < 0) continue;
    keep[at] = 1;
    open.push([from, at], [at, to]);
  }
  return points.filter((_, i) => i < n && keep[i] === 1);
}

function farthest(points: Pixels, from: number): number {
  const [x, y] = points[from]!;
  let best = from;
  let most = -1;
  points.forEach((point, i) => {
    const d = (point[0] - x) ** 2 + (point[1] - y) ** 2;
    if (d > most) {
      most = d;
      best = i;
    }
  });
  return best;
}

/** Distance of a point from a segment. */
function distance(p: readonly [number, number], a: readonly [number, number], b: readonly [number, number]): number {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  const length2 = dx * dx + dy * dy;
  const t = length2 === 0 ? 0 : Math.min(1, Math.max(0, ((p[0] - a[0]) * dx + (p[1] - a[1]) * dy) / length2));
  return Math.hypot(p[0] - a[0] - t * dx, p[1] - a[1] - t * dy);
}

/** Anticlockwise once y points up, or clockwise. In pixels y points down, which turns the sign of the area. */
function turned(ring: Pixels, anticlockwise: boolean): Pixels {
  let twice = 0;
  ring.forEach(([x, y], i) => {
    const [nextX, nextY] = ring[(i + 1) % ring.length]!;
    twice += x * nextY - nextX * y;
  });
  return twice < 0 === anticlockwise ? ring : [...ring].reverse();
}

function inMetres(ring: Pixels, pitchXM: number, pitchYM: number, rows: number): TracedRing {
  return [...ring, ring[0]!].map(([x, y]) => [x * pitchXM, (rows - y) * pitchYM] as const);
}
