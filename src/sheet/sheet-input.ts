/** What the sheet stage needs to know about one device. */
import type { NdArray } from 'ndarray';
import type { NoDensity } from '../barrier/barrier.ts';
import type { Grid, MaskMap, ScalarMap } from '../grid/maps.ts';
import type { Outline } from '../read/sample.ts';

/** Density of a tunnel element in A/m² at a bias in volts ≥ 0; must not fall as the bias rises. */
export type Density = (biasV: number) => number;

/** Elements whose curve has another shape than the reference's. */
export interface StepDensities {
  /** Layers relative to the reference per pixel, −128 where unknown (the reference's shape is used). */
  readonly map: NdArray<Int8Array>;
  readonly densityAPerM2: (step: number, biasV: number) => number;
}

export interface Shorts {
  readonly mask: MaskMap;
  /** At the device's bias, over the reference's no-drop density there. */
  readonly log10Relative: ScalarMap;
  /** Given where the ratio was carried from the scan's bias as an ohmic current's: then their elements are ohmic, too. */
  readonly ohmic?: { readonly scanBiasV: number; /** Some saturated, so that their ratio is a lower bound. */ readonly saturated: boolean };
}

export interface SheetInput {
  readonly grid: Grid;
  /** 1 where injector, barrier and emitter overlap. */
  readonly footprint: MaskMap;
  /** Outlines of the sheets and their contacts; a sheet without one covers the footprint. */
  readonly outlines: readonly Outline[];
  /** Log10 of the no-drop density at the device bias over the reference's; NaN where nothing is known to flow (the sheets still conduct there). */
  readonly log10Relative: ScalarMap;
  /** Recipe `band.factor`. */
  readonly bandFactor: number;
  /** Ω/sq; absent or 0 means perfectly conducting. */
  readonly emitterSheetOhm?: number | undefined;
  readonly injectorSheetOhm?: number | undefined;
  /** Recipe `stack.contactOhmUm`: resistance of a contact's edge times its length, Ω·µm; 0 when absent. */
  readonly contactOhmUm?: number | undefined;
  /** Device bias and the reference's density over bias (asked for at magnitudes); absent where amperes are not known. */
  readonly device?: { readonly biasV: number; readonly densityAPerM2: Density } | undefined;
  /**
   * Without it, every element follows the reference's curve times its ratio. With it, an element
   * follows the curve of its own step, scaled to its ratio at the device bias.
   */
  readonly steps?: StepDensities | undefined;
  /** Shorts carry current too: where the mask is 1, this log10 ratio replaces `log10Relative`. */
  readonly shorts?: Shorts | undefined;
  /** Why `device` is absent. */
  readonly noDensity?: NoDensity | undefined;
}
