/** Measurements of labelled regions. */
import { medianInPlace } from '../stats/median.ts';
import { selectInPlace } from '../stats/select.ts';

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
  /** Share of the height's variance that a paraboloid over the region's ellipse explains (0–1). */
  readonly domeShare: number;
  /** Mean over peak height, the peak taken at the 95 % quantile so that noise does not raise it; 1/2 for a paraboloid (0.475/0.95). */
  readonly fullness: number;
  readonly touchesEdge: boolean;
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
}

/**
 * Measures every region of a label map.
 *
 * - Boundary: Cauchy–Crofton with two directions, π/4 × the length of pixel edges between region and anything else (picture border
 *   included); within 5 % for compact shapes.
 * - Axes: full axes of the ellipse with the same second moments, a pixel's own extent included (so that one pixel has a size).
 * - Heights over the local ground; NaN pixels are left out; volume counts height × pixel area of what is known.
 */
export function measureRegions(input: MeasureInput): Region[] {
  const members = membersOf(input);
  return members.map((indices, k) => measureRegion(input, k + 1, indices));
}

function membersOf(input: MeasureInput): Int32Array[] {
  const sizes = new Uint32Array(input.count + 1);
  for (let i = 0; i < input.labels.length; i++) sizes[input.labels[i]!]!++;
  const lists = Array.from({ length: input.count }, (_, k) => new Int32Array(sizes[k + 1]!));
  const used = new Uint32Array(input.count + 1);
  for (let i = 0; i < input.labels.length; i++) {
    const label = input.labels[i]!;
    if (label > 0) lists[label - 1]![used[label]!++] = i;
  }
  return lists;
}

function measureRegion(input: MeasureInput, label: number, indices: Int32Array): Region {
  const { columns, rows, pitchXM, pitchYM, labels, rise } = input;
  const n = indices.length;
  let sx = 0;
  let sy = 0;
  let edgesM = 0;
  let touchesEdge = false;
  let inscribed2 = 0;
  let atFloor = 0;
  for (const i of indices) {
    const c = i % columns;
    const r = (i - c) / columns;
    sx += (c + 0.5) * pitchXM;
    sy += (rows - r - 0.5) * pitchYM;
    if (c === 0 || labels[i - 1] !== label) edgesM += pitchYM;
    if (c === columns - 1 || labels[i + 1] !== label) edgesM += pitchYM;
    if (r === 0 || labels[i - columns] !== label) edgesM += pitchXM;
    if (r === rows - 1 || labels[i + columns] !== label) edgesM += pitchXM;
    if (c === 0 || r === 0 || c === columns - 1 || r === rows - 1) touchesEdge = true;
    inscribed2 = Math.max(inscribed2, input.distance2[i]!);
    if (input.floor?.[i] === 1) atFloor++;
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
    log10Current: input.log10 ? medianOf(input.log10, indices) : Number.NaN,
    dropDecades: input.drop ? medianOf(input.drop, indices) : Number.NaN,
    floorShare: input.floor ? atFloor / n : Number.NaN,
    touchesEdge,
    ...(rise ? {} : { peakM: Number.NaN, meanM: Number.NaN, volumeM3: Number.NaN }),
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
  for (const i of indices) {
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

function heights(input: MeasureInput, indices: Int32Array, xM: number, yM: number, ellipse: Ellipse): { peakM: number; meanM: number; volumeM3: number; domeShare: number; fullness: number } {
  const { columns, rows, pitchXM, pitchYM, rise } = input;
  let n = 0;
  let sum = 0;
  let sum2 = 0;
  let peakM = Number.NEGATIVE_INFINITY;
  // Regression of height on q = 1 − ρ², ρ² = dᵀ·C⁻¹·d / 4 being 1 on the ellipse.
  let sq = 0;
  let sqq = 0;
  let sqh = 0;
  if (rise) {
    const [ixx, ixy, iyy] = ellipse.inverse;
    for (const i of indices) {
      const h = rise[i]!;
      if (Number.isNaN(h)) continue;
      const c = i % columns;
      const dx = (c + 0.5) * pitchXM - xM;
      const dy = (rows - (i - c) / columns - 0.5) * pitchYM - yM;
      const q = 1 - (ixx * dx * dx + 2 * ixy * dx * dy + iyy * dy * dy) / 4;
      n++;
      sum += h;
      sum2 += h * h;
      if (h > peakM) peakM = h;
      sq += q;
      sqq += q * q;
      sqh += q * h;
    }
  }
  if (n === 0) return { peakM: Number.NaN, meanM: Number.NaN, volumeM3: Number.NaN, domeShare: 0, fullness: Number.NaN };
  const varH = sum2 / n - (sum / n) ** 2;
  const varQ = sqq / n - (sq / n) ** 2;
  const cov = sqh / n - (sum / n) * (sq / n);
  return {
    peakM,
    meanM: sum / n,
    // A paraboloid's 95 % quantile is 0.95 of its peak, so this is 1/2 for one.
    fullness: (0.95 * sum) / n / quantileOf(rise!, indices, 0.95),
    volumeM3: sum * pitchXM * pitchYM,
    domeShare: varH > 0 && varQ > 0 && cov > 0 ? (cov * cov) / (varH * varQ) : 0,
  };
}

function quantileOf(values: Float32Array, indices: Int32Array, share: number): number {
  const buffer = new Float64Array(indices.length);
  let count = 0;
  for (const i of indices) if (!Number.isNaN(values[i]!)) buffer[count++] = values[i]!;
  return count === 0 ? Number.NaN : selectInPlace(buffer, Math.min(count - 1, Math.floor(share * count)), count);
}

function medianOf(values: Float32Array, indices: Int32Array): number {
  const buffer = new Float64Array(indices.length);
  let count = 0;
  for (const i of indices) if (!Number.isNaN(values[i]!)) buffer[count++] = values[i]!;
  return medianInPlace(buffer, count);
}
