/** Settling of a current amplifier with one pole within the time of a pixel: 1 − exp(−2πf·t) of a step (response of a first-order low pass). */

/**
 * Seconds that a pixel lasts. `lineRateHz` counts whole lines, there and back, of which one way is half, as a
 * scan's rate is usually stated.
 */
export function pixelTimeS(lineRateHz: number, columns: number): number {
  return 1 / (2 * lineRateHz * columns);
}

/** Share of a step that is reached after one pixel, for an amplifier whose response is down 3 dB at `bandwidthHz`. */
export function settledShare(bandwidthHz: number, lineRateHz: number, columns: number): number {
  return -Math.expm1(-2 * Math.PI * bandwidthHz * pixelTimeS(lineRateHz, columns));
}

/** Bandwidth in Hz at which at most `remaining` (0–1; 0.01) of a step is left after one pixel. More bandwidth than this only adds noise. */
export function bandwidthForSettlingHz(lineRateHz: number, columns: number, remaining = 0.01): number {
  return -Math.log(remaining) / (2 * Math.PI * pixelTimeS(lineRateHz, columns));
}
