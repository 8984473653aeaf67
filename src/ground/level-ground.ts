import type { Notice } from '../problems/problem.ts';
import type { ScanSection } from '../read/recipe.ts';
import { channelOf } from '../read/sample.ts';
import type { Sample } from '../read/sample.ts';
import { conditionCurrent } from './condition-current.ts';
import type { Ground } from './ground.ts';
import { levelHeight } from './level-height.ts';
import type { GroundSection } from './recipe.ts';

/**
 * Ground stage: levels the height and conditions the current of one sample (forward direction).
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
  return { ...(height ? { height } : {}), ...(conditioned ? { current: conditioned.current } : {}), warnings };
}
