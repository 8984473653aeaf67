/** Appraises a sample with the recipe that it stands at. Undo: none (what it computes follows from files and recipe). */
import { questionsOf } from '../../import/questions.ts';
import { recipeOf } from '../recipe.ts';
import type { Action, Session } from '../session.ts';
import type { SampleState } from '../state.ts';

/**
 * Starts a run and ends when it has been answered. A run that is under way is aborted, and its answer dropped whenever it
 * comes. Never rejects: what goes wrong becomes the sample's status. A lost worker is said, and the run repeated once.
 */
export const appraise: Action<[id: string], Promise<void>> = {
  undo: 'none',
  async run(session, id) {
    const before = session.sample(id);
    if (before === undefined) return;
    stopRun(session, before);
    const run = session.newRun();
    session.updateSample(id, ({ error: _error, progress: _progress, ...sample }) => ({ ...sample, status: sample.summary === undefined ? 'waiting' : 'working', run }));
    const ifNewest = (change: (sample: SampleState) => SampleState): void => {
      session.updateSample(id, (sample) => (sample.run === run ? change(sample) : sample));
    };
    try {
      const summary = await session.compute.appraise(run, id, recipeOf(before), (progress) => {
        // A stage may still be told after the answer; only a run under way has progress.
        ifNewest((sample) => (isBusy(sample) ? { ...sample, status: 'working', progress } : sample));
      });
      ifNewest(({ progress: _progress, restarted: _restarted, error: _error, ...sample }) => ({ ...sample, status: 'ready', summary }));
    } catch (thrown) {
      if (session.sample(id)?.run !== run) return;
      const error = errorOf(thrown);
      if (error.code === 'worker-lost' && before.restarted !== true) {
        ifNewest((sample) => ({ ...sample, restarted: true }));
        session.say(before.name, 'The computation stopped unexpectedly and was started again.');
        await appraise.run(session, id);
        return;
      }
      ifNewest(({ progress: _progress, restarted: _restarted, ...sample }) => ({ ...sample, status: statusAfter(error), error }));
    }
  },
};

/** Whether a run is under way. */
export function isBusy(sample: SampleState): boolean {
  return sample.status === 'waiting' || sample.status === 'working';
}

/** Tells the computation to leave a sample's run, if there is one. */
export function stopRun(session: Session, sample: SampleState): void {
  if (isBusy(sample) && sample.run > 0) session.compute.abort(sample.run).catch(() => { /* A run that is already over needs no abort. */ });
}

function statusAfter(error: NonNullable<SampleState['error']>): SampleState['status'] {
  if (error.code === 'aborted') return 'cancelled';
  return questionsOf(error).length > 0 ? 'asking' : 'failed';
}

function errorOf(thrown: unknown): NonNullable<SampleState['error']> {
  if (!(thrown instanceof Error)) return { code: 'unknown', message: String(thrown) };
  const { code, detail } = thrown as Error & { readonly code?: unknown; readonly detail?: unknown };
  return { code: typeof code === 'string' ? code : 'unknown', message: thrown.message, ...(detail === undefined ? {} : { detail }) };
}
