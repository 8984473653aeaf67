/** Measurements of labelled regions. */
import { solveBand } from '../stats/cholesky.ts';
import { medianInPlace } from '../stats/median.ts';
import { selectInPlace } from '../stats/select.ts';
import { membersOf } from './mask-pixels.ts';

/** Marks of `MeasureInput.kind`. */
export const partKinds = { blob: 0, ridge: 1, dome: 2 } as const;
const kindNames = ['blob', 'ridge', 'dome'] as const;

/** Geometry and content of one region; lengths in metres. */
export interface Region {
  readonly label: number;
  readonly pixels: number;
  readonly areaM2: number;
  readonly xM: number;
  readonly yM: number;
  readonly boundaryM: number;
  readonly diameterM: number;
  readonly longM: number;
  readonly shortM: number;
  readonly angleDeg: number;
  readonly peakM: number;
  readonly meanM: number;
  readonly volumeM3: number;
  /** Largest distance of a pixel from the region's outside. */
  readonly inscribedM: number;
  /** Median log10 current, NaN without current. */
  readonly log10Current: number;
  /** Median drop against the surroundings in decades, NaN without current. */
  readonly dropDecades: number;
  /** Share of pixels at the floor. */
  readonly floorShare: number;
  /** Share of the height's variance that the best round paraboloid explains (0–1). */
  readonly domeShare: number;
  /** The same for a cone over the ellipse of the region's second moments. */
  readonly coneShare: number;
  /** Mean over peak height, the peak taken at the 95 % quantile so that noise does not raise it; 1/2 for a paraboloid (0.475/0.95). */
  readonly fullness: number;
  /** Area above three quarters of the peak's height over that above half of it, the peak taken as for `fullness`: 0.55 for a paraboloid, 0.71 for 1 − ρ⁴. */
  readonly topShare: number;
  readonly touchesEdge: boolean;
  /** How it was told from what touches it: a crest runs through it, a circle and a paraboloid fit it, or neither; absent where nobody looked. */
  readonly kind?: 'blob' | 'ridge' | 'dome';
}

export interface MeasureInput {
  readonly columns: number;
  readonly rows: number;
  readonly pitchXM: number;
  readonly pitchYM: number;
  readonly labels: Uint32Array;
  readonly count: number;
  /** Height above the local ground, NaN missing; absent without a height map. */
  readonly rise?: Float32Array;
  readonly log10?: Float32Array;
  readonly drop?: Float32Array;
  readonly floor?: Uint8Array;
  /** Squared distance of each pixel from the outside of the labelled regions, m². */
  readonly distance2: Float32Array;
  /** Pixels that hold all labelled ones, in raster order; sought where they are not given. */
  readonly pixels?: Int32Array;
  /** By label: how the region was told (`partKinds`); absent where nobody looked. */
  readonly kind?: Uint8Array;
}

/**
 * Measures every region of a label map.
 *
 * - Boundary: Cauchy–Crofton with two directions, π/4 × the length of pixel edges between region and anything else (picture border
 *   included); exact on average over directions; an upright square comes out a fifth too short, one turned by 45° a tenth too long.
 * - Axes: full axes of the ellipse with the same second moments, a pixel's own extent included (so that one pixel has a size).
 * - Heights over the local ground; NaN pixels are left out; volume counts height × pixel area of what is known.
 */
export function measureRegions(input: MeasureInput): Region[] {
  const members = membersOf(input.labels, input.count, input.pixels);
  return members.slice(1).map((indices, k) => measureRegion(input, k + 1, indices));
}

