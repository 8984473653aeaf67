/** Tools for work by hand on the map, corrections of flaws and spots of ground: what each draws, what it says, and the correction that comes of it. */
import type { Correction, FlawCause, FlawEntry } from '../../workers/api.ts';
import { plain } from '../sample/format.ts';

export type PointUm = readonly [x: number, y: number];

/** What ground is drawn as. */
export type DrawnAs = FlawCause | 'none';

/** The tool in hand. `merge` waits for another flaw, the others draw. */
export type Hand =
  | { readonly tool: 'merge'; readonly first: FlawEntry }
  | { readonly tool: 'split' }
  | { readonly tool: 'brush'; readonly as: DrawnAs; readonly widthUm: number }
  | { readonly tool: 'outline'; readonly as: DrawnAs }
  | { readonly tool: 'spots'; readonly from: readonly PointUm[] };

/** How a tool draws: a path under a held pointer, a straight line, corners set one by one, or single places, which a second click takes out. */
export type DrawingKind = 'stroke' | 'line' | 'corners' | 'places';

/** Fewer spots of ground leave a tilt open. */
export const leastSpots = 3;

/** A correction and its name for the undo button. */
export interface NamedCorrection {
  readonly correction: Correction;
  readonly label: string;
}

export function drawingKind(hand: Hand): DrawingKind | undefined {
  return hand.tool === 'brush' ? 'stroke' : hand.tool === 'split' ? 'line' : hand.tool === 'outline' ? 'corners' : hand.tool === 'spots' ? 'places' : undefined;
}

/** Which flaw is meant, as a place on it: numbers change with every appraisal. */
export function placeOf({ insideUm, xUm, yUm }: FlawEntry): PointUm {
  return rounded(insideUm ?? [xUm, yUm]);
}

export function setCause(flaw: FlawEntry, cause: FlawCause): NamedCorrection {
  const [xUm, yUm] = placeOf(flaw);
  return { correction: { kind: 'reclassify', xUm, yUm, cause }, label: `flaw set to ${cause}` };
}

export function dismissFlaw(flaw: FlawEntry): NamedCorrection {
  const [xUm, yUm] = placeOf(flaw);
  return { correction: { kind: 'dismiss', xUm, yUm }, label: 'flaw dismissed' };
}

export function mergeFlaws(first: FlawEntry, second: FlawEntry): NamedCorrection {
  return { correction: { kind: 'merge', pointsUm: [placeOf(first), placeOf(second)] }, label: 'flaws merged' };
}

/** The correction that a drawn path means; undefined for a tool that draws nothing. */
export function drawn(hand: Hand, path: readonly PointUm[]): NamedCorrection | undefined {
  const pointsUm = path.map(rounded);
  switch (hand.tool) {
    case 'merge': case 'spots': return undefined;
    case 'split': return { correction: { kind: 'split', pointsUm }, label: 'flaw split' };
    case 'brush':
      return hand.as === 'none'
        ? { correction: { kind: 'erase', pointsUm, widthUm: hand.widthUm }, label: 'flaws erased' }
        : { correction: { kind: 'paint', pointsUm, widthUm: hand.widthUm, cause: hand.as }, label: `${hand.as} painted` };
    case 'outline':
      return { correction: { kind: 'polygon', pointsUm, cause: hand.as }, label: hand.as === 'none' ? 'outline cleared' : `outline filled with ${hand.as}` };
  }
}

/** What to do now, in one sentence. */
export function hintOf(hand: Hand): string {
  switch (hand.tool) {
    case 'merge': return `Merging flaw ${hand.first.flaw}: pick the other flaw, on the map or in the list.`;
    case 'split': return 'Splitting: draw a line right across the flaw.';
    case 'brush': return `${hand.as === 'none' ? 'Erasing flaws' : `Painting ${hand.as}`}, ${plain(hand.widthUm)}\u00a0µm wide: drag over the map.`;
    case 'spots': return `Picking ground: ${leastSpots} or more places of bare, even ground, spread over the map; a place again takes it out.`;
    case 'outline': return `Outlining ${hand.as === 'none' ? 'flawless ground' : hand.as}: set corners, then the first one again.`;
  }
}

/** A brush for a map of this width: about a fiftieth of it, as 1, 2 or 5 times a power of ten, µm. */
export function firstWidthUm(mapUm: number): number {
  const most = mapUm / 40;
  const power = 10 ** Math.floor(Math.log10(most));
  const lead = most / power;
  return Number(((lead >= 5 ? 5 : lead >= 2 ? 2 : 1) * power).toPrecision(1));
}

/** Places as the recipe's spots of ground. */
export function asSpots(path: readonly PointUm[]): readonly { readonly xUm: number; readonly yUm: number }[] {
  return path.map((point) => {
    const [xUm, yUm] = rounded(point);
    return { xUm, yUm };
  });
}

/** To a tenth of a nanometre, finer than any pixel. */
function rounded([x, y]: PointUm): PointUm {
  return [Math.round(x * 1e4) / 1e4, Math.round(y * 1e4) / 1e4];
}
