/** Thickness map and terraces' thickness from maps at two or more biases. */
import { scalarMap } from '../grid/maps.ts';
import type { Grid } from '../grid/maps.ts';
import { measuredOnly } from '../ground/condition-further.ts';
import type { CurrentGround, FurtherCurrent } from '../ground/ground.ts';
import { scaledMad } from '../stats/mad.ts';
import { median } from '../stats/median.ts';
import { densityTable } from './model/table.ts';
import type { BarrierMaterial, TunnelModel } from './model/tunnel-model.ts';
import { unknownStep } from './terraces.ts';
import { biasSolver, steepnessFromRatio } from './two-bias.ts';
import type { BiasSolver } from './two-bias.ts';

/** One terrace of the ladder by its currents at several biases. */
export interface BiasTerrace {
  /** Place on the ladder, counted from the thinnest measured terrace; in the barrier stage's result from the reference. */
  readonly step: number;
  /** Pixels with a measured current at every bias and a thickness, and their share of the terrace. */
  readonly pixels: number;
  readonly usedShare: number;
  /** Median thickness at the stated barrier height and mass, and its standard error from the scatter; metres. */
  readonly thicknessM: number;
  readonly seM: number;
  /** Median standard error of a single pixel from the amplifiers' noise, metres. */
  readonly pixelSeM: number;
  /** Median of ln(I at the highest bias / I at the lowest), and its standard error. */
  readonly lnRatio: number;
  readonly lnRatioSe: number;
  /** √m·φ^1.5·d in eV^1.5 nm by Fowler–Nordheim's formula, where both biases are above the barrier's height. */
  readonly steepnessEv15Nm?: number;
  readonly steepnessSe?: number;
}

/** Thickness per pixel by maps at several biases. */
export interface BiasMap {
  /** In the order of the maps, the first current's first. */
  readonly biasesV: readonly number[];
  /** Lowest and highest of them as magnitudes. */
  readonly lowV: number;
  readonly highV: number;
  /** Metres; NaN on flaws and wherever a current is censored, missing or repaired in any of the maps. */
  readonly thickness: Float32Array;
  /** Standard error from the amplifiers' noise, metres, and ln(I at the highest bias / I at the lowest). */
  readonly pixelSe: Float32Array;
  readonly lnRatio: Float32Array;
  readonly solver: BiasSolver;
  readonly further: readonly FurtherCurrent[];
}

export interface BiasThickness extends BiasMap {
  readonly terraces: readonly BiasTerrace[];
}

/** What noise does not account for in the ln current of a pixel; keeps bright pixels from having no error at all. */
const leastSd = 0.02;
/** Neighbouring pixels share their contact: errors of terraces come from squares of this many pixels a side. */
const block = 24;
const leastBlocks = 6;
const leastInBlock = 20;
const leastPixels = 50;
/** Pixels known less well than this would blur terraces more than the contact does. */
const evenBelowLayers = 0.3;

/**
 * Solves every pixel of the admitted ground for the thickness at which the model gives the currents at all biases, whatever the contact's area.
 * Undefined where the model does not hold at one of the biases.
 *
 * @param ground admits ground of the footprint free of flaws.
 */
export function biasMap(
  current: CurrentGround, further: readonly FurtherCurrent[], ground: (index: number) => boolean, model: TunnelModel, material: BarrierMaterial,
): BiasMap | undefined {
  const biasesV = [current.biasV!, ...further.map(({ biasV }) => biasV)];
  const solver = biasSolver(model, material, biasesV);
  if (!solver) return undefined;
  const magnitudes = biasesV.map(Math.abs);
  const [lowV, highV] = [Math.min(...magnitudes), Math.max(...magnitudes)];
  const [low, high] = [magnitudes.indexOf(lowV), magnitudes.indexOf(highV)];
  const maps = [measuredOnly(current), ...further.map(({ log10 }) => log10)];
  const noises = [current.noiseA, ...further.map(({ noiseA }) => noiseA)];
  const count = current.log10.data.length;
  const [thickness, pixelSe, lnRatio] = [0, 0, 0].map(() => new Float32Array(count).fill(Number.NaN)) as [Float32Array, Float32Array, Float32Array];
  const ln = new Float64Array(maps.length);
  const variances = new Float64Array(maps.length);
  for (let i = 0; i < count; i++) {
    if (!ground(i)) continue;
    for (let k = 0; k < maps.length; k++) {
      ln[k] = Math.LN10 * maps[k]![i]!;
      variances[k] = (noises[k]! / Math.exp(ln[k]!)) ** 2 + leastSd ** 2;
    }
    const solved = solver.thicknessM(ln, variances);
    if (Number.isNaN(solved)) continue;
    thickness[i] = solved;
    pixelSe[i] = solver.errorM(solved, variances);
    lnRatio[i] = ln[high]! - ln[low]!;
  }
  return { biasesV, lowV, highV, thickness, pixelSe, lnRatio, solver, further };
}

