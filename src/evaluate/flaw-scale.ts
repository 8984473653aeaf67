import { anchorOf } from '../barrier/anchor.ts';
import { quantifiedOverFloor } from '../ground/current-limits.ts';
import type { FlawScale } from '../flaws/find-flaws.ts';
import type { Ground } from '../ground/ground.ts';
import { measureLadder } from '../ground/ladder.ts';
import type { Recipe } from '../recipe/recipe.ts';

/** Ground higher than this over its surroundings is left out of the first look at the ladder, metres. */
const flatM = 2e-9;
/** Without a ladder, a bias and amperes, a layer is taken to cost a decade: between what the models give at low and at high bias. */
const assumedDecades = 1;

/** What a layer is worth before flaws are known: from the map's own ladder, else the model, else a decade. */
export function flawScale(ground: Ground, recipe: Recipe): FlawScale {
  return {
    layerM: recipe.barrier.layerNm * 1e-9,
    ...layerWorth(ground, recipe),
    shortMaxM2: recipe.band.shortMaxUm2 * 1e-12,
    terraceMinM2: recipe.band.terraceMinUm2 * 1e-12,
  };
}

function layerWorth(ground: Ground, recipe: Recipe): Pick<FlawScale, 'layerDecades' | 'layerFrom'> {
  const current = ground.current;
  const assumed = { layerDecades: assumedDecades, layerFrom: 'assumed' } as const;
  if (!current) return assumed;
  if (ground.layers?.ladder.stepDecades !== undefined) return { layerDecades: ground.layers.ladder.stepDecades, layerFrom: 'map' };
  const levelled = ground.height?.levelled.data;
  const least = Math.log10(current.floorA * quantifiedOverFloor);
  const log10 = current.log10.data;
  const saturated = current.saturated.data;
  const ladder = measureLadder(log10, (i) => saturated[i] === 0 && log10[i]! >= least && !(levelled && levelled[i]! > flatM));
  if (ladder.stepDecades !== undefined) return { layerDecades: ladder.stepDecades, layerFrom: 'map' };
  const anchor = anchorOf(recipe.barrier, { offsetV: 0, targetAPerM2: 1 }, current.unit === 'A' ? current.biasV : undefined);
  return anchor?.modelStepDecades === undefined ? assumed : { layerDecades: anchor.modelStepDecades, layerFrom: 'model' };
}
