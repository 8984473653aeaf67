/** A flaw map that is being corrected: its own copy of the labels, and what is known of each flaw by its number there. */
import { labelComponents } from '../grid/label-components.ts';
import type { Components } from '../grid/label-components.ts';
import type { Grid } from '../grid/maps.ts';
import type { CurrentGround } from '../ground/ground.ts';
import type { Flaw, FlawCause, Flaws } from './flaws.ts';
import { pixelAt } from '../grid/pixel-at.ts';
import type { PixelBox, Point } from './correction-shapes.ts';
import { boxAround } from './correction-shapes.ts';

/** A flaw while it is corrected. */
export interface DraftFlaw {
  /** As measured before; absent for what was painted. */
  readonly before?: Flaw;
  cause: FlawCause;
  confidence: number;
  reason: string;
  /** The class was set by hand and is not to be decided anew. */
  byHand: boolean;
  /** A fold stays one whatever part of it is left. */
  kind?: 'ridge';
  /** Its extent is no longer the one that was measured. */
  changed: boolean;
  /** Holds all its pixels, and may be larger. */
  box: PixelBox;
}

export interface Draft {
  readonly grid: Grid;
  readonly footprint: Uint8Array;
  /** What a flaw is measured by; absent where the quantity is. */
  readonly maps: { readonly rise?: Float32Array; readonly drop?: Float32Array; readonly log10?: Float32Array; readonly floor?: Uint8Array };
  readonly labels: Uint32Array;
  /** By number; 0 is no flaw, a number whose flaw is gone holds undefined. */
  readonly flaws: (DraftFlaw | undefined)[];
}

export function draftOf({ labels, list, rise, drop }: Flaws, current: CurrentGround | undefined, grid: Grid, footprint: Uint8Array): Draft {
  const own = labels.data.slice();
  const flaws: (DraftFlaw | undefined)[] = [undefined, ...list.map((flaw): DraftFlaw => ({
    before: flaw, cause: flaw.cause, confidence: flaw.confidence, reason: flaw.reason, byHand: flaw.byHand === true, ...(flaw.kind === 'ridge' ? { kind: flaw.kind } : {}), changed: false, box: emptyBox(),
  }))];
  for (let r = 0, i = 0; r < grid.rows; r++) for (let c = 0; c < grid.columns; c++, i++) if (own[i] !== 0) include(flaws[own[i]!]!.box, c, r);
  return {
    grid, footprint, labels: own, flaws,
    maps: { ...(rise ? { rise } : {}), ...(drop ? { drop } : {}), ...(current ? { log10: current.log10.data, floor: current.floor.data } : {}) },
  };
}

/** Pixels of a flaw in raster order. */
export function pixelsOf({ grid: { columns }, labels, flaws }: Draft, label: number): Int32Array {
  const { left, right, top, bottom } = flaws[label]!.box;
  const found: number[] = [];
  for (let r = top; r <= bottom; r++) for (let i = r * columns + left, end = r * columns + right; i <= end; i++) if (labels[i] === label) found.push(i);
  return Int32Array.from(found);
}

/** The flaw that covers a point, else the one whose nearest pixel centre is no further than `radiusM`; 0 when there is none. */
export function flawAt({ grid, labels }: Draft, point: Point, radiusM: number): number {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const index = pixelAt(grid, point);
  if (index !== undefined && labels[index] !== 0) return labels[index]!;
  const box = boxAround(grid, [point], radiusM);
  let [nearest, nearest2] = [0, radiusM * radiusM];
  for (let r = box.top; r <= box.bottom; r++) {
    for (let c = box.left; c <= box.right; c++) {
      const label = labels[r * columns + c]!;
      const away2 = ((c + 0.5) * pitchXM - point[0]) ** 2 + ((rows - r - 0.5) * pitchYM - point[1]) ** 2;
      if (label !== 0 && (away2 < nearest2 || (nearest === 0 && away2 <= nearest2))) [nearest, nearest2] = [label, away2];
    }
  }
  return nearest;
}

/** Adds a flaw without pixels; gives its number. */
export function addFlaw(draft: Draft, flaw: Omit<DraftFlaw, 'box'>): number {
  draft.flaws.push({ ...flaw, box: emptyBox() });
  return draft.flaws.length - 1;
}

