/** Takes samples out of the session. Undo: none (their files lie where they lay). */
import type { Action } from '../session.ts';
import { stopRun } from './appraise.ts';

export const close: Action<[ids: readonly string[]]> = {
  undo: 'none',
  run(session, ids) {
    for (const sample of session.state.samples.filter(({ id }) => ids.includes(id))) {
      stopRun(session, sample);
      session.handles.delete(sample.id);
      session.compute.close(sample.id).catch(() => { /* A worker that is gone has nothing left to close. */ });
    }
    session.update((state) => ({
      ...state,
      samples: state.samples.filter(({ id }) => !ids.includes(id)),
      place: state.place.name !== 'tray' && ids.includes(state.place.id) ? { name: 'tray' } : state.place,
    }));
  },
};
