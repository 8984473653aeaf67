/** Gauss–Legendre quadrature on [−1, 1] (Abramowitz & Stegun 25.4.29, 1964). */

/**
 * Nodes (ascending) and weights of the rule of `order` points, exact for polynomials up to degree
 * 2·order − 1. Roots of the Legendre polynomial by Newton's method.
 */
export function gaussLegendre(order: number): { nodes: Float64Array; weights: Float64Array } {
  const nodes = new Float64Array(order);
  const weights = new Float64Array(order);
  for (let k = 0; k < order; k++) {
    let x = -Math.cos((Math.PI * (k + 0.75)) / (order + 0.5));
    let slope = 0;
    for (let round = 0; round < 100; round++) {
      let previous = 1;
      let value = x;
      for (let n = 2; n <= order; n++) {
        const next = ((2 * n - 1) * x * value - (n - 1) * previous) / n;
        previous = value;
        value = next;
      }
      slope = (order * (x * value - previous)) / (x * x - 1);
      const step = value / slope;
      x -= step;
      if (Math.abs(step) < 1e-15) break;
    }
    nodes[k] = x;
    weights[k] = 2 / ((1 - x * x) * slope * slope);
  }
  return { nodes, weights };
}
