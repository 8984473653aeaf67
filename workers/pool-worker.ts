/** One worker of the pool as the page sees it: started when first needed, replaced when lost, every call settled. */
import { wrap } from 'comlink';
import type { Remote } from 'comlink';
import type { RecipeData } from './api.ts';
import { ComputeError } from './api.ts';
import type { SampleOffer } from './local-compute.ts';
import type { Reply, WorkerApi } from './wire.ts';
import { valueOf } from './wire.ts';

/** A sample and what it takes to bring it back in a new worker. */
export interface Placed {
  readonly id: string;
  readonly offer: SampleOffer;
  recipe?: RecipeData;
}

type Ask<Value> = (worker: Remote<WorkerApi>) => Promise<Reply<Value>>;

/** A call that has not been answered. `send` sends it (again) and never throws. */
interface Pending {
  readonly run: number | undefined;
  readonly send: () => void;
  readonly reject: (error: ComputeError) => void;
}

export class PoolWorker {
  /** Samples that live here. */
  readonly samples = new Map<string, Placed>();
  private readonly start: () => Worker;
  private readonly onLost: (lost: readonly string[], reason: string) => void;
  private readonly pending = new Set<Pending>();
  private running: { readonly worker: Worker; readonly remote: Remote<WorkerApi>; readonly knows: Set<string> } | undefined;

  constructor(start: () => Worker, onLost: (lost: readonly string[], reason: string) => void) {
    this.start = start;
    this.onLost = onLost;
  }

  /**
   * Sends a call, after the sample that it is about where the worker does not have it yet. Rejects with a `ComputeError`.
   *
   * @param run number by which the call can be aborted.
   */
  call<Value>(ask: Ask<Value>, id?: string, run?: number): Promise<Value> {
    return new Promise<Value>((resolve, reject) => {
      const send = (): void => {
        const running = this.running;
        this.answer(ask, id).then(
          (reply) => settle(() => resolve(reply)),
          (error: unknown) => settle(() => reject(error)),
        );
        const settle = (finish: () => void): void => {
          // What a worker said before it was replaced counts no more.
          if ((running === undefined || this.running === running) && this.pending.delete(pending)) finish();
        };
      };
      const pending: Pending = { run, send, reject };
      this.pending.add(pending);
      send();
    });
  }

  /** Takes the sample out of the worker, if it runs. */
  remove(id: string): void {
    this.samples.delete(id);
    if (this.running?.knows.delete(id)) void this.running.remote.close(id);
  }

  /** Ends the worker for good or until the next call; what it has not answered is rejected. */
  lose(reason: string): void {
    const lost = this.end();
    if (!lost) return;
    const pending = [...this.pending];
    this.pending.clear();
    for (const { reject } of pending) reject(lostError(reason));
    this.onLost([...lost], reason);
  }

  /** Ends the worker; its samples' ids when there was one. */
  end(): ReadonlySet<string> | undefined {
    const { running } = this;
    this.running = undefined;
    running?.worker.terminate();
    return running?.knows;
  }

  private ready(id: string | undefined): { readonly remote: Remote<WorkerApi>; readonly worker: Worker } {
    const running = (this.running ??= this.started());
    const placed = id === undefined ? undefined : this.samples.get(id);
    if (placed && !running.knows.has(placed.id)) {
      running.knows.add(placed.id);
      // Not waited for: messages arrive in their order.
      void running.remote.adopt(placed.id, placed.offer, placed.recipe);
    }
    return running;
  }

  private started(): NonNullable<PoolWorker['running']> {
    const worker = this.start();
    const isOurs = (): boolean => this.running?.worker === worker;
    worker.addEventListener('error', (event) => {
      event.preventDefault();
      if (isOurs()) this.lose(event.message || 'its script did not load or failed');
    });
    worker.addEventListener('messageerror', () => {
      if (isOurs()) this.lose('a message could not be read');
    });
    return { worker, remote: wrap<WorkerApi>(worker), knows: new Set() };
  }
}

function lostError(reason: string): ComputeError {
  return new ComputeError('worker-lost', `The computation was lost (${reason}); the sample is still open, ask again.`, reason);
}
