/** Parts flawed ground into single things: folds by their crests, the rest by its peaks. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import { findDomes } from './find-domes.ts';
import { findRidges, widestM } from './find-ridges.ts';
import type { RidgeInput } from './find-ridges.ts';
import { dilate, nearestAdmitted } from './local-ground.ts';
import { inverse, maskOf, pixelsOf, takeMask } from './mask-pixels.ts';
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
  /** Pixels that hold all labelled ones, in raster order. */
  readonly pixels: Int32Array;
  readonly count: number;
  /** By label: how the part was told (`partKinds`). */
  readonly kind: Uint8Array;
  /** Squared distance of each pixel from ground outside all parts, m²: between two that touch it does not fall. */
  readonly distance2: Float32Array;
}

/** A fold reaches this many times its full width at half height to each side of its crest: two standard deviations of a Gaussian ridge. */
const halfWidths = 0.85;
/** Half the width of the gap that is bridged under a fold, metres, and the least size of what is bridged, m². */
const bridgeM = 120e-9;
const leastBridgedM2 = 0.024e-12;
/** Half-width of remains that are the fringe of a dome or a fold's own flank, metres; at least `sliverHalfPx`. */
const sliverHalfM = 35e-9;
const sliverHalfPx = 2;
/** The foot of a fold goes on for so many of its widths to each side, below this part of its crest's height. */
const footWidths = 2;
const footPart = 0.16;
/** Share of the border of remains that a fold must make up for them to belong to it. */
const mostlyBordered = 0.62;

/** Parts a mask of flawed ground (`mask` 1) and labels the parts. Changes `mask`: the foot of a fold may be left out. */
export function partRegions(input: PartInput): Parts {
  const { columns, rows, mask } = input;
  // All parts lie on these pixels, so that most passes need look at no others.
  const flawed = pixelsOf(mask);
  const domes = findDomes(input);
  const ridges = ridgeGround(input, flawed, domes.labels);
  const rest = withoutLabelled(mask, flawed, domes.labels);
  takeMask(rest, ridges);
  giveBackRemains(domes.labels, ridges, rest, input);
  bridgeFolds(ridges, rest, input);
  const blobs = partByPeaks({ ...input, mask: rest });
  blobs.count = peelParts({ ...input, labels: blobs.labels, count: blobs.count, pixels: flawed });
  const folds = labelComponents(ridges, columns, rows, 8);
  const labels = new Uint32Array(mask.length);
  addParts(labels, flawed, domes.labels, blobs.count + folds.count);
  addParts(labels, flawed, folds.labels, blobs.count);
  addParts(labels, flawed, blobs.labels, 0);
  const count = blobs.count + folds.count + domes.count;
  const kind = new Uint8Array(count + 1).fill(partKinds.blob);
  kind.fill(partKinds.ridge, blobs.count + 1, blobs.count + folds.count + 1);
  kind.fill(partKinds.dome, blobs.count + folds.count + 1);
  return { labels, pixels: flawed, count, kind, distance2: distanceToOutside(labels, flawed, input) };
}

/** The mask without what has a label. */
function withoutLabelled(mask: Uint8Array, flawed: Int32Array, labels: Uint32Array): Uint8Array {
  const out = mask.slice();
  for (const i of flawed) if (labels[i]! > 0) out[i] = 0;
  return out;
}

/** Numbers the labelled pixels, each label `offset` higher. */
function addParts(labels: Uint32Array, flawed: Int32Array, parts: Uint32Array, offset: number): void {
  for (const i of flawed) if (parts[i]! > 0) labels[i] = offset + parts[i]!;
}

/** 1 on flawed ground within a fold's own half-width of its crest, domes left out. Changes `mask` where the foot of a fold goes beyond it. */
function ridgeGround(input: PartInput, flawed: Int32Array, domes: Uint32Array): Uint8Array {
  const { columns, rows, pitchXM, pitchYM, mask } = input;
  // A fold ends for the eye where it runs under a dome, and a dome has no crest.
  const { crest, widthM } = findRidges({ ...input, mask: withoutLabelled(mask, flawed, domes) });
  const ground = new Uint8Array(mask.length);
  if (!crest.includes(1)) return ground;
  const mostM = footWidths * widestM + Math.sqrt(pitchXM * pitchYM);
  const nearest = nearestAdmitted(crest, columns, rows, Math.ceil(mostM / pitchXM) + Math.ceil(mostM / pitchYM));
  markFolds(input, flawed, nearest, widthM, ground);
  for (const i of flawed) if (domes[i]! > 0) ground[i] = 0;
  return ground;
}

