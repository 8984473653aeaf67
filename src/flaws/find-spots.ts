/** Spots that only the current shows: shorts (too much) and opens (none). */
import { labelComponents } from '../grid/label-components.ts';
import { median } from '../stats/median.ts';
import { greyOpening } from '../grid/opening.ts';
import { dilate, nearestAdmitted } from './local-ground.ts';
import { knownOutside, onlyFirst, pixelsOf, takeMask } from './mask-pixels.ts';

export interface SpotsInput {
  readonly columns: number;
  readonly rows: number;
  readonly pixelAreaM2: number;
  /** log10 current, NaN missing. */
  readonly log10: Float32Array;
  readonly saturated: Uint8Array;
  readonly floor: Uint8Array;
  /** Height above the local ground in metres; absent without a height map. */
  readonly rise?: Float32Array;
  /** 1 where the pixel lies on its own terrace's plane; absent without a height map. */
  readonly onPlane?: Uint8Array;
  /** 1 where the height was lost and filled: without contact there is no current either, so that none says nothing. Absent without a height map. */
  readonly lost?: Uint8Array;
  /** Raised flaws found before. */
  readonly raised: Uint8Array;
  /** Decades of two layers (or what the recipe says) above the surroundings. */
  readonly shortDecades: number;
  /** Decades of one layer. */
  readonly layerDecades: number;
  readonly shortMaxM2: number;
  readonly terraceMinM2: number;
  readonly minPixels: number;
  /** Thickness of one layer, metres. */
  readonly layerM: number;
  /** Standard deviation of the height's noise, metres; absent without a height map. */
  readonly noiseM?: number;
  /** A pit this deep that conducts goes through the barrier, metres. */
  readonly pitM: number;
}

/** Decades above the floor from which ground is bright enough that noise does not make a dead pixel of it. */
const brightDecades = 0.5;
/** Near saturated ground a saturated spot must be deeper than this, in layers: thinner terraces lie up to two or three below. */
const pitLayers = 3.2;
/** A spot without a pit is no short where raised flaws make up more than this share of its border: they cut it off from ground like itself. */
const shutInShare = 0.5;
/** A dead spot borders on ground that carries current; with more than this share of its border at the floor it is the edge of something larger. */
const darkBorder = 0.25;
/** Undulation of even ground, metres, and its spread in decades of current (both our judgement of good flakes). */
const roughM = 0.1e-9;
const evenDecades = 0.2;
/** A spot with more than this share of its border at its own current is a corner of that ground. */
const alikeBorder = 0.15;
/** Part of a layer's worth of current by which a spot must stand out to be a spot at all. */
const standOut = 0.3;

/**
 * Shorts: patches up to `shortMaxM2` whose current lies `shortDecades` above the surroundings, or which saturate, or which are conducting
 * pits through the barrier. Surroundings are the current with every bright patch narrower than the largest short removed
 * (grey opening), raised flaws bridged from their edges. Down to one pixel.
 *
 * Saturation hides by how much a spot stands out. A saturated patch near a larger saturated terrace could be a piece of it, so there the
 * height must show a pit; what stands alone is held against its border (`bluntSpots`, `shutInSpots`).
 */
