/** The computation, in the thread that calls it: no worker, no page, no file system. */
import type { App, Appraised } from '../src/report/appraised.ts';
import { resultFiles } from '../src/report/result-files.ts';
import type { OpenReply, RecipeData } from './api.ts';
import { Appraiser } from './appraiser.ts';
import { demoOffers } from './demo.ts';
import { asComputeError, failure } from './errors.ts';
import { factsOf } from './facts.ts';
import type { LocalCompute, Offers } from './local-compute.ts';
import { offersOf } from './offers.ts';
import { drawPicture } from './picture.ts';
import { preview } from './preview.ts';
import { cutValues, histogramOf, pointValues } from './readings.ts';
import { summaryOf } from './summary.ts';
import { thisApp } from './this-app.ts';

export interface ComputeOptions {
  /** The program that result files name; this one by default. */
  readonly app?: App;
  /**
   * Limit of all maps kept between calls, 512 MB by default. What no longer fits is read and computed again when it is asked for; the sample last
   * looked at stays whatever its size.
   */
  readonly cacheBytes?: number;
}

const defaultCacheBytes = 512 * 2 ** 20;

/** Every call rejects with a `ComputeError`. Samples are kept until they are closed, their bytes are read when they are appraised. */
export function createCompute(options: ComputeOptions = {}): LocalCompute {
  const app = options.app ?? thisApp;
  const appraiser = new Appraiser(options.cacheBytes ?? defaultCacheBytes);
  let opened = 0;

  const open = (offers: Offers): OpenReply => ({
    samples: offers.samples.map((offer) => {
      const id = `sample-${++opened}`;
      appraiser.adopt(id, offer);
      return { id, name: offer.name, files: offer.files };
    }),
    skipped: offers.skipped, failed: offers.failed,
  });
  const files = (appraised: Appraised) => resultFiles(appraised, app);

  return {
    facts: guarded(async () => factsOf(app)),
    group: guarded(offersOf),
    demos: guarded(demoOffers),
    open: guarded(async (sources) => open(await offersOf(sources))),
    openDemo: guarded(async () => open(await demoOffers())),
    adopt: guarded(async (id, offer, recipe?: RecipeData) => appraiser.adopt(id, offer, recipe)),
    close: guarded(async (id) => appraiser.close(id)),
    carry: guarded((run, id, recipe, onStage) => appraiser.carry(run, id, recipe, onStage)),
    appraise: guarded(async (run, id, recipe, onStage) => summaryOf(id, await appraiser.carry(run, id, recipe, onStage))),
    abort: guarded(async (run) => appraiser.abort(run)),
    picture: guarded(async (request) => drawPicture(await appraiser.appraised(request.id), request)),
    preview: guarded(async (request) => {
      const { appraised, recipe } = await appraiser.previewed(request.id, request.recipe);
      return preview(appraised, recipe, request);
    }),
    point: guarded(async (id, xUm, yUm) => pointValues(await appraiser.appraised(id), xUm, yUm)),
    cut: guarded(async (request) => cutValues(await appraiser.appraised(request.id), request)),
    histogram: guarded(async (request) => histogramOf(await appraiser.appraised(request.id), request)),
    resultNames: guarded(async (id) => files(await appraiser.appraised(id)).map(({ name }) => name)),
    resultFile: guarded(async (id, name) => {
      const file = files(await appraiser.appraised(id)).find((candidate) => candidate.name === name);
      if (!file) throw failure('result-unknown', name);
      const content = file.content();
      // The writers make their bytes anew, so the buffer is an ordinary one.
      return typeof content === 'string' ? new TextEncoder().encode(content) : (content as Uint8Array<ArrayBuffer>);
    }),
  };
}

/** The same function, whose errors all are `ComputeError`s. */
function guarded<Arguments extends readonly unknown[], Value>(call: (...values: Arguments) => Promise<Value>): (...values: Arguments) => Promise<Value> {
  return async (...values) => {
    try {
      return await call(...values);
    } catch (error) {
      throw asComputeError(error);
    }
  };
}
