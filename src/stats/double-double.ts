/** Dot products carried in about 32 digits, for the residuals of ill-conditioned fits. */

const splitter = 134217729; // 2^27 + 1 (Veltkamp, as in Dekker, Numer. Math. 18, 224, 1971)

/**
 * start − Σ a[k]·b[k] over `length` terms, each product and sum with its rounding error
 * (two-product and two-sum: Ogita, Rump & Oishi, SIAM J. Sci. Comput. 26, 1955, 2005), rounded once.
 */
export function residualOf(start: number, a: (k: number) => number, b: (k: number) => number, length: number): number {
  let high = start;
  let low = 0;
  for (let k = 0; k < length; k++) {
    const x = -a(k);
    const y = b(k);
    const product = x * y;
    const xScaled = splitter * x;
    const xHigh = xScaled - (xScaled - x);
    const xLow = x - xHigh;
    const yScaled = splitter * y;
    const yHigh = yScaled - (yScaled - y);
    const yLow = y - yHigh;
    const productError = xLow * yLow - (product - xHigh * yHigh - xLow * yHigh - xHigh * yLow);
    const sum = high + product;
    const part = sum - high;
    low += high - (sum - part) + (product - part) + productError;
    high = sum;
  }
  return high + low;
}
