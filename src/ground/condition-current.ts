import type { Grid } from '../grid/maps.ts';
import { maskMap, scalarMap } from '../grid/maps.ts';
import { Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { notice } from '../problems/problem.ts';
import type { Channel } from '../read/sample.ts';
import type { ScanSection } from '../read/recipe.ts';
import { fillFromNeighbours, markBrokenRuns } from './broken-runs.ts';
import type { CurrentGround, HeightGround } from './ground.ts';
import type { GroundSection } from './recipe.ts';
import { findSaturation } from './saturation.ts';
import { findWear, leastWearDecades } from './wear.ts';
import { findZeroCurrent } from './zero-current.ts';

/** Above this height over the ground nothing of a thin barrier's current is left, metres. */
const blockedAboveM = 4e-9;
/** Detection limit in standard deviations of the noise (three: one reading in 700 of pure noise lies above, common practice). */
const floorSigmas = 3;
/** A break of log current this large in decades, in units of the run rule's six sigmas. */
const runNoiseDecades = 0.05;
/** Neighbours of a broken run agree when they differ by less than this, decades. */
const agreeDecades = 0.3;

/**
 * Conditions a current map: turns it by the bias's sign, removes the offset, marks what is censored (saturated, floor), repairs broken
 * runs of one or two lines between agreeing neighbours, and undoes tip wear as a factor per line. A current is never
 * levelled like a height: only an offset and a factor are physical.
 *
 * @param channel current in A, or relative units; NaN missing.
 * @param height levelled height of the same grid, when there is one: tall features show the reading at zero current.
 * @throws Problem `current-saturated` when 99 % or more of the map is saturated.
 */
export function conditionCurrent(
  channel: Channel, grid: Grid, height: HeightGround | undefined, section: GroundSection, scan: ScanSection, slowUp: boolean,
): { current: CurrentGround; warnings: Notice[] } {
  const { columns, rows } = grid;
  const count = columns * rows;
  const warnings: Notice[] = [];
  const turned = turnedUp(channel, warnings);

  const levelled = height?.levelled.data;
  const tall = levelled && ((i: number) => levelled[i]! > blockedAboveM);
  const saturationA = scan.saturationA ?? findSaturation(turned);
  const zero = findZeroCurrent(turned, columns, { blocked: tall, saturation: saturationA });
  if (zero.from === 'assumed') warnings.push(notice('current-offset-assumed', {}));
  const saturationNet = saturationA === undefined ? Number.POSITIVE_INFINITY : saturationA * (1 - 1e-4) - zero.offset;
  const offsetFree = turned.map((value) => value - zero.offset);
  const floorA = scan.floorA ?? lowestFloor(floorSigmas * zero.noise, offsetFree);
  const [floorLog, saturationLog] = [Math.log10(floorA), Math.log10(saturationNet)];

  const log10 = new Float32Array(count);
  let saturatedPixels = 0;
  for (let i = 0; i < count; i++) {
    const value = offsetFree[i]!;
    log10[i] = Number.isNaN(value) ? Number.NaN : Math.log10(Math.min(Math.max(value, floorA), saturationNet));
    if (value >= saturationNet) saturatedPixels++;
  }
  if (saturatedPixels >= 0.99 * count) throw new Problem('current-saturated', { file: channel.source, share: saturatedPixels / count });

  let repaired: Uint8Array = new Uint8Array(count);
  if (section.repair) {
    // A broken contact loses current; what gains it along a line may be a short.
    const marks = markBrokenRuns(log10, columns, rows, { noise: runNoiseDecades, minLength: 8, only: 'below' });
    repaired = fillFromNeighbours(log10, marks, columns, rows, agreeDecades);
  }

  // Censored after the repair: a run filled from saturated neighbours is as saturated as they are.
  const saturated = new Uint8Array(count);
  const floor = new Uint8Array(count);
  for (let i = 0; i < count; i++) {
    if (log10[i]! <= floorLog + 1e-6) floor[i] = 1;
    else if (log10[i]! >= saturationLog - 1e-6) saturated[i] = 1;
  }
  const wear = findWear(log10, columns, rows, (i) => floor[i] === 0 && saturated[i] === 0 && log10[i]! > floorLog && !tall?.(i), slowUp);
  const conditioned = new Float32Array(count);
  for (let i = 0; i < count; i++) conditioned[i] = repaired[i] === 1 ? 10 ** log10[i]! : Number.isNaN(log10[i]!) ? Number.NaN : offsetFree[i]!;
  if (section.wear && wear.decades >= leastWearDecades) {
    // A bound moves with the wear like a value: what an unworn tip would have shown lies as much higher.
    for (let i = 0; i < count; i++) {
      const shift = wear.perRow[(i / columns) | 0]!;
      conditioned[i]! *= 10 ** shift;
      log10[i]! += shift;
    }
    warnings.push(notice('current-wear', { decades: wear.decades }));
  }

  let repairedPixels = 0;
  for (const mark of repaired) repairedPixels += mark;
  return {
    current: {
      unit: channel.unit === 'A' ? 'A' : 'relative',
      ...(channel.biasV === undefined ? {} : { biasV: channel.biasV }),
      offsetFree: scalarMap(grid, offsetFree),
      conditioned: scalarMap(grid, conditioned),
      log10: scalarMap(grid, log10),
      saturated: maskMap(grid, saturated),
      floor: maskMap(grid, floor),
      repaired: maskMap(grid, repaired),
      repairedPixels,
      offsetA: zero.offset,
      noiseA: zero.noise,
      floorA,
      ...(saturationA === undefined ? {} : { saturationA: saturationA - zero.offset }),
      saturatedPixels,
      wearDecades: wear.decades,
    },
    warnings,
  };
}

/**
 * Current times the sign that makes real currents positive: the bias's, or the current's own where no bias is known. Where nearly all readings
 * of some size oppose the bias, the amplifier inverts, as many do: then the current's own sign is taken and a remark says so.
 */
function turnedUp(channel: Channel, warnings: Notice[]): Float32Array {
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
  const biasSign = channel.biasV === undefined || channel.biasV === 0 ? undefined : Math.sign(channel.biasV);
  const inverted = biasSign !== undefined && biasSign !== own && (own === 1 ? up : down) >= 0.95 * (up + down) && up + down > 0;
  if (inverted) warnings.push(notice('current-inverted', { biasV: channel.biasV! }));
  const sign = inverted || biasSign === undefined ? own : biasSign;
  return values.map((value) => value * sign);
}

/** A noiseless map still needs a positive floor for its logs: the smallest positive value. */
function lowestFloor(measured: number, values: Float32Array): number {
  if (measured > 0) return measured;
  let least = Number.POSITIVE_INFINITY;
  for (const value of values) if (value > 0 && value < least) least = value;
  return Number.isFinite(least) ? least : 1e-15;
}
