/** Recipe section `ground`: how the height is levelled and the current conditioned. */
import { z } from 'zod';
import { flagField, numberField, optionalNumberField, section } from '../schema/fields.ts';

/** Beyond any scanner's range. */
const farUm = 1e6;
const mostSpots = 1000;
const coordinate = (axis: string) => z.number().min(-farUm).max(farUm).meta({
  title: axis, unit: 'µm', description: 'From the lower-left corner of the map as it is shown; x to the right, y up.',
});
const spotList = z.array(z.strictObject({ xUm: coordinate('x'), yUm: coordinate('y') })).max(mostSpots)
  .refine((list) => list.length === 0 || list.length >= 3, { message: 'takes no spot or at least 3: fewer leave a tilt open' })
  .default([]).meta({
    title: 'Ground by hand', description: 'Places of bare, even ground. The form is then fitted to the height at these spots instead of the ground found by itself; its order is lowered to what their number supports (3: tilt, 6: bow). Line offsets stay, and zero stays at the most common height.',
  });

export const groundSection = section({
  order: numberField(2, { min: 0, max: 5, integer: true }, {
    title: 'Form order', description: 'Highest total order of the polynomial removed from the height: 1 tilt, 2 tilt and bow.',
  }),
  lines: flagField(true, { title: 'Line offsets', description: 'Bring scan lines to a common height by their differences on undisturbed ground, which terraces survive.' }),
  repair: flagField(true, { title: 'Repair', description: 'Fill spikes and broken runs of one to three lines from agreeing neighbours.' }),
  wear: flagField(true, { title: 'Tip wear', description: 'Undo a slow loss of conductance along the slow axis when it is told from real structure.' }),
  offsetA: optionalNumberField({}, {
    title: 'Current offset', unit: 'A', description: 'What the current channel reads where no current flows, with the file’s sign.', absent: 'measured where a flaw blocks, off the sample, or from the noise peak',
  }),
  lag: flagField(true, { title: 'Amplifier lag', description: 'Undo the smear of a slow amplifier along the fast axis when it is told from the edges.' }),
  lagPx: optionalNumberField({ min: -20, max: 20 }, {
    title: 'Lag', unit: 'px', description: 'Time constant of the amplifier in pixels along the fast axis, negative for a scan from right to left; 0 for none.', absent: 'measured from the tails behind sharp edges',
  }),
  align: flagField(true, { title: 'Alignment', description: 'Move the current back over the height, by whole pixels, when a shift between them is certain.' }),
  spots: spotList,
});

export type GroundSection = z.output<typeof groundSection>;
