/** Parts flawed ground into single things: folds by their crests, the rest by its peaks. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import { findDomes } from './find-domes.ts';
import { findRidges } from './find-ridges.ts';
import type { RidgeInput } from './find-ridges.ts';
import { dilate, nearestAdmitted } from './local-ground.ts';
import { partKinds } from './measure.ts';
import { partByPeaks } from './part-by-peaks.ts';
import { peelParts } from './peel.ts';

export interface PartInput extends RidgeInput {
  /** Standard deviation of the smoothed height's noise, metres. */
  readonly noiseM: number;
  /** Remains of fewer pixels join what they touch. */
  readonly minPixels: number;
  /** 1 where only the height says that the ground is flawed; absent where it always does. */
  readonly byHeight?: Uint8Array | undefined;
}

export interface Parts {
  /** Number of the part per pixel from 1; 0 outside the mask. */
  readonly labels: Uint32Array;
  readonly count: number;
  /** By label: how the part was told (`partKinds`). */
  readonly kind: Uint8Array;
  /** Squared distance of each pixel from ground outside all parts, m²: between two that touch it does not fall. */
  readonly distance2: Float32Array;
}

/** A fold reaches this many times its full width at half height to each side of its crest: two standard deviations of a Gaussian ridge. */
const halfWidths = 0.85;
/** Half the width of the gap that is bridged under a fold, and the least size of what is bridged, pixels. */
const bridgePx = 6;
const leastBridged = 60;
/** Half-width of remains that are a fold's own flank, pixels. */
const sliverHalfPx = 2;
/** The foot of a fold goes on for so many of its widths to each side, below this part of its crest's height. */
const footWidths = 2;
const footPart = 0.16;
/** Share of the border of remains that a fold must make up for them to belong to it. */
const mostlyBordered = 0.62;

/** Parts a mask of flawed ground (`mask` 1) and labels the parts. Changes `mask`: the foot of a fold may be left out. */
export function partRegions(input: PartInput): Parts {
  const { columns, rows, mask } = input;
  const domes = findDomes(input);
  // A fold ends for the eye where it runs under a dome, and a dome has no crest.
  const withoutDomes = new Uint8Array(mask.length);
  for (let i = 0; i < mask.length; i++) withoutDomes[i] = domes.labels[i]! > 0 ? 0 : mask[i]!;
  const ridges = ridgeGround(input, withoutDomes);
  const rest = new Uint8Array(mask.length);
  for (let i = 0; i < rest.length; i++) {
    if (domes.labels[i]! > 0) ridges[i] = 0;
    else rest[i] = mask[i] === 1 && ridges[i] === 0 ? 1 : 0;
  }
  giveBackRemains(domes.labels, ridges, rest, input);
  bridgeFolds(ridges, rest, input);
  const blobs = partByPeaks({ ...input, mask: rest });
  blobs.count = peelParts({ ...input, labels: blobs.labels, count: blobs.count });
  const folds = labelComponents(ridges, columns, rows, 8);
  const labels = new Uint32Array(mask.length);
  for (let i = 0; i < labels.length; i++) labels[i] = rest[i] === 1 ? blobs.labels[i]! : ridges[i] === 1 ? blobs.count + folds.labels[i]! : domes.labels[i]! > 0 ? blobs.count + folds.count + domes.labels[i]! : 0;
  const count = blobs.count + folds.count + domes.count;
  const kind = new Uint8Array(count + 1).fill(partKinds.blob);
  kind.fill(partKinds.ridge, blobs.count + 1, blobs.count + folds.count + 1);
  kind.fill(partKinds.dome, blobs.count + folds.count + 1);
  return { labels, count, kind, distance2: distanceToOutside(labels, input) };
}

/** 1 on flawed ground within a fold's own half-width of its crest. Changes `mask` where the foot of a fold goes beyond it. */
function ridgeGround(input: PartInput, withoutDomes: Uint8Array): Uint8Array {
  const { columns, rows, pitchXM, pitchYM, mask, rise, byHeight } = input;
  const { crest, widthM } = findRidges({ ...input, mask: withoutDomes });
  const ground = new Uint8Array(mask.length);
  if (!crest.includes(1)) return ground;
  const nearest = nearestAdmitted(crest, columns, rows);
  const pixelM = Math.sqrt(pitchXM * pitchYM);
  for (let i = 0; i < ground.length; i++) {
    if (mask[i] === 0) continue;
    const at = nearest[i]!;
    const dx = ((i % columns) - (at % columns)) * pitchXM;
    const dy = (Math.floor(i / columns) - Math.floor(at / columns)) * pitchYM;
    const away = Math.hypot(dx, dy);
    const halfM = halfWidths * widthM[at]!;
    // A fold's foot goes on beyond where it stops the current; without a current to follow, the fold ends where others do.
    if (byHeight?.[i] === 1 && away > halfM && (away <= halfM + pixelM || (away < footWidths * widthM[at]! && rise[i]! < footPart * rise[at]!))) mask[i] = 0;
    // What stands higher than the crest beside it belongs to something that leans on the fold.
    else if (rise[i]! <= 1.5 * rise[at]! && away <= halfM + pixelM) ground[i] = 1;
  }
  return ground;
}