/** Gives pixels to a flaw, whatever they belonged to. */
export function give({ grid: { columns }, labels, flaws }: Draft, label: number, pixels: Int32Array): void {
  const { box } = flaws[label]!;
  for (const i of pixels) {
    labels[i] = label;
    include(box, i % columns, Math.floor(i / columns));
  }
}

/**
 * Takes pixels away from whatever flaws they belong to, but for one that may keep its own. A flaw that is left without pixels is gone; a part that comes apart from the piece it was
 * connected with (by edges or corners) becomes a flaw of its own, the largest keeping the number. Gives the numbers of the flaws that lost pixels.
 */
export function takeAway(draft: Draft, pixels: Int32Array, keeper = 0): number[] {
  const lost = new Map<number, number[]>();
  for (const i of pixels) {
    const label = draft.labels[i]!;
    if (label === 0 || label === keeper) continue;
    const list = lost.get(label);
    if (list) list.push(i);
    else lost.set(label, [i]);
  }
  for (const [label, taken] of lost) trim(draft, label, taken);
  return [...lost.keys()];
}

/** Notes that a hand changed a flaw's extent: its reason says so, unless its class was set by hand already. */
export function handled(flaw: DraftFlaw, did: string): void {
  flaw.changed = true;
  if (!flaw.byHand && !flaw.reason.startsWith(did)) flaw.reason = `${did}: ${flaw.reason}`;
}

function trim(draft: Draft, label: number, taken: readonly number[]): void {
  const { labels, flaws } = draft;
  const flaw = flaws[label]!;
  const before = piecesOf(draft, label);
  for (const i of taken) labels[i] = 0;
  const after = piecesOf(draft, label);
  if (after.count === 0) {
    flaws[label] = undefined;
    return;
  }
  handled(flaw, 'trimmed by hand');
  standApart(draft, label, before, after);
}

/**
 * Makes flaws of their own of what has come apart: the largest part of each former piece keeps the number. `before` and `after` number the pieces
 * in the flaw's box. Gives the new numbers.
 */
export function standApart(draft: Draft, label: number, before: Components, after: Components): number[] {
  const flaw = draft.flaws[label]!;
  const pieceOf = new Uint32Array(after.count + 1);
  for (let k = 0; k < after.labels.length; k++) if (after.labels[k]! > 0) pieceOf[after.labels[k]!] = before.labels[k]!;
  const largest = new Uint32Array(before.count + 1);
  for (let n = 1; n <= after.count; n++) if (largest[pieceOf[n]!] === 0 || after.pixels[n]! > after.pixels[largest[pieceOf[n]!]!]!) largest[pieceOf[n]!] = n;
  const { left, right, top } = flaw.box;
  const width = right - left + 1;
  const members = new Map<number, number[]>();
  for (let n = 1; n <= after.count; n++) if (largest[pieceOf[n]!] !== n) members.set(n, []);
  for (let k = 0; members.size > 0 && k < after.labels.length; k++) {
    members.get(after.labels[k]!)?.push((top + Math.floor(k / width)) * draft.grid.columns + left + (k % width));
  }
  return [...members.values()].map((pixels) => {
    const { box: _box, ...same } = flaw;
    const own = addFlaw(draft, same);
    give(draft, own, Int32Array.from(pixels));
    return own;
  });
}

/** Connected pieces (by edges or corners) of a flaw within its box. */
export function piecesOf({ grid: { columns }, labels, flaws }: Draft, label: number): Components {
  const { left, right, top, bottom } = flaws[label]!.box;
  const [width, height] = [right - left + 1, bottom - top + 1];
  const mask = Uint8Array.from({ length: width * height }, (_, k) => (labels[(top + Math.floor(k / width)) * columns + left + (k % width)] === label ? 1 : 0));
  return labelComponents(mask, width, height, 8);
}

function emptyBox(): PixelBox {
  return { left: Number.POSITIVE_INFINITY, right: -1, top: Number.POSITIVE_INFINITY, bottom: -1 };
}

function include(box: PixelBox, c: number, r: number): void {
  if (c < box.left) box.left = c;
  if (c > box.right) box.right = c;
  if (r < box.top) box.top = r;
  if (r > box.bottom) box.bottom = r;
}
