/** What the ground stage hands on: levelled height and conditioned current with their masks. */
import type { MaskMap, ScalarMap } from '../grid/maps.ts';
import type { Notice } from '../problems/problem.ts';
import type { Outline } from '../read/sample.ts';
import type { Shift } from './align-current.ts';
import type { LevelsFound } from './describe-levels.ts';
import type { LadderFit } from './ladder.ts';
import type { ZeroCurrent } from './zero-current.ts';

export interface HeightGround {
  /** Levelled height in metres: ground near 0, NaN where missing and not repaired. */
  readonly levelled: ScalarMap;
  /** 1 where a value was missing or broken and has been filled from its neighbours. */
  readonly repaired: MaskMap;
  readonly repairedPixels: number;
  /** Robust standard deviation of the pixel noise on flat ground, metres. */
  readonly noiseM: number;
  /** Height of the plane, the terrace, that each pixel lies on, metres above a common one; NaN where neither the current nor flat ground tells, and on small patches that may be films. */
  readonly plane: Float32Array;
  /** Peak-to-peak of the removed tilt and bow over the map, metres. */
  readonly tiltM: number;
  /** What levelling took out and how it was found; absent for a height that was levelled by itself. */
  readonly levels?: LevelsFound;
}

export interface CurrentGround {
  /** `A`, or `relative` when no amperes are known: then every field ending in A is in the file's own unit. */
  readonly unit: 'A' | 'relative';
  readonly biasV?: number;
  /** Current with the offset removed, times the sign of the bias; NaN where missing (this is `current.tif`). */
  readonly offsetFree: ScalarMap;
  /** The same with lag undone, moved back over the height, broken runs repaired and wear undone (this is `conditioned.tif`). All maps below lie as this one does. */
  readonly conditioned: ScalarMap;
  /**
   * log10 of `conditioned`; floor pixels at log10(floorA), or higher where a tail of the amplifier's lag was taken off and hides more, and saturated ones at log10(saturationA), both
   * plus the wear undone on their line; NaN where missing.
   */
  readonly log10: ScalarMap;
  /** Censored from above: the current is at least this. */
  readonly saturated: MaskMap;
  /** Censored from below: the current is at most the floor (wrong-sign pixels included). */
  readonly floor: MaskMap;
  readonly repaired: MaskMap;
  readonly repairedPixels: number;
  readonly offsetA: number;
  /** Standard error of the offset; absent where it was not measured. */
  readonly offsetSeA?: number;
  readonly offsetFrom?: ZeroCurrent['from'];
  readonly noiseA: number;
  readonly floorA: number;
  /** Standard error of the floor as a current, offset included; absent where the floor was given or the offset not measured. */
  readonly floorSeA?: number;
  /** Step between neighbouring readings of a coarsely digitised current. */
  readonly stepA?: number;
  readonly saturationA?: number;
  readonly saturatedPixels: number;
  /** Conductance lost by the tip from first to last line, in decades (positive = lost); 0 where no loss is told from the barrier. */
  readonly wearDecades: number;
  /** Trend of the log current on the terraces from first to last line, whatever its cause, and its standard error; NaN where the map cannot tell. */
  readonly driftDecades?: number;
  readonly driftSeDecades?: number;
  /** Time constant of the amplifier that was undone, pixels along the fast axis; 0 for none. */
  readonly lagPx: number;
  /** Absent where the time constant was given or is 0. */
  readonly lagSePx?: number;
  /** Shift of the current against the height, after the lag was undone; absent where the maps do not tell. */
  readonly shift?: Shift;
}

/** A current at another bias over the same ground, laid over the first one's pixels. */
export interface FurtherCurrent {
  readonly biasV: number;
  /** Name of the file (and page) it came from. */
  readonly source: string;
  /** log10 of the conditioned current, A; NaN where it is missing, censored, repaired, within 10σ of zero, beside an edge or beyond the border. */
  readonly log10: Float32Array;
  readonly noiseA: number;
  readonly wearDecades: number;
  /** Where it lay against the first current before it was moved; absent where `ground.align` is off. */
  readonly shift?: Shift;
}

/** What the return scan adds: it is measured and compared, not mixed into the maps. */
export interface ReturnGround {
  readonly height?: { readonly noiseM: number; readonly shift?: Shift };
  readonly current?: {
    readonly noiseA: number;
    readonly offsetA: number;
    readonly lagPx: number;
    /** NaN where the map cannot tell. */
    readonly driftDecades: number;
    /** Shift against the forward scan, after the lag of both was undone. */
    readonly shift?: Shift;
  };
}

/** A height levelled without knowledge of terraces: good enough to tell features and to find edges. */
export type RoughHeight = Pick<HeightGround, 'levelled' | 'noiseM'>;

/** Terraces as parallel planes. */
export interface LayerPlanes {
  /** Height of the pixel's terrace above the thinnest one that was measured, metres; NaN where the current does not tell. */
  readonly planes: Float32Array;
  readonly ladder: LadderFit;
  /** Height of one gap of the ladder, metres. */
  readonly gapM: number;
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
  /** Currents at further biases; absent without any that can be used. */
  readonly further?: readonly FurtherCurrent[];
  /** Absent without a return scan. */
  readonly returned?: ReturnGround;
  /** Planes of the terraces by their current; absent without height or without a terrace whose current can be measured. */
  readonly layers?: LayerPlanes;
  /** Only for a sample without outlines, and only on evidence. */
  readonly footprintProposal?: FootprintProposal;
  readonly warnings: readonly Notice[];
}
