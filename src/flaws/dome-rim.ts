/** The rim of a round dome: where flawed ground ends with it, and where the height breaks its slope. */

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

export interface Point {
  readonly xM: number;
  readonly yM: number;
}

/** A ray along a unit vector; y runs down. */
export interface Ray {
  readonly ux: number;
  readonly uy: number;
  /** Length of a pixel's step along it, metres. */
  readonly pixelM: number;
}

/** Rays evenly around. */
export function raysAround(count: number, { pitchXM, pitchYM }: DomeInput): readonly Ray[] {
  return Array.from({ length: count }, (_, k) => {
    const ux = Math.cos((2 * Math.PI * k) / count);
    const uy = Math.sin((2 * Math.PI * k) / count);
    return { ux, uy, pixelM: Math.hypot(ux * pitchXM, uy * pitchYM) };
  });
}

/** The break of slope is at least this part of that at the rim of a paraboloid of the same height and radius. */
const leastBreak = 0.4;

/** Where the mask ends along a ray, if that is within `stray` pixels of the radius. Off the map nothing ends. */
export function edgeAlong({ columns, rows, pitchXM, pitchYM, mask }: DomeInput, { xM, yM }: Point, radiusM: number, { ux, uy, pixelM }: Ray, stray: number): Point | undefined {
  const from = radiusM - stray * pixelM;
  for (let at = from; at <= radiusM + stray * pixelM; at += 0.25 * pixelM) {
    const c = Math.floor((xM + at * ux) / pitchXM);
    const r = Math.floor((yM + at * uy) / pitchYM);
    if (c < 0 || c >= columns || r < 0 || r >= rows) return undefined;
    if (mask[r * columns + c] === 1) continue;
    if (at === from) return undefined;
    return { xM: xM + (at - 0.125 * pixelM) * ux, yM: yM + (at - 0.125 * pixelM) * uy };
  }
  return undefined;
}

/**
 * Where the height breaks its slope along a ray, between two distances. A paraboloid h(1 − ρ²) falls with 2h/R at its rim and no longer beyond it, whatever
 * smooth thing it stands on; what breaks by less than 0.4 of that is none. Of several the one with the largest part counts. `heightM` is the height over the rim, `stepPx` how finely is looked.
 */
export function breakAlong(input: DomeInput, { xM, yM }: Point, heightM: number, { ux, uy, pixelM }: Ray, fromM: number, toM: number, stepPx = 0.5): Point | undefined {
  const armM = 2 * pixelM;
  let most = leastBreak * 2 * heightM * armM;
  let rim = Number.NaN;
  for (let at = fromM; at <= toM; at += stepPx * pixelM) {
    const before = heightAt(input, xM + (at - armM) * ux, yM + (at - armM) * uy);
    const beyond = heightAt(input, xM + (at + armM) * ux, yM + (at + armM) * uy);
    const part = at * (before - 2 * heightAt(input, xM + at * ux, yM + at * uy) + beyond);
    if (part > most) {
      most = part;
      rim = at;
    }
  }
  return rim === rim ? { xM: xM + rim * ux, yM: yM + rim * uy } : undefined;
}

/** Height at a place, linear between pixel centres; NaN off the map. */
function heightAt({ columns, rows, pitchXM, pitchYM, rise }: DomeInput, xM: number, yM: number): number {
  const x = xM / pitchXM - 0.5;
  const y = yM / pitchYM - 0.5;
  const c = Math.floor(x);
  const r = Math.floor(y);
  if (c < 0 || r < 0 || c + 1 >= columns || r + 1 >= rows) return Number.NaN;
  const fx = x - c;
  const fy = y - r;
  const i = r * columns + c;
  return (1 - fy) * ((1 - fx) * rise[i]! + fx * rise[i + 1]!) + fy * ((1 - fx) * rise[i + columns]! + fx * rise[i + columns + 1]!);
}

/** Circle through points by linear least squares (Kåsa, IEEE Trans. Instrum. Meas. IM-25, 8, 1976); undefined where they lie on a line. */
export function circleThrough(points: readonly Point[]): (Point & { readonly radiusM: number }) | undefined {
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

