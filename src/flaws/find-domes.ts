/** Round domes, also where other things lean on them or run through them. */
import { directions, flawedInside, isParaboloid } from './dome-pixels.ts';
import type { Circle, Ring } from './dome-pixels.ts';
import { breakAlong, circleThrough, edgeAlong, raysAround } from './dome-rim.ts';
import type { DomeInput, Point, Ray } from './dome-rim.ts';
import { startsByOutline, startsBySummits } from './dome-starts.ts';
import type { DomeStart } from './dome-starts.ts';

export interface Domes {
  /** Number of the dome per pixel from 1; 0 elsewhere. */
  readonly labels: Uint32Array;
  readonly count: number;
}

/** Share of a circle's directions in which the flawed ground ends with it; the two sides of a fold are never more than 0.45 of a circle between them. */
const leastFree = 0.52;
/** Less will do, down to this share, for a dome that clearly rises out of what runs through it: by this factor over what lies just outside the circle. */
const leastFreeIfHigh = 0.33;
const standsOut = 1.35;
/** A rim told by breaks of slope: on this share of the circle at least, with flawed ground ending on at least this share of it. */
const leastRim = 0.65;
const leastFreeIfBroken = 0.2;
/** Where the ground ends this near to such a circle, in parts of its radius, it must end with it in this share of those directions: particles have lobes. */
const endsWithin = 0.5;
const mostlyFree = 0.85;
/** Such a circle with less free than this leans on something. */
const leaningFree = 0.75;
/** A circle that the map's border cuts must have this share of its directions on the map, and show its rim in this share of those. */
const leastOnMap = 0.3;
const leastFreeIfCut = 0.75;
/** What goes on outside a small circle at this part of its height or more is the same fold, of which the circle is the end; radius in pixels. */
const goesOnPart = 0.7;
const smallPx = 6;
/** How far the outline may stray from the circle, pixels, while the circle moves on to it; the last holds for what is found. */
const straysPx = [3, 2, 1.2, 1.2] as const;
const strayPx = 1.2;
/** A dome of which larger ones have taken more than the rest of this share is one of them. */
const leastOwn = 0.3;

/**
 * Finds domes: circles that the outline of the flawed ground follows over more than half of their directions, or on which the slope breaks where the flawed
 * ground goes on, and inside which, towards the directions where it ends, the height is a paraboloid h(1 − ρ²) rather than a block h(1 − ρ⁴) or a cone h(1 − ρ)
 * (least squares for each). Candidates are the largest inscribed circles and caps at the map's border, then circles about the summits that are left, each the largest first. What
 * overlaps a dome adds to its height only in the other directions, so it does not spoil the comparison.
 */
export function findDomes(input: DomeInput): Domes {
  const { columns, rows, pitchXM, pitchYM, mask, rise, noiseM } = input;
  const search: Search = { columns, rows, pitchXM, pitchYM, mask, rise, noiseM, rays: raysAround(directions, input) };
  const labels = new Uint32Array(mask.length);
  const count = takeDomes(search, startsByOutline(input), labels, 0);
  return { labels, count: takeDomes(search, startsBySummits(input, labels), labels, count) };
}

/** Labels the domes that come of the starts, from `count` + 1 on. @returns the new count. */
function takeDomes(input: Search, starts: readonly DomeStart[], labels: Uint32Array, count: number): number {
  let found = count;
  for (const start of starts) {
    if (labels[start.at]! > 0) continue;
    const circle = settle(input, start);
    if (!circle || !isParaboloid(input, circle)) continue;
    if (fill(input, circle, labels, found + 1)) found++;
  }
  return found;
}

interface Search extends DomeInput {
  readonly rays: readonly Ray[];
}

/** Moves a circle on to its rim, which is where its slope breaks or the flawed ground ends; undefined where too little of it is one. y runs down here. */
function settle(input: Search, start: DomeStart): Circle | undefined {
  const { breaks } = start;
  let circle: Ring = start;
  // Most candidates lie on folds and show it at once.
  const least = leastFreeIfHigh * onMap(input, circle).share * directions;
  if (!rimOf(input, circle, breaks, straysPx[0], 4, (breaks ? leastRim * directions : least) / 4 - 1)) return undefined;
  for (const strayed of straysPx) {
    const { radiusM } = circle;
    const rim = rimOf(input, circle, breaks, strayed, 1, least);
    const fitted = rim && circleThrough(rim);
    if (!fitted || !(fitted.radiusM > 0.5 * radiusM && fitted.radiusM < 1.6 * radiusM)) return undefined;
    circle = fitted;
  }
  return judged(input, circle, breaks);
}

/** Points of the rim near a circle, along every `each`-th ray; undefined where fewer than `least` show one. */
function rimOf(input: Search, circle: Ring, breaks: boolean, stray: number, each: number, least: number): Point[] | undefined {
  const heightM = breaks ? heightOverRim(input, circle) : 0;
  const rim: Point[] = [];
  for (let k = 0; k < directions; k += each) {
    const ray = input.rays[k]!;
    const point = breaks ? breakNear(input, circle, heightM, ray, stray) : edgeAlong(input, circle, circle.radiusM, ray, stray);
    if (point) rim.push(point);
    // Not even all rays to come would do.
    if (rim.length + (directions - 1 - k) / each < least) return undefined;
  }
  return rim.length < least ? undefined : rim;
}

