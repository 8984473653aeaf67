/** Circles from which domes are sought. */
import { squaredDistance } from '../grid/distance.ts';
import { breakAlong, circleThrough, raysAround } from './dome-rim.ts';
import type { DomeInput, Point, Ray } from './dome-rim.ts';
import { pixelsOf } from './mask-pixels.ts';

export interface DomeStart {
  /** Pixel of the centre, or the one nearest to it on the map. */
  readonly at: number;
  /** Centre from the map's left and upper border, metres: y runs down. */
  readonly xM: number;
  readonly yM: number;
  readonly radiusM: number;
  /** The rim is where the slope breaks, rather than where flawed ground ends. */
  readonly breaks: boolean;
}

/** A dome of a smaller radius has too few pixels for its outline to tell a circle, pixels. */
const leastRadiusPx = 3;
/** Directions in which the ground about a summit is followed. */
const rays = 16;
/** Nor is a dome about a summit sought beyond this, pixels: larger ones are seldom run through on all sides. */
const mostRadiusPx = 24;
/** Nor about one lower than this many standard deviations of the noise: a break of slope must stand out of it. */
const leastSummit = 60;
/** A cap cut off by the map's border is at least this wide and this deep, pixels. */
const leastChordPx = 6;
const leastDepthPx = 2;

/** Inscribed circles of the flawed ground, and caps at the map's border, the largest first. */
export function startsByOutline(input: DomeInput): DomeStart[] {
  return [...inscribedCircles(input), ...capsAtBorder(input)].sort(largestFirst);
}

const largestFirst = (a: DomeStart, b: DomeStart): number => b.radiusM - a.radiusM || a.at - b.at;

function startAt({ columns, pitchXM, pitchYM }: DomeInput, at: number, radiusM: number): DomeStart {
  return { at, breaks: false, xM: ((at % columns) + 0.5) * pitchXM, yM: (Math.floor(at / columns) + 0.5) * pitchYM, radiusM };
}

/** Circles at the maxima of the distance to the outline. */
function inscribedCircles(input: DomeInput): DomeStart[] {
  const { columns, rows, pitchXM, pitchYM, mask } = input;
  const distance2 = squaredDistance(mask, columns, rows, { pitchX: pitchXM, pitchY: pitchYM });
  const least = (leastRadiusPx * Math.max(pitchXM, pitchYM)) ** 2;
  return maxima(distance2, columns, rows, pixelsOf(mask), least)
    .map((at) => startAt(input, at, Math.sqrt(distance2[at]!) - 0.5 * Math.sqrt(pitchXM * pitchYM)));
}

/**
 * Circles through the breaks of slope about the summits, those in `taken` left out, the largest first: what runs through a dome moves the inscribed circle off
 * it, but not its rim.
 */
export function startsBySummits(input: DomeInput, taken: Uint32Array): DomeStart[] {
  const { columns, rows, pitchXM, pitchYM, mask, rise, noiseM } = input;
  const pixelM = Math.max(pitchXM, pitchYM);
  const starts: DomeStart[] = [];
  const around = raysAround(rays, input);
  const least = leastSummit * noiseM;
  for (const at of maxima(rise, columns, rows, pixelsOf(mask), least)) {
    if (taken[at]! > 0 || rise[at] === least) continue;
    // Noise makes many a summit on a broad top: one within two pixels is enough.
    if (!isHighestWithin(rise, columns, rows, at, 2)) continue;
    const centre = startAt(input, at, 0);
    const found = circleThrough(rimAbout(input, around, centre, rise[at]!, mostRadiusPx * pixelM));
    if (found && found.radiusM >= leastRadiusPx * pixelM && Math.hypot(found.xM - centre.xM, found.yM - centre.yM) < found.radiusM) starts.push({ at, breaks: true, ...found });
  }
  return starts.sort(largestFirst);
}

