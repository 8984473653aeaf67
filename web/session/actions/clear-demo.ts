/** Takes the invented samples out. Undo: none (they can be opened again). */
import type { Action } from '../session.ts';
import { close } from './close.ts';

export const clearDemo: Action<[]> = {
  undo: 'none',
  run(session) {
    session.do(close, session.state.samples.filter((sample) => sample.demo === true).map(({ id }) => id));
  },
};
