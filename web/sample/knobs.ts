/** Which settings stand in which chapter, and how they are operated. */
import type { FieldInfo, RecipeData } from '../../workers/api.ts';
import { correctionsOf, spotsOf, valueAt } from '../session/recipe.ts';
import { plain } from './format.ts';

export type ChapterName = 'scan' | 'ground' | 'flaws' | 'glow';

export interface Slider {
  readonly from: number;
  readonly to: number;
  /** Steps of equal ratio rather than equal difference. */
  readonly log?: boolean;
  readonly step?: number;
}

export interface KnobPlan {
  readonly path: string;
  readonly slider?: Slider;
  /** Of the method page. */
  readonly topic?: string;
}

/** By hand: the order is the order of use, sliders only where a feel for the value helps. */
export const chapterKnobs: Readonly<Record<ChapterName, readonly KnobPlan[]>> = {
  scan: [
    { path: 'scan.surface' }, { path: 'scan.biasV' }, { path: 'scan.biasOn' }, { path: 'scan.heightUnit' }, { path: 'scan.currentUnit' }, { path: 'scan.widthUm' }, { path: 'scan.heightUm' },
  ],
  ground: [
    { path: 'ground.order', slider: { from: 0, to: 5, step: 1 }, topic: 'form' }, { path: 'ground.lines', topic: 'lines' }, { path: 'ground.repair', topic: 'repair' },
    { path: 'ground.offsetA', topic: 'zero' }, { path: 'ground.wear', topic: 'wear' }, { path: 'ground.lag', topic: 'lag' }, { path: 'ground.lagPx', topic: 'lag' }, { path: 'ground.align', topic: 'alignment' },
  ],
  flaws: [
    { path: 'flaws.heightNm', slider: { from: 0.1, to: 20, log: true }, topic: 'thresholds' },
    { path: 'flaws.heightNoise', slider: { from: 0, to: 30, step: 0.5 }, topic: 'thresholds' },
    { path: 'flaws.dropDecades', slider: { from: 0.05, to: 3, step: 0.05 }, topic: 'thresholds' },
    { path: 'flaws.edgeShare', slider: { from: 0.05, to: 1, step: 0.05 }, topic: 'thresholds' },
    { path: 'flaws.minPixels', slider: { from: 1, to: 1000, log: true, step: 1 }, topic: 'thresholds' },
    { path: 'flaws.shortLayers', slider: { from: 0.5, to: 6, step: 0.5 }, topic: 'spots-of-current' },
    { path: 'band.shortMaxUm2', topic: 'spots-of-current' }, { path: 'band.terraceMinUm2', topic: 'spots-of-current' },
  ],
  glow: [
    { path: 'stack.biasV' }, { path: 'stack.targetNaPerUm2', slider: { from: 0.01, to: 100, log: true } },
    { path: 'band.factor', slider: { from: 1, to: 100, log: true } }, { path: 'band.minNaPerUm2' }, { path: 'band.maxNaPerUm2' },
    { path: 'barrier.referenceLayers' }, { path: 'barrier.heightEv', slider: { from: 1, to: 4, step: 0.05 } }, { path: 'barrier.massRatio', slider: { from: 0.1, to: 1, step: 0.01 } },
    { path: 'barrier.tipAreaNm2', slider: { from: 1, to: 1000, log: true } }, { path: 'barrier.model' }, { path: 'barrier.withinTerrace' },
    { path: 'stack.emitterSheetOhm' }, { path: 'stack.injectorSheetOhm' },
  ],
};

/** What a chapter's knobs are made of: the field and its plan, in order; fields that the computation does not know are left out. */
export function knobsOf(chapter: ChapterName, fields: readonly FieldInfo[]): readonly { readonly field: FieldInfo; readonly plan: KnobPlan }[] {
  return chapterKnobs[chapter].flatMap((plan) => {
    const field = fields.find(({ path }) => path === plan.path);
    return field ? [{ field, plan }] : [];
  });
}

/** Paths whose value in the sparse recipe is there and differs from the default. */
export function changedPaths(chapter: ChapterName, fields: readonly FieldInfo[], recipe: RecipeData): readonly string[] {
  return knobsOf(chapter, fields).filter(({ field }) => {
    const value = valueAt(recipe, field.path);
    return value !== undefined && value !== field.fallback;
  }).map(({ field }) => field.path);
}

/** The chapter whose settings differ between two recipes; undefined when none or several do. */
export function chapterOfChange(before: RecipeData, after: RecipeData): ChapterName | undefined {
  const corrected = JSON.stringify(correctionsOf(before)) !== JSON.stringify(correctionsOf(after));
  const picked = JSON.stringify(spotsOf(before)) !== JSON.stringify(spotsOf(after));
  const touched = (Object.keys(chapterKnobs) as ChapterName[])
    .filter((chapter) => (chapter === 'flaws' && corrected) || (chapter === 'ground' && picked) || chapterKnobs[chapter].some(({ path }) => valueAt(before, path) !== valueAt(after, path)));
  return touched.length === 1 ? touched[0] : undefined;
}

/** Chapters whose sliders show on the map where they would lead while they are held: what they change does not touch the ground. */
export const liveChapters: readonly ChapterName[] = ['flaws', 'glow'];

/** Name of the step that a change makes, for the undo button: "band factor 5", "repair off", "device bias back to default". */
export function stepLabel(field: FieldInfo, value: number | string | boolean | undefined): string {
  const title = field.title.charAt(0).toLowerCase() + field.title.slice(1);
  if (value === undefined) return `${title} back to default`;
  if (typeof value === 'boolean') return `${title} ${value ? 'on' : 'off'}`;
  if (typeof value === 'string') return `${title} ${value}`;
  return `${title} ${plain(value)}${field.unit === undefined ? '' : ` ${field.unit}`}`;
}

/** Why a number is refused, as a sentence; undefined when it is fine. */
export function refusal(field: FieldInfo, value: number): string | undefined {
  const unit = field.unit === undefined ? '' : `\u00a0${field.unit}`;
  if (Number.isNaN(value)) return `Type a number for ${field.title.toLowerCase()}, such as ${String(field.fallback ?? 1)}.`;
  if (field.integer && !Number.isInteger(value)) return `${field.title} is a whole number.`;
  if (field.min !== undefined && value < field.min) return `${field.title} is at least ${plain(field.min)}${unit}.`;
  if (field.max !== undefined && value > field.max) return `${field.title} is at most ${plain(field.max)}${unit}.`;
  return undefined;
}
