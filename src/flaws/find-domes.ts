/** Round domes, also where other things lean on them or run through them. */
import { squaredDistance } from '../grid/distance.ts';

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

/** A dome of a smaller radius has too few pixels for its outline to tell a circle, pixels. */
const leastRadiusPx = 3;
/** Directions in which a circle is compared with the outline. */
const directions = 48;
/** Share of a circle's directions in which the flawed ground ends with it; the two sides of a fold are never more than 0.45 of a circle between them. */
const leastFree = 0.52;
/** Less will do, down to this share, for a dome that clearly rises out of what runs through it: by this factor over what lies just outside the circle. */
const leastFreeIfHigh = 0.33;
const standsOut = 1.35;
/** What goes on outside a small circle at this part of its height or more is the same fold, of which the circle is the end; radius in pixels. */
const goesOnPart = 0.7;
const smallPx = 6;
/** How far the outline may stray from the circle, pixels, while the circle moves on to it; the last holds for what is found. */
const straysPx = [3, 2, 1.2, 1.2] as const;
const strayPx = 1.2;
/** Largest rms deviation from a paraboloid, as a share of its height, beyond the noise. */
const mostDeviation = 0.12;

interface Circle {
  readonly xM: number;
  readonly yM: number;
  readonly radiusM: number;
  /** By direction: the flawed ground ends here with the circle. */
  readonly free: readonly boolean[];
}

/**
 * Finds domes: circles that the outline of the flawed ground follows over more than half of their directions, and inside which, towards those directions, the
 * height is a paraboloid h(1 − ρ²) rather than a block h(1 − ρ⁴) or a cone h(1 − ρ) (least squares for each). Centres are sought at the maxima of the
 * distance to the outline (the inscribed circles), largest first. What overlaps a dome adds to its height only in the other directions, so it does
 * not spoil the comparison. A dome cut by the map's border is not found here.
 */
export function findDomes(input: DomeInput): Domes {
  const { columns, rows, pitchXM, pitchYM, mask } = input;
  const labels = new Uint32Array(mask.length);
  const distance2 = squaredDistance(mask, columns, rows, { pitchX: pitchXM, pitchY: pitchYM });
  const pixelM = Math.max(pitchXM, pitchYM);
  const candidates: number[] = [];
  for (let r = 1; r + 1 < rows; r++) {
    for (let c = 1; c + 1 < columns; c++) {
      const i = r * columns + c;
      const here = distance2[i]!;
      if (here < (leastRadiusPx * pixelM) ** 2) continue;
      let highest = true;
      for (const step of [-columns - 1, -columns, -columns + 1, -1, 1, columns - 1, columns, columns + 1]) if (distance2[i + step]! > here) highest = false;
      if (highest) candidates.push(i);
    }
  }
  candidates.sort((a, b) => distance2[b]! - distance2[a]! || a - b);
  let count = 0;
  for (const i of candidates) {
    if (labels[i]! > 0) continue;
    const start = { xM: ((i % columns) + 0.5) * pitchXM, yM: (Math.floor(i / columns) + 0.5) * pitchYM, radiusM: Math.sqrt(distance2[i]!) - 0.5 * Math.sqrt(pitchXM * pitchYM) };
    const circle = settle(input, start);
    if (!circle || !isParaboloid(input, circle)) continue;
    count++;
    fill(input, circle, labels, count);
  }
  return { labels, count };
}

/** Moves a circle on to the outline where that follows it; undefined where it follows too little of it. y runs down here. */
function settle(input: DomeInput, start: { xM: number; yM: number; radiusM: number }): Circle | undefined {
  let { xM, yM, radiusM } = start;
  // Most candidates lie on folds and show it at once.
  let near = 0;
  for (let k = 0; k < directions; k += 4) if (edgeAlong(input, xM, yM, radiusM, (2 * Math.PI * k) / directions, straysPx[0])) near++;
  if (near < (leastFreeIfHigh * directions) / 4 - 1) return undefined;
  for (const strayed of straysPx) {
    // Outline crossings along the rays, fitted by a circle (Kåsa, IEEE Trans. Instrum. Meas. IM-25, 8, 1976).
    const edges = Array.from({ length: directions }, (_, k) => edgeAlong(input, xM, yM, radiusM, (2 * Math.PI * k) / directions, strayed));
    const known = edges.filter((edge) => edge !== undefined);
    if (known.length < leastFreeIfHigh * directions) return undefined;
    const fitted = kasa(known);
    if (!fitted || !(fitted.radiusM > 0.5 * radiusM && fitted.radiusM < 1.6 * radiusM)) return undefined;
    ({ xM, yM, radiusM } = fitted);
  }
  const free = Array.from({ length: directions }, (_, k) => edgeAlong(input, xM, yM, radiusM, (2 * Math.PI * k) / directions, strayPx) !== undefined);
  const share = free.filter(Boolean).length / directions;
  if (share < leastFreeIfHigh) return undefined;
  const circle = { xM, yM, radiusM, free };
  const ratio = outsideOverInside(input, circle);
  if (share < leastFree) return ratio * standsOut <= 1 ? circle : undefined;
  const small = radiusM < smallPx * Math.max(input.pitchXM, input.pitchYM);
  return small && share < 0.85 && ratio > goesOnPart ? undefined : circle;
}

