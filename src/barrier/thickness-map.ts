/** Layers, thickness and relative density per pixel. */
import type { Grid } from '../grid/maps.ts';
import { pixelCount } from '../grid/maps.ts';
import type { CurrentGround } from '../ground/ground.ts';
import { layersAt } from './anchor.ts';
import type { Anchor, Anchored } from './anchor.ts';
import type { Rung } from './barrier.ts';
import { densityTable } from './model/table.ts';
import { unknownStep } from './terraces.ts';
import type { Terraces } from './terraces.ts';

interface MapQuestion {
  readonly withinTerrace: 'contact' | 'barrier';
  /** Log10 current of the reference terrace, NaN without one: then saturated ground is thin and the rest thick. */
  readonly referenceLog10: number;
  /** All terraces with their whole layers, which are never below one. */
  readonly rungs: readonly Rung[];
  readonly anchor?: Anchor;
  readonly anchored?: Anchored;
  readonly deviceBiasV?: number;
}

interface ThicknessMaps {
  readonly layers?: Uint8Array;
  readonly thickness?: Float32Array;
  /** Log10 of density at the device's bias over the reference's; NaN unknown. */
  readonly log10Relative: Float32Array;
}

/**
 * Relative density per pixel. At the scan's own bias (or when no device bias is known) it is the ratio of currents, whatever the
 * barrier; at another bias it follows from whole layers (or, with `withinTerrace: barrier`, from the thickness of each
 * pixel) through the model.
 */
export function thicknessMap(current: CurrentGround, terraces: Terraces, origin: number, grid: Grid, question: MapQuestion): ThicknessMaps {
  const count = pixelCount(grid);
  const { anchor, anchored, deviceBiasV, withinTerrace } = question;
  const log10 = current.log10.data;
  const relative = new Float32Array(count).fill(Number.NaN);
  const layers = anchored && new Uint8Array(count);
  const thickness = anchored && new Float32Array(count).fill(Number.NaN);
  const sameBias = !anchor || deviceBiasV === undefined || Math.abs(anchor.acrossV(deviceBiasV) - Math.abs(anchor.scanBiasV)) < 1e-9;
  const byStep = relativeByStep(question, sameBias);
  const layersOf = new Uint8Array(256);
  for (const rung of question.rungs) layersOf[rung.step + origin + 128] = rung.layers ?? 0;
  const scanTable = withinTerrace === 'barrier' && anchor && anchored ? densityTable(anchor.model, anchor.material, Math.abs(anchor.scanBiasV)) : undefined;
  const deviceTable = scanTable && !sameBias ? densityTable(anchor!.model, anchor!.material, anchor!.acrossV(deviceBiasV!)) : undefined;
  // With a per-pixel thickness the contact's area is set so that the reference terrace has its own thickness.
  const scanReference = scanTable && anchored ? scanTable.log10Density(anchored.thicknessM) : Number.NaN;
  const deviceReference = deviceTable && anchored ? deviceTable.log10Density(anchored.thicknessM) : Number.NaN;

  const known = { ...(layers ? { layers } : {}), ...(thickness ? { thickness } : {}), log10Relative: relative };
  // Without a ladder there are no whole layers to go by: then every pixel speaks for itself.
  if (withinTerrace === 'contact' && terraces.from !== 'assumed' && !Number.isNaN(question.referenceLog10)) {
    const ofStep = new Float64Array(256);
    for (const rung of question.rungs) ofStep[rung.step + origin + 128] = byStep(rung.step);
    fillByStep(terraces.steps, ofStep, relative);
    if (layers) fillByStep(terraces.steps, layersOf, layers);
    if (thickness && anchor) fillByStep(terraces.steps, Float64Array.from(layersOf, (whole) => whole * anchor.layerM), thickness);
    return known;
  }
  for (let i = 0; i < count; i++) {
    const step = terraces.steps[i]!;
    if (step === unknownStep) continue;
    if (Number.isNaN(question.referenceLog10)) {
      // No reference: all that is known is on which side of the amplifier's range the ground lies.
      relative[i] = current.saturated.data[i] === 1 ? Number.POSITIVE_INFINITY : Number.NEGATIVE_INFINITY;
      continue;
    }
    if (layers) layers[i] = layersOf[step + 128]!;
    const difference = log10[i]! - question.referenceLog10;
    if (!scanTable) {
      relative[i] = difference;
      continue;
    }
    const own = Math.max(anchor!.layerM, scanTable.thicknessM(scanReference + difference));
    if (thickness) thickness[i] = own;
    relative[i] = deviceTable ? deviceTable.log10Density(own) - deviceReference : difference;
  }
  return known;
}

/** Sets every pixel of known step to its step's value; `values` by step + 128. */
function fillByStep(steps: Int8Array, values: Float64Array | Uint8Array, into: Float32Array | Uint8Array): void {
  for (let i = 0; i < into.length; i++) if (steps[i] !== unknownStep) into[i] = values[steps[i]! + 128]!;
}

/** Relative density of a whole terrace k layers from the reference. */
function relativeByStep(question: MapQuestion, sameBias: boolean): (k: number) => number {
  const { anchor, anchored, deviceBiasV } = question;
  const layersOf = new Map(question.rungs.map((rung) => [rung.step, rung.layers]));
  const measured = new Map(question.rungs.map((rung) => [rung.step, rung.medianLog10 - question.referenceLog10]));
  const lnAt = (layers: number): number => anchor!.model.lnDensity({ ...anchor!.material, thicknessM: layers * anchor!.layerM }, anchor!.acrossV(deviceBiasV!));
  return (k) => (sameBias || !anchored ? (k === 0 ? 0 : measured.get(k) ?? Number.NaN) : (lnAt(layersOf.get(k) ?? layersAt(anchored.layers, k)) - lnAt(anchored.layers)) / Math.LN10);
}
