/** Maps as small pictures: one palette entry per pixel, ready for PNG or for a canvas. */
import { encode } from 'fast-png';
import { appearanceByCode, hatchPeriod, isHatchInk } from './appearance.ts';
import { base64 } from './base64.ts';
import { cividis, cividisLength } from './cividis.ts';

export interface Picture {
  readonly width: number;
  readonly height: number;
  /** Row-major, row 0 at the top; an index into the palette per pixel. */
  readonly indices: Uint8Array;
  readonly palette: readonly (readonly [red: number, green: number, blue: number])[];
}

export interface Extent {
  readonly columns: number;
  readonly rows: number;
}

/** A PNG palette has 256 places: 255 levels of the colour scale and one for missing values. */
const levels = 255;
const missingIndex = levels;
export const missingColour = [226, 230, 233] as const;
const largestPicture = 1024;
/** A figure is half a page wide: more pixels than this are not seen, and the maps themselves lie beside the report as GeoTIFF. */
const largestValuePicture = 768;
const smallestCausePicture = 640;

/**
 * Values in cividis between `low` and `high` (clipped outside), missing ones in light grey. Maps larger
 * than 768 pixels on a side are reduced by a whole number: each pixel is the mean of the values present in its box.
 */
export function valuePicture(values: Float32Array, extent: Extent, low: number, high: number): Picture {
  const width = Math.ceil(extent.columns / Math.ceil(extent.columns / largestValuePicture));
  const height = Math.ceil(extent.rows / Math.ceil(extent.rows / largestValuePicture));
  const whole = width === extent.columns && height === extent.rows;
  const indices = indicesOf(whole ? values : meanInBoxes(values, extent, width, height), low, high > low ? high - low : 1);
  const ramp = Array.from({ length: levels }, (_, level) => cividis(Math.round((level / (levels - 1)) * (cividisLength - 1))));
  return { width, height, indices, palette: [...ramp, missingColour] };
}

/** Place in the palette of every value. */
function indicesOf(values: Float32Array | Float64Array, low: number, span: number): Uint8Array {
  const indices = new Uint8Array(values.length);
  for (let i = 0; i < indices.length; i++) {
    const share = (values[i]! - low) / span;
    indices[i] = share !== share ? missingIndex : Math.round(Math.min(1, Math.max(0, share)) * (levels - 1));
  }
  return indices;
}

/**
 * Cause codes in their colours and hatches. `aspect` is the map's width over its height on the sample; the
 * picture has that shape, its longer side between 640 and 1024 pixels whatever the map's, so that hatches
 * keep their size. Where it is coarser than the map each pixel shows the most common cause of its box.
 */
export function causePicture(codes: Uint8Array, extent: Extent, aspect: number): Picture {
  const longer = Math.min(largestPicture, Math.max(smallestCausePicture, extent.columns, extent.rows));
  const width = Math.max(1, Math.round(aspect >= 1 ? longer : longer * aspect));
  const height = Math.max(1, Math.round(aspect >= 1 ? longer / aspect : longer));
  const common = modeInBoxes(codes, extent, width, height);
  const indices = new Uint8Array(width * height);
  const ink = hatchTable();
  for (let y = 0; y < height; y++) hatchRow(common, y * width, width, ink, (y % hatchPeriod) * hatchPeriod, indices);
  return { width, height, indices, palette: appearanceByCode.flatMap(({ fill, ink }) => [rgb(fill), rgb(ink)]) };
}

/** 1 where the hatch's line lies: by code, then row and column within a period. */
function hatchTable(): Uint8Array {
  const period = hatchPeriod * hatchPeriod;
  return Uint8Array.from({ length: appearanceByCode.length * period }, (_, at) => {
    const { hatch } = appearanceByCode[Math.floor(at / period)]!;
    return isHatchInk(hatch, at % hatchPeriod, Math.floor((at % period) / hatchPeriod)) ? 1 : 0;
  });
}

