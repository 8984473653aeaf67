/** What the barrier stage hands on: terraces, ladder, reference, layers and thickness. */
import type { ScalarMap } from '../grid/maps.ts';
import type { NdArray } from 'ndarray';
import type { Notice } from '../problems/problem.ts';

/** All ground of one layer count. */
export interface Rung {
  /** Layers relative to the reference terrace: 0 reference, +1 one layer thicker. */
  readonly step: number;
  /** Absolute layer count, absent where nothing anchors it (relative current). */
  readonly layers?: number;
  readonly areaM2: number;
  readonly pixels: number;
  /** Median of log10 current (A, or the file's unit) over its uncensored pixels. */
  readonly medianLog10: number;
  /** Robust scatter (scaled MAD) of log10 current. */
  readonly scatterDecades: number;
  /** `exact`, or only a bound: saturated ground is at most, floor ground at least this thick. */
  readonly bound: 'exact' | 'at-most' | 'at-least';
}

/** Equal steps of log current per layer, measured from the map. */
export interface Ladder {
  /** Decades of current lost per added layer at the scan's bias. */
  readonly stepDecades: number;
  readonly stepSeDecades: number;
  /** Where the step came from: the map's own terraces, or the model when the map shows fewer than two; assumed without either. */
  readonly from: 'map' | 'model' | 'assumed';
  /** The same step by the chosen model, absent without bias. */
  readonly modelStepDecades?: number;
  readonly rungs: readonly Rung[];
}

export interface Reference {
  readonly step: 0;
  readonly layers?: number;
  readonly thicknessM?: number;
  /** Median current of the reference terrace (A, or the file's unit). */
  readonly median: number;
  readonly areaM2: number;
  readonly shareOfUnflawed: number;
  /** Whether its no-drop density at the device's bias lies within the recipe's range; absent when not assessed. */
  readonly inRange?: boolean;
}

/** What the device would carry on the reference terrace, before any voltage drop. */
export interface DeviceDensity {
  readonly biasV: number;
  readonly proposed: boolean;
  /** Density in A/m² with its 95 % interval (tip area, barrier height, mass). */
  readonly median: number;
  readonly low95: number;
  readonly high95: number;
}

/**
 * Why no density in the device is given: the current has no scale, the scan's bias is not known, the scanned surface spreads the current, no ground to go by,
 * the model does not hold at the biases or currents asked for, or nothing (or not the target) flows at any device bias asked for.
 */
export type NoDensity = 'current-relative' | 'bias-missing' | 'stack-surface' | 'no-ground' | 'model' | 'device-bias';

export interface Barrier {
  /** Layers relative to the reference per pixel (int8), −128 where unknown (no current, flaw). */
  readonly step: NdArray<Int8Array>;
  /** Absolute layers, 0 unknown (this is `layers.tif`); absent where nothing anchors it. */
  readonly layers?: NdArray<Uint8Array>;
  /** Thickness in metres, NaN unknown (this is `barrier.tif`); absent where nothing anchors it. */
  readonly thickness?: ScalarMap;
  /** Log10 of the no-drop density at the device's bias over the reference's, NaN unknown. */
  readonly log10Relative: ScalarMap;
  readonly ladder: Ladder;
  readonly reference: Reference;
  readonly device?: DeviceDensity;
  /** The reason where `device` is absent; then `log10Relative` is the ratio of currents at the scan's bias. */
  readonly noDensity?: NoDensity;
  readonly warnings: readonly Notice[];
}
