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
 */
export function flatSegments(rest: Float32Array, columns: number, rows: number, layerM: number): Components {
  const smooth = boxMean(rest, columns, rows, smoothPx);
  const flat = flatPlaces(smooth, columns, rows, flatPart * layerM);
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
  const only = (map: Float32Array): Float32Array => map.map((value, i) => (use[i] === 1 ? value : Number.NaN));
  const flat = flatPlaces(boxMean(only(height), columns, rows, smoothPx), columns, rows, flatPart * layerM);
  const even = flatPlaces(boxMean(only(log10), columns, rows, smoothPx), columns, rows, flatPart * layerDecades);
  for (let i = 0; i < flat.length; i++) flat[i] = flat[i]! & even[i]! & use[i]!;
  // Stretches hang together by more than a pixel or two.
  const inside = squaredDistance(flat, columns, rows, {});
  for (let i = 0; i < flat.length; i++) flat[i] = inside[i]! > throatPx ** 2 ? 1 : 0;
  return labelComponents(flat, columns, rows, 4);
}

/** 1 where a smoothed map does not change by `least` or more between the places to either side, along both axes. */
function flatPlaces(smooth: Float32Array, columns: number, rows: number, least: number): Uint8Array {
  const flat = new Uint8Array(smooth.length);
  for (let r = 0, i = 0; r < rows; r++) {
    const up = Math.max(0, r - asidePx) * columns;
    const down = Math.min(rows - 1, r + asidePx) * columns;
    for (let c = 0; c < columns; c++, i++) {
      const along = Math.abs(smooth[i - c + Math.min(columns - 1, c + asidePx)]! - smooth[i - c + Math.max(0, c - asidePx)]!);
      // What is missing beside it says nothing against a place.
      if (smooth[i] === smooth[i] && !(along >= least) && !(Math.abs(smooth[down + c]! - smooth[up + c]!) >= least)) flat[i] = 1;
    }
  }
  return flat;
}

/** Mean of the finite values in a square of half-width `half` around each pixel, cut off at borders; NaN where there is none. */
export function boxMean(values: Float32Array, columns: number, rows: number, half: number): Float32Array {
  const sums = new Float64Array(columns + 1);
  const counts = new Int32Array(columns + 1);
  const columnSums = new Float64Array(columns);
  const columnCounts = new Int32Array(columns);
  const out = new Float32Array(values.length);
  const take = (r: number, sign: 1 | -1): void => {
    for (let c = 0, i = r * columns; c < columns; c++, i++) {
      const value = values[i]!;
      if (value !== value) continue;
      columnSums[c]! += sign * value;
      columnCounts[c]! += sign;
    }
  };
  for (let r = 0; r < Math.min(half, rows); r++) take(r, 1);
  for (let r = 0; r < rows; r++) {
    if (r + half < rows) take(r + half, 1);
    if (r - half > 0) take(r - half - 1, -1);
    for (let c = 0; c < columns; c++) {
      sums[c + 1] = sums[c]! + columnSums[c]!;
      counts[c + 1] = counts[c]! + columnCounts[c]!;
    }
    for (let c = 0; c < columns; c++) {
      const left = Math.max(0, c - half);
      const right = Math.min(columns, c + half + 1);
      out[r * columns + c] = (sums[right]! - sums[left]!) / (counts[right]! - counts[left]!);
    }
  }
  return out;
}
