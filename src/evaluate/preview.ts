/** A quick look at what a recipe would give: the chain from the flaws on, over every n-th pixel of ground that is known. */
import { applyCorrections } from '../flaws/apply-corrections.ts';
import { findFlaws } from '../flaws/find-flaws.ts';
import type { Flaws } from '../flaws/flaws.ts';
import { maskMap, scalarMap } from '../grid/maps.ts';
import type { MaskMap, ScalarMap } from '../grid/maps.ts';
import type { Ground } from '../ground/ground.ts';
import { thin, thinGrid } from '../ground/thin.ts';
import { keepLedger } from '../ledger/keep-ledger.ts';
import type { Ledger } from '../ledger/ledger.ts';
import type { Sample } from '../read/sample.ts';
import type { Recipe } from '../recipe/recipe.ts';
import { assessSheet } from '../sheet/assess-sheet.ts';
import { barrierOf } from './evaluate.ts';
import { flawScale } from './flaw-scale.ts';
import { sheetInput } from './sheet-question.ts';

export interface ThinnedGround {
  readonly sample: Sample;
  readonly ground: Ground;
  /** Every so many-th pixel of the map in each direction. */
  readonly step: number;
}

export interface Preview {
  readonly flaws: Flaws;
  readonly ledger: Ledger;
}

/**
 * Every n-th pixel of a sample and its ground, so that no side is longer than about `side` pixels. Pixels are picked and not averaged: noise,
 * floor and saturation stay what they are.
 */
export function thinnedGround(sample: Sample, ground: Ground, side: number): ThinnedGround {
  const { grid } = sample;
  const step = Math.max(1, Math.ceil(Math.max(grid.columns, grid.rows) / side));
  if (step === 1) return { sample, ground, step };
  const coarse = thinGrid(grid, step);
  const map = (values: ScalarMap): ScalarMap => scalarMap(coarse, thin(values.data, grid, step));
  const mask = (values: MaskMap): MaskMap => maskMap(coarse, thin(values.data, grid, step));
  const { height, current, further, layers: _layers, ...rest } = ground;
  return {
    step,
    // Nothing behind the ground reads a channel.
    sample: { ...sample, grid: coarse, channels: [], footprint: mask(sample.footprint) },
    ground: {
      ...rest,
      ...(height ? { height: { ...height, levelled: map(height.levelled), repaired: mask(height.repaired), plane: thin(height.plane, grid, step) } } : {}),
      ...(current ? {
        current: {
          ...current, offsetFree: map(current.offsetFree), conditioned: map(current.conditioned), log10: map(current.log10),
          saturated: mask(current.saturated), floor: mask(current.floor), repaired: mask(current.repaired),
        },
      } : {}),
      ...(further ? { further: further.map((other) => ({ ...other, log10: thin(other.log10, grid, step) })) } : {}),
    },
  };
}

/**
 * Flaws and ledger by a recipe over thinned ground. Counts of pixels in the recipe are taken for the full map's. Shares come near those of the
 * full map (flaws of a few pixels and their outlines are coarser); nothing of it may be stored or reported.
 */
export function previewOf({ sample, ground, step }: ThinnedGround, full: Recipe): Preview {
  const recipe: Recipe = { ...full, flaws: { ...full.flaws, minPixels: Math.max(1, Math.round(full.flaws.minPixels / step ** 2)) } };
  const { band, barrier: barrierSection, stack } = recipe;
  const found = findFlaws(ground, sample.grid, sample.footprint, recipe.flaws, flawScale(ground, recipe));
  const flaws = recipe.corrections.length === 0 ? found : applyCorrections(found, recipe.corrections, ground, sample.grid, sample.footprint);
  const barrier = barrierOf(sample, ground, flaws, recipe);
  const sheet = barrier && assessSheet(sheetInput(sample, ground, flaws, barrier, recipe));
  return { flaws, ledger: keepLedger({ sample, ground, flaws, barrier, sheet, band, barrierSection, offsetV: stack.offsetV }) };
}
