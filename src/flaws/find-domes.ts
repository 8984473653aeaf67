/** Round domes, also where other things lean on them or run through them. */
import { breakAlong, circleThrough, directionsAround, edgeAlong } from './dome-rim.ts';
import type { Direction, Point } from './dome-rim.ts';
import { startsByOutline, startsBySummits } from './dome-starts.ts';
import type { DomeStart } from './dome-starts.ts';

export interface DomeInput {
  readonly columns: number;
  readonly rows: number;
  readonly pitchXM: number;
  readonly pitchYM: number;
  /** 1 on flawed ground. */
  readonly mask: Uint8Array;
  /** Height above the local ground, metres; NaN missing. */
  readonly rise: Float32Array;
  readonly noiseM: number;
}

export interface Domes {
  /** Number of the dome per pixel from 1; 0 elsewhere. */
  readonly labels: Uint32Array;
  readonly count: number;
}

/** Directions in which a circle is compared with the outline. */
const directions = 48;
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
/** Largest rms deviation from a paraboloid, as a share of its height, beyond the noise. */
const mostDeviation = 0.12;

interface Ring extends Point {
  readonly radiusM: number;
}

interface Circle extends Ring {
  /** By direction: the flawed ground ends here with the circle. */
  readonly free: readonly boolean[];
  /** It stands on the flank of something whose own fall adds to the dome's: that makes it more pointed. */
  readonly leaning: boolean;
}

/**
 * Finds domes: circles that the outline of the flawed ground follows over more than half of their directions, or on which the slope breaks where the flawed
 * ground goes on, and inside which, towards the directions where it ends, the height is a paraboloid h(1 − ρ²) rather than a block h(1 − ρ⁴) or a cone h(1 − ρ)
 * (least squares for each). Candidates are the largest inscribed circles and caps at the map's border, then circles about the summits that are left, each the largest first. What
 * overlaps a dome adds to its height only in the other directions, so it does not spoil the comparison.
 */
export function findDomes(input: DomeInput): Domes {
  const labels = new Uint32Array(input.mask.length);
  let count = 0;
  const take = (starts: readonly DomeStart[]): void => {
    for (const start of starts) {
      if (labels[start.at]! > 0) continue;
      const circle = settle(input, start);
      if (!circle || !isParaboloid(input, circle)) continue;
      if (fill(input, circle, labels, count + 1)) count++;
    }
  };
  take(startsByOutline(input));
  take(startsBySummits(input, labels));
  return { labels, count };
}

const around = directionsAround(directions);

/** Moves a circle on to its rim, which is where its slope breaks or the flawed ground ends; undefined where too little of it is one. y runs down here. */
function settle(input: DomeInput, start: DomeStart): Circle | undefined {
  const { breaks } = start;
  let circle: Ring = start;
  // Most candidates lie on folds and show it at once.
  const least = leastFreeIfHigh * onMap(input, circle).share * directions;
  let near = 0;
  const firstM = breaks ? heightOverRim(input, circle) : 0;
  for (let k = 0; k < directions; k += 4) if (breaks ? breakNear(input, circle, firstM, around[k]!, straysPx[0]) : edgeAlong(input, circle, circle.radiusM, around[k]!, straysPx[0])) near++;
  if (near < (breaks ? leastRim * directions : least) / 4 - 1) return undefined;
  for (const strayed of straysPx) {
    const { radiusM } = circle;
    const heightM = breaks ? heightOverRim(input, circle) : 0;
    const rim: Point[] = [];
    for (const direction of around) {
      const point = breaks ? breakNear(input, circle, heightM, direction, strayed) : edgeAlong(input, circle, radiusM, direction, strayed);
      if (point) rim.push(point);
    }
    if (rim.length < least) return undefined;
    const fitted = circleThrough(rim);
    if (!fitted || !(fitted.radiusM > 0.5 * radiusM && fitted.radiusM < 1.6 * radiusM)) return undefined;
    circle = fitted;
  }
  return judged(input, circle, breaks);
}

/** The circle with what is free of it, if enough of it is a rim. */
function judged(input: DomeInput, circle: Ring, breaks: boolean): Circle | undefined {
  const { radiusM } = circle;
  const free = around.map((direction) => edgeAlong(input, circle, radiusM, direction, strayPx) !== undefined);
  const on = onMap(input, circle);
  if (on.share < leastOnMap) return undefined;
  const share = free.filter(Boolean).length / directions / on.share;
  const found = { ...circle, free, leaning: breaks && share < leaningFree };
  if (breaks) {
    const heightM = heightOverRim(input, circle);
    const rim = around.filter((direction) => breakNear(input, circle, heightM, direction, strayPx) !== undefined).length / directions / on.share;
    const ends = around.filter((direction) => edgeAlong(input, circle, radiusM, direction, (endsWithin * radiusM) / pixelAlong(input, direction)) !== undefined).length / directions / on.share;
    return share >= Math.max(leastFreeIfBroken, mostlyFree * ends) && rim >= leastRim && outsideOverInside(input, found) * standsOut <= 1 ? found : undefined;
  }
  if (on.share < 1) return share >= leastFreeIfCut ? found : undefined;
  if (share < leastFreeIfHigh) return undefined;
  const ratio = outsideOverInside(input, found);
  if (share < leastFree) return ratio * standsOut <= 1 ? found : undefined;
  const small = radiusM < smallPx * Math.max(input.pitchXM, input.pitchYM);
  return small && share < 0.85 && ratio > goesOnPart ? undefined : found;
}

function breakNear(input: DomeInput, circle: Ring, heightM: number, direction: Direction, stray: number): Point | undefined {
  const strayM = stray * pixelAlong(input, direction);
  return breakAlong(input, circle, heightM, direction, circle.radiusM - strayM, circle.radiusM + strayM);
}

