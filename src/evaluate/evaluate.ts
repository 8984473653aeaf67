import type { Barrier } from '../barrier/barrier.ts';
import { assessBarrier } from '../barrier/assess-barrier.ts';
import { applyCorrections } from '../flaws/apply-corrections.ts';
import { findFlaws } from '../flaws/find-flaws.ts';
import { levelGround } from '../ground/level-ground.ts';
import type { Ground } from '../ground/ground.ts';
import { measureTexture } from '../ground/measure-texture.ts';
import { keepLedger } from '../ledger/keep-ledger.ts';
import type { Sample } from '../read/sample.ts';
import type { Recipe } from '../recipe/recipe.ts';
import { assessSheet } from '../sheet/assess-sheet.ts';
import type { Sheet } from '../sheet/sheet.ts';
import type { Appraisal } from './appraisal.ts';
import { edgeGround } from './edge-ground.ts';
import { flawScale } from './flaw-scale.ts';
import { sheetInput } from './sheet-question.ts';
import { StageCache } from './stage-cache.ts';

export const stageNames = ['ground', 'flaws', 'barrier', 'sheet', 'ledger'] as const;
export type StageName = (typeof stageNames)[number];

export interface EvaluateOptions {
  /** Keeps results between calls; a stage whose inputs have not changed is not computed again. */
  readonly cache?: StageCache;
  /** Called before each stage. Throw from it to stop between stages. */
  readonly onStage?: (stage: StageName) => void;
  /** Milliseconds since some start, for timings; the system clock by default. */
  readonly now?: () => number;
}

/**
 * Folds the chain over one sample: ground → flaws → barrier → sheet → ledger. Each stage is cached by (the sources' names and hashes, the parts of the recipe that
 * it and the stages before it read), so that moving a threshold recomputes from that stage on and never reads a file again.
 *
 * The same sample and recipe give the same result to the bit, with or without a cache; only `timings` differ.
 *
 * @throws Problem when a map carries no information (see the stages).
 */
export function evaluate(sample: Sample, recipe: Recipe, options: EvaluateOptions = {}): Appraisal {
  const steps = evaluateInSteps(sample, recipe, options);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
    options.onStage?.(step.value);
  }
}

/** The same, halting before each stage with its name, so that a worker can listen in between. */
export function* evaluateInSteps(sample: Sample, recipe: Recipe, options: EvaluateOptions = {}): Generator<StageName, Appraisal, void> {
  const cache = options.cache ?? new StageCache(0);
  const now = options.now ?? Date.now;
  const timings: Record<string, number> = {};
  let key = JSON.stringify([sample.name, sample.sources, recipe.scan]);
  const run = function* <T>(stage: StageName, read: unknown, compute: () => T): Generator<StageName, T, void> {
    key += JSON.stringify([stage, read]);
    yield stage;
    const start = now();
    const value = cache.take(key, compute);
    timings[stage] = now() - start;
    return value;
  };

  const { band, barrier: barrierSection, stack } = recipe;
  const ground = yield* run('ground', [recipe.ground, barrierSection.layerNm], () => levelGround(sample, recipe.ground, recipe.scan, barrierSection.layerNm * 1e-9));
  const found = yield* run('flaws', [recipe.flaws, barrierSection, band.shortMaxUm2, band.terraceMinUm2], () =>
    findFlaws(ground, sample.grid, sample.footprint, recipe.flaws, flawScale(ground, recipe)));
  // Part of the same stage, with a key of its own: a correction by hand must not have flaws sought again.
  key += JSON.stringify(['corrections', recipe.corrections]);
  const flaws = recipe.corrections.length === 0 ? found : { ...found, ...cache.take(key, () => {
    // The maps that flaws are measured by are kept once, with what was found.
    const { rise: _rise, drop: _drop, ...corrected } = applyCorrections(found, recipe.corrections, ground, sample.grid, sample.footprint);
    return corrected;
  }) };
  const barrier = yield* run('barrier', [stack, band], () => barrierOf(sample, ground, flaws, recipe));
  const sheet: Sheet | undefined = yield* run('sheet', [], () => barrier && assessSheet(sheetInput(sample, ground, flaws, barrier, recipe)));
  const { ledger, texture } = yield* run('ledger', [], () => ({
    ledger: keepLedger({ sample, ground, flaws, barrier, sheet, band, barrierSection, offsetV: stack.offsetV }),
    texture: ground.height && measureTexture(ground.height, sample.grid, sample.footprint.data, flaws.labels.data, textureSection(ground, recipe), barrier?.step.data),
  }));
  return {
    sample, recipe, ground, flaws,
    ...(barrier ? { barrier } : {}), ...(sheet ? { sheet } : {}),
    ledger, ...(texture ? { texture } : {}),
    warnings: [...sample.warnings, ...ground.warnings, ...flaws.warnings, ...(barrier?.warnings ?? []), ...(sheet?.warnings ?? []), ...ledger.warnings],
    timings,
  };
}

/** A form through a few spots takes next to nothing of the roughness with it. */
function textureSection({ height }: Ground, { ground }: Recipe): Recipe['ground'] {
  return height?.levels?.formFrom === 'spots' ? { ...ground, order: 0 } : ground;
}

/** The barrier stage's question; undefined without a current. */
export function barrierOf(sample: Sample, ground: Ground, flaws: ReturnType<typeof findFlaws>, recipe: Recipe): Barrier | undefined {
  if (!ground.current) return undefined;
  const { band, stack } = recipe;
  return assessBarrier(ground.current, flaws, sample.footprint, sample.grid, sample.surface, recipe.barrier, {
    biasV: stack.biasV, offsetV: stack.offsetV, targetAPerM2: stack.targetNaPerUm2 * 1e3,
    minAPerM2: band.minNaPerUm2 * 1e3, maxAPerM2: band.maxNaPerUm2 * 1e3,
    bandFactor: band.factor, terraceMinM2: band.terraceMinUm2 * 1e-12, deviceFieldVPerNm: band.deviceFieldVPerNm,
  }, ground.height?.levelled.data, { further: ground.further, edge: edgeGround(sample, ground) });
}
