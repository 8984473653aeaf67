/** What the ledger stage hands on: every pixel of the footprint booked to one cause. */
import type { NdArray } from 'ndarray';
import type { ScalarMap } from '../grid/maps.ts';
import type { Notice } from '../problems/problem.ts';

/** Causes in the order of their codes 0–12; the code is the index. Frozen by the file formats. */
export const causes = [
  'outside', 'usable', 'unmeasured', 'bubble', 'residue', 'wrinkle', 'short', 'open', 'thin', 'thick', 'starved', 'rim', 'stray',
] as const;
export type Cause = (typeof causes)[number];

/** The order in which causes are tested; what none claims is usable. */
export const orderOfTest = [
  'short', 'bubble', 'residue', 'wrinkle', 'unmeasured', 'open', 'thin', 'thick', 'starved', 'rim', 'stray',
] as const satisfies readonly Cause[];

export interface LedgerRow {
  readonly code: number;
  readonly cause: Cause;
  readonly areaM2: number;
  readonly pixels: number;
  /** Of the footprint. */
  readonly share: number;
  /** False where the input does not allow the test (no height: bubbles; no sheet resistance: starved …). */
  readonly assessed: boolean;
}

export interface Usable {
  readonly areaM2: number;
  readonly share: number;
  /** This map's 95 % interval: outlines, borders of terraces and band edges (`usableInterval`). */
  readonly low95M2: number;
  readonly high95M2: number;
  readonly largestPatchM2: number;
  /** Whether the reference's density at the device's bias lies in the recipe's range. */
  readonly knownToGlow: boolean;
  /** `usable` from height and current, `flaw-free` from height alone. */
  readonly meaning: 'usable' | 'flaw-free';
}

export interface MissedShorts {
  readonly seen: number;
  /** Share of point shorts that the scan lines cross with a contact of the assumed diameter. */
  readonly crossedShare: number;
  readonly expectedMissed: number;
  /** Per m²: estimate and exact Poisson 95 % interval, corrected for the share crossed. */
  readonly densityPerM2: number;
  readonly low95PerM2: number;
  readonly high95PerM2: number;
}

export interface Ledger {
  /** Shape [rows, columns], cause codes (this is `causes.tif`). */
  readonly codes: NdArray<Uint8Array>;
  /** Relative emission, 1 = median of usable, 0 where blocked, NaN unknown (this is `glow.tif`). */
  readonly glow: ScalarMap;
  /** One row per code 1–12, in the order of the codes. */
  readonly rows: readonly LedgerRow[];
  readonly footprintM2: number;
  readonly footprintPixels: number;
  readonly repairedM2: number;
  readonly usable: Usable;
  /** Absent without a current: shorts do not show in height. */
  readonly missedShorts?: MissedShorts;
  readonly verdict: string;
  readonly warnings: readonly Notice[];
}
