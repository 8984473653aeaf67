import type { Grid, MaskMap } from '../grid/maps.ts';
import type { Ground } from '../ground/ground.ts';
import { notice } from '../problems/problem.ts';
import type { ProblemDetail, Notice } from '../problems/problem.ts';
import { classifyRaised } from './classify.ts';
import type { Draft } from './correction-draft.ts';
import { addFlaw, draftOf, flawAt, give, handled, pixelsOf, takeAway } from './correction-draft.ts';
import { finishDraft, measureFlaw } from './correction-finish.ts';
import type { CorrectionEntry } from './correction-recipe.ts';
import type { Path, Point } from './correction-shapes.ts';
import { outlinePixels, strokePixels } from './correction-shapes.ts';
import { splitAlong } from './correction-split.ts';
import { correctionPlace, correctionWords } from './correction-words.ts';
import type { FlawCause, Flaws } from './flaws.ts';

/** Why a correction changes nothing; undefined when it was applied. */
type Idle = ProblemDetail<'correction-idle'>['why'] | undefined;

/** Without a stated reach, a point means the nearest flaw within so many pixels. */
const reachPixels = 2;

/**
 * Corrections by hand, applied in order to what was found. They are points and outlines in metres and never numbers of flaws, so that they hold when
 * the ground is levelled anew or thresholds move:
 *
 * - reclassify, dismiss, merge: a point means the flaw that covers it, else the nearest within reach.
 * - split: the flaw that most of the line lies on and that it parts; each part is measured and, where it was classed by its height, classed anew.
 * - merge: the flaws become one, measured and classed the same way; a class that was set by hand, or a short or open among them, is kept (that of the largest).
 * - paint, polygon: the pixels are a flaw of that cause, whatever was found there; with flaws of the same cause that they overlap they become one.
 * - erase, polygon with `none`: the pixels are no flaw.
 *
 * Only the footprint is painted. A flaw that loses pixels is measured again and keeps its class; what comes apart is numbered apart. A class that
 * was set by hand has confidence 1. Flaws that remain keep their order, new ones follow; numbers run from 1 without gaps and the map agrees with the list. What is given is
 * not changed. A correction that meets nothing changes nothing and gives one notice.
 */
export function applyCorrections(flaws: Flaws, corrections: readonly CorrectionEntry[], ground: Ground, grid: Grid, footprint: MaskMap): Flaws {
  if (corrections.length === 0) return flaws;
  const draft = draftOf(flaws, ground.current, grid, footprint.data);
  const idle: Notice[] = [];
  for (const [k, entry] of corrections.entries()) {
    const why = applyOne(draft, entry);
    if (why === undefined) continue;
    const [xUm, yUm] = correctionPlace(entry);
    idle.push(notice('correction-idle', { number: k + 1, what: correctionWords(entry), xUm, yUm, why }));
  }
  return {
    ...flaws, ...finishDraft(draft),
    warnings: [...flaws.warnings, ...idle],
    corrections: { given: corrections.length, applied: corrections.length - idle.length },
  };
}

function applyOne(draft: Draft, entry: CorrectionEntry): Idle {
  switch (entry.kind) {
    case 'reclassify': return reclassify(draft, flawAt(draft, metres(entry.xUm, entry.yUm), reachM(draft, entry.radiusUm)), entry.cause);
    case 'dismiss': return dismiss(draft, flawAt(draft, metres(entry.xUm, entry.yUm), reachM(draft, entry.radiusUm)));
    case 'merge': return merge(draft, path(entry.pointsUm).map((point) => flawAt(draft, point, reachM(draft, entry.radiusUm))));
    case 'split': return split(draft, path(entry.pointsUm));
    case 'paint': return cover(draft, strokePixels(draft.grid, path(entry.pointsUm), entry.widthUm * 1e-6), entry.cause);
    case 'erase': return clear(draft, strokePixels(draft.grid, path(entry.pointsUm), entry.widthUm * 1e-6));
    case 'polygon': {
      const pixels = outlinePixels(draft.grid, path(entry.pointsUm));
      return entry.cause === 'none' ? clear(draft, pixels) : cover(draft, pixels, entry.cause);
    }
  }
}

