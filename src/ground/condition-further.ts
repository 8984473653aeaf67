/** Currents at further biases over the same ground: conditioned like the first and laid over it. */
import type { Grid } from '../grid/maps.ts';
import { notice, Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import type { ScanSection } from '../read/recipe.ts';
import type { Channel, Sample } from '../read/sample.ts';
import { shiftBetweenDirections } from './align-current.ts';
import { conditionCurrent } from './condition-current.ts';
import type { BesideCurrent } from './condition-current.ts';
import { quantifiedOverFloor } from './current-limits.ts';
import type { CurrentGround, FurtherCurrent } from './ground.ts';
import type { GroundSection } from './recipe.ts';

/** Scans drift between them: looked for up to this part of the map's shorter side, and so many pixels at most. */
const reach = { part: 1 / 8, pixels: 24 } as const;
/** Biases nearer than this part say nothing about thickness. */
const leastApart = 0.02;
/** Between neighbours further apart than this lies an edge, which is not interpolated over, decades. */
const edgeDecades = 0.3;
/** A rest of a shift below this is left, pixels. */
const leastRest = 0.1;

/**
 * Conditions every further forward current by the same steps as the first, registers it to the first and resamples it over the first's pixels, linearly
 * in log current. Saturated, floor and repaired pixels, those within 10σ of zero (Currie 1968) and those beside an edge are missing in the result.
 *
 * Left out with a remark: maps of another unit or of the other polarity (another electrode emits then), of the same or of no stated bias, saturated
 * ones, and maps that do not look like the first.
 *
 * @param first the conditioned current of `channel`; @param beside what helped to condition it.
 */
export function conditionFurther(
  sample: Sample, channel: Channel, first: CurrentGround, section: GroundSection, scan: ScanSection, beside: BesideCurrent,
): { further: FurtherCurrent[]; warnings: Notice[] } {
  const { grid } = sample;
  const further: FurtherCurrent[] = [];
  const warnings: Notice[] = [];
  for (const other of sample.channels) {
    if (other.quantity !== 'current' || other.direction !== 'forward' || other === channel) continue;
    const known = [first.biasV, ...further.map(({ biasV }) => biasV)];
    const found = unusable(channel, other, known) ?? laidOver(other, first, grid, section, scan, beside);
    if (typeof found === 'string') warnings.push(notice('bias-map-left-out', { source: other.source, reason: found }));
    else further.push(found);
  }
  return { further, warnings };
}

function unusable(channel: Channel, other: Channel, known: readonly (number | undefined)[]): 'bias' | 'unit' | 'polarity' | 'same' | undefined {
  if (!channel.biasV || !other.biasV) return 'bias';
  if (channel.unit !== 'A' || other.unit !== 'A') return 'unit';
  if (channel.biasV * other.biasV < 0) return 'polarity';
  return known.some((biasV) => Math.abs(other.biasV! / biasV! - 1) < leastApart) ? 'same' : undefined;
}

function laidOver(
  channel: Channel, first: CurrentGround, grid: Grid, section: GroundSection, scan: ScanSection, beside: BesideCurrent,
): FurtherCurrent | 'saturated' | 'unlike' {
  const current = conditionedOrNone(channel, grid, section, scan, beside);
  if (!current) return 'saturated';
  const { columns, rows } = grid;
  const side = Math.min(columns, rows);
  const shift = section.align ? shiftBetweenDirections(first.log10.data, current.log10.data, columns, rows, Math.min(reach.pixels, Math.max(2, Math.floor(side * reach.part)))) : undefined;
  if (section.align && !shift) return 'unlike';
  const measured = measuredOnly(current);
  const [dx, dy] = shift ? [shift.dxPx, shift.dyPx] : [0, 0];
  return {
    biasV: channel.biasV!, source: channel.source, noiseA: current.noiseA, wearDecades: current.wearDecades,
    log10: resampled(measured, columns, rows, dx, dy),
    ...(shift ? { shift } : {}),
  };
}

function conditionedOrNone(channel: Channel, grid: Grid, section: GroundSection, scan: ScanSection, beside: BesideCurrent): CurrentGround | undefined {
  try {
    return conditionCurrent(channel, grid, section, scan, beside).current;
  } catch (error) {
    if (error instanceof Problem && error.code === 'current-saturated') return undefined;
    throw error;
  }
}

/** Log10 current where it is measured well; NaN where it is censored, repaired, or within 10σ of zero. */
export function measuredOnly({ log10, saturated, floor, repaired, floorA }: CurrentGround): Float32Array {
  const least = Math.log10(floorA * quantifiedOverFloor);
  const out = log10.data.slice();
  for (let i = 0; i < out.length; i++) {
    if (saturated.data[i] === 1 || floor.data[i] === 1 || repaired.data[i] === 1 || !(out[i]! >= least)) out[i] = Number.NaN;
  }
  return out;
}

/** The map's values at (column + dx, row + dy); NaN beyond the border, beside missing pixels and over an edge. */
function resampled(values: Float32Array, columns: number, rows: number, dx: number, dy: number): Float32Array {
  const [wholeX, restX] = parts(dx);
  const [wholeY, restY] = parts(dy);
  if (wholeX === 0 && wholeY === 0 && restX === 0 && restY === 0) return values;
  const right = restX > 0 ? 1 : 0;
  const below = restY > 0 ? columns : 0;
  const out = new Float32Array(values.length).fill(Number.NaN);
  for (let r = 0, i = 0; r < rows; r++) {
    const y = r + wholeY;
    for (let c = 0; c < columns; c++, i++) {
      const x = c + wholeX;
      if (x < 0 || y < 0 || x + right >= columns || y + (below > 0 ? 1 : 0) >= rows) continue;
      const at = y * columns + x;
      const [a, b, d, e] = [values[at]!, values[at + right]!, values[at + below]!, values[at + below + right]!];
      if (Math.max(a, b, d, e) - Math.min(a, b, d, e) <= edgeDecades) out[i] = (1 - restY) * (a + restX * (b - a)) + restY * (d + restX * (e - d));
    }
  }
  return out;
}

/** Whole pixels and a rest from 0 to below 1; a small rest counts as none. */
function parts(shift: number): [whole: number, rest: number] {
  const nearest = Math.round(shift);
  if (Math.abs(shift - nearest) < leastRest) return [nearest, 0];
  return [Math.floor(shift), shift - Math.floor(shift)];
}
