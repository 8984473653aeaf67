/** Every pixel's place on the layer ladder. */
import type { CurrentGround } from '../ground/ground.ts';
import { heightPerGap } from '../ground/gap-height.ts';
import { quantifiedOverFloor } from '../ground/current-limits.ts';
import { measureLadder } from '../ground/ladder.ts';
import type { LadderHeight } from '../ground/ladder.ts';
import { settleTerraces } from './settle-terraces.ts';
import { layersPerGap } from './layers-per-gap.ts';
import { median } from '../stats/median.ts';
import { madScale, medianAbsoluteDeviation } from '../stats/mad.ts';

/** Unknown place on the ladder: no current here, or a flaw. */
export const unknownStep = -128;

export interface Terraces {
  /** Layers from the first (thinnest) measured terrace per pixel, `unknownStep` where unknown. */
  readonly steps: Int8Array;
  readonly stepDecades: number;
  readonly stepSeDecades: number;
  readonly from: 'map' | 'model' | 'assumed';
  /** Layers counted per gap of the map's own ladder: 1, or 2 or 3 where the model says that terraces in between are missing. */
  readonly layersPerGap: number;
  readonly rungs: readonly MeasuredRung[];
}

export interface MeasuredRung {
  readonly step: number;
  readonly pixels: number;
  readonly medianLog10: number;
  readonly scatterDecades: number;
  readonly bound: 'exact' | 'at-most' | 'at-least';
}

/**
 * Places the ground on a ladder of whole layers: with a height map by stretches of terrace (`settleTerraces`), else pixel by pixel. Where the map shows two terraces or more, boundaries lie half-way between neighbouring
 * peaks and the step is the map's own (`layersPerGap` decides whether layers in between are missing from the map); otherwise the step is `fallback`. Saturated ground is placed on the first rung that would
 * saturate (a bound: at most this thick), floor ground on the first rung that would vanish (at least this thick).
 *
 * @param ground admits ground of the footprint free of flaws.
 */
export function findTerraces(current: CurrentGround, ground: (index: number) => boolean, fallback: { stepDecades: number; from: 'model' | 'assumed' }, height?: LadderHeight): Terraces {
  const log10 = current.log10.data;
  const saturated = current.saturated.data;
  const floor = current.floor.data;
  const quantified = Math.log10(current.floorA * quantifiedOverFloor);
  // 0 beside the ground, 1 on ground, 2 where its current is neither saturated nor too near the floor.
  const admitted = new Uint8Array(log10.length);
  for (let i = 0; i < admitted.length; i++) if (ground(i)) admitted[i] = saturated[i] === 0 && log10[i]! >= quantified ? 2 : 1;
  const onGround = (i: number): boolean => admitted[i] !== 0;
  const ladder = measureLadder(log10, (i) => admitted[i] === 2, height);
  const measured = ladder.stepDecades !== undefined;
  const modelStepDecades = fallback.from === 'model' ? fallback.stepDecades : undefined;
  const heightLayers = measured && height ? heightPerGap(height.levelled, log10, height.columns, ladder.peaks, ladder.stepDecades!, onGround, height.apartPx) / height.layerM : undefined;
  const perGap = measured ? layersPerGap({ stepDecades: ladder.stepDecades!, modelStepDecades, heightLayers }) : 1;
  const stepDecades = measured ? ladder.stepDecades! / perGap : fallback.stepDecades;
  const centres = rungCentres(ladder.peaks.map((peak) => ({ log10: peak.log10, rung: peak.rung * perGap })), log10, onGround);
  const place = placer(centres, stepDecades);
  const thinnest = current.saturationA === undefined ? -127 : Math.max(-127, firstBeyond(centres, stepDecades, Math.log10(current.saturationA), -1));
  const thickest = Math.min(127, firstBeyond(centres, stepDecades, Math.log10(current.floorA), 1));

  const steps = new Int8Array(log10.length).fill(unknownStep);
  const exact = new Uint8Array(log10.length);
  for (let i = 0; i < steps.length; i++) {
    if (admitted[i] === 0 || log10[i] !== log10[i]) continue;
    if (saturated[i] === 0 && floor[i] === 0) exact[i] = 1;
    steps[i] = saturated[i] === 1 ? thinnest : thickest;
  }
  const settled = height && settleTerraces({ ...height, log10, measured: exact, stepDecades, place });
  // A single noisy pixel must not leave the ladder beyond its censored ends.
  const within = (rung: number): number => Math.min(thickest, Math.max(thinnest, rung));
  if (settled) for (let i = 0; i < steps.length; i++) if (exact[i] === 1) steps[i] = within(settled[i]!);
  if (!settled) for (let i = 0; i < steps.length; i++) if (exact[i] === 1) steps[i] = within(place(log10[i]!));
  return {
    steps,
    stepDecades,
    stepSeDecades: (ladder.stepSeDecades ?? 0) / perGap,
    layersPerGap: perGap,
    from: measured ? 'map' : fallback.from,
    rungs: summarise(steps, current, thinnest, thickest),
  };
}

