/** Opens files that belong together, such as a folder or a selection. Undo: none. */
import type { Action } from '../session.ts';
import { addSamples } from './add-samples.ts';

/** Shows the tray, groups the files into samples and appraises them. Never rejects: what goes wrong is said. */
export const openFiles: Action<[files: readonly File[]], Promise<void>> = {
  undo: 'none',
  async run(session, chosen) {
    if (chosen.length === 0) return;
    session.update((state) => ({ ...state, place: { name: 'tray' } }));
    const files = chosen.map((file) => ({ name: file.name, content: file }));
    try {
      const reply = await session.compute.open(files);
      await session.do(addSamples, { reply, demo: false, files });
    } catch (error) {
      session.say(files.length === 1 ? chosen[0]!.name : `${files.length} files`, `They could not be opened: ${error instanceof Error ? error.message : String(error)}`);
    }
  },
};
