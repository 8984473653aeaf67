/** What the ground stage hands on: levelled height and conditioned current with their masks. */
import type { MaskMap, ScalarMap } from '../grid/maps.ts';
import type { Notice } from '../problems/problem.ts';

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
  /** log10 of `conditioned`; floor pixels at log10(floorA), saturated ones at log10(saturationA), NaN where missing. */
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

export interface Ground {
  readonly height?: HeightGround;
  readonly current?: CurrentGround;
  readonly warnings: readonly Notice[];
}
