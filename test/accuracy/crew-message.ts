import type { SceneResult } from './work.ts';

/** What a thread answers to a task. */
export type CrewMessage = { readonly result: SceneResult } | { readonly error: string };