/** Known centres by rung; with no peak at all, the median of the ground is rung 0. */
function rungCentres(peaks: readonly { log10: number; rung: number }[], log10: Float32Array, ground: (index: number) => boolean): Map<number, number> {
  if (peaks.length > 0) return new Map(peaks.map((peak) => [peak.rung, peak.log10]));
  const values = log10.filter((value, i) => ground(i) && !Number.isNaN(value));
  return new Map([[0, values.length > 0 ? median(values) : 0]]);
}

/** Centre of any rung: measured, interpolated between measured ones, or a whole number of steps beyond. */
function centreOf(centres: Map<number, number>, stepDecades: number, rung: number): number {
  const known = centres.get(rung);
  if (known !== undefined) return known;
  const rungs = [...centres.keys()].sort((a, b) => a - b);
  const first = rungs[0]!;
  const last = rungs[rungs.length - 1]!;
  if (rung < first) return centres.get(first)! + (first - rung) * stepDecades;
  if (rung > last) return centres.get(last)! - (rung - last) * stepDecades;
  const below = rungs.filter((k) => k < rung).pop()!;
  const above = rungs.find((k) => k > rung)!;
  return centres.get(below)! + ((centres.get(above)! - centres.get(below)!) * (rung - below)) / (above - below);
}

/** Nearest rung to a log current. */
function placer(centres: Map<number, number>, stepDecades: number): (log10: number) => number {
  const rungs = [...centres.keys()].sort((a, b) => a - b);
  const first = rungs[0]!;
  const last = rungs[rungs.length - 1]!;
  const inner: number[] = [];
  for (let rung = first; rung <= last; rung++) inner.push(centreOf(centres, stepDecades, rung));
  return (value) => {
    if (value > inner[0]! + stepDecades / 2) return first - Math.round((value - inner[0]!) / stepDecades);
    if (value < inner[inner.length - 1]! - stepDecades / 2) return last + Math.round((inner[inner.length - 1]! - value) / stepDecades);
    let k = 0;
    while (k + 1 < inner.length && value < (inner[k]! + inner[k + 1]!) / 2) k++;
    return first + k;
  };
}

/** First rung from the measured ones outwards (direction −1 thinner, +1 thicker) whose centre lies beyond a limit. */
function firstBeyond(centres: Map<number, number>, stepDecades: number, limitLog10: number, direction: 1 | -1): number {
  const rungs = [...centres.keys()];
  let rung = direction < 0 ? Math.min(...rungs) : Math.max(...rungs);
  for (let guard = 0; guard < 120 && direction * (limitLog10 - centreOf(centres, stepDecades, rung)) < 0; guard++) rung += direction;
  return rung;
}

function summarise(steps: Int8Array, current: CurrentGround, thinnest: number, thickest: number): MeasuredRung[] {
  const log10 = current.log10.data;
  const saturated = current.saturated.data;
  const floor = current.floor.data;
  // Counted first, so that each terrace's values go into an array of the right size; index 0 is step −128, which is no place.
  const pixels = new Uint32Array(256);
  const measured = new Uint32Array(256);
  for (let i = 0; i < steps.length; i++) {
    const place = steps[i]! + 128;
    pixels[place]!++;
    if (saturated[i] === 0 && floor[i] === 0) measured[place]!++;
  }
  pixels[0] = 0;
  const values = Array.from(pixels, (total, place) => (total > 0 ? new Float64Array(measured[place]!) : undefined));
  const used = new Uint32Array(256);
  for (let i = 0; i < steps.length; i++) {
    const place = steps[i]! + 128;
    if (saturated[i] === 0 && floor[i] === 0) {
      const list = values[place];
      if (list) list[used[place]!++] = log10[i]!;
    }
  }
  return values.flatMap((known, place) => {
    if (!known) return [];
    const step = place - 128;
    const total = pixels[place]!;
    const censored = known.length < 0.5 * total;
    const bound = !censored ? 'exact' : step === thinnest ? 'at-most' : step === thickest ? 'at-least' : 'exact';
    const fallback = bound === 'at-most' ? Math.log10(current.saturationA ?? Number.NaN) : Math.log10(current.floorA);
    const { median: middle, mad } = medianAbsoluteDeviation(known);
    return [{
      step,
      pixels: total,
      medianLog10: censored ? fallback : middle,
      scatterDecades: known.length > 1 ? madScale * mad : 0,
      bound,
    } satisfies MeasuredRung];
  });
}
