/** Undo and redo of a sample's recipe. Undo: place (they only move in the history). */
import type { Action, Session } from '../session.ts';
import { appraise } from './appraise.ts';
import { beforeChange } from './before-change.ts';

async function moveBy(session: Session, id: string, steps: number): Promise<void> {
  const current = session.sample(id);
  if (current === undefined || current.history[current.at + steps] === undefined) return;
  session.updateSample(id, (sample) => ({ ...beforeChange(sample), at: sample.at + steps }));
  await session.do(appraise, id);
}

/** One step back, if there is one. */
export const undo: Action<[id: string], Promise<void>> = { undo: 'place', run: (session, id) => moveBy(session, id, -1) };

/** One step forward again, if there is one. */
export const redo: Action<[id: string], Promise<void>> = { undo: 'place', run: (session, id) => moveBy(session, id, 1) };