export function findShorts(input: SpotsInput): Uint8Array {
  const { columns, rows, log10, raised, saturated, floor, rise } = input;
  const use = knownOutside(raised, log10);
  // Without a height nothing says which dead ground is a flaw: none of it may serve as surroundings, or every gap between two bubbles would stand out.
  if (!rise) takeMask(use, floor);
  const width = openingWidth(input);
  const surroundings = greyOpening(filledFrom(log10, nearestAdmitted(use, columns, rows)), columns, rows, width, width);
  const nearTerrace = nearLargeSaturated(input, width);
  const candidates = new Uint8Array(log10.length);
  for (const i of standingOut(use, log10, surroundings, standOut * input.layerDecades)) {
    const above = log10[i]! - surroundings[i]!;
    const pitM = rise ? -rise[i]! : 0;
    if (above >= input.shortDecades) candidates[i] = 1;
    else if (saturated[i] === 1) candidates[i] = nearTerrace[i] === 0 || pitM > pitLayers * input.layerM ? 1 : 0;
    else if (pitM > input.pitM && floor[i] === 0) candidates[i] = 1;
  }
  const { labels, pixels, count: spots } = labelComponents(candidates, columns, rows, 8);
  if (spots === 0) return candidates;
  const members = pixelsOf(candidates);
  const shutIn = shutInSpots(labels, members, spots, input);
  const blunt = bluntSpots(labels, members, spots, pixels, input);
  for (const i of members) {
    const label = labels[i]!;
    if (pixels[label]! * input.pixelAreaM2 > input.shortMaxM2 || shutIn[label] === 1 || blunt[label] === 1) candidates[i] = 0;
  }
  return candidates;
}

/** The map with every pixel's value that of the pixel named for it; 0 where none is. */
function filledFrom(values: Float32Array, nearest: Int32Array): Float32Array {
  const filled = new Float32Array(values.length);
  for (let i = 0; i < filled.length; i++) filled[i] = nearest[i]! < 0 ? 0 : values[nearest[i]!]!;
  return filled;
}

/** Pixels of a mask that lie at least so far above a map of their surroundings. */
function standingOut(mask: Uint8Array, values: Float32Array, surroundings: Float32Array, least: number): Int32Array {
  const found = new Int32Array(values.length);
  let count = 0;
  for (let i = 0; i < values.length; i++) if (mask[i] === 1 && !(values[i]! - surroundings[i]! < least)) found[count++] = i;
  return found.slice(0, count);
}

/** By spot: 1 where it lies level with the ground and raised flaws make up most of its border. A short inside a bubble lies high up or in a pit. */
function shutInSpots(labels: Uint32Array, members: Int32Array, count: number, { columns, rise, raised, layerM }: SpotsInput): Uint8Array {
  const [border, beside] = [new Float64Array(count + 1), new Float64Array(count + 1)];
  const deepest = new Float64Array(count + 1);
  const highest = new Float64Array(count + 1);
  for (const i of members) {
    const label = labels[i]!;
    if (rise && rise[i]! < deepest[label]!) deepest[label] = rise[i]!;
    if (rise && rise[i]! > highest[label]!) highest[label] = rise[i]!;
  }
  countBorders(labels, members, columns, raised, border, beside);
  return Uint8Array.from(border, (edges, label) => (beside[label]! > shutInShare * edges && deepest[label]! > -2 * layerM && highest[label]! < 3 * layerM ? 1 : 0));
}

/**
 * By spot: 1 where it does not stand out of what borders on it. A pit deeper than a terrace that carries as much more, and than the height's noise at the
 * deepest of its pixels makes that, settles it: a short. Without one it is none where a part of its border is like itself (a corner of that ground), where it
 * lies less than half of what a short stands out by above the median of its border (ground that brightens gradually), and where it saturates and
 * could lie as little as a layer above its border: a terrace as much thinner explains it.
 */
