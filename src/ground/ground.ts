/** What the ground stage hands on: levelled height and conditioned current with their masks. */
import type { MaskMap, ScalarMap } from '../grid/maps.ts';
import type { Notice } from '../problems/problem.ts';
import type { Outline } from '../read/sample.ts';

export interface HeightGround {
  /** Levelled height in metres: ground near 0, NaN where missing and not repaired. */
  readonly levelled: ScalarMap;
  /** 1 where a value was missing or broken and has been filled from its neighbours. */
  readonly repaired: MaskMap;
  readonly repairedPixels: number;
  /** Robust standard deviation of the pixel noise on flat ground, metres. */
  readonly noiseM: number;
  /** Peak-to-peak of the removed tilt and bow over the map, metres. */
  readonly tiltM: number;
}

export interface CurrentGround {
  /** `A`, or `relative` when no amperes are known: then every field ending in A is in the file's own unit. */
  readonly unit: 'A' | 'relative';
  readonly biasV?: number;
  /** Current with the offset removed, times the sign of the bias; NaN where missing (this is `current.tif`). */
  readonly offsetFree: ScalarMap;
  /** The same with broken runs repaired and drift undone (this is `conditioned.tif`). */
  readonly conditioned: ScalarMap;
  /** log10 of `conditioned`; floor pixels at log10(floorA) and saturated ones at log10(saturationA), both plus the wear undone on their line; NaN where missing. */
  readonly log10: ScalarMap;
  /** Censored from above: the current is at least this. */
  readonly saturated: MaskMap;
  /** Censored from below: the current is at most the floor (wrong-sign pixels included). */
  readonly floor: MaskMap;
  readonly repaired: MaskMap;
  readonly repairedPixels: number;
  readonly offsetA: number;
  readonly noiseA: number;
  readonly floorA: number;
  readonly saturationA?: number;
  readonly saturatedPixels: number;
  /** Conductance lost by the tip from first to last line, in decades (positive = lost). */
  readonly wearDecades: number;
}

/** What lies bare beside the flake: `both` injector and substrate, `unknown` when only the height tells. */
export type BareGround = 'injector' | 'substrate' | 'both' | 'unknown';

/** An outline for a map that has none and shows more than the flake. Nothing has been left out by it. */
export interface FootprintProposal {
  readonly ground: BareGround;
  /** Area of the bare ground and its depth below the flake at their common border, m² and metres. */
  readonly bareM2: number;
  readonly stepM: number;
  readonly flakeM2: number;
  /** The flake as one polygon of layer `barrier`; gaps of 0.25 µm² and more are holes. */
  readonly outline: Outline;
}

export interface Ground {
  readonly height?: HeightGround;
  readonly current?: CurrentGround;
  /** Only for a sample without outlines, and only on evidence. */
  readonly footprintProposal?: FootprintProposal;
  readonly warnings: readonly Notice[];
}
