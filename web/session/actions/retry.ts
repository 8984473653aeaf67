/** Appraises again what failed or was cancelled. Undo: none. */
import type { Action } from '../session.ts';
import { filesNotOpen } from './add-samples.ts';
import { appraise } from './appraise.ts';

export const retry: Action<[id: string], Promise<void>> = {
  undo: 'none',
  async run(session, id) {
    const sample = session.sample(id);
    // Files of a saved session are not there to be read; only opening them helps.
    if (sample === undefined || sample.error?.code === filesNotOpen) return;
    session.updateSample(id, ({ restarted: _restarted, ...rest }) => rest);
    await session.do(appraise, id);
  },
};
