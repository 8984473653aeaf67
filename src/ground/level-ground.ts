import { maskMap, scalarMap } from '../grid/maps.ts';
import type { Grid, ScalarMap } from '../grid/maps.ts';
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { layerMask } from '../read/footprint.ts';
import type { ScanSection } from '../read/recipe.ts';
import { channelOf } from '../read/sample.ts';
import type { Sample } from '../read/sample.ts';
import { conditionCurrent } from './condition-current.ts';
import type { CurrentGround, FootprintProposal, Ground, HeightGround } from './ground.ts';
import { levelHeight } from './level-height.ts';
import { proposeFootprint } from './propose-footprint.ts';
import type { GroundSection } from './recipe.ts';
import { thin, thinGrid } from './thin.ts';

/** Bare ground is sought on at most about this many pixels a side: an outline needs no more. */
const searchPixels = 400;

/**
 * Ground stage: levels the height and conditions the current of one sample (forward direction). For a sample without
 * outlines it also looks for bare ground beside the flake, says so and proposes an outline. Form and line offsets follow the
 * footprint where outlines are given, the proposed outline where there is one, else the whole map.
 *
 * @returns whichever of height and current the sample has; both on the sample's grid, NaN where missing.
 * @throws Problem `current-saturated` when the current map carries no information.
 */
export function levelGround(sample: Sample, section: GroundSection, scan: ScanSection): Ground {
  const { grid } = sample;
  const warnings: Notice[] = [];
  const heightChannel = channelOf(sample, 'height');
  const currentChannel = channelOf(sample, 'current');
  const drawn = sample.outlines.length > 0 ? sample.footprint.data : undefined;
  let height = heightChannel && levelHeight(heightChannel.values, grid, section, drawn, currentChannel !== undefined);
  let conditioned = currentChannel && conditionCurrent(currentChannel, grid, height, section, scan, sample.frame.slowUp);
  const proposal = heightChannel && height && !drawn ? propose(heightChannel.values, height, conditioned?.current, grid, section) : undefined;
  if (heightChannel && proposal) {
    height = levelHeight(heightChannel.values, grid, section, layerMask(grid, [proposal.outline], 'barrier').data, currentChannel !== undefined);
    conditioned = currentChannel && conditionCurrent(currentChannel, grid, height, section, scan, sample.frame.slowUp);
    const { ground, bareM2, stepM, flakeM2 } = proposal;
    warnings.push(notice('footprint-proposed', { sample: sample.name, ground, areaUm2: bareM2 * 1e12, stepNm: stepM * 1e9, flakeUm2: flakeM2 * 1e12 }));
  }
  return {
    ...(height ? { height } : {}), ...(conditioned ? { current: conditioned.current } : {}), ...(proposal ? { footprintProposal: proposal } : {}),
    warnings: [...(conditioned?.warnings ?? []), ...warnings],
  };
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
