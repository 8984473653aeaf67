/** Stretches of flat ground: each lies on one plane, whichever that is. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import type { Components } from '../grid/label-components.ts';

/** Half-width of the square over which the height is averaged before it is called flat, pixels. */
const smoothPx = 2;
/** Flat ground is compared between places this far to either side of a pixel, so that a border parts it in a band several pixels wide. */
const asidePx = 3;
/** It changes by less than this part of a layer in between; the step of one layer and the flank of a feature change by more. */
const flatPart = 0.6;
/** Half-width of a throat too narrow to hold two parts of a terrace together, pixels. */
const throatPx = 1.5;
/** Ground is looked for in this range around the most common height, metres: nine layers down, twelve up. */
const range = { lowM: -3e-9, highM: 4e-9 } as const;

/**
 * Connected (4) stretches of flat ground, on which a 5 × 5 mean changes by less than 0.6 of a layer over six pixels in both directions. A border between two terraces
 * parts them.
 *
 * @param rest metres, roughly levelled, most common height near 0; NaN missing.
 * @param every the columns are every so many-th of a map: along the lines everything spans as much fewer of them.
 */
export function flatSegments(rest: Float32Array, columns: number, rows: number, layerM: number, every = 1): Components {
  const smooth = boxMean(rest, columns, rows, smoothPx, fewer(smoothPx, every));
  const flat = flatPlaces(smooth, columns, rows, flatPart * layerM, fewer(asidePx, every));
  for (let i = 0; i < flat.length; i++) if (!(smooth[i]! > range.lowM && smooth[i]! < range.highM)) flat[i] = 0;
  return labelComponents(flat, columns, rows, 4);
}

/**
 * The same where neither the height nor the log current shows a border: each stretch is one terrace, whichever.
 *
 * @param height metres, NaN missing; @param log10 log10 of the current, NaN missing; @param use 1 on flawless ground.
 * @param layerM height of one layer; @param layerDecades what it costs.
 */
export function terraceSegments(height: Float32Array, log10: Float32Array, use: Uint8Array, columns: number, rows: number, layerM: number, layerDecades: number): Components {
  // What a flaw shows beside the ground must not blur the ground's own border.
  const flat = flatPlaces(boxMean(only(height, use), columns, rows, smoothPx), columns, rows, flatPart * layerM);
  const even = flatPlaces(boxMean(only(log10, use), columns, rows, smoothPx), columns, rows, flatPart * layerDecades);
  for (let i = 0; i < flat.length; i++) flat[i] = flat[i]! & even[i]! & use[i]!;
  // Stretches hang together by more than a pixel or two.
  const inside = squaredDistance(flat, columns, rows, {});
  for (let i = 0; i < flat.length; i++) flat[i] = inside[i]! > throatPx ** 2 ? 1 : 0;
  return labelComponents(flat, columns, rows, 4);
}

/** A distance over columns of which only every so many-th is there. */
export function fewer(px: number, every: number): number {
  return Math.max(1, Math.round(px / every));
}

function only(map: Float32Array, use: Uint8Array): Float32Array {
  const out = map.slice();
  for (let i = 0; i < out.length; i++) if (use[i] !== 1) out[i] = Number.NaN;
  return out;
}

/** 1 where a smoothed map does not change by `least` or more between the places to either side, along both axes. */
function flatPlaces(smooth: Float32Array, columns: number, rows: number, least: number, asideColumns = asidePx): Uint8Array {
  const flat = new Uint8Array(smooth.length);
  const left = Int32Array.from({ length: columns }, (_, c) => Math.max(0, c - asideColumns));
  const right = Int32Array.from({ length: columns }, (_, c) => Math.min(columns - 1, c + asideColumns));
  for (let r = 0; r < rows; r++) {
    markFlat(smooth, r * columns, Math.max(0, r - asidePx) * columns, Math.min(rows - 1, r + asidePx) * columns, left, right, least, flat);
  }
  return flat;
}

function markFlat(smooth: Float32Array, start: number, up: number, down: number, left: Int32Array, right: Int32Array, least: number, flat: Uint8Array): void {
  for (let c = 0; c < left.length; c++) {
    const own = smooth[start + c]!;
    // What is missing beside it says nothing against a place.
    if (own === own && !(Math.abs(smooth[start + right[c]!]! - smooth[start + left[c]!]!) >= least) && !(Math.abs(smooth[down + c]! - smooth[up + c]!) >= least)) flat[start + c] = 1;
  }
}

/** Mean of the finite values in a rectangle of half-height `half` and half-width `halfColumns` around each pixel, cut off at borders; NaN where there is none. */
export function boxMean(values: Float32Array, columns: number, rows: number, half: number, halfColumns = half): Float32Array {
  const columnSums = new Float64Array(columns);
  const columnCounts = new Int32Array(columns);
  // Sums over the columns before each.
  const sums = new Float64Array(columns + 1);
  const counts = new Int32Array(columns + 1);
  const out = new Float32Array(values.length);
  for (let r = 0; r < Math.min(half, rows); r++) addRow(values, r * columns, columnSums, columnCounts);
  for (let r = 0; r < rows; r++) {
    if (r + half < rows) addRow(values, (r + half) * columns, columnSums, columnCounts);
    if (r - half > 0) dropRow(values, (r - half - 1) * columns, columnSums, columnCounts);
    addUp(columnSums, columnCounts, sums, counts);
    writeMeans(sums, counts, halfColumns, out.subarray(r * columns, (r + 1) * columns));
  }
  return out;
}

function addRow(values: Float32Array, start: number, sums: Float64Array, counts: Int32Array): void {
  for (let c = 0; c < sums.length; c++) {
    const value = values[start + c]!;
    if (value !== value) continue;
    sums[c]! += value;
    counts[c]!++;
  }
}

function dropRow(values: Float32Array, start: number, sums: Float64Array, counts: Int32Array): void {
  for (let c = 0; c < sums.length; c++) {
    const value = values[start + c]!;
    if (value !== value) continue;
    sums[c]! -= value;
    counts[c]!--;
  }
}

function addUp(columnSums: Float64Array, columnCounts: Int32Array, sums: Float64Array, counts: Int32Array): void {
  let sum = 0;
  let count = 0;
  for (let c = 0; c < columnSums.length; c++) {
    sum += columnSums[c]!;
    count += columnCounts[c]!;
    sums[c + 1] = sum;
    counts[c + 1] = count;
  }
}

function writeMeans(sums: Float64Array, counts: Int32Array, half: number, row: Float32Array): void {
  for (let c = 0; c < row.length; c++) {
    const left = Math.max(0, c - half);
    const right = Math.min(row.length, c + half + 1);
    row[c] = (sums[right]! - sums[left]!) / (counts[right]! - counts[left]!);
  }
}
