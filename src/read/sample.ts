/** What the read stage hands on: one sample as a list of channels over one grid. */
import type { Grid, MaskMap, ScalarMap } from '../grid/maps.ts';
import type { Notice } from '../problems/problem.ts';

export type Quantity = 'height' | 'current';
export type Direction = 'forward' | 'return';

/** One measured quantity over the sample's grid, in SI. */
export interface Channel {
  readonly quantity: Quantity;
  /** `m` for heights; `A` for currents, or `relative` when the file gives no amperes. */
  readonly unit: 'm' | 'A' | 'relative';
  /** Unit that the values were read in, as the recipe spells it (`nm`); absent where nobody kept it. */
  readonly readIn?: string;
  readonly direction: Direction;
  /** Bias during this map in volts, absent when nobody stated it. */
  readonly biasV?: number;
  /** Name of the file (and page) the values came from. */
  readonly source: string;
  /** Shape [rows, columns]; NaN where missing (infinite values are missing too). */
  readonly values: ScalarMap;
}

/**
 * A file that went into the sample, so that another lab can check it has the same bytes; or its row of a manifest, called by its place, of which the
 * hash is that of what it states. Together with the recipe the records determine the sample.
 */
export interface SourceRecord {
  readonly name: string;
  readonly sha256: string;
  readonly bytes: number;
}

/** Where the map lies in the microscope's own coordinates. All lengths in metres, angle in degrees. */
export interface ScanFrame {
  readonly centreXM: number;
  readonly centreYM: number;
  readonly rotationDeg: number;
  /** True when the slow axis ran upwards (first line at the picture's bottom). */
  readonly slowUp: boolean;
}

export type OutlineLayer = 'injector' | 'barrier' | 'emitter' | 'contact-injector' | 'contact-emitter' | 'keep-out';

/** One polygon of one layer, rings in metres in the map's coordinates (first ring outer, others holes). */
export interface Outline {
  readonly layer: OutlineLayer;
  readonly rings: readonly (readonly (readonly [xM: number, yM: number])[])[];
}

/** One sample as read: channels over one grid, its footprint, where it came from. */
export interface Sample {
  readonly name: string;
  readonly grid: Grid;
  readonly channels: readonly Channel[];
  /** Bare barrier, or finished stack with the emitter on top. */
  readonly surface: 'barrier' | 'stack';
  readonly frame: ScanFrame;
  readonly outlines: readonly Outline[];
  /** 1 on the footprint (injector ∩ barrier ∩ emitter − keep-outs of the given outlines; all 1 without outlines). */
  readonly footprint: MaskMap;
  readonly sources: readonly SourceRecord[];
  readonly warnings: readonly Notice[];
}

/** First channel of a quantity and direction, or undefined. */
export function channelOf(sample: Sample, quantity: Quantity, direction: Direction = 'forward'): Channel | undefined {
  return sample.channels.find((channel) => channel.quantity === quantity && channel.direction === direction);
}