/** The circle with what is free of it, if enough of it is a rim. */
function judged(input: Search, circle: Ring, breaks: boolean): Circle | undefined {
  const { radiusM } = circle;
  const free = input.rays.map((ray) => edgeAlong(input, circle, radiusM, ray, strayPx) !== undefined);
  const on = onMap(input, circle);
  if (on.share < leastOnMap) return undefined;
  const share = free.filter(Boolean).length / directions / on.share;
  const found = { ...circle, free, leaning: breaks && share < leaningFree };
  if (breaks) {
    if (share < leastFreeIfBroken) return undefined;
    const heightM = heightOverRim(input, circle);
    const rim = input.rays.filter((ray) => breakNear(input, circle, heightM, ray, strayPx) !== undefined).length / directions / on.share;
    if (rim < leastRim) return undefined;
    const ends = input.rays.filter((ray) => edgeAlong(input, circle, radiusM, ray, (endsWithin * radiusM) / ray.pixelM) !== undefined).length / directions / on.share;
    return share >= mostlyFree * ends && outsideOverInside(input, found) * standsOut <= 1 ? found : undefined;
  }
  if (on.share < 1) return share >= leastFreeIfCut ? found : undefined;
  if (share < leastFreeIfHigh) return undefined;
  const ratio = outsideOverInside(input, found);
  if (share < leastFree) return ratio * standsOut <= 1 ? found : undefined;
  const small = radiusM < smallPx * Math.max(input.pitchXM, input.pitchYM);
  return small && share < 0.85 && ratio > goesOnPart ? undefined : found;
}

function breakNear(input: Search, circle: Ring, heightM: number, ray: Ray, stray: number): Point | undefined {
  const strayM = stray * ray.pixelM;
  return breakAlong(input, circle, heightM, ray, circle.radiusM - strayM, circle.radiusM + strayM);
}

/** Share of a circle's directions in which it lies on the map. */
function onMap({ columns, rows, pitchXM, pitchYM, rays }: Search, { xM, yM, radiusM }: Ring): { readonly share: number } {
  const width = columns * pitchXM;
  const height = rows * pitchYM;
  if (xM - radiusM > pitchXM && yM - radiusM > pitchYM && xM + radiusM < width - pitchXM && yM + radiusM < height - pitchYM) return { share: 1 };
  const on = rays.filter(({ ux, uy }) => {
    const [x, y] = [xM + (radiusM + pitchXM) * ux, yM + (radiusM + pitchYM) * uy];
    return x > 0 && x < width && y > 0 && y < height;
  });
  return { share: on.length / directions };
}

/** Height at the centre over the lower half of what lies on the circle, metres. */
function heightOverRim(input: Search, { xM, yM, radiusM }: Ring): number {
  const rim = new Float64Array(directions);
  let count = 0;
  for (const { ux, uy } of input.rays) {
    const value = riseAt(input, xM + radiusM * ux, yM + radiusM * uy);
    if (value === value) rim[count++] = value;
  }
  const known = rim.subarray(0, count).sort();
  return riseAt(input, xM, yM) - (known[count >> 1] ?? Number.NaN);
}

function riseAt({ columns, rows, pitchXM, pitchYM, rise }: DomeInput, xM: number, yM: number): number {
  const c = Math.floor(xM / pitchXM);
  const r = Math.floor(yM / pitchYM);
  return c >= 0 && c < columns && r >= 0 && r < rows ? rise[r * columns + c]! : Number.NaN;
}

/** Highest rise just outside the circle, in the directions where the flawed ground goes on, over the rise at its centre; 0 where it ends everywhere. */
function outsideOverInside(input: Search, { xM, yM, radiusM, free }: Circle): number {
  let highest = 0;
  for (const [k, { ux, uy, pixelM }] of input.rays.entries()) {
    if (free[k]) continue;
    const away = radiusM + 1.5 * pixelM;
    const value = riseAt(input, xM + away * ux, yM + away * uy);
    if (value > highest) highest = value;
  }
  return highest / riseAt(input, xM, yM);
}

/** Gives the dome its pixels: flawed ground within the circle that no larger dome has taken. False, and nothing is taken, where little of it is left: it is the same dome. */
function fill(input: DomeInput, circle: Circle, labels: Uint32Array, label: number): boolean {
  const marginM = 0.5 * Math.sqrt(input.pitchXM * input.pitchYM);
  const inside = flawedInside(input, circle, ((circle.radiusM + marginM) / circle.radiusM) ** 2);
  const free = inside.filter((i) => labels[i] === 0);
  if (free.length < leastOwn * inside.length) return false;
  for (const i of free) labels[i] = label;
  return true;
}
