/** Root of a function between two points of opposite sign. */

/**
 * Brent's method (R. P. Brent, Algorithms for Minimization without Derivatives, 1973, chapter 4):
 * inverse quadratic and secant steps, bisection where they stall. Stops when the bracket is
 * `relative`·|x| wide, or after 200 rounds. NaN when both ends have the same sign or either is NaN.
 */
export function findRoot(f: (x: number) => number, low: number, high: number, relative = 1e-12): number {
  let a = low;
  let b = high;
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (!(fa < 0 !== fb < 0) || Number.isNaN(fa) || Number.isNaN(fb)) return Number.NaN;
  let c = a;
  let fc = fa;
  let step = b - a;
  let previous = step;
  for (let round = 0; round < 200; round++) {
    if (Math.abs(fc) < Math.abs(fb)) {
      a = b;
      b = c;
      c = a;
      fa = fb;
      fb = fc;
      fc = fa;
    }
    const tolerance = 2 * Number.EPSILON * Math.abs(b) + 0.5 * relative * Math.abs(b);
    const middle = (c - b) / 2;
    if (Math.abs(middle) <= tolerance || fb === 0) return b;
    if (Math.abs(previous) >= tolerance && Math.abs(fa) > Math.abs(fb)) {
      const s = fb / fa;
      let p: number;
      let q: number;
      if (a === c) {
        p = 2 * middle * s;
        q = 1 - s;
      } else {
        const r = fb / fc;
        const t = fa / fc;
        p = s * (2 * middle * t * (t - r) - (b - a) * (r - 1));
        q = (t - 1) * (r - 1) * (s - 1);
      }
      if (p > 0) q = -q;
      else p = -p;
      if (2 * p < Math.min(3 * middle * q - Math.abs(tolerance * q), Math.abs(previous * q))) {
        previous = step;
        step = p / q;
      } else {
        step = middle;
        previous = middle;
      }
    } else {
      step = middle;
      previous = middle;
    }
    a = b;
    fa = fb;
    b += Math.abs(step) > tolerance ? step : Math.sign(middle) * tolerance;
    fb = f(b);
    if (Number.isNaN(fb)) return Number.NaN;
    if (fb < 0 === fc < 0) {
      c = a;
      fc = fa;
      step = b - a;
      previous = step;
    }
  }
  return b;
}
