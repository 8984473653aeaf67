/** A fixed piece of work in plain TypeScript. Times over it can be compared between machines; absolute times cannot. */
import { seededRandom } from '../../src/stats/random.ts';

/** Input and output of the reference, made once and reused so that no allocation is timed. */
export interface ReferenceData {
  readonly values: Float32Array;
  readonly result: Float32Array;
}

/** As many values as a map has pixels, the same ones every time. */
export function referenceData(pixels: number): ReferenceData {
  const random = seededRandom('reference');
  return { values: Float32Array.from({ length: pixels }, () => random.uniform()), result: new Float32Array(pixels) };
}

/**
 * Three passes over the values: mean, standard deviation, and the root of each value's distance from the mean in standard deviations. Changing this
 * function makes all ratios printed before worthless, so it stays as it is.
 *
 * @returns the sum of the roots, so that no pass can be left out.
 */
export function referenceWork({ values, result }: ReferenceData): number {
  const count = values.length;
  let sum = 0;
  for (let i = 0; i < count; i++) sum += values[i]!;
  const mean = sum / count;
  let squares = 0;
  for (let i = 0; i < count; i++) {
    const difference = values[i]! - mean;
    squares += difference * difference;
  }
  const deviation = Math.sqrt(squares / count);
  let total = 0;
  for (let i = 0; i < count; i++) {
    const root = Math.sqrt(Math.abs(values[i]! - mean) / deviation);
    result[i] = root;
    total += root;
  }
  return total;
}
