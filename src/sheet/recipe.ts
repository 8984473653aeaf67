/** Recipe section `stack`: the device that will be built. */
import type { z } from 'zod';
import { choiceField, numberField, optionalNumberField, section } from '../schema/fields.ts';

export const stackSection = section({
  kind: choiceField(['one-barrier'], 'one-barrier', { title: 'Kind', description: 'Layer sequence: injector, one barrier, emitter.' }),
  biasV: optionalNumberField({ min: -100, max: 100 }, { title: 'Device bias', unit: 'V', description: 'Bias at which the finished device will run.', absent: 'proposed: where the reference carries the target density' }),
  targetNaPerUm2: numberField(1, { above: 0, max: 1e9 }, { title: 'Target density', unit: 'nA/µm²', description: 'Density the proposed bias should give on the reference terrace.' }),
  emitterSheetOhm: optionalNumberField({ above: 0, max: 1e12 }, { title: 'Emitter sheet', unit: 'Ω/sq', description: 'Sheet resistance of the emitter.', absent: 'its voltage drop is not assessed' }),
  injectorSheetOhm: optionalNumberField({ above: 0, max: 1e12 }, { title: 'Injector sheet', unit: 'Ω/sq', description: 'Sheet resistance of the injector.', absent: 'its voltage drop is not assessed' }),
  contactOhmUm: numberField(0, { min: 0, max: 1e15 }, { title: 'Contact resistance', unit: 'Ω·µm', description: 'Resistance of a contact’s edge times its length.' }),
  offsetV: numberField(0, { min: -20, max: 20 }, { title: 'Offset', unit: 'V', description: 'Part of the bias that does not fall across the barrier (emitter’s band offset).' }),
});

export type StackSection = z.output<typeof stackSection>;
