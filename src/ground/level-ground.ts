import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import type { ScanSection } from '../read/recipe.ts';
import { channelOf } from '../read/sample.ts';
import type { Sample } from '../read/sample.ts';
import { conditionCurrent } from './condition-current.ts';
import type { Ground } from './ground.ts';
import { levelHeight } from './level-height.ts';
import { proposeFootprint } from './propose-footprint.ts';
import type { GroundSection } from './recipe.ts';

/**
 * Ground stage: levels the height and conditions the current of one sample (forward direction). For a sample without
 * outlines it also looks for bare ground beside the flake, says so and proposes an outline.
 *
 * @returns whichever of height and current the sample has; both on the sample's grid, NaN where missing.
 * @throws Problem `current-saturated` when the current map carries no information.
 */
export function levelGround(sample: Sample, section: GroundSection, scan: ScanSection): Ground {
  const warnings: Notice[] = [];
  const heightChannel = channelOf(sample, 'height');
  const currentChannel = channelOf(sample, 'current');
  const height = heightChannel && levelHeight(heightChannel.values, sample.grid, section);
  const conditioned = currentChannel && conditionCurrent(currentChannel, sample.grid, height, section, scan, sample.frame.slowUp);
  if (conditioned) warnings.push(...conditioned.warnings);
  const proposal = heightChannel && height && sample.outlines.length === 0
    ? proposeFootprint(heightChannel.values, height.repaired, conditioned?.current, sample.grid, section.order)
    : undefined;
  if (proposal) {
    const { ground, bareM2, stepM, flakeM2 } = proposal;
    warnings.push(notice('footprint-proposed', { sample: sample.name, ground, areaUm2: bareM2 * 1e12, stepNm: stepM * 1e9, flakeUm2: flakeM2 * 1e12 }));
  }
  return { ...(height ? { height } : {}), ...(conditioned ? { current: conditioned.current } : {}), ...(proposal ? { footprintProposal: proposal } : {}), warnings };
}