/** Highest rise just outside the circle, in the directions where the flawed ground goes on, over the rise at its centre; 0 where it ends everywhere. */
function outsideOverInside({ columns, rows, pitchXM, pitchYM, rise }: DomeInput, { xM, yM, radiusM, free }: Circle): number {
  const at = (x: number, y: number): number => {
    const c = Math.floor(x / pitchXM);
    const r = Math.floor(y / pitchYM);
    return c >= 0 && c < columns && r >= 0 && r < rows ? rise[r * columns + c]! : Number.NaN;
  };
  let highest = 0;
  free.forEach((ends, k) => {
    if (ends) return;
    const [ux, uy] = [Math.cos((2 * Math.PI * k) / directions), Math.sin((2 * Math.PI * k) / directions)];
    const away = radiusM + 1.5 * Math.hypot(ux * pitchXM, uy * pitchYM);
    const value = at(xM + away * ux, yM + away * uy);
    if (value > highest) highest = value;
  });
  return highest / at(xM, yM);
}

/** Where the mask ends along a ray, if that is near the circle. */
function edgeAlong({ columns, rows, pitchXM, pitchYM, mask }: DomeInput, xM: number, yM: number, radiusM: number, angle: number, stray: number): { xM: number; yM: number } | undefined {
  const [ux, uy] = [Math.cos(angle), Math.sin(angle)];
  const pixelM = Math.hypot(ux * pitchXM, uy * pitchYM);
  const from = radiusM - stray * pixelM;
  for (let at = from; at <= radiusM + stray * pixelM; at += 0.25 * pixelM) {
    const c = Math.floor((xM + at * ux) / pitchXM);
    const r = Math.floor((yM + at * uy) / pitchYM);
    if (c >= 0 && c < columns && r >= 0 && r < rows && mask[r * columns + c] === 1) continue;
    if (at === from) return undefined;
    return { xM: xM + (at - 0.125 * pixelM) * ux, yM: yM + (at - 0.125 * pixelM) * uy };
  }
  return undefined;
}

/** Circle through points by linear least squares. */
function kasa(points: readonly { xM: number; yM: number }[]): { xM: number; yM: number; radiusM: number } | undefined {
  const n = points.length;
  let [mx, my] = [0, 0];
  for (const p of points) {
    mx += p.xM / n;
    my += p.yM / n;
  }
  let [xx, xy, yy, xz, yz, zz] = [0, 0, 0, 0, 0, 0];
  for (const p of points) {
    const [x, y] = [p.xM - mx, p.yM - my];
    const z = x * x + y * y;
    xx += x * x;
    xy += x * y;
    yy += y * y;
    xz += x * z;
    yz += y * z;
    zz += z / n;
  }
  const determinant = xx * yy - xy * xy;
  if (!(determinant > 0)) return undefined;
  const a = (xz * yy - yz * xy) / (2 * determinant);
  const b = (yz * xx - xz * xy) / (2 * determinant);
  return { xM: mx + a, yM: my + b, radiusM: Math.sqrt(zz + a * a + b * b) };
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
  return dome.height > 0 && dome.rms < block.rms && dome.rms < cone.rms && dome.rms < mostDeviation * dome.height + 2 * noiseM;
}

/** Gives the dome its pixels: flawed ground within the circle that no larger dome has taken. */
function fill(input: DomeInput, circle: Circle, labels: Uint32Array, label: number): void {
  const marginM = 0.5 * Math.sqrt(input.pitchXM * input.pitchYM);
  const most = ((circle.radiusM + marginM) / circle.radiusM) ** 2;
  forEachInside(input, circle, (i, rho2) => {
    if (rho2 <= most && input.mask[i] === 1 && labels[i] === 0) labels[i] = label;
  });
}