function bluntSpots(labels: Uint32Array, members: Int32Array, count: number, pixels: Uint32Array, { columns, rows, log10, raised, saturated, rise, noiseM, shortDecades, layerDecades, layerM }: SpotsInput): Uint8Array {
  const own = Array.from({ length: count + 1 }, (): number[] => []);
  const border = Array.from({ length: count + 1 }, (): number[] => []);
  const deepestM = new Float64Array(count + 1);
  const clipped = new Uint8Array(count + 1);
  for (const i of members) {
    const label = labels[i]!;
    own[label]!.push(log10[i]!);
    if (saturated[i] === 1) clipped[label] = 1;
    if (rise && -rise[i]! > deepestM[label]!) deepestM[label] = -rise[i]!;
    const c = i % columns;
    const r = (i - c) / columns;
    for (let y = Math.max(0, r - 1); y <= Math.min(rows - 1, r + 1); y++) {
      for (let x = Math.max(0, c - 1); x <= Math.min(columns - 1, c + 1); x++) {
        const k = y * columns + x;
        if (labels[k] === 0 && raised[k] === 0 && log10[k] === log10[k]) border[label]!.push(log10[k]!);
      }
    }
  }
  return Uint8Array.from(own, (values, label) => {
    if (label === 0 || border[label]!.length === 0) return 0;
    const level = median(values);
    const above = level - median(border[label]!);
    const layers = Math.max(1, Math.ceil(above / layerDecades));
    const spreadM = Math.hypot(noiseM ?? 0, roughM) * (1.2 + Math.sqrt(2 * Math.log(pixels[label]!)));
    if (deepestM[label]! >= layers * layerM + spreadM) return 0;
    if (shareNear(border[label]!, level, standOut * layerDecades) > alikeBorder) return 1;
    if (above >= shortDecades - evenDecades) return 0;
    return clipped[label] === 1 || above < shortDecades / 2 ? 1 : 0;
  });
}

function shareNear(values: readonly number[], level: number, within: number): number {
  return values.filter((value) => Math.abs(value - level) < within).length / values.length;
}

/** 1 within one opening width of saturated ground larger than the largest short. */
function nearLargeSaturated(input: SpotsInput, width: number): Uint8Array {
  const { columns, rows, saturated } = input;
  const { labels, pixels } = labelComponents(saturated, columns, rows, 8);
  const large = new Uint8Array(saturated.length);
  if (!pixels.some((size, n) => n > 0 && size * input.pixelAreaM2 > input.shortMaxM2)) return large;
  for (const i of pixelsOf(saturated)) large[i] = pixels[labels[i]!]! * input.pixelAreaM2 > input.shortMaxM2 ? 1 : 0;
  return dilate(large, columns, rows, width);
}

/** Width of the square that a largest short just fits into, in pixels; at least three. */
function openingWidth(input: SpotsInput): number {
  const across = Math.sqrt(input.shortMaxM2 / input.pixelAreaM2);
  return Math.min(Math.max(3, 2 * Math.ceil(across / 2) + 3), input.columns, input.rows);
}

/**
 * Opens: patches at the floor, smaller than a terrace, that no raised flaw explains and whose surroundings carry at least 0.8 of a layer (and half
 * a decade) more than the floor. Floor pixels that touch a raised flaw belong to it and are returned apart.
 *
 * A patch that hangs together with as much ground at the floor as makes a terrace, or that has a good part of its border with it, is the edge of that terrace.
 *
 * Patches of fewer than `minPixels` could be noise of dim ground: they are open only where all of the up to eight neighbours of each of their
 * pixels that are not of the patch are measured and carry half a decade more than the floor. The floor lies three standard
 * deviations of the noise above zero, so noise would have to take 6.5 of them off (√10 − 1 times three) to make such a pixel. On
 * dimmer ground it stays with its surroundings.
 */
