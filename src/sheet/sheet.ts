/** What the sheet stage hands on: density and glow of the device, with or without voltage drop. */
import type { MaskMap, ScalarMap } from '../grid/maps.ts';
import type { Notice } from '../problems/problem.ts';

export interface Sheet {
  /** Current density at the device's bias over the reference's no-drop density, NaN unknown. */
  readonly relativeDensity: ScalarMap;
  /** Bias left across the barrier per pixel in volts; absent where no sheet resistance is given. */
  readonly localBiasV?: ScalarMap;
  /** 1 where the barrier is in band but the voltage drop leaves too little; absent when not assessed. */
  readonly starved?: MaskMap;
  /** 1 on emitter ground that no sheet path joins to a contact; absent when no contact is drawn. */
  readonly unconnected?: MaskMap;
  readonly warnings: readonly Notice[];
}
