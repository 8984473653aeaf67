import { maskMap, scalarMap } from '../grid/maps.ts';
import type { Grid, ScalarMap } from '../grid/maps.ts';
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { layerMask } from '../read/footprint.ts';
import type { ScanSection } from '../read/recipe.ts';
import { channelOf } from '../read/sample.ts';
import type { Sample } from '../read/sample.ts';
import { conditionCurrent } from './condition-current.ts';
import { conditionFurther } from './condition-further.ts';
import { describeLevels } from './describe-levels.ts';
import { fitSpots, leastSpots } from './fit-spots.ts';
import type { SpotFit } from './fit-spots.ts';
import type { CurrentGround, FootprintProposal, Ground, HeightGround, RoughHeight } from './ground.ts';
import { layerPlanes } from './layer-planes.ts';
import { firstLevels, levelHeight, withoutLevels } from './level-height.ts';
import { compareReturn, readReturnCurrent } from './measure-return.ts';
import { proposeFootprint } from './propose-footprint.ts';
import type { GroundSection } from './recipe.ts';
import { refineLevels } from './refine-levels.ts';
import type { Levels } from './refine-levels.ts';
import { pixelNoise } from './noise.ts';
import { thin, thinGrid } from './thin.ts';

/** Bare ground is sought on at most about this many pixels a side: an outline needs no more. */
const searchPixels = 400;

/**
 * Ground stage: levels the height and conditions the current of one sample (forward direction). The height is levelled roughly at first, which is
 * enough for the current to be conditioned; the terraces that the current then shows are the parallel planes by which the height is levelled for
 * good. For a sample without outlines it also looks for bare ground beside the flake, says so and proposes an outline. Form and line offsets follow
 * the footprint where outlines are given, the proposed outline where there is one, else the whole map.
 *
 * @param layerM thickness of one layer of the barrier, metres.
 * @returns whichever of height and current the sample has; both on the sample's grid, NaN where missing.
 * @throws Problem `current-saturated` when the current map carries no information.
 */
export function levelGround(sample: Sample, section: GroundSection, scan: ScanSection, layerM: number): Ground {
  const { grid } = sample;
  const drawn = sample.outlines.length > 0 ? sample.footprint.data : undefined;
  const found = levelInside(sample, section, scan, layerM, drawn);
  const heightChannel = channelOf(sample, 'height');
  const proposal = heightChannel && found.height && !drawn ? propose(heightChannel.values, found.height, found.current, grid, section) : undefined;
  if (!proposal) return found;
  const again = levelInside(sample, section, scan, layerM, layerMask(grid, [proposal.outline], 'barrier').data);
  const { ground, bareM2, stepM, flakeM2 } = proposal;
  const said = notice('footprint-proposed', { sample: sample.name, ground, areaUm2: bareM2 * 1e12, stepNm: stepM * 1e9, flakeUm2: flakeM2 * 1e12 });
  return { ...again, footprintProposal: proposal, warnings: [...again.warnings, said] };
}

function levelInside(sample: Sample, section: GroundSection, scan: ScanSection, layerM: number, inside: Uint8Array | undefined): Ground {
  const { grid } = sample;
  const { slowUp } = sample.frame;
  const heightChannel = channelOf(sample, 'height');
  const currentChannel = channelOf(sample, 'current');
  const values = heightChannel?.values;
  const first = values && firstLevels(values, grid, section, inside);
  const rough = values && first && roughHeight(values.data, grid, first);
  const backChannel = channelOf(sample, 'height', 'return')?.values;
  const back = backChannel && roughHeight(backChannel.data, grid, firstLevels(backChannel, grid, section, inside));
  const backCurrent = channelOf(sample, 'current', 'return');
  const read = backCurrent && readReturnCurrent(backCurrent, grid, section, scan, rough ?? back, slowUp);
  const conditioned = currentChannel && conditionCurrent(currentChannel, grid, section, scan, { height: rough, inside, slowUp, returned: read?.drift });
  const others = currentChannel && conditioned && conditionFurther(sample, currentChannel, conditioned.current, section, scan, { height: rough, inside, slowUp });
  const returned = compareReturn(grid, { height: rough, current: conditioned?.current }, { height: back, current: read });
  const layers = rough && conditioned && layerPlanes(conditioned.current, rough.levelled.data, grid.columns, layerM, grid.pitchXM);
  const levels = values && first && refineLevels(values.data, grid, section, { start: first, inside, planes: layers?.planes, layerM });
  const byHand = values && levels && section.spots.length > 0 ? fitSpots(values.data, grid, section, levels.lines) : undefined;
  const used = levels && byHand ? { ...levels, form: byHand.form } : levels;
  const height = values && used && levelHeight(values, grid, section, used, inside, currentChannel !== undefined);
  return {
    ...(height ? { height: { ...height, levels: describeLevels(used, byHand, section.lines, grid.columns, grid.rows) } } : {}), ...(conditioned ? { current: conditioned.current } : {}), ...(layers ? { layers } : {}),
    ...(others && others.further.length > 0 ? { further: others.further } : {}), ...(returned ? { returned } : {}),
    warnings: [...(values ? spotNotices(section, byHand) : []), ...(conditioned?.warnings ?? []), ...(others?.warnings ?? [])],
  };
}

/** What became of spots picked by hand. */
function spotNotices({ spots, order }: GroundSection, fit: SpotFit | undefined): Notice[] {
  if (spots.length === 0) return [];
  if (!fit) return [notice('spots-too-few', { given: spots.length, least: leastSpots })];
  return fit.order < order || fit.used < spots.length ? [notice('spots-order-lowered', { given: spots.length, used: fit.used, order, usedOrder: fit.order })] : [];
}

function roughHeight(raw: Float32Array, grid: Grid, levels: Levels): RoughHeight {
  const levelled = withoutLevels(raw, grid, levels);
  return { levelled: scalarMap(grid, levelled), noiseM: pixelNoise(levelled, grid.columns, grid.rows) };
}

/** The proposal, sought on every n-th pixel of large maps and given in the map's own coordinates. */
function propose(height: ScalarMap, levelled: HeightGround, current: CurrentGround | undefined, grid: Grid, section: GroundSection): FootprintProposal | undefined {
  const step = Math.max(1, Math.ceil(Math.max(grid.columns, grid.rows) / searchPixels));
  if (step === 1) return proposeFootprint(height, levelled.repaired, current, grid, section.order);
  const coarse = thinGrid(grid, step);
  const mask = (data: Uint8Array) => maskMap(coarse, thin(data, grid, step));
  const map = (data: Float32Array) => scalarMap(coarse, thin(data, grid, step));
  const thinned = current && {
    ...current, offsetFree: map(current.offsetFree.data), conditioned: map(current.conditioned.data), log10: map(current.log10.data),
    saturated: mask(current.saturated.data), floor: mask(current.floor.data), repaired: mask(current.repaired.data),
  };
  const found = proposeFootprint(map(height.data), mask(levelled.repaired.data), thinned, coarse, section.order);
  if (!found) return undefined;
  // Rows left out at the lower border lie below the coarse map's origin.
  const belowM = (grid.rows - coarse.rows * step) * grid.pitchYM;
  const rings = found.outline.rings.map((ring) => ring.map(([xM, yM]) => [xM, yM + belowM] as const));
  return { ...found, outline: { ...found.outline, rings } };
}
