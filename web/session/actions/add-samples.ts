/** Takes what the computation opened into the session. Undo: none. */
import type { OpenReply, SourceFile } from '../../../workers/api.ts';
import { emptyRecipe } from '../recipe.ts';
import type { Action } from '../session.ts';
import type { SampleState } from '../state.ts';
import { appraise } from './appraise.ts';

/** Code of a sample that a saved session names and whose files have not been opened in this one. */
export const filesNotOpen = 'files-not-open';

export interface Added {
  readonly reply: OpenReply;
  readonly demo: boolean;
  /** What was opened, to be opened again with something added; empty for the invented samples. */
  readonly files: readonly SourceFile[];
}

/**
 * Adds the samples, says what could not be used, and appraises all of them at once; ends when the last one has an answer.
 * A sample that a saved session waits for (same name, same files) takes its place and its recipes.
 */
export const addSamples: Action<[added: Added], Promise<void>> = {
  undo: 'none',
  async run(session, { reply, demo, files }) {
    for (const opened of reply.samples) {
      session.handles.set(opened.id, files.filter((file) => opened.files.includes(file.name)));
    }
    session.update((state) => {
      let samples = state.samples;
      let place = state.place;
      const found: SampleState[] = [];
      for (const opened of reply.samples) {
        const saved = samples.find((sample) => awaits(sample, opened, demo));
        const fresh: SampleState = {
          id: opened.id, name: opened.name, files: opened.files, ...(demo ? { demo } : {}), status: 'waiting', run: 0,
          history: saved?.history ?? [{ recipe: emptyRecipe, label: '' }], at: saved?.at ?? 0,
        };
        if (saved === undefined) found.push(fresh);
        else samples = samples.map((sample) => (sample === saved ? fresh : sample));
        if (saved !== undefined && place.name !== 'tray' && place.id === saved.id) place = { ...place, id: fresh.id };
      }
      // One's own samples stand above the invented ones.
      samples = demo ? [...samples, ...found] : [...found, ...samples];
      const notices = [
        ...state.notices,
        ...reply.failed.map(({ name, message }) => ({ name, message })),
        ...reply.skipped.map(({ name, reason }) => ({ name, message: `${name} was left out: ${reason}.` })),
      ];
      return { ...state, samples, notices, place };
    });
    await Promise.all(reply.samples.map(({ id }) => session.do(appraise, id)));
  },
};

function awaits(sample: SampleState, opened: { readonly name: string; readonly files: readonly string[] }, demo: boolean): boolean {
  if (sample.error?.code !== filesNotOpen || (sample.demo ?? false) !== demo || sample.name !== opened.name) return false;
  return demo || [...sample.files].sort().join('\n') === [...opened.files].sort().join('\n');
}
