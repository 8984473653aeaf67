/** What the maps are called on the page. */
import type { MapName } from '../../workers/api.ts';
import type { DrawingKind } from '../hand/hand.ts';

/** Maps that the switch offers; the raw ones are reached from their levelled twins. */
export const switchMaps = ['height', 'current', 'layers', 'thickness', 'glow'] as const satisfies readonly MapName[];
export type SwitchMap = (typeof switchMaps)[number];

export const mapWords: Readonly<Record<MapName, string>> = {
  height: 'height', current: 'current', layers: 'layers', thickness: 'thickness', glow: 'glow', rawHeight: 'raw height', rawCurrent: 'raw current',
};

/** The raw twin of a map, where it has one. */
export const rawTwin: Readonly<Partial<Record<MapName, MapName>>> = { height: 'rawHeight', current: 'rawCurrent' };

const drawingKeys: Readonly<Record<DrawingKind, string>> = {
  stroke: pathKeys(), line: pathKeys(), corners: pathKeys(), places: ' Enter sets a place in the middle or takes it out; Backspace takes the last one out.',
};

/** What the map is and which keys it takes, for those who do not see it. */
export function stageLabel(map: MapName, drawing: DrawingKind | undefined): string {
  return `Map: ${map}. Plus and minus zoom, arrows move, 0 shows all of it.${drawing ? drawingKeys[drawing] : ''}`;
}

function pathKeys(): string {
  return ' Enter sets a point in the middle, twice ends the path; Backspace takes it back, Escape drops it.';
}
