/** What the maps are called on the page. */
import type { MapName } from '../../workers/api.ts';

/** Maps that the switch offers; the raw ones are reached from their levelled twins. */
export const switchMaps = ['height', 'current', 'layers', 'thickness', 'glow'] as const satisfies readonly MapName[];
export type SwitchMap = (typeof switchMaps)[number];

export const mapWords: Readonly<Record<MapName, string>> = {
  height: 'height', current: 'current', layers: 'layers', thickness: 'thickness', glow: 'glow', rawHeight: 'raw height', rawCurrent: 'raw current',
};

/** The raw twin of a map, where it has one. */
export const rawTwin: Readonly<Partial<Record<MapName, MapName>>> = { height: 'rawHeight', current: 'rawCurrent' };
