/** Recipe section `plan`: what is asked of the flake and how it would be cleaned. */
import { z } from 'zod';
import { numberField, optionalNumberField, section } from '../schema/fields.ts';

const markPair = z.strictObject({ mapXUm: z.number(), mapYUm: z.number(), chipXUm: z.number(), chipYUm: z.number() });

export const planSection = section({
  requiredUm2: optionalNumberField({ above: 0, max: 1e9 }, { title: 'Required area', unit: 'µm²', description: 'Usable area a device needs.', absent: 'no requirement is judged' }),
  siteWidthUm: optionalNumberField({ above: 0, max: 1e5 }, { title: 'Site width', unit: 'µm', description: 'Width of one device.', absent: 'no sites are proposed' }),
  siteHeightUm: optionalNumberField({ above: 0, max: 1e5 }, { title: 'Site height', unit: 'µm', description: 'Height of one device.', absent: 'the width' }),
  siteCount: optionalNumberField({ min: 1, max: 10000, integer: true }, { title: 'Sites', description: 'How many devices to place.', absent: 'one' }),
  marginUm: numberField(0.5, { min: 0, max: 100 }, { title: 'Cleaning margin', unit: 'µm', description: 'Distance a cleaning box reaches beyond the flaw.' }),
  cleaningSpeedUmPerS: numberField(5, { above: 0, max: 1e4 }, { title: 'Cleaning speed', unit: 'µm/s', description: 'Tip speed of a cleaning pass.' }),
  cleaningPitchNm: numberField(20, { above: 0, max: 1e4 }, { title: 'Cleaning pitch', unit: 'nm', description: 'Distance between cleaning lines.' }),
  successChance: numberField(1, { min: 0, max: 1 }, { title: 'Chance of success', description: 'Your own experience of how often a cleaning box succeeds.' }),
  marks: z.array(markPair).max(1000).optional().meta({ title: 'Marks', description: 'Pairs of map and chip coordinates of alignment marks.', absent: 'no chip frame' }),
});

export type PlanSection = z.output<typeof planSection>;