function measureRegion(input: MeasureInput, label: number, indices: Int32Array): Region {
  const { columns, rows, pitchXM, pitchYM, labels, distance2, floor } = input;
  const n = indices.length;
  let sx = 0;
  let sy = 0;
  let edgesM = 0;
  let touchesEdge = false;
  let inscribed2 = 0;
  let atFloor = 0;
  for (let m = 0; m < indices.length; m++) {
    const i = indices[m]!;
    const c = i % columns;
    const r = (i - c) / columns;
    sx += (c + 0.5) * pitchXM;
    sy += (rows - r - 0.5) * pitchYM;
    if (c === 0 || labels[i - 1] !== label) edgesM += pitchYM;
    if (c === columns - 1 || labels[i + 1] !== label) edgesM += pitchYM;
    if (r === 0 || labels[i - columns] !== label) edgesM += pitchXM;
    if (r === rows - 1 || labels[i + columns] !== label) edgesM += pitchXM;
    if (c === 0 || r === 0 || c === columns - 1 || r === rows - 1) touchesEdge = true;
    if (distance2[i]! > inscribed2) inscribed2 = distance2[i]!;
    if (floor?.[i] === 1) atFloor++;
  }
  const xM = sx / n;
  const yM = sy / n;
  const ellipse = ellipseOf(input, indices, xM, yM);
  const areaM2 = n * pitchXM * pitchYM;
  return {
    label,
    pixels: n,
    areaM2,
    xM,
    yM,
    boundaryM: (Math.PI / 4) * edgesM,
    diameterM: 2 * Math.sqrt(areaM2 / Math.PI),
    longM: ellipse.longM,
    shortM: ellipse.shortM,
    angleDeg: ellipse.angleDeg,
    ...heights(input, indices, xM, yM, ellipse),
    inscribedM: Math.sqrt(inscribed2),
    log10Current: medianOf(input.log10, indices),
    dropDecades: medianOf(input.drop, indices),
    floorShare: input.floor ? atFloor / n : Number.NaN,
    touchesEdge,
    ...(input.kind ? { kind: kindNames[input.kind[label]!]! } : {}),
  };
}

interface Ellipse {
  readonly longM: number;
  readonly shortM: number;
  readonly angleDeg: number;
  /** Inverse of the covariance: [xx, xy, yy]. */
  readonly inverse: readonly [number, number, number];
}

function ellipseOf(input: MeasureInput, indices: Int32Array, xM: number, yM: number): Ellipse {
  const { columns, rows, pitchXM, pitchYM } = input;
  let xx = (pitchXM * pitchXM) / 12;
  let yy = (pitchYM * pitchYM) / 12;
  let xy = 0;
  for (let m = 0; m < indices.length; m++) {
    const i = indices[m]!;
    const c = i % columns;
    const dx = (c + 0.5) * pitchXM - xM;
    const dy = (rows - (i - c) / columns - 0.5) * pitchYM - yM;
    xx += (dx * dx) / indices.length;
    yy += (dy * dy) / indices.length;
    xy += (dx * dy) / indices.length;
  }
  const middle = (xx + yy) / 2;
  const spread = Math.hypot((xx - yy) / 2, xy);
  const determinant = xx * yy - xy * xy;
  const angle = (0.5 * Math.atan2(2 * xy, xx - yy) * 180) / Math.PI;
  return {
    longM: 4 * Math.sqrt(middle + spread),
    shortM: 4 * Math.sqrt(Math.max(middle - spread, 0)),
    angleDeg: angle <= -90 ? angle + 180 : angle,
    inverse: [yy / determinant, -xy / determinant, xx / determinant],
  };
}

/** Height's measures; NaN (shares 0) where no height is known. */
type Heights = Pick<Region, 'peakM' | 'meanM' | 'volumeM3' | 'domeShare' | 'coneShare' | 'fullness' | 'topShare'>;

