/** A correction in words, for notices, the report and the page's list. */
import type { CorrectionEntry } from './correction-recipe.ts';

/** "flaw at x 1.2, y 3.4 µm set to residue". Places to 0.01 µm, widths to three digits. */
export function correctionWords(entry: CorrectionEntry): string {
  switch (entry.kind) {
    case 'reclassify': return `flaw at ${place(entry.xUm, entry.yUm)} set to ${entry.cause}`;
    case 'dismiss': return `flaw at ${place(entry.xUm, entry.yUm)} dismissed`;
    case 'merge': return `${entry.pointsUm.length} flaws merged, the first at ${first(entry.pointsUm)}`;
    case 'split': return `flaw split along a line from ${first(entry.pointsUm)}`;
    case 'paint': return `${entry.cause} painted ${Number(entry.widthUm.toPrecision(3))} µm wide from ${first(entry.pointsUm)}`;
    case 'erase': return `flaws erased ${Number(entry.widthUm.toPrecision(3))} µm wide from ${first(entry.pointsUm)}`;
    case 'polygon': return `outline with a corner at ${first(entry.pointsUm)} ${entry.cause === 'none' ? 'cleared of flaws' : `filled with ${entry.cause}`}`;
  }
}

/** Where a correction starts, µm. */
export function correctionPlace(entry: CorrectionEntry): readonly [xUm: number, yUm: number] {
  return entry.kind === 'reclassify' || entry.kind === 'dismiss' ? [entry.xUm, entry.yUm] : entry.pointsUm[0]!;
}

function first(points: readonly (readonly [number, number])[]): string {
  return place(...points[0]!);
}

function place(xUm: number, yUm: number): string {
  return `x ${xUm.toFixed(2)}, y ${yUm.toFixed(2)} µm`;
}
