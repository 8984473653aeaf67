/** States which maps of a file are height and current, by opening it again with a sidecar. Undo: none (the files themselves say it then). */
import type { SourceFile } from '../../../workers/api.ts';
import type { Action, Session } from '../session.ts';
import type { SampleState } from '../state.ts';
import { appraise } from './appraise.ts';

/** Numbers count from 1. The sample keeps its recipes. Never rejects: what goes wrong is said, and the sample asks on. */
export const answerPages: Action<[id: string, file: string, pages: { readonly height?: number; readonly current?: number }], Promise<void>> = {
  undo: 'none',
  async run(session, id, file, pages) {
    const sample = session.sample(id);
    if (sample === undefined) return;
    try {
      const opened = await reopen(session, sample, { height: pages.height && `${file}#${pages.height}`, current: pages.current && `${file}#${pages.current}` });
      await session.do(appraise, opened);
    } catch (error) {
      session.say(sample.name, `It could not be opened again: ${error instanceof Error ? error.message : String(error)}`);
    }
  },
};

/** Opens the sample's files with a sidecar that says more; the sample goes on under its new id. */
async function reopen(session: Session, sample: SampleState, said: Readonly<Record<string, unknown>>): Promise<string> {
  const name = `${sample.name}.json`;
  const handles = session.handles.get(sample.id) ?? [];
  const before = handles.find((handle) => handle.name === name);
  const sidecar = { ...(before === undefined ? {} : await contentOf(before)), ...said };
  const files: SourceFile[] = [...handles.filter((handle) => handle !== before), { name, content: new Blob([JSON.stringify(sidecar)]) }];
  const reply = await session.compute.open(files);
  const [opened] = reply.samples;
  if (opened === undefined || reply.samples.length > 1) {
    for (const extra of reply.samples) forget(session, extra.id);
    throw new Error(reply.failed[0]?.message ?? 'its files no longer make one sample.');
  }
  session.handles.delete(sample.id);
  session.handles.set(opened.id, files);
  forget(session, sample.id);
  session.update((state) => ({
    ...state,
    place: state.place.name !== 'tray' && state.place.id === sample.id ? { ...state.place, id: opened.id } : state.place,
  }));
  session.updateSample(sample.id, (former) => ({ ...former, id: opened.id, files: opened.files }));
  return opened.id;
}

async function contentOf({ content }: SourceFile): Promise<object> {
  const parsed: unknown = JSON.parse(content instanceof Blob ? await content.text() : new TextDecoder().decode(content));
  return typeof parsed === 'object' && parsed !== null ? parsed : {};
}

function forget(session: Session, id: string): void {
  session.compute.close(id).catch(() => { /* What is gone needs no closing. */ });
}
