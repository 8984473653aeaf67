/** The computation for the page: the same interface, answered by a few workers. */
import { proxy } from 'comlink';
import type { Compute, OnStage, OpenReply, RecipeData, SampleSummary, SourceFile } from './api.ts';
import { ComputeError } from './api.ts';
import type { Offers } from './local-compute.ts';
import { PoolWorker } from './pool-worker.ts';

export interface PoolOptions {
  /** How many workers; one fewer than the processor's threads, 1 to 4, by default. */
  readonly size?: number;
  /** Starts a worker; the program's own by default. */
  readonly worker?: () => Worker;
  /** How long a worker may take to hear an abort before it is replaced, 5000 ms by default. */
  readonly patienceMs?: number;
}

export interface Lost {
  /** Ids of the samples that lived in the worker; they stay valid. */
  readonly samples: readonly string[];
  readonly reason: string;
}

export interface ComputePool extends Compute {
  readonly size: number;
  /** Ends all workers; calls that are not answered, and all later ones, reject with code `worker-lost`. */
  dispose(): void;
  /** Tells of workers that crashed. Returns what takes the listener off again. */
  onLost(listener: (lost: Lost) => void): () => void;
}

/** Every run of a pool, over all its workers, needs a number of its own. */
export function createPool(options: PoolOptions = {}): ComputePool {
  const size = Math.max(1, options.size ?? Math.min(4, navigator.hardwareConcurrency - 1));
  const listeners = new Set<(lost: Lost) => void>();
  const onLost = (samples: readonly string[], reason: string): void => listeners.forEach((listener) => listener({ samples, reason }));
  const crew = Array.from({ length: size }, () => new PoolWorker(options.worker ?? startWorker, onLost));
  /** Which worker an unfinished run is on. */
  const runs = new Map<number, PoolWorker>();
  let opened = 0;
  let isOver = false;

  const home = (id: string): PoolWorker => {
    if (isOver) throw new ComputeError('worker-lost', 'The computation has ended; load the page again.');
    const found = crew.find(({ samples }) => samples.has(id));
    if (!found) throw new ComputeError('sample-unknown', `There is no open sample ${id}; open its files again.`, id);
    return found;
  };
  const leastLoaded = (): PoolWorker => {
    if (isOver) throw new ComputeError('worker-lost', 'The computation has ended; load the page again.');
    return crew.reduce((best, one) => (one.samples.size < best.samples.size ? one : best));
  };
  const place = ({ samples, skipped, failed }: Offers): OpenReply => ({
    samples: samples.map((offer) => {
      const id = `sample-${++opened}`;
      leastLoaded().samples.set(id, { id, offer, run: Number.NEGATIVE_INFINITY });
      return { id, name: offer.name, files: offer.files };
    }),
    skipped, failed,
  });

  const appraise = async (run: number, id: string, recipe: RecipeData, onStage?: OnStage): Promise<SampleSummary> => {
    const worker = home(id);
    runs.set(run, worker);
    const listener: OnStage = (progress) => {
      if (runs.get(run) === worker) onStage?.(progress);
    };
    try {
      const summary = await worker.call((remote) => (onStage ? remote.appraise(run, id, recipe, proxy(listener)) : remote.appraise(run, id, recipe)), id, run);
      const placed = worker.samples.get(id);
      if (placed && run >= placed.run) Object.assign(placed, { run, recipe });
      return summary;
    } finally {
      runs.delete(run);
    }
  };

  return {
    size,
    facts: async () => leastLoaded().call((remote) => remote.facts()),
    async open(files) {
      const blobs = files.map(asBlob);
      return place(await leastLoaded().call((remote) => remote.group(blobs)));
    },
    openDemo: async () => place(await leastLoaded().call((remote) => remote.demos())),
    close: async (id) => home(id).remove(id),
    appraise,
    abort: async (run) => {
      runs.get(run)?.abort(run, options.patienceMs ?? 5000);
    },
    picture: async (request) => home(request.id).call((remote) => remote.picture(request), request.id),
    preview: async (request) => home(request.id).call((remote) => remote.preview(request), request.id),
    point: async (id, xUm, yUm) => home(id).call((remote) => remote.point(id, xUm, yUm), id),
    cut: async (request) => home(request.id).call((remote) => remote.cut(request), request.id),
    histogram: async (request) => home(request.id).call((remote) => remote.histogram(request), request.id),
    resultNames: async (id) => home(id).call((remote) => remote.resultNames(id), id),
    resultFile: async (id, name) => home(id).call((remote) => remote.resultFile(id, name), id),
    dispose() {
      isOver = true;
      listeners.clear();
      for (const worker of crew) worker.lose('it was ended');
    },
    onLost(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}

function startWorker(): Worker {
  return new Worker(new URL('./compute.worker.ts', import.meta.url), { type: 'module' });
}

/** Bytes become a Blob, which the browser may keep on disk and every worker can read without a copy being sent to it. */
function asBlob({ name, content }: SourceFile): SourceFile {
  return { name, content: content instanceof Blob ? content : new Blob([content]) };
}
