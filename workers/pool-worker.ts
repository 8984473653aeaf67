/** One worker of the pool as the page sees it: started when first needed, replaced when lost, every call settled. */
import { wrap } from 'comlink';
import type { Remote } from 'comlink';
import type { RecipeData } from './api.ts';
import { ComputeError } from './api.ts';
import type { SampleOffer } from './local-compute.ts';
import type { Reply, WorkerApi } from './wire.ts';
import { errorOf } from './wire.ts';

/** A sample and what it takes to bring it back in a new worker. */
export interface Placed {
  readonly id: string;
  readonly offer: SampleOffer;
  /** The newest run that succeeded, and its recipe. */
  run: number;
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
        try {
          const { worker, remote } = this.ready(id);
          // What a worker said before it was replaced counts no more.
          const isFirst = (): boolean => this.running?.worker === worker && this.pending.delete(pending);
          ask(remote).then(
            (reply) => {
              if (!isFirst()) return;
              if (reply.ok) resolve(reply.value);
              else reject(errorOf(reply));
            },
            (error: unknown) => {
              if (isFirst()) reject(lostError(`a message could not be sent: ${String(error)}`));
            },
          );
        } catch (error) {
          this.pending.delete(pending);
          reject(lostError(String(error)));
        }
      };
      const pending: Pending = { run, send, reject };
      this.pending.add(pending);
      send();
    });
  }

  /** Rejects a run at once and tells the worker, which is replaced when it has not heard after `patienceMs`. */
  abort(run: number, patienceMs: number): void {
    const pending = [...this.pending].find((candidate) => candidate.run === run);
    if (!pending || !this.running) return;
    const { worker, remote } = this.running;
    pending.reject(new ComputeError('aborted', 'Stopped before it was finished.'));
    remote.abort(run).catch(() => {});
    setTimeout(() => {
      if (this.running?.worker !== worker || !this.pending.delete(pending)) return;
      this.replace();
    }, patienceMs);
  }

  /** Ends a worker that does not listen and sends what it has not answered to a new one. */
  private replace(): void {
    this.end();
    for (const { send } of this.pending) send();
  }

  /** Takes the sample out of the worker, if it runs. */
  remove(id: string): void {
    this.samples.delete(id);
    if (this.running?.knows.delete(id)) this.running.remote.close(id).catch(() => {});
  }

  /** Ends the worker, until the next call starts another; what it has not answered is rejected. */
  lose(reason: string): void {
    const lost = this.end();
    if (!lost) return;
    const pending = [...this.pending];
    this.pending.clear();
    for (const { reject } of pending) reject(lostError(reason));
    this.onLost([...lost], reason);
  }

  private end(): ReadonlySet<string> | undefined {
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
      running.remote.adopt(placed.id, placed.offer, placed.recipe).catch(() => {});
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
  return new ComputeError('worker-lost', `The computation was lost (${reason}); what was open is still there, ask again.`, reason);
}
