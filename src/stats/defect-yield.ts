/**
 * Share of devices without a defect, from x = area × defect density. The models differ in how far
 * the density varies from device to device.
 */

/** Defects scattered evenly: e^−x. */
export function poissonYield(defectsPerDevice: number): number {
  return Math.exp(-defectsPerDevice);
}

/** Triangular spread of the density: ((1 − e^−x)/x)² (B. T. Murphy, Proc. IEEE 52, 1537, 1964); 1 at x = 0. */
export function murphyYield(defectsPerDevice: number): number {
  if (defectsPerDevice === 0) return 1;
  return (Math.expm1(-defectsPerDevice) / defectsPerDevice) ** 2;
}

/** Exponential spread of the density: 1/(1 + x) (R. B. Seeds, IEEE Int. Convention Record, part 6, 60, 1967). */
export function seedsYield(defectsPerDevice: number): number {
  return 1 / (1 + defectsPerDevice);
}

/** Gamma spread of the density with clustering α: (1 + x/α)^−α (C. H. Stapper, IBM J. Res. Dev. 20, 228, 1976); Poisson's as α → ∞. */
export function negativeBinomialYield(defectsPerDevice: number, alpha: number): number {
  return Math.exp(-alpha * Math.log1p(defectsPerDevice / alpha));
}
