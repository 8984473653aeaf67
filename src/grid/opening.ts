import { openedMap } from '../kernels/grey-opening.ts';

/**
 * Grey opening by a square: removes bright structure narrower than the square and keeps the rest. Running minima and maxima by
 * van Herk (Pattern Recognit. Lett. 13, 517, 1992) and Gil & Werman (IEEE Trans. PAMI 15, 504, 1993), three comparisons a pixel
 * whatever the width. Computed by the kernel where one is installed, with the same result.
 *
 * @param values row-major without NaN (fill them before); borders: the square is cut off at the picture's edge.
 * @param widthX, widthY full widths in pixels, made odd by rounding up.
 */
export function greyOpening(values: Float32Array, columns: number, rows: number, widthX: number, widthY: number): Float32Array {
  const halfX = widthX >> 1;
  const halfY = widthY >> 1;
  return openedMap(values, columns, rows, halfX, halfY) ?? openedPlainly(values, columns, rows, halfX, halfY);
}

/** The same in plain TypeScript. */
function openedPlainly(values: Float32Array, columns: number, rows: number, halfX: number, halfY: number): Float32Array {
  const low = sweep(values, columns, rows, halfX, halfY, -1);
  return sweep(low, columns, rows, halfX, halfY, 1);
}

/** Running maximum (sign 1) or minimum (sign −1) over a square. */
function sweep(values: Float32Array, columns: number, rows: number, halfX: number, halfY: number, sign: 1 | -1): Float32Array {
  const across = new Float32Array(values.length);
  const buffers = createBuffers(Math.max(columns, rows), Math.max(halfX, halfY));
  for (let r = 0; r < rows; r++) runningMaximum(values, across, r * columns, 1, columns, halfX, sign, buffers);
  const out = new Float32Array(values.length);
  for (let c = 0; c < columns; c++) runningMaximum(across, out, c, columns, rows, halfY, sign, buffers);
  return out;
}

interface Buffers {
  readonly padded: Float32Array;
  readonly forward: Float32Array;
  readonly backward: Float32Array;
}

function createBuffers(length: number, half: number): Buffers {
  const size = length + 4 * half + 2;
  return { padded: new Float32Array(size), forward: new Float32Array(size), backward: new Float32Array(size) };
}

function runningMaximum(from: Float32Array, to: Float32Array, start: number, stride: number, n: number, half: number, sign: 1 | -1, buffers: Buffers): void {
  const { padded, forward, backward } = buffers;
  const window = 2 * half + 1;
  const size = Math.ceil((n + 2 * half) / window) * window;
  padded.fill(Number.NEGATIVE_INFINITY, 0, half);
  padded.fill(Number.NEGATIVE_INFINITY, half + n, size);
  for (let i = 0; i < n; i++) padded[half + i] = sign * from[start + i * stride]!;
  for (let i = 0; i < size; i++) forward[i] = i % window === 0 ? padded[i]! : Math.max(forward[i - 1]!, padded[i]!);
  for (let i = size - 1; i >= 0; i--) backward[i] = i % window === window - 1 ? padded[i]! : Math.max(backward[i + 1]!, padded[i]!);
  for (let i = 0; i < n; i++) to[start + i * stride] = sign * Math.max(backward[i]!, forward[i + window - 1]!);
}
