/** What the barrier stage hands on: terraces, ladder, reference, layers and thickness. */
import type { ScalarMap } from '../grid/maps.ts';
import type { NdArray } from 'ndarray';
import type { Notice } from '../problems/problem.ts';
import type { BiasThickness } from './bias-thickness.ts';

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

/**
 * What a thickness can be anchored to: a stated layer count, maps at several biases, a finished device, the step at the flake's edge, or the current through a
 * contact of stated area. They are taken in this order.
 */
export const anchorKinds = ['layers', 'biases', 'device', 'edge', 'area'] as const;
export type AnchorKind = (typeof anchorKinds)[number];

/** The reference's thickness by one anchor, metres. */
export interface ThicknessAnchor {
  readonly kind: AnchorKind;
  /** True for the one that layers and densities follow. */
  readonly taken: boolean;
  readonly thicknessM: number;
  /** Standard deviation at the stated barrier height and mass, and what their spread adds. */
  readonly sdM: number;
  readonly materialSdM: number;
  readonly sentence: string;
}

/** What the device would carry on the reference terrace, before any voltage drop. */
export interface DeviceDensity {
  readonly biasV: number;
  readonly proposed: boolean;
  /** Density in A/m² with its 95 % interval (tip area, barrier height, mass). */
  readonly median: number;
  readonly low95: number;
  readonly high95: number;
  /** Mean field on the reference terrace under the probe, where the current was measured, and in the device, for which it is predicted; V/nm. */
  readonly probeFieldVPerNm: number;
  readonly fieldVPerNm: number;
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
  /** All that anchors the reference's thickness, in the order of preference; empty where nothing does. */
  readonly anchors: readonly ThicknessAnchor[];
  /** From maps at several biases; its terraces' steps count from the reference. */
  readonly biases?: BiasThickness;
  readonly device?: DeviceDensity;
  /** The reason where `device` is absent; then `log10Relative` is the ratio of currents at the scan's bias. */
  readonly noDensity?: NoDensity;
  readonly warnings: readonly Notice[];
}
