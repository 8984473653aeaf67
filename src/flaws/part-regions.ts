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
/** Share of the border of remains that a fold must make up for them to belong to it. */
const mostlyBordered = 0.62;

/** Parts a mask of flawed ground (`mask` 1) and labels the parts. Changes `mask`: the foot of a fold may be left out. */
export function partRegions(input: PartInput): Parts {
  const { columns, rows, mask } = input;
  const domes = findDomes(input);
  // A fold ends for the eye where it runs under a dome, and a dome has no crest.
  const ridges = ridgeGround(input, mask.map((value, i) => (domes.labels[i]! > 0 ? 0 : value)));
  const rest = new Uint8Array(mask.length);
  for (let i = 0; i < rest.length; i++) {
    if (domes.labels[i]! > 0) ridges[i] = 0;
    else rest[i] = mask[i] === 1 && ridges[i] === 0 ? 1 : 0;
  }
  giveBackFringes(domes.labels, rest, input);
  giveBackSlivers(ridges, rest, input);
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
    // What stands higher than the crest beside it belongs to something that leans on the fold.
    const away = Math.hypot(dx, dy);
    if (rise[i]! > 1.5 * rise[at]! || away > halfWidths * widthM[at]! + pixelM) continue;
    // A fold's foot goes on beyond where it stops the current; without a current to follow, the fold ends where others do.
    if (byHeight?.[i] === 1 && away > halfWidths * widthM[at]!) mask[i] = 0;
    else ground[i] = 1;
  }
  return ground;
}

/** The fringe of a dome that is no perfect circle belongs to the dome: remains that touch one and are nowhere wider than three pixels. Changes both. */
function giveBackFringes(domes: Uint32Array, rest: Uint8Array, { columns, rows, minPixels }: PartInput): void {
  const { labels, count, pixels } = labelComponents(rest, columns, rows, 8);
  const distance2 = squaredDistance(rest, columns, rows, {});
  const widest = new Float64Array(count + 1);
  const touched = new Uint32Array(count + 1);
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label === 0) continue;
    if (distance2[i]! > widest[label]!) widest[label] = distance2[i]!;
    if (touched[label] !== 0) continue;
    const c = i % columns;
    touched[label] = (c > 0 ? domes[i - 1]! : 0) || (c + 1 < columns ? domes[i + 1]! : 0) || (domes[i - columns] ?? 0) || (domes[i + columns] ?? 0);
  }
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label === 0 || touched[label] === 0 || (widest[label]! > sliverHalfPx ** 2 && pixels[label]! >= minPixels)) continue;
    rest[i] = 0;
    domes[i] = touched[label]!;
  }
}

/**
 * Remains along a fold belong to it: what is nowhere wider than three pixels, what is smaller than the smallest flaw, and what is as low as the fold and bordered
 * mostly by it (the gaps where folds meet). Changes both masks.
 */
function giveBackSlivers(ridges: Uint8Array, rest: Uint8Array, { columns, rows, minPixels, rise }: PartInput): void {
  const { labels, count, pixels } = labelComponents(rest, columns, rows, 8);
  const distance2 = squaredDistance(rest, columns, rows, {});
  const [widest, peak, foldSum, contact, border] = Array.from({ length: 5 }, () => new Float64Array(count + 1)) as [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array];
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label === 0) continue;
    if (distance2[i]! > widest[label]!) widest[label] = distance2[i]!;
    if (rise[i]! > peak[label]!) peak[label] = rise[i]!;
    const c = i % columns;
    for (const j of [c > 0 ? i - 1 : -1, c + 1 < columns ? i + 1 : -1, i - columns, i + columns]) {
      if (j < 0 || j >= labels.length || labels[j] === label) continue;
      border[label]!++;
      if (ridges[j] !== 1) continue;
      contact[label]!++;
      foldSum[label]! += rise[j]!;
    }
  }
  const joins = Uint8Array.from(labels.length > 0 ? border : [], (edges, label) => {
    if (label === 0 || contact[label] === 0) return 0;
    if (widest[label]! <= sliverHalfPx ** 2 || pixels[label]! < minPixels) return 1;
    return contact[label]! > mostlyBordered * edges && peak[label]! < 1.4 * (foldSum[label]! / contact[label]!) ? 1 : 0;
  });
  for (let i = 0; i < labels.length; i++) {
    if (labels[i] === 0 || joins[labels[i]!] === 0) continue;
    rest[i] = 0;
    ridges[i] = 1;
  }
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
