/** Values in SI from values in the file's unit, with the checks that every channel must pass. */
import { Problem } from '../problems/problem.ts';
import type { Values } from './decoded-map.ts';
import type { Quantity } from './sample.ts';
import { siFactor } from './units.ts';
import type { KnownUnit } from './units.ts';

/** A surface is rougher than this (1 pm, peak to valley); a smaller span means a wrong unit. */
const leastSpanM = 1e-12;

/**
 * A new array in SI (metres, amperes, or the file's own unit for relative currents) times `sign`.
 * NaN and ±Infinity become NaN, as does what single precision cannot hold.
 * Throws `channel-missing`, `map-constant` and, for heights, `map-flat`.
 */
export function toSi(source: string, quantity: Quantity, values: Values, unit: KnownUnit, sign: 1 | -1): Float32Array {
  const factor = siFactor(unit) * sign;
  const out = new Float32Array(values.length);
  let least = Infinity;
  let most = -Infinity;
  for (let i = 0; i < out.length; i++) {
    const value = values[i]! * factor;
    out[i] = value;
    const stored = out[i]!;
    // NaN fails this comparison too.
    if (!(stored > -Infinity && stored < Infinity)) {
      out[i] = Number.NaN;
      continue;
    }
    if (value < least) least = value;
    if (value > most) most = value;
  }
  if (least > most) throw new Problem('channel-missing', { file: source });
  if (least === most) throw new Problem('map-constant', { file: source, quantity, value: `${short(least / factor)} ${unit.unit}` });
  if (quantity === 'height' && most - least < leastSpanM) throw new Problem('map-flat', { file: source, spanPm: short((most - least) * 1e12) });
  return out;
}

function short(value: number): string {
  return String(Number(value.toPrecision(4)));
}