function heights(input: MeasureInput, indices: Int32Array, xM: number, yM: number, ellipse: Ellipse): Heights {
  const { columns, rows, pitchXM, pitchYM, rise } = input;
  const { values, count } = presentOf(rise, indices);
  if (!rise || count === 0) return { peakM: Number.NaN, meanM: Number.NaN, volumeM3: Number.NaN, domeShare: 0, coneShare: 0, fullness: Number.NaN, topShare: Number.NaN };
  // Regression of height on a cone 1 − ρ, ρ² = dᵀ·C⁻¹·d / 4 being 1 on the ellipse.
  const cone = new Float64Array(count);
  const [ixx, ixy, iyy] = ellipse.inverse;
  let peakM = Number.NEGATIVE_INFINITY;
  let sum = 0;
  let k = 0;
  for (let m = 0; m < indices.length; m++) {
    const i = indices[m]!;
    const h = rise[i]!;
    if (Number.isNaN(h)) continue;
    const c = i % columns;
    const dx = (c + 0.5) * pitchXM - xM;
    const dy = (rows - (i - c) / columns - 0.5) * pitchYM - yM;
    const rho2 = (ixx * dx * dx + 2 * ixy * dx * dy + iyy * dy * dy) / 4;
    cone[k++] = 1 - Math.sqrt(rho2);
    sum += h;
    if (h > peakM) peakM = h;
  }
  const meanM = sum / count;
  const domeShare = paraboloidShare(input, indices, xM, yM);
  const coneShare = explainedShare(cone, values, count);
  // A paraboloid's 95 % quantile is 0.95 of its peak, so this is 1/2 for one. Selecting reorders the values, so it comes last.
  const topM = selectInPlace(values, Math.min(count - 1, Math.floor(0.95 * count)), count);
  const fullness = (0.95 * meanM) / topM;
  let half = 0;
  let upper = 0;
  for (let n = 0; n < count; n++) {
    if (!(values[n]! > 0.5 * topM)) continue;
    half++;
    if (values[n]! > 0.75 * topM) upper++;
  }
  const topShare = half > 0 ? upper / half : Number.NaN;
  return { peakM, meanM, volumeM3: sum * pitchXM * pitchYM, domeShare, coneShare, fullness, topShare };
}

/** Share of the height's variance that the best round paraboloid explains, wherever its centre lies; 0 for one that opens upwards. */
function paraboloidShare({ columns, rows, pitchXM, pitchYM, rise }: MeasureInput, indices: Int32Array, xM: number, yM: number): number {
  const scale = Math.sqrt(indices.length * pitchXM * pitchYM);
  const normal = new Float64Array(16);
  const right = new Float64Array(4);
  const basis = new Float64Array(4).fill(1);
  let [sum, square, count] = [0, 0, 0];
  for (let m = 0; m < indices.length; m++) {
    const i = indices[m]!;
    const h = rise![i]!;
    if (h !== h) continue;
    const c = i % columns;
    const dx = ((c + 0.5) * pitchXM - xM) / scale;
    const dy = ((rows - (i - c) / columns - 0.5) * pitchYM - yM) / scale;
    basis[1] = dx;
    basis[2] = dy;
    basis[3] = dx * dx + dy * dy;
    for (let a = 0; a < 4; a++) {
      right[a]! += basis[a]! * h;
      for (let b = 0; b <= a; b++) normal[a * 4 + (a - b)]! += basis[a]! * basis[b]!;
    }
    sum += h;
    square += h * h;
    count++;
  }
  const total = square - (sum * sum) / count;
  const products = right.slice();
  const solved = solveBand(normal, 3, right);
  // Few pixels, or all in one line, fix no paraboloid.
  if (!(total > 0) || !(solved[3]! < 0)) return 0;
  let explained = -(sum * sum) / count;
  for (let a = 0; a < 4; a++) explained += solved[a]! * products[a]!;
  return Math.min(1, Math.max(0, explained / total));
}

/** Share of the variance of `values` that grows with `shape`: the squared correlation, 0 where it falls with it. */
function explainedShare(shape: Float64Array, values: Float64Array, count: number): number {
  let shapeMean = 0;
  let valueMean = 0;
  for (let k = 0; k < count; k++) {
    shapeMean += shape[k]! / count;
    valueMean += values[k]! / count;
  }
  let both = 0;
  let shape2 = 0;
  let value2 = 0;
  for (let k = 0; k < count; k++) {
    const s = shape[k]! - shapeMean;
    const v = values[k]! - valueMean;
    both += s * v;
    shape2 += s * s;
    value2 += v * v;
  }
  return shape2 > 0 && value2 > 0 && both > 0 ? (both * both) / (shape2 * value2) : 0;
}

/** What is known of a map on some pixels, in their order; the buffer may be longer than the count. */
function presentOf(map: Float32Array | undefined, indices: Int32Array): { values: Float64Array; count: number } {
  const values = new Float64Array(map ? indices.length : 0);
  let count = 0;
  if (!map) return { values, count };
  for (let m = 0; m < indices.length; m++) {
    const value = map[indices[m]!]!;
    if (value === value) values[count++] = value;
  }
  return { values, count };
}

function medianOf(map: Float32Array | undefined, indices: Int32Array): number {
  const { values, count } = presentOf(map, indices);
  return medianInPlace(values, count);
}
