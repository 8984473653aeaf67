import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import type { Channel } from '../read/sample.ts';

/**
 * Current (not a copy where nothing has to be turned) times the sign that makes real currents positive: the bias's, or the current's own where no bias is known. Where nearly all readings
 * of some size oppose the bias, the amplifier inverts, as many do: then the current's own sign is taken and a remark says so.
 */
export function turnedUp(channel: Channel): { values: Float32Array; sign: 1 | -1; warnings: Notice[] } {
  const values = channel.values.data;
  let largest = 0;
  for (const value of values) if (Math.abs(value) > largest) largest = Math.abs(value);
  let up = 0;
  let down = 0;
  for (const value of values) {
    if (value > largest / 100) up++;
    else if (value < -largest / 100) down++;
  }
  const own = down > up ? -1 : 1;
  const biasSign = channel.biasV === undefined || channel.biasV === 0 ? undefined : channel.biasV < 0 ? -1 : 1;
  const inverted = biasSign !== undefined && biasSign !== own && (own === 1 ? up : down) >= 0.95 * (up + down) && up + down > 0;
  const sign = inverted || biasSign === undefined ? own : biasSign;
  return { values: sign === 1 ? values : values.map((value) => -value), sign, warnings: inverted ? [notice('current-inverted', { biasV: channel.biasV! })] : [] };
}
