/** How high each pixel's terrace lies by its current: terraces are parallel planes a whole number of layers apart. */
import { quantifiedOverFloor } from './current-limits.ts';
import { heightPerGap, leastApartPx, pairDistancePx } from './gap-height.ts';
import type { CurrentGround, LayerPlanes } from './ground.ts';
import { measureLadder } from './ladder.ts';
import type { LadderFit } from './ladder.ts';

/** Ground higher than this over the roughly levelled ground is left out: nothing is known of a terrace under a feature, metres. */
const flatM = 2.5e-9;
/** Part of the ladder's step within which a current belongs to a terrace; between terraces and on films the height of the plane is unknown. */
const withinPart = 0.35;
/** The same in decades where the map shows one terrace only. */
const withinDecades = 0.4;
/** A gap between level and nearly a layer is one layer over a border too wide for the pairs, in layers. */
const levelPart = 0.3;
const hardlyPart = 0.65;
/** A measured gap this near to whole layers, in layers, is taken to be whole. */
const wholePart = 0.35;

/**
 * Planes of the terraces from the current's ladder. Their distance is the height that the map shows at the borders between them, rounded to whole
 * layers where it is near to that; without enough borders it is one layer.
 *
 * @param rough height in metres, levelled without knowledge of terraces; NaN missing.
 * @param layerM thickness of one layer; @param pitchXM of the columns, metres.
 * @returns undefined where no terrace's current can be measured (all of it censored).
 */
export function layerPlanes(current: CurrentGround, rough: Float32Array, columns: number, layerM: number, pitchXM?: number): LayerPlanes | undefined {
  const log10 = current.log10.data;
  const least = Math.log10(current.floorA * quantifiedOverFloor);
  const { data: saturated } = current.saturated;
  const { data: floor } = current.floor;
  const admitted = new Uint8Array(log10.length);
  for (let i = 0; i < admitted.length; i++) if (saturated[i] === 0 && floor[i] === 0 && log10[i]! >= least && !(rough[i]! > flatM)) admitted[i] = 1;
  const use = (i: number): boolean => admitted[i] === 1;
  const apartPx = pitchXM === undefined ? leastApartPx : pairDistancePx(pitchXM, columns);
  const ladder = measureLadder(log10, use, { levelled: rough, columns, layerM, apartPx });
  if (ladder.peaks.length === 0) return undefined;
  const step = ladder.stepDecades;
  const measuredM = step === undefined ? Number.NaN : heightPerGap(rough, log10, columns, ladder.peaks, step, use, apartPx);
  const layers = measuredM / layerM;
  const gapM = Number.isNaN(layers) || (layers > levelPart && layers < hardlyPart) ? layerM : Math.abs(layers - Math.round(layers)) < wholePart ? Math.round(layers) * layerM : measuredM;

  const reach = step === undefined ? withinDecades : withinPart * step;
  const rungs = allRungs(ladder);
  const planes = planesAt(log10, admitted, Float64Array.from(rungs, (rung) => rung.log10), Float64Array.from(rungs, ({ rung }) => rung * gapM), reach);
  return { planes, ladder, gapM };
}

/** The height that belongs to the first centre within reach, at admitted pixels; NaN elsewhere. */
function planesAt(log10: Float32Array, admitted: Uint8Array, centres: Float64Array, heights: Float64Array, reach: number): Float32Array {
  const planes = new Float32Array(log10.length).fill(Number.NaN);
  for (let i = 0; i < planes.length; i++) {
    if (admitted[i] === 0) continue;
    let k = 0;
    while (k < centres.length && !(Math.abs(log10[i]! - centres[k]!) < reach)) k++;
    if (k < centres.length) planes[i] = heights[k]!;
  }
  return planes;
}

/** The measured rungs, those missing in between, and one beyond each end. */
function allRungs({ peaks, stepDecades }: LadderFit): { log10: number; rung: number }[] {
  if (stepDecades === undefined) return peaks.map(({ log10, rung }) => ({ log10, rung }));
  const known = new Map(peaks.map((peak) => [peak.rung, peak.log10]));
  const last = peaks[peaks.length - 1]!;
  const out: { log10: number; rung: number }[] = [];
  let from = peaks[0]!;
  for (let rung = -1; rung <= last.rung + 1; rung++) {
    const measured = known.get(rung);
    if (measured !== undefined) from = { ...from, log10: measured, rung };
    out.push({ rung, log10: measured ?? from.log10 - (rung - from.rung) * stepDecades });
  }
  return out;
}
