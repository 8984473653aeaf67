import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import type { Channel } from '../read/sample.ts';

/**
 * Current (not a copy where nothing has to be turned) times the sign that makes real currents positive: the bias's, or the current's own where no bias is known. Where nearly all readings
 * of some size oppose the bias, the amplifier inverts, as many do: then the current's own sign is taken and a remark says so.
 */
export function turnedUp(channel: Channel): { values: Float32Array; sign: 1 | -1; warnings: Notice[] } {
  const values = channel.values.data;
  const { up, down } = countSigns(values, largestSize(values) / 100);
  const own = down > up ? -1 : 1;
  const biasSign = channel.biasV === undefined || channel.biasV === 0 ? undefined : channel.biasV < 0 ? -1 : 1;
  const inverted = biasSign !== undefined && biasSign !== own && (own === 1 ? up : down) >= 0.95 * (up + down) && up + down > 0;
  const sign = inverted || biasSign === undefined ? own : biasSign;
  return { values: sign === 1 ? values : negated(values), sign, warnings: inverted ? [notice('current-inverted', { biasV: channel.biasV! })] : [] };
}

function largestSize(values: Float32Array): number {
  let largest = 0;
  for (let i = 0; i < values.length; i++) if (Math.abs(values[i]!) > largest) largest = Math.abs(values[i]!);
  return largest;
}

/** Readings above `beyond`, and below its negative. */
function countSigns(values: Float32Array, beyond: number): { up: number; down: number } {
  let up = 0;
  let down = 0;
  for (let i = 0; i < values.length; i++) {
    if (values[i]! > beyond) up++;
    else if (values[i]! < -beyond) down++;
  }
  return { up, down };
}

function negated(values: Float32Array): Float32Array {
  const out = new Float32Array(values.length);
  for (let i = 0; i < out.length; i++) out[i] = -values[i]!;
  return out;
}