function reclassify(draft: Draft, label: number, cause: FlawCause): Idle {
  const flaw = draft.flaws[label];
  if (!flaw) return 'no-flaw';
  Object.assign(flaw, { cause, confidence: 1, reason: `set by hand: ${cause}`, byHand: true });
  return undefined;
}

function dismiss(draft: Draft, label: number): Idle {
  if (label === 0) return 'no-flaw';
  takeAway(draft, pixelsOf(draft, label));
  return undefined;
}

function merge(draft: Draft, found: readonly number[]): Idle {
  const labels = [...new Set(found)].filter((label) => label !== 0);
  // All points on one flaw: they are one already.
  if (labels.length < 2) return labels.length === 1 && !found.includes(0) ? undefined : 'too-few';
  const members = labels.map((label) => ({ label, flaw: draft.flaws[label]!, pixels: pixelsOf(draft, label) }));
  const [one, ...others] = members;
  const raised = members.every(({ flaw }) => !flaw.byHand && isRaised(flaw.cause));
  const kept = members.filter(({ flaw }) => raised || flaw.byHand || !isRaised(flaw.cause)).reduce((a, b) => (b.pixels.length > a.pixels.length ? b : a)).flaw;
  const { cause, confidence, reason, byHand } = kept;
  Object.assign(one!.flaw, { cause, confidence, reason, byHand });
  // Folds together are a fold, with anything else they are whatever their shape says.
  if (!members.every(({ flaw }) => flaw.kind === 'ridge')) delete one!.flaw.kind;
  for (const { label, pixels } of others) {
    give(draft, one!.label, pixels);
    draft.flaws[label] = undefined;
  }
  classAnew(draft, one!.label, 'merged by hand');
  return undefined;
}

function split(draft: Draft, line: Path): Idle {
  const parts = splitAlong(draft, line);
  if (!parts) return 'not-parted';
  for (const label of parts) classAnew(draft, label, 'split by hand');
  return undefined;
}

/** After a change of extent: a class that follows from the shape is found anew, at once, because later corrections may ask for it. */
function classAnew(draft: Draft, label: number, did: string): void {
  const flaw = draft.flaws[label]!;
  if (!flaw.byHand && isRaised(flaw.cause) && draft.maps.rise) Object.assign(flaw, classifyRaised(measureFlaw(draft, label)));
  handled(flaw, did);
}

function cover(draft: Draft, pixels: Int32Array, cause: FlawCause): Idle {
  const inside = pixels.filter((i) => draft.footprint[i] === 1);
  if (inside.length === 0) return 'no-ground';
  const same = new Set<number>();
  for (const i of inside) if (draft.flaws[draft.labels[i]!]?.cause === cause) same.add(draft.labels[i]!);
  const painted = { cause, confidence: 1, reason: `painted by hand: ${cause}`, byHand: true, changed: true };
  const [own = addFlaw(draft, painted), ...others] = [...same].sort((a, b) => a - b);
  if (same.size > 0) Object.assign(draft.flaws[own]!, { ...painted, reason: `painted by hand in part: ${cause}` });
  for (const label of others) {
    give(draft, own, pixelsOf(draft, label));
    draft.flaws[label] = undefined;
  }
  takeAway(draft, inside, own);
  give(draft, own, inside);
  return undefined;
}

function clear(draft: Draft, pixels: Int32Array): Idle {
  return takeAway(draft, pixels).length > 0 ? undefined : 'no-flaw';
}

/** Found by height, so that its class follows from its shape. */
function isRaised(cause: FlawCause): boolean {
  return cause === 'bubble' || cause === 'residue' || cause === 'wrinkle';
}

function reachM({ grid }: Draft, radiusUm: number | undefined): number {
  return radiusUm === undefined ? reachPixels * Math.max(grid.pitchXM, grid.pitchYM) : radiusUm * 1e-6;
}

function path(pointsUm: readonly (readonly [number, number])[]): Path {
  return pointsUm.map(([xUm, yUm]) => metres(xUm, yUm));
}

function metres(xUm: number, yUm: number): Point {
  return [xUm * 1e-6, yUm * 1e-6];
}