/** Length of a pixel's step in a direction, metres. */
function pixelAlong({ pitchXM, pitchYM }: DomeInput, { ux, uy }: Direction): number {
  return Math.hypot(ux * pitchXM, uy * pitchYM);
}

/** Share of a circle's directions in which it lies on the map. */
function onMap({ columns, rows, pitchXM, pitchYM }: DomeInput, { xM, yM, radiusM }: Ring): { readonly share: number } {
  const [width, height] = [columns * pitchXM, rows * pitchYM];
  if (xM - radiusM > pitchXM && yM - radiusM > pitchYM && xM + radiusM < width - pitchXM && yM + radiusM < height - pitchYM) return { share: 1 };
  const on = around.filter(({ ux, uy }) => {
    const [x, y] = [xM + (radiusM + pitchXM) * ux, yM + (radiusM + pitchYM) * uy];
    return x > 0 && x < width && y > 0 && y < height;
  });
  return { share: on.length / directions };
}

/** Height at the centre over the lower half of what lies on the circle, metres. */
function heightOverRim(input: DomeInput, { xM, yM, radiusM }: Ring): number {
  const rim = around.map(({ ux, uy }) => riseAt(input, xM + radiusM * ux, yM + radiusM * uy)).filter((value) => value === value).sort((a, b) => a - b);
  return riseAt(input, xM, yM) - (rim[rim.length >> 1] ?? Number.NaN);
}

function riseAt({ columns, rows, pitchXM, pitchYM, rise }: DomeInput, xM: number, yM: number): number {
  const c = Math.floor(xM / pitchXM);
  const r = Math.floor(yM / pitchYM);
  return c >= 0 && c < columns && r >= 0 && r < rows ? rise[r * columns + c]! : Number.NaN;
}

/** Highest rise just outside the circle, in the directions where the flawed ground goes on, over the rise at its centre; 0 where it ends everywhere. */
function outsideOverInside(input: DomeInput, { xM, yM, radiusM, free }: Circle): number {
  let highest = 0;
  free.forEach((ends, k) => {
    if (ends) return;
    const { ux, uy } = around[k]!;
    const away = radiusM + 1.5 * Math.hypot(ux * input.pitchXM, uy * input.pitchYM);
    const value = riseAt(input, xM + away * ux, yM + away * uy);
    if (value > highest) highest = value;
  });
  return highest / riseAt(input, xM, yM);
}

/** Pixels inside the circle with ρ² and direction. */
function forEachInside({ columns, rows, pitchXM, pitchYM }: DomeInput, { xM, yM, radiusM }: Circle, visit: (i: number, rho2: number, direction: number) => void): void {
  const firstRow = Math.max(0, Math.floor((yM - radiusM) / pitchYM - 1));
  const lastRow = Math.min(rows - 1, Math.ceil((yM + radiusM) / pitchYM + 1));
  const firstColumn = Math.max(0, Math.floor((xM - radiusM) / pitchXM - 1));
  const lastColumn = Math.min(columns - 1, Math.ceil((xM + radiusM) / pitchXM + 1));
  for (let r = firstRow; r <= lastRow; r++) {
    for (let c = firstColumn; c <= lastColumn; c++) {
      const dx = (c + 0.5) * pitchXM - xM;
      const dy = (r + 0.5) * pitchYM - yM;
      const rho2 = (dx * dx + dy * dy) / (radiusM * radiusM);
      const direction = Math.round(((Math.atan2(dy, dx) / (2 * Math.PI) + 1) % 1) * directions) % directions;
      visit(r * columns + c, rho2, direction);
    }
  }
}

function isParaboloid(input: DomeInput, circle: Circle): boolean {
  const { rise, noiseM } = input;
  const heights: number[] = [];
  const shapes: [number, number, number][] = [];
  forEachInside(input, circle, (i, rho2, direction) => {
    if (rho2 > 1 || circle.free[direction] !== true || rise[i] !== rise[i]) return;
    heights.push(rise[i]!);
    shapes.push([1 - rho2, 1 - rho2 * rho2, 1 - Math.sqrt(rho2)]);
  });
  if (heights.length < 12) return false;
  const fits = [0, 1, 2].map((k) => {
    let both = 0;
    let square = 0;
    heights.forEach((h, n) => {
      both += h * shapes[n]![k]!;
      square += shapes[n]![k]! ** 2;
    });
    const height = both / square;
    let rss = 0;
    heights.forEach((h, n) => { rss += (h - height * shapes[n]![k]!) ** 2; });
    return { height, rms: Math.sqrt(rss / heights.length) };
  });
  const [dome, block, cone] = fits as [typeof fits[0], typeof fits[0], typeof fits[0]];
  return dome.height > 0 && dome.rms < block.rms && (circle.leaning || dome.rms < cone.rms) && dome.rms < mostDeviation * dome.height + 2 * noiseM;
}

/** Gives the dome its pixels: flawed ground within the circle that no larger dome has taken. False, and nothing is taken, where little of it is left: it is the same dome. */
function fill(input: DomeInput, circle: Circle, labels: Uint32Array, label: number): boolean {
  const marginM = 0.5 * Math.sqrt(input.pitchXM * input.pitchYM);
  const most = ((circle.radiusM + marginM) / circle.radiusM) ** 2;
  const free: number[] = [];
  let all = 0;
  forEachInside(input, circle, (i, rho2) => {
    if (rho2 > most || input.mask[i] === 0) return;
    all++;
    if (labels[i] === 0) free.push(i);
  });
  if (free.length < leastOwn * all) return false;
  for (const i of free) labels[i] = label;
  return true;
}