/** What is known of one piece of ground that is neither dome nor crest. */
interface Remains {
  pixels: number;
  /** Largest squared distance from its outline, pixels². */
  widest2: number;
  /** A dome that it touches, 0 for none. */
  dome: number;
  /** Edges of pixels on its outline, those along a fold, and the mean rise of the fold there, metres. */
  border: number;
  alongFold: number;
  foldM: number;
  peakM: number;
}

/**
 * Gives remains back to what they are part of. The fringe of a dome that is no perfect circle belongs to the dome: what touches one and is nowhere wider than three
 * pixels. So do remains along a fold belong to it: what is nowhere wider, what is smaller than the smallest flaw, and what is as low as the fold
 * and bordered mostly by it (the gaps where folds meet). What is smaller than the smallest flaw and touches neither is left of a fold's foot, and no flaw. Changes all three, and `mask`.
 */
function giveBackRemains(domes: Uint32Array, ridges: Uint8Array, rest: Uint8Array, input: PartInput): void {
  const { columns, rows, minPixels, mask } = input;
  const { labels, count, pixels } = labelComponents(rest, columns, rows, 8);
  if (count === 0) return;
  const pieces = measureRemains(labels, count, pixels, domes, ridges, input);
  const [toDome, toFold, away] = [1, 2, 3];
  const goes = Uint8Array.from(pieces, (piece) => {
    const narrow = piece.widest2 <= sliverHalfPx ** 2 || piece.pixels < minPixels;
    if (piece.dome > 0 && narrow) return toDome;
    if (piece.alongFold > 0 && narrow) return toFold;
    if (piece.alongFold > mostlyBordered * piece.border && piece.peakM < 1.4 * piece.foldM) return toFold;
    return piece.pixels < minPixels ? away : 0;
  });
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label === 0 || goes[label] === 0) continue;
    rest[i] = 0;
    if (goes[label] === toDome) domes[i] = pieces[label]!.dome;
    else if (goes[label] === toFold) ridges[i] = 1;
    else mask[i] = 0;
  }
}

function measureRemains(labels: Uint32Array, count: number, pixels: Uint32Array, domes: Uint32Array, ridges: Uint8Array, { columns, rows, rise }: PartInput): Remains[] {
  const pieces = Array.from({ length: count + 1 }, (_, label): Remains => ({ pixels: pixels[label]!, widest2: 0, dome: 0, border: 0, alongFold: 0, foldM: 0, peakM: 0 }));
  const inside = new Uint8Array(labels.length);
  for (let i = 0; i < labels.length; i++) if (labels[i]! > 0) inside[i] = 1;
  const distance2 = squaredDistance(inside, columns, rows, {});
  for (let i = 0; i < labels.length; i++) {
    if (labels[i] === 0) continue;
    const piece = pieces[labels[i]!]!;
    if (distance2[i]! > piece.widest2) piece.widest2 = distance2[i]!;
    if (rise[i]! > piece.peakM) piece.peakM = rise[i]!;
    // Inside a piece there is no border.
    if (distance2[i]! > 1) continue;
    const c = i % columns;
    for (const j of [c > 0 ? i - 1 : -1, c + 1 < columns ? i + 1 : -1, i - columns, i + columns]) {
      if (j < 0 || j >= labels.length || labels[j] === labels[i]) continue;
      piece.border++;
      if (piece.dome === 0) piece.dome = domes[j]!;
      if (ridges[j] !== 1) continue;
      piece.alongFold++;
      piece.foldM += rise[j]!;
    }
  }
  for (const piece of pieces) piece.foldM /= piece.alongFold;
  return pieces;
}

/**
 * What lies on both sides of a fold goes on under it: there the ledger's order of test gives the place to residue. Takes ground from the fold where a
 * closing of what lies beside it (by the fold's own reach) covers it. Changes both masks.
 */
function bridgeFolds(ridges: Uint8Array, rest: Uint8Array, { columns, rows }: PartInput): void {
  const { labels, pixels } = labelComponents(rest, columns, rows, 8);
  const large = new Uint8Array(rest.length);
  let any = false;
  for (let i = 0; i < large.length; i++) {
    if (labels[i]! === 0 || pixels[labels[i]!]! < leastBridged) continue;
    large[i] = 1;
    any = true;
  }
  if (!any || !ridges.includes(1)) return;
  // A closing: grown, and what was not reached grown back.
  const beyond = dilate(large, columns, rows, bridgePx);
  for (let i = 0; i < beyond.length; i++) beyond[i] = 1 - beyond[i]!;
  const open = dilate(beyond, columns, rows, bridgePx);
  for (let i = 0; i < ridges.length; i++) {
    if (ridges[i] === 0 || open[i] === 1) continue;
    ridges[i] = 0;
    rest[i] = 1;
  }
}

function distanceToOutside(labels: Uint32Array, { columns, rows, pitchXM, pitchYM }: PartInput): Float32Array {
  const inside = new Uint8Array(labels.length);
  for (let i = 0; i < inside.length; i++) if (labels[i]! > 0) inside[i] = 1;
  return squaredDistance(inside, columns, rows, { pitchX: pitchXM, pitchY: pitchYM });
}
