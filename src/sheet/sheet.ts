/** What the sheet stage hands on: density and glow of the device, with or without voltage drop. */
import type { MaskMap, ScalarMap } from '../grid/maps.ts';
import type { Notice } from '../problems/problem.ts';

/** Currents of the whole device, as magnitudes. */
export interface SheetTotals {
  /** Current of the device in A; absent where the reference's density is not known in amperes. */
  readonly deviceCurrentA?: number;
  /** Share of the device's current that flows through shorts, taken as ohmic from the scan's bias to the device's; a lower bound where they saturated. Absent where their density is not given. */
  readonly shortShareOfCurrent?: number;
  /** Largest relative difference between current in, current through the barrier and current out; absent without voltage drop. */
  readonly imbalance?: number;
}

export interface Sheet {
  /** Current density at the device's bias over the reference's no-drop density, NaN unknown, 0 where unconnected. */
  readonly relativeDensity: ScalarMap;
  /** Bias left across the barrier per pixel in volts, with the device bias's sign; absent where no sheet resistance is given. */
  readonly localBiasV?: ScalarMap;
  /** 1 where the barrier is in band but the voltage drop leaves too little; absent when not assessed. */
  readonly starved?: MaskMap;
  /** 1 on emitter ground that no sheet path joins to a contact, and on footprint over such injector ground; absent when no contact is drawn. */
  readonly unconnected?: MaskMap;
  /** Absent where the voltage drop was asked for and did not settle. */
  readonly totals?: SheetTotals;
  readonly warnings: readonly Notice[];
}
