/**
 * From SI to the units that result files carry in their names. Every result is rounded to twelve
 * significant digits: that removes the noise of multiplying by a power of ten (0.019999999999999997 µm)
 * and is far below anything a probe resolves. NaN and infinities pass through.
 */
export const toUm = (metres: number): number => inUnit(metres, 1e6);
export const toNm = (metres: number): number => inUnit(metres, 1e9);
export const toUm2 = (squareMetres: number): number => inUnit(squareMetres, 1e12);
/** Per m² to per µm². */
export const toPerUm2 = (perSquareMetre: number): number => inUnit(perSquareMetre, 1e-12);
/** m³ to µm²·nm (area times height, as volumes of bubbles are pictured). */
export const toUm2Nm = (cubicMetres: number): number => inUnit(cubicMetres, 1e21);
/** A/m² to nA/µm². */
export const toNaPerUm2 = (amperesPerSquareMetre: number): number => inUnit(amperesPerSquareMetre, 1e-3);
/** Only the rounding, for numbers whose unit stays. */
export const rounded = (value: number): number => inUnit(value, 1);

function inUnit(value: number, factor: number): number {
  return Number((value * factor).toPrecision(12));
}
