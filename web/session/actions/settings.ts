/** Settings and places of the page. Undo: none for all of them. */
import type { Action } from '../session.ts';
import type { Place, SessionState } from '../state.ts';

/** Goes to a place; a sample that is not there leads nowhere. */
export const go: Action<[place: Place]> = {
  undo: 'none',
  run(session, place) {
    if (place.name !== 'tray' && session.sample(place.id) === undefined) return;
    session.update((state) => ({ ...state, place }));
  },
};

/** Usable area that a device needs in µm²; undefined, or anything that is not above 0: samples are not judged. */
export const setRequired: Action<[requiredUm2: number | undefined]> = {
  undo: 'none',
  run(session, requiredUm2) {
    session.update(({ requiredUm2: _former, ...state }) => (requiredUm2 !== undefined && requiredUm2 > 0 && Number.isFinite(requiredUm2) ? { ...state, requiredUm2 } : state));
  },
};

export const setTheme: Action<[theme: SessionState['theme']]> = {
  undo: 'none',
  run(session, theme) {
    session.update((state) => ({ ...state, theme }));
  },
};

/** Takes away one notice by its place in the list, or all. */
export const dismiss: Action<[index?: number]> = {
  undo: 'none',
  run(session, index) {
    session.update((state) => ({ ...state, notices: index === undefined ? [] : state.notices.filter((_, i) => i !== index) }));
  },
};
