/**
 * Otsu's threshold of a histogram (N. Otsu, IEEE Trans. Syst. Man Cybern. 9, 62, 1979): the bin t
 * for which splitting into bins ≤ t and bins > t leaves the largest variance between the two
 * classes; foreground is > t. The lowest such bin on ties, so that a run of empty bins gives its
 * lower end. −1 when fewer than two bins hold anything.
 */
export function otsuBin(counts: ArrayLike<number>): number {
  let total = 0;
  let moment = 0;
  for (let bin = 0; bin < counts.length; bin++) {
    total += counts[bin]!;
    moment += bin * counts[bin]!;
  }
  let best = 0;
  let bestBin = -1;
  let below = 0;
  let belowMoment = 0;
  for (let bin = 0; bin < counts.length - 1; bin++) {
    below += counts[bin]!;
    belowMoment += bin * counts[bin]!;
    if (below === 0 || below === total) continue;
    // Whole numbers up to here: an empty bin gives exactly the same value as the one before it.
    const apart = total * belowMoment - below * moment;
    const between = (apart * apart) / (below * (total - below));
    if (between > best) {
      best = between;
      bestBin = bin;
    }
  }
  return bestBin;
}