/** The same by the crest pixel nearest to each, −1 for none near by. */
function markFolds({ columns, pitchXM, pitchYM, mask, rise, byHeight }: PartInput, flawed: Int32Array, nearest: Int32Array, widthM: Float32Array, ground: Uint8Array): void {
  const pixelM = Math.sqrt(pitchXM * pitchYM);
  for (const i of flawed) {
    const at = nearest[i]!;
    if (at < 0) continue;
    const dx = ((i % columns) - (at % columns)) * pitchXM;
    const dy = (Math.floor(i / columns) - Math.floor(at / columns)) * pitchYM;
    const away = Math.hypot(dx, dy);
    const halfM = halfWidths * widthM[at]!;
    // A fold's foot goes on beyond where it stops the current; without a current to follow, the fold ends where others do.
    if (byHeight?.[i] === 1 && away > halfM && (away <= halfM + pixelM || (away < footWidths * widthM[at]! && rise[i]! < footPart * rise[at]!))) mask[i] = 0;
    // What stands higher than the crest beside it belongs to something that leans on the fold.
    else if (rise[i]! <= 1.5 * rise[at]! && away <= halfM + pixelM) ground[i] = 1;
  }
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
 * Gives remains back to what they are part of. The fringe of a dome that is no perfect circle belongs to the dome: what touches one and is nowhere wider than 70 nm (three
 * pixels at least). So do remains along a fold belong to it: what is nowhere wider, what is smaller than the smallest flaw, and what is as low as the fold
 * and bordered mostly by it (the gaps where folds meet). What is smaller than the smallest flaw and touches neither is left of a fold's foot, and no flaw. Changes all three, and `mask`.
 */
function giveBackRemains(domes: Uint32Array, ridges: Uint8Array, rest: Uint8Array, input: PartInput): void {
  const { columns, rows, pitchXM, pitchYM, minPixels, mask } = input;
  const { labels, count, pixels } = labelComponents(rest, columns, rows, 8);
  if (count === 0) return;
  const halfPx = Math.max(sliverHalfPx, sliverHalfM / Math.sqrt(pitchXM * pitchYM));
  const members = pixelsOf(rest);
  const pieces = measureRemains(labels, members, count, pixels, domes, ridges, input);
  const [toDome, toFold, away] = [1, 2, 3];
  const goes = pieces.map((piece) => {
    const narrow = piece.widest2 <= halfPx ** 2 || piece.pixels < minPixels;
    if (piece.dome > 0 && narrow) return toDome;
    if (piece.alongFold > 0 && narrow) return toFold;
    if (piece.alongFold > mostlyBordered * piece.border && piece.peakM < 1.4 * piece.foldM) return toFold;
    return piece.pixels < minPixels ? away : 0;
  });
  for (const i of members) {
    const label = labels[i]!;
    if (goes[label] === 0) continue;
    rest[i] = 0;
    if (goes[label] === toDome) domes[i] = pieces[label]!.dome;
    else if (goes[label] === toFold) ridges[i] = 1;
    else mask[i] = 0;
  }
}

function measureRemains(labels: Uint32Array, members: Int32Array, count: number, pixels: Uint32Array, domes: Uint32Array, ridges: Uint8Array, { columns, rows, rise }: PartInput): Remains[] {
  const pieces = Array.from({ length: count + 1 }, (_, label): Remains => ({ pixels: pixels[label]!, widest2: 0, dome: 0, border: 0, alongFold: 0, foldM: 0, peakM: 0 }));
  const distance2 = squaredDistance(maskOf(members, labels.length), columns, rows, {});
  const beside = (piece: Remains, j: number): void => {
    piece.border++;
    if (piece.dome === 0) piece.dome = domes[j]!;
    if (ridges[j] !== 1) return;
    piece.alongFold++;
    piece.foldM += rise[j]!;
  };
  for (const i of members) {
    const label = labels[i]!;
    const piece = pieces[label]!;
    if (distance2[i]! > piece.widest2) piece.widest2 = distance2[i]!;
    if (rise[i]! > piece.peakM) piece.peakM = rise[i]!;
    // Inside a piece there is no border.
    if (distance2[i]! > 1) continue;
    const c = i % columns;
    if (c > 0 && labels[i - 1] !== label) beside(piece, i - 1);
    if (c + 1 < columns && labels[i + 1] !== label) beside(piece, i + 1);
    if (i >= columns && labels[i - columns] !== label) beside(piece, i - columns);
    if (i + columns < labels.length && labels[i + columns] !== label) beside(piece, i + columns);
  }
  for (const piece of pieces) piece.foldM /= piece.alongFold;
  return pieces;
}

/**
 * What lies on both sides of a fold goes on under it: there the ledger's order of test gives the place to residue. Takes ground from the fold where a
 * closing of what lies beside it (by the fold's own reach) covers it. Changes both masks.
 */
function bridgeFolds(ridges: Uint8Array, rest: Uint8Array, { columns, rows, pitchXM, pitchYM }: PartInput): void {
  const folds = pixelsOf(ridges);
  if (folds.length === 0) return;
  const { labels, pixels } = labelComponents(rest, columns, rows, 8);
  const large = rest.slice();
  const leastBridged = leastBridgedM2 / (pitchXM * pitchYM);
  const bridgePx = Math.max(1, Math.round(bridgeM / Math.sqrt(pitchXM * pitchYM)));
  for (const i of pixelsOf(rest)) if (pixels[labels[i]!]! < leastBridged) large[i] = 0;
  if (!large.includes(1)) return;
  // A closing: grown, and what was not reached grown back.
  const beyond = inverse(dilate(large, columns, rows, bridgePx));
  const open = dilate(beyond, columns, rows, bridgePx);
  for (const i of folds) {
    if (open[i] === 1) continue;
    ridges[i] = 0;
    rest[i] = 1;
  }
}

function distanceToOutside(labels: Uint32Array, flawed: Int32Array, { columns, rows, pitchXM, pitchYM }: PartInput): Float32Array {
  const inside = new Uint8Array(labels.length);
  for (const i of flawed) if (labels[i]! > 0) inside[i] = 1;
  return squaredDistance(inside, columns, rows, { pitchX: pitchXM, pitchY: pitchYM });
}
