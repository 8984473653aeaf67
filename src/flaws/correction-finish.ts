/** From a corrected draft back to flaws: measures what has changed and numbers everything from 1. */
import { squaredDistance } from '../grid/distance.ts';
import { labelMap } from '../grid/maps.ts';
import type { Draft, DraftFlaw } from './correction-draft.ts';
import { flawOf } from './flaw-of.ts';
import type { Flaw, Flaws } from './flaws.ts';
import { measureRegions } from './measure.ts';
import type { Region } from './measure.ts';

/** Labels and list of the draft, in the order of the draft's numbers. Flaws whose extent did not change keep their measurements. */
export function finishDraft(draft: Draft): Pick<Flaws, 'labels' | 'list'> {
  const { grid, labels, flaws } = draft;
  const numbers = new Uint32Array(flaws.length);
  const list: Flaw[] = [];
  flaws.forEach((flaw, label) => {
    if (!flaw) return;
    numbers[label] = list.length + 1;
    list.push(finished(draft, flaw, label, list.length + 1));
  });
  return { labels: labelMap(grid, labels.map((label) => numbers[label]!)), list };
}

function finished(draft: Draft, { before, changed, cause, confidence, reason, byHand }: DraftFlaw, label: number, number: number): Flaw {
  const measured = before && !changed ? { ...before, flaw: number, cause, confidence, reason } : flawOf(measureFlaw(draft, label), number, { cause, confidence, reason });
  return byHand ? { ...measured, byHand } : measured;
}

/**
 * Measures one flaw of the draft in the part of the map around it. Depths inside count from what is not this flaw; the map's border is no outside,
 * as for flaws that were found.
 */
export function measureFlaw({ grid, labels, flaws, maps }: Draft, label: number): Region {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const { box, kind } = flaws[label]!;
  const [left, top] = [Math.max(0, box.left - 1), Math.max(0, box.top - 1)];
  const [width, height] = [Math.min(columns - 1, box.right + 1) - left + 1, Math.min(rows - 1, box.bottom + 1) - top + 1];
  const part = <T extends Float32Array | Uint8Array | Uint32Array>(map: T, empty: T): T => {
    for (let r = 0; r < height; r++) empty.set(map.subarray((top + r) * columns + left, (top + r) * columns + left + width), r * width);
    return empty;
  };
  const count = width * height;
  const mask = Uint8Array.from(part(labels, new Uint32Array(count)), (own) => (own === label ? 1 : 0));
  const { rise, drop, log10, floor } = maps;
  const region = measureRegions({
    columns: width, rows: height, pitchXM, pitchYM, labels: Uint32Array.from(mask), count: 1, distance2: squaredDistance(mask, width, height, { pitchX: pitchXM, pitchY: pitchYM }),
    ...(rise ? { rise: part(rise, new Float32Array(count)) } : {}), ...(drop ? { drop: part(drop, new Float32Array(count)) } : {}),
    ...(log10 ? { log10: part(log10, new Float32Array(count)) } : {}), ...(floor ? { floor: part(floor, new Uint8Array(count)) } : {}),
  })[0]!;
  return { ...region, ...(kind ? { kind } : {}), xM: region.xM + left * pitchXM, yM: region.yM + (rows - top - height) * pitchYM };
}