export function findOpens(input: SpotsInput): { opens: Uint8Array; belongToRaised: Uint8Array } {
  const { columns, rows, log10, raised, floor } = input;
  const dark = onlyFirst(floor, raised);
  const candidates = dark.slice();
  for (const explained of [input.onPlane, input.lost]) if (explained) takeMask(candidates, explained);
  const opens = new Uint8Array(log10.length);
  const belongToRaised = new Uint8Array(log10.length);
  const { labels, count, pixels } = labelComponents(candidates, columns, rows, 8);
  if (count === 0) return { opens, belongToRaised };
  const members = pixelsOf(candidates);
  const nearest = nearestAdmitted(onlyFirst(knownOutside(raised, log10), floor), columns, rows);
  const sum = new Float64Array(count + 1);
  const touches = new Uint8Array(count + 1);
  for (const i of members) {
    const label = labels[i]!;
    if (nearest[i]! >= 0) sum[label]! += log10[nearest[i]!]! - log10[i]!;
    if (touchesMask(raised, columns, rows, i)) touches[label] = 1;
  }
  const ofTerrace = edgesOfTerraces(labels, members, count, dark, input);
  const dim = new Uint8Array(count + 1);
  for (const i of members) if (pixels[labels[i]!]! < input.minPixels && !brightAround(log10, labels, columns, rows, i)) dim[labels[i]!] = 1;
  const least = Math.max(0.5, 0.8 * input.layerDecades);
  for (const i of members) {
    const label = labels[i]!;
    if (pixels[label]! * input.pixelAreaM2 >= input.terraceMinM2 || sum[label]! / pixels[label]! < least) continue;
    if (touches[label] === 1) belongToRaised[i] = 1;
    else if (dim[label] === 0 && ofTerrace[label] === 0) opens[i] = 1;
  }
  return { opens, belongToRaised };
}

/** By patch: 1 where it is a piece of a larger dark ground. */
function edgesOfTerraces(labels: Uint32Array, members: Int32Array, count: number, dark: Uint8Array, { columns, rows, pixelAreaM2, terraceMinM2 }: SpotsInput): Uint8Array {
  const grounds = labelComponents(dark, columns, rows, 8);
  const [border, beside] = [new Float64Array(count + 1), new Float64Array(count + 1)];
  const edge = new Uint8Array(count + 1);
  for (const i of members) if (grounds.pixels[grounds.labels[i]!]! * pixelAreaM2 >= terraceMinM2) edge[labels[i]!] = 1;
  countBorders(labels, members, columns, dark, border, beside);
  for (let n = 1; n <= count; n++) if (beside[n]! > darkBorder * border[n]!) edge[n] = 1;
  return edge;
}

/** Counts by label the edges of pixels on its border, and those of them along a mask. */
function countBorders(labels: Uint32Array, members: Int32Array, columns: number, mask: Uint8Array, border: Float64Array, along: Float64Array): void {
  for (const i of members) {
    const label = labels[i]!;
    const c = i % columns;
    if (c > 0) countEdge(labels, label, i - 1, mask, border, along);
    if (c + 1 < columns) countEdge(labels, label, i + 1, mask, border, along);
    if (i >= columns) countEdge(labels, label, i - columns, mask, border, along);
    if (i + columns < labels.length) countEdge(labels, label, i + columns, mask, border, along);
  }
}

function countEdge(labels: Uint32Array, label: number, beside: number, mask: Uint8Array, border: Float64Array, along: Float64Array): void {
  if (labels[beside] === label) return;
  border[label]!++;
  along[label]! += mask[beside]!;
}

function touchesMask(mask: Uint8Array, columns: number, rows: number, i: number): boolean {
  const c = i % columns;
  const r = (i - c) / columns;
  return (c > 0 && mask[i - 1] === 1) || (c + 1 < columns && mask[i + 1] === 1) || (r > 0 && mask[i - columns] === 1) || (r + 1 < rows && mask[i + columns] === 1);
}

/** Whether all neighbours (8) of a pixel that are not of its own patch are measured and half a decade above it. */
function brightAround(log10: Float32Array, labels: Uint32Array, columns: number, rows: number, i: number): boolean {
  const c = i % columns;
  const r = (i - c) / columns;
  for (let y = Math.max(0, r - 1); y <= Math.min(rows - 1, r + 1); y++) {
    for (let x = Math.max(0, c - 1); x <= Math.min(columns - 1, c + 1); x++) {
      const k = y * columns + x;
      if (labels[k] !== labels[i] && !(log10[k]! - log10[i]! >= brightDecades)) return false;
    }
  }
  return true;
}
