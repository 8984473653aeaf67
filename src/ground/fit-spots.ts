/** Form of a height through spots of ground that a person picked. */
import type { Grid } from '../grid/maps.ts';
import { pixelAt } from '../grid/pixel-at.ts';
import { solveBand } from '../stats/cholesky.ts';
import { medianInPlace } from '../stats/median.ts';
import { axisTable } from './form.ts';
import type { Form } from './form.ts';
import type { GroundSection } from './recipe.ts';

export interface SpotFit {
  /** Of the order stated, higher coefficients zero where the spots did not support them. */
  readonly form: Form;
  /** Order that was fitted. */
  readonly order: number;
  /** Spots with a height under them. */
  readonly used: number;
}

/** The height of a spot is the median within this radius, pixels: one pixel's noise or spike must not tilt the map. */
const radiusPx = 5;
/** Fewer heights under a spot are no ground. */
const leastPixels = 8;
/** No spot leaves a tilt open with three. */
export const leastSpots = 3;
/**
 * A term of the form counts as determined when this share of its own sum of squares over the spots is left by the terms before it (the squared sine
 * of the angle between them). Spots on a line, or nearly so, leave next to nothing.
 */
const leastShare = 1e-3;

/**
 * Least-squares form over the heights at spots: at each the median within five pixels. The order is the section's, lowered until there is at least one
 * spot a term (3: tilt, 6: bow, 10, 15, 21) and the spots' places determine every term.
 *
 * A form of the fitted order added to the height is added to the result.
 *
 * @param height metres, row-major, NaN missing. @param lines offset of each row, metres, which is taken out before.
 * @returns undefined where fewer than three spots lie on measured ground of the map; what to do then is the caller's.
 */
export function fitSpots(height: Float32Array, grid: Grid, section: Pick<GroundSection, 'order' | 'spots'>, lines: Float64Array): SpotFit | undefined {
  const spots = section.spots.flatMap(({ xUm, yUm }) => {
    const spot = spotAt(height, grid, xUm * 1e-6, yUm * 1e-6, lines);
    return spot ? [spot] : [];
  });
  if (spots.length < leastSpots) return undefined;
  for (let order = section.order; order > 0; order--) {
    const coefficients = termsOf(order) <= spots.length ? solve(spots, grid, order) : undefined;
    if (coefficients) return { form: padded(coefficients, section.order), order, used: spots.length };
  }
  const mean = spots.reduce((sum, { valueM }) => sum + valueM, 0) / spots.length;
  return { form: padded(Float64Array.of(mean), section.order), order: 0, used: spots.length };
}

interface Spot {
  readonly column: number;
  readonly row: number;
  readonly valueM: number;
}

/** The spot's pixel and the median height around it; undefined beside the map and where too little was measured. */
function spotAt(height: Float32Array, grid: Grid, xM: number, yM: number, lines: Float64Array): Spot | undefined {
  const at = pixelAt(grid, [xM, yM]);
  if (at === undefined) return undefined;
  const { columns, rows } = grid;
  const column = at % columns;
  const row = (at - column) / columns;
  const valueAt = (c: number, r: number): number => (c >= 0 && c < columns && r >= 0 && r < rows ? height[r * columns + c]! - lines[r]! : Number.NaN);
  const found = new Float64Array((2 * radiusPx + 1) ** 2);
  let count = 0;
  for (let dy = -radiusPx; dy <= radiusPx; dy++) {
    for (let dx = -radiusPx; dx <= radiusPx; dx++) {
      const value = valueAt(column + dx, row + dy);
      // Only with its opposite, so that beside the border and beside missing ground a slope does not move the median.
      if (dx * dx + dy * dy > radiusPx ** 2 || Number.isNaN(value) || Number.isNaN(valueAt(column - dx, row - dy))) continue;
      found[count++] = value;
    }
  }
  return count < leastPixels ? undefined : { column, row, valueM: medianInPlace(found, count) };
}

const termsOf = (order: number): number => ((order + 1) * (order + 2)) / 2;

/** Coefficients of a lower order in the layout of a higher one: orders follow one another, so the rest is zero. */
function padded(coefficients: Float64Array, order: number): Form {
  const out = new Float64Array(termsOf(order));
  out.set(coefficients);
  return { order, coefficients: out };
}

/** Least squares; undefined where the places of the spots leave a term open. */
function solve(spots: readonly Spot[], { columns, rows }: Grid, order: number): Float64Array | undefined {
  const terms = termsOf(order);
  const px = axisTable(columns, order);
  const py = axisTable(rows, order);
  const basis = spots.map((spot) => productsAt(spot, px, py, order));
  const normal = new Float64Array(terms * terms);
  const right = new Float64Array(terms);
  for (const [k, products] of basis.entries()) {
    for (let i = 0; i < terms; i++) {
      right[i]! += products[i]! * spots[k]!.valueM;
      for (let j = 0; j <= i; j++) normal[i * terms + (i - j)]! += products[i]! * products[j]!;
    }
  }
  return isDetermined(basis, terms) ? solveBand(normal, terms - 1, right) : undefined;
}

function productsAt({ column, row }: Spot, px: Float64Array, py: Float64Array, order: number): Float64Array {
  const out = new Float64Array(termsOf(order));
  let k = 0;
  for (let total = 0; total <= order; total++) for (let j = 0; j <= total; j++) out[k++] = px[column * (order + 1) + total - j]! * py[row * (order + 1) + j]!;
  return out;
}

/** Whether each term has something over the spots that those before it have not (Gram–Schmidt, twice for rounding). */
function isDetermined(basis: readonly Float64Array[], terms: number): boolean {
  const done: Float64Array[] = [];
  for (let i = 0; i < terms; i++) {
    const own = Float64Array.from(basis, (products) => products[i]!);
    const before = dot(own, own);
    for (let pass = 0; pass < 2; pass++) {
      for (const other of done) {
        const part = dot(own, other);
        for (let k = 0; k < own.length; k++) own[k]! -= part * other[k]!;
      }
    }
    const left = dot(own, own);
    if (!(left > leastShare * before) || !(left > 0)) return false;
    const norm = Math.sqrt(left);
    done.push(own.map((value) => value / norm));
  }
  return true;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < a.length; k++) sum += a[k]! * b[k]!;
  return sum;
}
