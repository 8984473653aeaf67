/**
 * Lists of a mask's pixels, and single passes over masks of 0 and 1. Flawed ground is a tenth of most maps, so that what looks at it again and again goes by a list.
 *
 * Most passes of this stage run once, before the engine has optimised them: each loop is a short function of its own, which is compiled sooner than a long one, and masks
 * are read four pixels at a time where that is possible.
 */

/** Indices of the pixels at 1, in raster order. */
export function pixelsOf(mask: Uint8Array): Int32Array {
  // Room that is never written to costs nothing.
  const found = new Int32Array(mask.length);
  const fours = inFours(mask);
  let count = 0;
  for (let k = 0; k < fours.length; k++) {
    if (fours[k] === 0) continue;
    for (let i = 4 * k; i < 4 * k + 4; i++) if (mask[i] === 1) found[count++] = i;
  }
  for (let i = 4 * fours.length; i < mask.length; i++) if (mask[i] === 1) found[count++] = i;
  return found.slice(0, count);
}

/** A mask as whole numbers of four pixels each, up to three left over at its end; none where it does not lie on such a boundary. */
function inFours(mask: Uint8Array): Uint32Array {
  return new Uint32Array(mask.buffer, mask.byteOffset & ~3, mask.byteOffset % 4 === 0 ? mask.length >> 2 : 0);
}

function labelledPixels(labels: Uint32Array): Int32Array {
  const found = new Int32Array(labels.length);
  let count = 0;
  for (let i = 0; i < labels.length; i++) if (labels[i] !== 0) found[count++] = i;
  return found.slice(0, count);
}

/**
 * By label the indices of its pixels in raster order, entry 0 empty. The lists are parts of one buffer.
 *
 * @param pixels holds all labelled pixels in raster order; sought where it is not given.
 */
export function membersOf(labels: Uint32Array, count: number, pixels: Int32Array = labelledPixels(labels)): Int32Array[] {
  const ends = endsOf(labels, pixels, count);
  const sorted = new Int32Array(ends[count]!);
  sortByLabel(labels, pixels, ends, sorted);
  const lists: Int32Array[] = [];
  for (let label = 0; label <= count; label++) lists.push(sorted.subarray(label === 0 ? 0 : ends[label - 1], ends[label]));
  return lists;
}

/** By label the number of pixels of all labels from 1 up to it. */
function endsOf(labels: Uint32Array, pixels: Int32Array, count: number): Uint32Array {
  const ends = new Uint32Array(count + 1);
  for (let n = 0; n < pixels.length; n++) ends[labels[pixels[n]!]!]!++;
  ends[0] = 0;
  for (let label = 1; label <= count; label++) ends[label]! += ends[label - 1]!;
  return ends;
}

function sortByLabel(labels: Uint32Array, pixels: Int32Array, ends: Uint32Array, sorted: Int32Array): void {
  const next = new Uint32Array(ends.length);
  next.set(ends.subarray(0, ends.length - 1), 1);
  for (let n = 0; n < pixels.length; n++) {
    const label = labels[pixels[n]!]!;
    if (label > 0) sorted[next[label]!++] = pixels[n]!;
  }
}

/** 1 where a map is higher than `least`. */
export function higherThan(values: Float32Array, least: number): Uint8Array {
  const higher = new Uint8Array(values.length);
  for (let i = 0; i < higher.length; i++) if (values[i]! > least) higher[i] = 1;
  return higher;
}

/** 1 where a map is known and a mask is 0. */
export function knownOutside(mask: Uint8Array, values: Float32Array): Uint8Array {
  const known = new Uint8Array(values.length);
  for (let i = 0; i < known.length; i++) if (values[i] === values[i] && mask[i] === 0) known[i] = 1;
  return known;
}

/** A mask of `length` pixels with 1 on those listed. */
export function maskOf(pixels: Int32Array, length: number): Uint8Array {
  const mask = new Uint8Array(length);
  for (let n = 0; n < pixels.length; n++) mask[pixels[n]!] = 1;
  return mask;
}

/** Sets `mask` to 1 where `other` is. */
export function addMask(mask: Uint8Array, other: Uint8Array): void {
  const [own, its] = [inFours(mask), inFours(other)];
  const fours = Math.min(own.length, its.length);
  for (let k = 0; k < fours; k++) own[k]! |= its[k]!;
  for (let i = 4 * fours; i < mask.length; i++) mask[i]! |= other[i]!;
}

/** Sets `mask` to 0 where `other` is 1. */
export function takeMask(mask: Uint8Array, other: Uint8Array): void {
  const [own, its] = [inFours(mask), inFours(other)];
  const fours = Math.min(own.length, its.length);
  for (let k = 0; k < fours; k++) own[k]! &= ~its[k]!;
  for (let i = 4 * fours; i < mask.length; i++) mask[i]! &= ~other[i]!;
}

/** Sets `mask` to 0 where `other` is 0. */
export function keepBoth(mask: Uint8Array, other: Uint8Array): void {
  const [own, its] = [inFours(mask), inFours(other)];
  const fours = Math.min(own.length, its.length);
  for (let k = 0; k < fours; k++) own[k]! &= its[k]!;
  for (let i = 4 * fours; i < mask.length; i++) mask[i]! &= other[i]!;
}

/** 1 where both masks are. */
export function bothOf(a: Uint8Array, b: Uint8Array): Uint8Array {
  const both = a.slice();
  keepBoth(both, b);
  return both;
}

/** 1 where the first mask is and the second is not. */
export function onlyFirst(a: Uint8Array, b: Uint8Array): Uint8Array {
  const only = a.slice();
  takeMask(only, b);
  return only;
}

/** 1 where the mask is 0. */
export function inverse(mask: Uint8Array): Uint8Array {
  return onlyFirst(new Uint8Array(mask.length).fill(1), mask);
}

/** Number of pixels at 1. */
export function countOf(mask: Uint8Array): number {
  return pixelsOf(mask).length;
}
