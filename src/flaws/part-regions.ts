/** Parts flawed ground into single things: folds by their crests, the rest by its peaks. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import { findRidges } from './find-ridges.ts';
import type { RidgeInput } from './find-ridges.ts';
import { nearestAdmitted } from './local-ground.ts';
import { partByPeaks } from './part-by-peaks.ts';
import { peelParts } from './peel.ts';

export interface PartInput extends RidgeInput {
  /** Standard deviation of the smoothed height's noise, metres. */
  readonly noiseM: number;
  /** Remains of fewer pixels join what they touch. */
  readonly minPixels: number;
}

export interface Parts {
  /** Number of the part per pixel from 1; 0 outside the mask. */
  readonly labels: Uint32Array;
  readonly count: number;
  /** By label: 1 where the part is a ridge by its crest. */
  readonly ridge: Uint8Array;
  /** Squared distance of each pixel from the outside of its own part, m². */
  readonly distance2: Float32Array;
}

/** A fold reaches this many times its full width at half height to each side of its crest: two standard deviations of a Gaussian ridge. */
const halfWidths = 0.85;

/** Parts a mask of flawed ground (`mask` 1) and labels the parts. */
export function partRegions(input: PartInput): Parts {
  const { columns, rows, mask } = input;
  const ridges = ridgeGround(input);
  const rest = new Uint8Array(mask.length);
  for (let i = 0; i < rest.length; i++) rest[i] = mask[i] === 1 && ridges[i] === 0 ? 1 : 0;
  giveBackSlivers(ridges, rest, input);
  const blobs = partByPeaks({ ...input, mask: rest });
  blobs.count = peelParts({ ...input, labels: blobs.labels, count: blobs.count });
  const folds = labelComponents(ridges, columns, rows, 8);
  const labels = new Uint32Array(mask.length);
  for (let i = 0; i < labels.length; i++) labels[i] = rest[i] === 1 ? blobs.labels[i]! : ridges[i] === 1 ? blobs.count + folds.labels[i]! : 0;
  const count = blobs.count + folds.count;
  const ridge = new Uint8Array(count + 1);
  ridge.fill(1, blobs.count + 1);
  return { labels, count, ridge, distance2: distanceToOutside(labels, input) };
}

/** 1 on flawed ground within a fold's own half-width of its crest. */
function ridgeGround(input: PartInput): Uint8Array {
  const { columns, rows, pitchXM, pitchYM, mask, rise } = input;
  const { crest, widthM } = findRidges(input);
  const ground = new Uint8Array(mask.length);
  if (!crest.includes(1)) return ground;
  const nearest = nearestAdmitted(crest, columns, rows);
  const pixelM = Math.sqrt(pitchXM * pitchYM);
  for (let i = 0; i < ground.length; i++) {
    if (mask[i] === 0) continue;
    const at = nearest[i]!;
    const dx = ((i % columns) - (at % columns)) * pitchXM;
    const dy = (Math.floor(i / columns) - Math.floor(at / columns)) * pitchYM;
    // What stands higher than the crest beside it belongs to something that leans on the fold.
    if (Math.hypot(dx, dy) <= halfWidths * widthM[at]! + pixelM && !(rise[i]! > 1.5 * rise[at]!)) ground[i] = 1;
  }
  return ground;
}

/** Thin remains along a fold belong to it: what is nowhere wider than three pixels, or smaller than the smallest flaw. Changes both masks. */
function giveBackSlivers(ridges: Uint8Array, rest: Uint8Array, { columns, rows, minPixels }: PartInput): void {
  const { labels, count, pixels } = labelComponents(rest, columns, rows, 8);
  const distance2 = squaredDistance(rest, columns, rows, {});
  const widest = new Float64Array(count + 1);
  const touching = new Uint8Array(count + 1);
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label === 0) continue;
    if (distance2[i]! > widest[label]!) widest[label] = distance2[i]!;
    const c = i % columns;
    for (const j of [c > 0 ? i - 1 : i, c + 1 < columns ? i + 1 : i, i - columns, i + columns]) if (ridges[j] === 1) touching[label] = 1;
  }
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label === 0 || touching[label] === 0 || (widest[label]! > 4 && pixels[label]! >= minPixels)) continue;
    rest[i] = 0;
    ridges[i] = 1;
  }
}

function distanceToOutside(labels: Uint32Array, { columns, rows, pitchXM, pitchYM }: PartInput): Float32Array {
  return squaredDistance(Uint8Array.from(labels, (label) => (label > 0 ? 1 : 0)), columns, rows, { pitchX: pitchXM, pitchY: pitchYM });
}
