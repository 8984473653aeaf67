/** Where the band ends, for every test against it. */

/** A hair of tolerance in decades, so that a density exactly at the band's edge is in band whatever the rounding. */
const slackDecades = 1e-6;

/** Largest |log10 of density over the reference's| that still is in band, for a band of ×/÷ `factor` (at least 1). */
export function bandEdgeLog10(factor: number): number {
  return Math.log10(factor) + slackDecades;
}
