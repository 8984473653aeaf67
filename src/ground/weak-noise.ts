import { madScale } from '../stats/mad.ts';
import { medianInPlace } from '../stats/median.ts';
import { thinned } from './zero-peak.ts';

/** Robust noise between horizontal neighbours on the weakest tenth of the map, for a map that shows no zero current; 0 where there is none. */
export function weakNoise(values: Float32Array, columns: number): number {
  const sorted = thinned(values, () => true).map(Math.abs).sort();
  const limit = sorted[Math.floor(sorted.length / 10)] ?? Number.NaN;
  const differences: number[] = [];
  for (let i = 1; i < values.length; i++) {
    if (i % columns !== 0 && Math.abs(values[i]!) <= limit && Math.abs(values[i - 1]!) <= limit) differences.push(Math.abs(values[i]! - values[i - 1]!));
  }
  const buffer = Float64Array.from(differences);
  const noise = (madScale * medianInPlace(buffer, buffer.length)) / Math.SQRT2;
  return Number.isNaN(noise) ? 0 : noise;
}
