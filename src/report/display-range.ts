/** From which value to which a picture spends its colours, and where its scale is labelled. */
import { niceBelow } from './numbers.ts';

export interface DisplayRange {
  readonly low: number;
  readonly high: number;
  /** Whether values lie below `low` or above `high` and are drawn in the end colours. */
  readonly clipsLow: boolean;
  readonly clipsHigh: boolean;
  readonly missingPixels: number;
}

const sampleSize = 65536;
const clippedShare = 0.005;

/**
 * The range that leaves half a per cent of the values outside on each side, from at most 65 536 evenly
 * spread ones; NaN and infinite values are skipped. Undefined when there is no value at all.
 */
export function displayRange(values: Float32Array): DisplayRange | undefined {
  const { least, most, missingPixels } = extremes(values);
  if (missingPixels === values.length) return undefined;
  const sorted = evenlySpread(values).sort();
  const low = sorted[Math.floor(clippedShare * (sorted.length - 1))] ?? least;
  const high = sorted[Math.ceil((1 - clippedShare) * (sorted.length - 1))] ?? most;
  return { low, high, clipsLow: least < low, clipsHigh: most > high, missingPixels };
}

function extremes(values: Float32Array): { least: number; most: number; missingPixels: number } {
  let least = Infinity;
  let most = -Infinity;
  let missingPixels = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    // Neither a missing nor an infinite value less itself is 0.
    if (value - value !== 0) missingPixels++;
    else {
      if (value < least) least = value;
      if (value > most) most = value;
    }
  }
  return { least, most, missingPixels };
}

function evenlySpread(values: Float32Array): Float64Array {
  // An odd stride does not fall in step with the usual even line lengths.
  const stride = Math.ceil(values.length / sampleSize) | 1;
  const kept = new Float64Array(Math.ceil(values.length / stride));
  let count = 0;
  for (let i = 0; i < values.length; i += stride) if (Number.isFinite(values[i]!)) kept[count++] = values[i]!;
  return kept.subarray(0, count);
}

/** Round numbers from `low` to `high`, three to eight of them; the value itself when the range is empty. */
export function linearTicks(low: number, high: number): number[] {
  if (!(high > low)) return [low];
  const step = niceBelow((high - low) / 3);
  const first = Math.ceil(low / step - 1e-9);
  const last = Math.floor(high / step + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, index) => Number(((first + index) * step).toPrecision(9)));
}

/** Whole decades between `low` and `high` (both log10), thinned to at most eight; under one and a half decades also 2 and 5 of each. */
export function decadeTicks(low: number, high: number): number[] {
  const leads = high - low < 1.5 ? [1, 2, 5] : [1];
  const decades = Math.floor(high) - Math.floor(low) + 1;
  const every = Math.ceil(decades / 8);
  const ticks: number[] = [];
  for (let decade = Math.floor(low); decade <= Math.floor(high); decade += every) {
    for (const lead of leads) {
      const tick = decade + Math.log10(lead);
      if (tick >= low - 1e-9 && tick <= high + 1e-9) ticks.push(tick);
    }
  }
  return ticks.length > 0 ? ticks : [low, high];
}
