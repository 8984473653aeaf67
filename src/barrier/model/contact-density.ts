/** Density from current and back through a contact whose area is known only to a factor. */

/** A log-normal quantity: median, 95 % range, and mean, in one unit. */
export interface LogNormal {
  readonly median: number;
  readonly low95: number;
  readonly high95: number;
  readonly mean: number;
}

const z95 = 1.959963984540054;

/** Log-normal with its 95 % range at ×/÷ `factor95` (≥ 1) of the median. The mean lies exp(s²/2) above the median, s = ln(factor95)/1.96. */
function logNormal(median: number, factor95: number): LogNormal {
  const sd = Math.log(factor95) / z95;
  return { median, low95: median / factor95, high95: median * factor95, mean: median * Math.exp(sd ** 2 / 2) };
}

/**
 * Density in A/m² under a contact that carries `currentA`: the area's spread turns over to the density whole,
 * and the mean density is not current over mean area.
 *
 * @param areaM2 median of the area.
 * @param areaFactor95 factor such that the area lies within ×/÷ it with 95 %.
 */
export function densityOfContact(currentA: number, areaM2: number, areaFactor95: number): LogNormal {
  return logNormal(currentA / areaM2, areaFactor95);
}

/** Current in A that a density in A/m² drives through the contact; parameters as `densityOfContact`. */
export function currentOfContact(densityAPerM2: number, areaM2: number, areaFactor95: number): LogNormal {
  return logNormal(densityAPerM2 * areaM2, areaFactor95);
}

/**
 * Factor of the 95 % range of Hertz's area, which goes as (F·R/E*)^⅔, from independent factors of force, tip
 * radius and modulus. Wear, water and a second asperity are not in it: usually the area is
 * known to a decade only.
 */
export function hertzAreaFactor95(forceFactor95: number, radiusFactor95: number, modulusFactor95: number): number {
  return Math.exp((2 / 3) * Math.hypot(Math.log(forceFactor95), Math.log(radiusFactor95), Math.log(modulusFactor95)));
}
