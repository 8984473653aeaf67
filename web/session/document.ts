/** The session as one document: what is kept of it, how it is written down, how it is read again. */
import type { RecipeData } from '../../workers/api.ts';
import { filesNotOpen } from './actions/add-samples.ts';
import { emptyRecipe } from './recipe.ts';
import { firstState } from './session.ts';
import type { Place, RecipeStep, SampleState, SessionState } from './state.ts';

/** Where a piece of state is kept: in the document, in the browser's own store, or nowhere (it is computed or said again). */
type Kept = 'document' | 'browser' | 'nowhere';

/** Every piece must say where it is kept, or the types do not fit. */
export const keptOfSession = { place: 'document', samples: 'document', requiredUm2: 'document', theme: 'browser', notices: 'nowhere' } as const satisfies Record<keyof SessionState, Kept>;
export const keptOfSample = {
  id: 'document', name: 'document', files: 'document', demo: 'document', history: 'document', at: 'document',
  status: 'nowhere', progress: 'nowhere', summary: 'nowhere', previous: 'nowhere', error: 'nowhere', run: 'nowhere', restarted: 'nowhere',
} as const satisfies Record<keyof SampleState, Kept>;

export const documentFormat = 'evenglow-session';
export const documentVersion = 1;

/** JSON of the session: recipes and names, no maps, no bytes of files, nothing that is computed from them. */
export function serialise(state: SessionState): string {
  const kept = { ...pick(state, keptOfSession), samples: state.samples.map((sample) => pick(sample, keptOfSample)) };
  return JSON.stringify({ format: documentFormat, version: documentVersion, ...kept });
}

/**
 * The state that a document describes. Its samples wait for their files: opening files of the same names (or the invented
 * samples) gives each its recipes back. Throws an Error with one sentence when the document is not one or is newer.
 */
export function restore(text: string): SessionState {
  const document = parse(text);
  if (document['format'] !== documentFormat) throw new Error('This is not a saved session of Evenglow.');
  if (document['version'] !== documentVersion) throw new Error(`This session has version ${String(document['version'])}; this program reads version ${documentVersion}.`);
  const { samples, place, requiredUm2 } = document;
  if (!Array.isArray(samples)) throw new Error('This session is damaged: it has no list of samples.');
  const restored = samples.map(restoreSample);
  return {
    ...firstState,
    samples: restored,
    place: restorePlace(place, restored),
    ...(typeof requiredUm2 === 'number' && requiredUm2 > 0 ? { requiredUm2 } : {}),
  };
}

function restoreSample(value: unknown, index: number): SampleState {
  const damaged = (what: string): Error => new Error(`This session is damaged: sample ${index + 1} ${what}.`);
  if (!isObject(value)) throw damaged('is no sample');
  const { id, name, files, demo, history, at } = value;
  if (typeof id !== 'string' || typeof name !== 'string') throw damaged('has no name');
  if (!Array.isArray(files) || !files.every((file) => typeof file === 'string')) throw damaged('has no list of files');
  const steps = Array.isArray(history) && history.every(isStep) ? history : undefined;
  if (steps === undefined || typeof at !== 'number' || steps[at] === undefined) throw damaged('has no history of recipes');
  const open = demo === true ? 'open the invented samples again' : `open ${files.join(', ')} again`;
  return {
    // The computation gives ids of its own, which a saved one must not meet.
    id: savedId(id), name, files, ...(demo === true ? { demo } : {}), history: steps, at, run: 0, status: 'failed',
    error: { code: filesNotOpen, message: `${name}: its files are not open in this session; ${open}.` },
  };
}

function restorePlace(value: unknown, samples: readonly SampleState[]): Place {
  if (!isObject(value) || typeof value['id'] !== 'string') return { name: 'tray' };
  const id = savedId(value['id']);
  return samples.some((sample) => sample.id === id) ? { name: 'sample', id } : { name: 'tray' };
}

const savedId = (id: string): string => (id.startsWith('saved ') ? id : `saved ${id}`);

function isStep(value: unknown): value is RecipeStep {
  return isObject(value) && typeof value['label'] === 'string' && isObject(value['recipe']) && (value['recipe'] as RecipeData)['format'] === emptyRecipe['format'];
}

function isObject(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function parse(text: string): Readonly<Record<string, unknown>> {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch (error) {
    throw new Error(`This session is not valid JSON (${(error as Error).message}).`, { cause: error });
  }
  if (!isObject(value)) throw new Error('This is not a saved session of Evenglow.');
  return value;
}

function pick<T extends object>(value: T, kept: Readonly<Record<string, Kept>>): Partial<T> {
  return Object.fromEntries(Object.entries(value).filter(([key]) => kept[key] === 'document')) as Partial<T>;
}
