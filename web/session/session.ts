/**
 * The session: one immutable `SessionState`, replaced as a whole by actions; tells its listeners with a `change` event.
 * What cannot be written down (file handles, the computation, the counter of runs) lies beside the state.
 */
import type { Compute, SourceFile } from '../../workers/api.ts';
import type { SampleState, SessionState } from './state.ts';

/**
 * What undo does about an action. `none`: it is not undone (files, places, views). `step`: it adds one step to a sample's
 * recipe and cuts the steps that were undone. `place`: it only moves the place in the recipe's history.
 */
export type UndoClass = 'none' | 'step' | 'place';

/** One thing that a person can do. */
export interface Action<Args extends readonly unknown[], Answer = void> {
  readonly undo: UndoClass;
  readonly run: (session: Session, ...args: Args) => Answer;
}

export const firstState: SessionState = { place: { name: 'tray' }, samples: [], theme: 'system', notices: [] };

export class Session extends EventTarget {
  readonly compute: Compute;
  /** Handles of the files behind each sample, to open them again with something added. Holds no bytes. */
  readonly handles = new Map<string, readonly SourceFile[]>();
  private current: SessionState;
  private lastRun: number;

  constructor(compute: Compute, state: SessionState = firstState) {
    super();
    this.compute = compute;
    this.current = state;
    this.lastRun = Math.max(0, ...state.samples.map((sample) => sample.run));
  }

  get state(): SessionState {
    return this.current;
  }

  do<Args extends readonly unknown[], Answer>(action: Action<Args, Answer>, ...args: Args): Answer {
    return action.run(this, ...args);
  }

  /** Replaces the state. Listeners hear of it once, and only when it changed. */
  update(change: (state: SessionState) => SessionState): void {
    const next = change(this.current);
    if (next === this.current) return;
    this.current = next;
    this.dispatchEvent(new Event('change'));
  }

  /** The same for one sample; nothing happens when it has been closed meanwhile. */
  updateSample(id: string, change: (sample: SampleState) => SampleState): void {
    this.update((state) => {
      const samples = state.samples.map((sample) => (sample.id === id ? change(sample) : sample));
      return samples.every((sample, i) => sample === state.samples[i]) ? state : { ...state, samples };
    });
  }

  sample(id: string): SampleState | undefined {
    return this.current.samples.find((sample) => sample.id === id);
  }

  /** Number of a new run, larger than all before. */
  newRun(): number {
    this.lastRun += 1;
    return this.lastRun;
  }

  /** Says something once, until it is dismissed. */
  say(name: string, message: string): void {
    this.update((state) => ({ ...state, notices: [...state.notices, { name, message }] }));
  }
}
