/** Opens the invented samples. Undo: none. */
import type { Action } from '../session.ts';
import { addSamples } from './add-samples.ts';

export const openDemo: Action<[], Promise<void>> = {
  undo: 'none',
  async run(session) {
    try {
      await session.do(addSamples, { reply: await session.compute.openDemo(), demo: true, files: [] });
    } catch (error) {
      session.say('Invented samples', `They could not be opened: ${error instanceof Error ? error.message : String(error)}`);
    }
  },
};