/** Breaks of slope about a place, those left out that lie more than half as far again as the middle one, or less than half as far. */
function rimAbout(input: DomeInput, around: readonly Ray[], centre: Point, heightM: number, mostM: number): Point[] {
  const pixelM = Math.max(input.pitchXM, input.pitchYM);
  const points: { point: Point; awayM: number }[] = [];
  for (const ray of around) {
    const point = breakAlong(input, centre, heightM / 2, ray, 2 * pixelM, mostM, 1);
    if (point) points.push({ point, awayM: Math.hypot(point.xM - centre.xM, point.yM - centre.yM) });
  }
  if (points.length < around.length / 2) return [];
  points.sort((a, b) => a.awayM - b.awayM);
  const middle = points[points.length >> 1]!.awayM;
  return points.filter(({ awayM }) => awayM > middle / 2 && awayM < 1.5 * middle).map(({ point }) => point);
}

/** Caps: where flawed ground lies on the map's border, the circle through the ends of the chord and as deep as the ground goes on inwards from its middle. */
function capsAtBorder(input: DomeInput): DomeStart[] {
  const { columns, rows, pitchXM, pitchYM, mask } = input;
  const starts: DomeStart[] = [];
  const along = (length: number, pitchM: number, inwardsM: number, depthPx: number, pixel: (k: number, depth: number) => number, place: (alongM: number, inM: number) => [number, number]): void => {
    for (let k = 0; k < length; k++) {
      if (mask[pixel(k, 0)] === 0) continue;
      let end = k;
      while (end < length && mask[pixel(end, 0)] === 1) end++;
      const middle = (k + end) >> 1;
      let depth = 0;
      while (depth < depthPx && mask[pixel(middle, depth)] === 1) depth++;
      if (end - k >= leastChordPx && depth >= leastDepthPx) {
        const [chordM, depthM] = [(end - k) * pitchM, depth * inwardsM];
        const radiusM = (chordM ** 2 / 4 + depthM ** 2) / (2 * depthM);
        const inM = depthM - radiusM;
        const [xM, yM] = place(((k + end) / 2) * pitchM, inM);
        starts.push({ breaks: false, at: pixel(middle, Math.min(depthPx - 1, Math.max(0, Math.floor(inM / inwardsM)))), xM, yM, radiusM });
      }
      k = end;
    }
  };
  along(columns, pitchXM, pitchYM, rows, (k, depth) => depth * columns + k, (a, b) => [a, b]);
  along(columns, pitchXM, pitchYM, rows, (k, depth) => (rows - 1 - depth) * columns + k, (a, b) => [a, rows * pitchYM - b]);
  along(rows, pitchYM, pitchXM, columns, (k, depth) => k * columns + depth, (a, b) => [b, a]);
  along(rows, pitchYM, pitchXM, columns, (k, depth) => k * columns + columns - 1 - depth, (a, b) => [columns * pitchXM - b, a]);
  return starts;
}

function isHighestWithin(values: Float32Array, columns: number, rows: number, at: number, half: number): boolean {
  const c = at % columns;
  const r = (at - c) / columns;
  for (let y = Math.max(0, r - half); y <= Math.min(rows - 1, r + half); y++) {
    for (let x = Math.max(0, c - half); x <= Math.min(columns - 1, c + half); x++) if (values[y * columns + x]! > values[at]!) return false;
  }
  return true;
}

/** Those of the listed pixels off the border that are at least so high and that none of their eight neighbours exceeds. */
function maxima(values: Float32Array, columns: number, rows: number, pixels: Int32Array, least: number): number[] {
  const found: number[] = [];
  for (let n = 0; n < pixels.length; n++) {
    const i = pixels[n]!;
    const here = values[i]!;
    if (!(here >= least) || i < columns || i >= (rows - 1) * columns) continue;
    const c = i % columns;
    if (c > 0 && c + 1 < columns && isMaximum(values, columns, i, here)) found.push(i);
  }
  return found;
}

function isMaximum(values: Float32Array, columns: number, i: number, here: number): boolean {
  if (values[i - 1]! > here || values[i + 1]! > here || values[i - columns]! > here || values[i + columns]! > here) return false;
  return !(values[i - columns - 1]! > here || values[i - columns + 1]! > here || values[i + columns - 1]! > here || values[i + columns + 1]! > here);
}
