import { withKernels } from './installed.ts';

/** Map columns or rows under each column or row of the picture, ends exclusive. */
export interface Spans {
  readonly from: Int32Array;
  readonly to: Int32Array;
}

export interface LinearColours {
  /** What a value is multiplied by before it is coloured. */
  readonly factor: number;
  /** Where the scale begins, and its entries per unit. */
  readonly from: number;
  readonly perUnit: number;
  /** 256 × red, green, blue. */
  readonly scale: Uint8Array;
  readonly missing: readonly [red: number, green: number, blue: number];
}

/**
 * Red, green, blue, alpha per picture pixel: the colour of the mean of the values under it, transparent beside the map. Undefined where no kernel can.
 */
export function colouredMap(data: Float32Array, columns: number, across: Spans, down: Spans, colours: LinearColours): Uint8ClampedArray<ArrayBuffer> | undefined {
  const width = across.from.length;
  const height = down.from.length;
  // Only the rows that are looked at are copied.
  const firstRow = down.from.reduce((least, row) => Math.min(least, row), data.length);
  const endRow = down.to.reduce((most, row) => Math.max(most, row), firstRow);
  const part = data.subarray(firstRow * columns, endRow * columns);
  const sizes = [4 * part.length, 4 * width, 4 * width, 4 * height, 4 * height, 4 * 256, 4 * width * height];
  return withKernels(sizes, (kernels, [at, leftAt, rightAt, topAt, bottomAt, paletteAt, rgbaAt]) => {
    const { buffer } = kernels.memory;
    new Float32Array(buffer, at, part.length).set(part);
    new Int32Array(buffer, leftAt, width).set(across.from);
    new Int32Array(buffer, rightAt, width).set(across.to);
    new Int32Array(buffer, topAt, height).set(down.from.map((row) => row - firstRow));
    new Int32Array(buffer, bottomAt, height).set(down.to.map((row) => row - firstRow));
    const palette = new Uint8Array(buffer, paletteAt, 4 * 256).fill(255);
    for (let entry = 0; entry < 256; entry++) for (let k = 0; k < 3; k++) palette[4 * entry + k] = colours.scale[3 * entry + k]!;
    const [red, green, blue] = colours.missing;
    // Little-endian, as all memory of kernels: red is the lowest byte.
    const missing = (red | (green << 8) | (blue << 16) | (255 << 24)) >>> 0;
    kernels.colourMap(at!, columns, width, height, leftAt!, rightAt!, topAt!, bottomAt!, colours.factor, colours.from, colours.perUnit, paletteAt!, missing, rgbaAt!);
    return new Uint8ClampedArray(buffer, rgbaAt, 4 * width * height).slice();
  });
}
