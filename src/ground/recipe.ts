/** Recipe section `ground`: how the height is levelled and the current conditioned. */
import type { z } from 'zod';
import { flagField, numberField, section } from '../schema/fields.ts';

export const groundSection = section({
  order: numberField(2, { min: 0, max: 5, integer: true }, {
    title: 'Form order', description: 'Highest total order of the polynomial removed from the height: 1 tilt, 2 tilt and bow.',
  }),
  lines: flagField(true, { title: 'Line offsets', description: 'Bring scan lines to a common height by their differences on undisturbed ground, which terraces survive.' }),
  repair: flagField(true, { title: 'Repair', description: 'Fill spikes and broken runs of one or two lines from agreeing neighbours.' }),
  wear: flagField(true, { title: 'Tip wear', description: 'Undo a slow loss of conductance along the slow axis when it is told from real structure.' }),
});

export type GroundSection = z.output<typeof groundSection>;
