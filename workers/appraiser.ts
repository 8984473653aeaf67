/** Carries samples through the chain, remembers what it can, and stops when it is told to. */
import { evaluateInSteps, stageNames } from '../src/evaluate/evaluate.ts';
import { StageCache } from '../src/evaluate/stage-cache.ts';
import { readSample } from '../src/read/read-sample.ts';
import { sha256 } from '../src/read/sha256.ts';
import { recipeObject, checkRecipe } from '../src/recipe/parse-recipe.ts';
import type { Recipe } from '../src/recipe/recipe.ts';
import { recipeFormat, recipeVersion } from '../src/recipe/recipe.ts';
import type { Appraised } from '../src/report/appraised.ts';
import type { OnStage, RecipeData } from './api.ts';
import { demoSource } from './demo.ts';
import { asComputeError, failure } from './errors.ts';
import type { Kept } from './kept-appraisals.ts';
import { KeptAppraisals } from './kept-appraisals.ts';
import type { SampleOffer } from './local-compute.ts';
import { bytesOf } from './offers.ts';

const stages = ['read', ...stageNames] as const;
/** Of the memory, this share holds results of stages; the rest samples as read and the appraisals on show. */
const stageShare = 0.75;
/** Between stages others get their turn, unless the last turn was less than this ago: a cached stage costs nothing. */
const turnMs = 8;

interface OpenSample {
  readonly offer: SampleOffer;
  /** What the last finished run was asked for; enough to make its appraisal again. */
  recipe?: Recipe;
  run: number;
  /** The appraisal while it is made again, so that calls that come together share the work. */
  again?: Promise<Appraised>;
}

export class Appraiser {
  private readonly samples = new Map<string, OpenSample>();
  private readonly runs = new Map<number, { aborted: boolean }>();
  private readonly cache: StageCache;
  private readonly kept: KeptAppraisals;

  constructor(limitBytes: number) {
    this.cache = new StageCache(limitBytes * stageShare);
    this.kept = new KeptAppraisals(limitBytes * (1 - stageShare));
  }

  adopt(id: string, offer: SampleOffer, recipe?: RecipeData): void {
    this.kept.delete(id);
    this.samples.set(id, { offer, run: Number.NEGATIVE_INFINITY, ...(recipe ? { recipe: checked(recipe) } : {}) });
  }

  close(id: string): void {
    this.samples.delete(id);
    this.kept.delete(id);
  }

  abort(run: number): void {
    const known = this.runs.get(run);
    if (known) known.aborted = true;
  }

  /** Reads, where that has not been done by this recipe, and evaluates. An older run that ends later does not replace a newer one's result. */
  async carry(run: number, id: string, recipe: RecipeData, onStage?: OnStage): Promise<Appraised> {
    const sample = this.sample(id);
    const state = { aborted: false };
    this.runs.set(run, state);
    try {
      const full = checked(recipe);
      const kept = await this.evaluated(id, sample, full, () => {
        if (state.aborted) throw failure('aborted');
      }, onStage);
      if (run >= sample.run && this.samples.get(id) === sample) {
        sample.run = run;
        sample.recipe = full;
        this.kept.set(id, kept);
      }
      return kept.appraised;
    } catch (error) {
      throw asComputeError(error, sample.offer.name);
    } finally {
      this.runs.delete(run);
    }
  }

  /** The appraisal on show, made again where it had to make room. */
  async appraised(id: string): Promise<Appraised> {
    const sample = this.sample(id);
    const known = this.kept.get(id)?.appraised;
    if (known) return known;
    sample.again ??= this.madeAgain(id, sample).finally(() => {
      delete sample.again;
    });
    return sample.again;
  }

  /** The appraisal on show, and a recipe checked that keeps to its ground. */
  async previewed(id: string, recipe: RecipeData): Promise<{ readonly appraised: Appraised; readonly recipe: Recipe }> {
    const full = checked(recipe);
    const appraised = await this.appraised(id);
    const { scan, ground } = this.sample(id).recipe ?? full;
    return { appraised, recipe: { ...full, scan, ground } };
  }

  private async madeAgain(id: string, sample: OpenSample): Promise<Appraised> {
    const { recipe } = sample;
    if (!recipe) throw failure('sample-not-appraised', sample.offer.name);
    const kept = await this.evaluated(id, sample, recipe, () => {});
    if (sample.recipe === recipe && this.samples.get(id) === sample) this.kept.set(id, kept);
    return kept.appraised;
  }

  private sample(id: string): OpenSample {
    const sample = this.samples.get(id);
    if (!sample) throw failure('sample-unknown', id);
    return sample;
  }

  private async evaluated(id: string, { offer }: OpenSample, recipe: Recipe, mayGoOn: () => void, onStage?: OnStage): Promise<Kept & { readonly appraised: Appraised }> {
    const begin = (stage: (typeof stages)[number]): void => onStage?.({ stage, done: stages.indexOf(stage), total: stages.length });
    begin('read');
    const scan = JSON.stringify(recipe.scan);
    const known = this.kept.get(id);
    const read = known?.scan === scan ? known : await readOffer(offer, recipe, scan);
    mayGoOn();
    let turn = performance.now();
    const steps = evaluateInSteps(read.sample, recipe, { cache: this.cache, now: () => performance.now() });
    for (;;) {
      const step = steps.next();
      if (step.done) return { ...read, appraised: { ...step.value, timings: { read: read.readMs, ...step.value.timings } } };
      begin(step.value);
      if (performance.now() - turn > turnMs) {
        await othersTurn();
        turn = performance.now();
      }
      mayGoOn();
    }
  }
}

async function readOffer(offer: SampleOffer, recipe: Recipe, scan: string): Promise<Kept> {
  const start = performance.now();
  const source = offer.source.kind === 'demo' ? await demoSource(offer.source.name) : offer.source;
  const files = await Promise.all(source.files.map(async (file) => ({ name: file.name, bytes: await bytesOf(file) })));
  const sample = await readSample(source.group, files, recipe.scan, sha256);
  return { sample, scan, readMs: performance.now() - start };
}

/** Checks a recipe, which may leave out its head and everything that is as by default. */
function checked(recipe: RecipeData): Recipe {
  return checkRecipe(recipeObject(JSON.stringify({ format: recipeFormat, version: recipeVersion, ...recipe }), 'The recipe'));
}

/** A timer, because messages that arrived before it is due are heard before it. */
function othersTurn(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, 0));
}
