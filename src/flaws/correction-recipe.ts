/** Recipe list `corrections`: what a person set right by hand, as points and outlines on the map, never as numbers of flaws. */
import { z } from 'zod';
import { flawCauses } from './flaws.ts';

/** Beyond any scanner's range. */
const farUm = 1e6;
const mostPoints = 10_000;
const mostCorrections = 10_000;

const coordinate = (axis: string) => z.number().min(-farUm).max(farUm).meta({
  title: axis, unit: 'µm', description: 'From the lower-left corner of the map as it is shown; x to the right, y up.',
});
const at = { xUm: coordinate('x'), yUm: coordinate('y') };
const points = (least: number, description: string) => z.array(z.tuple([z.number().min(-farUm).max(farUm), z.number().min(-farUm).max(farUm)])).min(least).max(mostPoints).meta({
  title: 'Points', unit: 'µm', description: `${description} Pairs [x, y] from the lower-left corner of the map as it is shown; x to the right, y up.`,
});
const cause = z.enum(flawCauses).meta({ title: 'Cause', description: 'What the flaw is.' });
const radiusUm = z.number().gt(0).max(farUm).optional().meta({
  title: 'Reach', unit: 'µm', description: 'Where no flaw covers the point, the nearest one within this distance is meant.', absent: 'two pixels',
});
const widthUm = z.number().gt(0).max(farUm).meta({ title: 'Width', unit: 'µm', description: 'Width of the stroke; one thinner than a pixel leaves no gaps.' });

/** One correction by hand as a recipe file holds it. */
export const correctionEntry = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('reclassify'), ...at, radiusUm, cause }).meta({ title: 'Reclassify', description: 'The flaw at a point is of this cause.' }),
  z.strictObject({ kind: z.literal('dismiss'), ...at, radiusUm }).meta({ title: 'Dismiss', description: 'What was found at a point is no flaw.' }),
  z.strictObject({ kind: z.literal('merge'), pointsUm: points(2, 'One point on each flaw.'), radiusUm }).meta({ title: 'Merge', description: 'The flaws at these points are one.' }),
  z.strictObject({ kind: z.literal('split'), pointsUm: points(2, 'A line right across one flaw.') }).meta({ title: 'Split', description: 'The flaw that the line crosses is several.' }),
  z.strictObject({ kind: z.literal('paint'), pointsUm: points(1, 'The stroke; one point makes a dot.'), widthUm, cause }).meta({ title: 'Paint', description: 'The ground under the stroke is a flaw of this cause.' }),
  z.strictObject({ kind: z.literal('erase'), pointsUm: points(1, 'The stroke; one point makes a dot.'), widthUm }).meta({ title: 'Erase', description: 'The ground under the stroke is no flaw.' }),
  z.strictObject({ kind: z.literal('polygon'), pointsUm: points(3, 'Corners of an outline, which closes by itself.'), cause: z.enum([...flawCauses, 'none']).meta({ title: 'Cause', description: 'What fills the outline; none: no flaw.' }) })
    .meta({ title: 'Polygon', description: 'The ground inside the outline is a flaw of this cause, or none. Where the outline crosses itself, inside is even-odd.' }),
]);

/** All corrections; they are applied in this order. */
export const correctionList = z.array(correctionEntry).max(mostCorrections).meta({
  title: 'Corrections', description: 'What a person set right by hand, applied in order after flaws have been found.',
});

export type CorrectionEntry = z.output<typeof correctionEntry>;