function hatchRow(codes: Uint8Array, start: number, width: number, ink: Uint8Array, row: number, indices: Uint8Array): void {
  const period = hatchPeriod * hatchPeriod;
  for (let x = 0; x < width; x++) {
    const code = codes[start + x]!;
    indices[start + x] = code * 2 + ink[code * period + row + (x % hatchPeriod)]!;
  }
}

/** A one-line picture of the colour scale, low on the left. */
export function scalePicture(): Picture {
  return valuePicture(Float32Array.from({ length: levels }, (_, level) => level), { columns: levels, rows: 1 }, 0, levels - 1);
}

/** Red, green, blue, alpha per pixel, opaque. */
export function rgbaOf({ indices, palette }: Picture): Uint8ClampedArray {
  const rgba = new Uint8ClampedArray(indices.length * 4);
  indices.forEach((index, pixel) => rgba.set([...(palette[index] ?? missingColour), 255], pixel * 4));
  return rgba;
}

/** The picture as an indexed-colour PNG inside a `data:` address. */
export function pngAddress({ width, height, indices, palette }: Picture): string {
  const png = encode(
    { width, height, data: indices, channels: 1, depth: 8, palette: palette.map((colour) => [...colour]) },
    // Levels above 3 take several times as long for a tenth less.
    { zlib: { level: 1 } },
  );
  return `data:image/png;base64,${base64(png)}`;
}

/** First source index of each of `count` boxes over `length` pixels, and one past the last; never empty, also when count > length. */
function boxEdges(length: number, count: number): { from: Int32Array; to: Int32Array } {
  const from = Int32Array.from({ length: count }, (_, box) => Math.floor((box * length) / count));
  const to = from.map((start, box) => Math.max(start + 1, Math.floor(((box + 1) * length) / count)));
  return { from, to };
}

function meanInBoxes(values: Float32Array, extent: Extent, width: number, height: number): Float64Array {
  const across = boxEdges(extent.columns, width);
  const down = boxEdges(extent.rows, height);
  const means = new Float64Array(width * height);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      let sum = 0;
      let count = 0;
      for (let row = down.from[y] ?? 0; row < (down.to[y] ?? 0); row++) {
        for (let column = across.from[x] ?? 0; column < (across.to[x] ?? 0); column++) {
          const value = values[row * extent.columns + column] ?? Number.NaN;
          if (Number.isNaN(value)) continue;
          sum += value;
          count++;
        }
      }
      means[y * width + x] = count > 0 ? sum / count : Number.NaN;
    }
  }
  return means;
}

/** Ties go to the lower code. */
function modeInBoxes(codes: Uint8Array, extent: Extent, width: number, height: number): Uint8Array {
  const across = boxEdges(extent.columns, width);
  const down = boxEdges(extent.rows, height);
  const modes = new Uint8Array(width * height);
  const counts = new Uint32Array(appearanceByCode.length);
  // Where no box holds more than one pixel there is nothing to count.
  const one = width >= extent.columns && height >= extent.rows;
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      if (one) {
        modes[y * width + x] = codes[down.from[y]! * extent.columns + across.from[x]!]!;
        continue;
      }
      counts.fill(0);
      for (let row = down.from[y] ?? 0; row < (down.to[y] ?? 0); row++) {
        for (let column = across.from[x] ?? 0; column < (across.to[x] ?? 0); column++) {
          const code = codes[row * extent.columns + column] ?? 0;
          counts[code] = (counts[code] ?? 0) + 1;
        }
      }
      let most = 0;
      for (let code = 1; code < counts.length; code++) if (counts[code]! > counts[most]!) most = code;
      modes[y * width + x] = most;
    }
  }
  return modes;
}

function rgb(hex: string): [number, number, number] {
  const channel = (offset: number): number => Number.parseInt(hex.slice(offset, offset + 2), 16);
  return [channel(1), channel(3), channel(5)];
}
