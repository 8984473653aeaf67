/**
 * How much of a rough surface's variance goes with a polynomial that is fitted and subtracted.
 *
 * A fit of orthonormal functions eᵢ takes Σᵢ⟨e², z⟩ of the variance with it. For a stationary surface its expectation is the
 * autocorrelation projected on those functions, ∬ρ(x − x′)·e(x)·e(x′) dx dx′/L². This closed form is the one of Nečas, Klapetek &
 * Valtr, arXiv:2001.00433 (2020), arXiv:2001.00433; here e are Legendre polynomials and the inner integral is a polynomial.
 */
import { gaussLegendre } from './gauss-legendre.ts';

/** Shape of the autocorrelation over the distance r: exp(−r²/T²) or exp(−r/T). T is where it has fallen to 1/e in both. */
export type CorrelationShape = 'gaussian' | 'exponential';

/** Autocorrelation at `distance`, in units of the correlation length T. */
export function correlationAt(shape: CorrelationShape, distance: number): number {
  return Math.exp(shape === 'gaussian' ? -distance * distance : -distance);
}

/** Beyond this many correlation lengths nothing above 1e-16 is left. */
const reach = { gaussian: 6.2, exponential: 37 } as const;
const along = gaussLegendre(48);
/** Cusps of the exponential at distance 0 are met by clustering nodes there, so that few are enough in two dimensions. */
const across = gaussLegendre(28);

/**
 * Share of the variance of one long line that goes with a least-squares polynomial: degree 0 its mean, 1 a straight line, and so on.
 *
 * @param ratio correlation length over the line's length, T/L, above 0.
 * @param degree whole number from 0.
 * @returns between 0 and 1, with a relative error below 1e-12 (measured for T/L from 0.001 to 5).
 */
export function varianceRemoved(ratio: number, degree: number, shape: CorrelationShape = 'gaussian'): number {
  return legendreShares(ratio, degree, shape).reduce((sum, share) => sum + share, 0);
}

/**
 * Share of the variance of the correlated part of a long normal line that goes with its median. A median follows the mean (their covariance is the mean's variance v)
 * and scatters about it, so 2v − var(median) goes, less than with the mean. With P(both above 0) = 1/4 + asin ρ/2π (Sheppard 1899), var(median) = σ²·∬asin ρ/L².
 *
 * @param correlated share of the correlated part in the whole variance, above 0 to 1; the rest is noise without correlation, whose own small
 * scatter of the median (∝ 1/pixels) is left out.
 */
export function varianceRemovedByMedian(ratio: number, shape: CorrelationShape, correlated = 1): number {
  // asin falls from π/2 with the root of the distance where ρ falls with the distance itself: clustered nodes make that smooth.
  const width = Math.min(1, reach[shape] * ratio);
  let share = 0;
  for (let k = 0; k < along.nodes.length; k++) {
    const q = (along.nodes[k]! + 1) / 2;
    const distance = width * q * q;
    const correlation = correlationAt(shape, distance / ratio);
    share += 2 * width * q * along.weights[k]! * (1 - distance) * (2 * correlation - Math.asin(correlated * correlation) / correlated);
  }
  return share;
}

/** Shares of the variance of a line, term by term: shares that go with P0, P1 … P`degree`. */
export function legendreShares(ratio: number, degree: number, shape: CorrelationShape): Float64Array {
  const shares = new Float64Array(degree + 1);
  const width = Math.min(1, reach[shape] * ratio);
  for (let k = 0; k < along.nodes.length; k++) {
    const distance = (width * (along.nodes[k]! + 1)) / 2;
    const overlap = overlaps(distance, degree);
    const weight = width * along.weights[k]! * correlationAt(shape, distance / ratio);
    for (let n = 0; n <= degree; n++) shares[n]! += weight * (2 * n + 1) * overlap[n]!;
  }
  return shares;
}

/**
 * Shares of an isotropic surface's variance on a rectangle that go with the products Pi(x)·Pj(y), i + j ≤ `order`.
 *
 * @param ratioX T over the rectangle's width. @param ratioY T over its height.
 * @returns row-major (order + 1) × (order + 1), entry [i·(order + 1) + j]; 0 where i + j exceeds the order. Relative error below 1e-6.
 */
export function productShares(ratioX: number, ratioY: number, order: number, shape: CorrelationShape): Float64Array {
  const terms = order + 1;
  const shares = new Float64Array(terms * terms);
  if (shape === 'gaussian') {
    // exp(−(x² + y²)/T²) is a product, and so is each share.
    const alongX = legendreShares(ratioX, order, shape);
    const alongY = legendreShares(ratioY, order, shape);
    for (let i = 0; i < terms; i++) for (let j = 0; i + j <= order; j++) shares[i * terms + j] = alongX[i]! * alongY[j]!;
    return shares;
  }
  const x = clustered(ratioX, order, shape);
  const y = clustered(ratioY, order, shape);
  for (const a of x) {
    for (const b of y) {
      const weight = a.weight * b.weight * correlationAt(shape, Math.sqrt((a.distance / ratioX) ** 2 + (b.distance / ratioY) ** 2));
      for (let i = 0; i < terms; i++) for (let j = 0; i + j <= order; j++) shares[i * terms + j]! += weight * a.overlap[i]! * b.overlap[j]!;
    }
  }
  return shares;
}

/** Nodes over the distance (in lengths of the side), the square of a variable that is spread evenly; overlaps are those of normalised polynomials. */
function clustered(ratio: number, order: number, shape: CorrelationShape): { distance: number; weight: number; overlap: Float64Array }[] {
  const width = Math.min(1, reach[shape] * ratio);
  return Array.from(across.nodes, (node, k) => {
    const q = (node + 1) / 2;
    const distance = width * q * q;
    return { distance, weight: 2 * width * q * across.weights[k]!, overlap: overlaps(distance, order).map((value, n) => (2 * n + 1) * value) };
  });
}

/** ∫Pn(2u − 1)·Pn(2(u + d) − 1) du over the part of [0, 1] where both exist, for n from 0 to `degree`; exact. */
function overlaps(d: number, degree: number): Float64Array {
  const { nodes, weights } = ruleOf(degree + 1);
  const sums = new Float64Array(degree + 1);
  const length = 1 - d;
  for (let k = 0; k < nodes.length; k++) {
    const u = (length * (nodes[k]! + 1)) / 2;
    const s = 2 * u - 1;
    const t = s + 2 * d;
    let a = 1;
    let b = 1;
    let previousA = 0;
    let previousB = 0;
    for (let n = 0; n <= degree; n++) {
      sums[n]! += (length / 2) * weights[k]! * a * b;
      const nextA = ((2 * n + 1) * s * a - n * previousA) / (n + 1);
      const nextB = ((2 * n + 1) * t * b - n * previousB) / (n + 1);
      previousA = a;
      previousB = b;
      a = nextA;
      b = nextB;
    }
  }
  return sums;
}

const rules = new Map<number, ReturnType<typeof gaussLegendre>>();

function ruleOf(points: number): ReturnType<typeof gaussLegendre> {
  const rule = rules.get(points) ?? gaussLegendre(points);
  rules.set(points, rule);
  return rule;
}