/** Medians over terraces; `steps` is the place on the ladder per pixel (`unknownStep`: flaw or no current). */
export function biasThickness(map: BiasMap, steps: Int8Array, grid: Grid, { heightEv }: BarrierMaterial): BiasThickness {
  const { lowV, highV, thickness, pixelSe, lnRatio } = map;
  const terraces = pixelsByStep(steps).flatMap(({ step, indices }): BiasTerrace[] => {
    const used = indices.filter((i) => !Number.isNaN(thickness[i]!));
    if (used.length < leastPixels) return [];
    const [depth, ratio] = [medianWithError(thickness, used, grid), medianWithError(lnRatio, used, grid)];
    const { steepnessEv15Nm, perLn } = steepnessFromRatio(ratio.median, lowV, highV);
    return [{
      step, pixels: used.length, usedShare: used.length / indices.length,
      thicknessM: depth.median, seM: depth.se, pixelSeM: median(Float64Array.from(used, (i) => pixelSe[i]!)),
      lnRatio: ratio.median, lnRatioSe: ratio.se,
      ...(lowV >= heightEv ? { steepnessEv15Nm, steepnessSe: perLn * ratio.se } : {}),
    }];
  });
  return { ...map, terraces };
}

/**
 * The current as a contact that is the same everywhere would have shown it: by the model from each pixel's thickness, times the median contact. What one map
 * cannot tell, contact or barrier, two can: terraces are then found free of the contact's variation. Pixels without such a thickness, and all where single pixels
 * are not known to 0.3 layers, keep their current.
 */
export function evenedCurrent(current: CurrentGround, map: BiasMap, grid: Grid, model: TunnelModel, material: BarrierMaterial, layerM: number): CurrentGround {
  const { thickness, pixelSe } = map;
  const table = densityTable(model, material, current.biasV!);
  if (!table || !(median(pixelSe) < evenBelowLayers * layerM)) return current;
  const log10 = current.log10.data;
  const own = thickness.map((metres) => table.log10Density(metres));
  const contact = median(own.map((density, i) => log10[i]! - density));
  return { ...current, log10: scalarMap(grid, own.map((density, i) => (Number.isNaN(density) ? log10[i]! : density + contact))) };
}

function pixelsByStep(steps: Int8Array): { step: number; indices: Uint32Array }[] {
  const counts = new Uint32Array(256);
  for (let i = 0; i < steps.length; i++) counts[steps[i]! + 128]!++;
  counts[unknownStep + 128] = 0;
  const lists = Array.from(counts, (count) => (count > 0 ? new Uint32Array(count) : undefined));
  const filled = new Uint32Array(256);
  for (let i = 0; i < steps.length; i++) {
    const place = steps[i]! + 128;
    const list = lists[place];
    if (list) list[filled[place]!++] = i;
  }
  return lists.flatMap((indices, place) => (indices ? [{ step: place - 128, indices }] : []));
}

/** Median over pixels; its standard error from the scatter of medians over squares of the map, or where these are few from the pixels' own. */
function medianWithError(values: Float32Array, used: Uint32Array, { columns }: Grid): { median: number; se: number } {
  const all = Float64Array.from(used, (i) => values[i]!);
  const across = Math.ceil(columns / block);
  const blocks = new Map<number, number[]>();
  for (const i of used) {
    const key = Math.floor(Math.floor(i / columns) / block) * across + Math.floor((i % columns) / block);
    const list = blocks.get(key);
    if (list) list.push(values[i]!);
    else blocks.set(key, [values[i]!]);
  }
  const middles = [...blocks.values()].filter((list) => list.length >= leastInBlock).map((list) => median(list));
  // A median of normal numbers scatters √(π/2) times as much as their mean.
  const se = middles.length >= leastBlocks ? scaledMad(middles) / Math.sqrt(middles.length) : scaledMad(all) / Math.sqrt(all.length);
  return { median: median(all), se: Math.sqrt(Math.PI / 2) * se };
}
