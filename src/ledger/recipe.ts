/** Recipe section `band`: what counts as even, and how causes are told apart by size. */
import type { z } from 'zod';
import { numberField, section } from '../schema/fields.ts';

export const bandSection = section({
  factor: numberField(3, { min: 1, max: 1e6 }, { title: 'Band factor', description: 'Density may be this factor above or below the reference’s and still count as even.' }),
  minNaPerUm2: numberField(0.1, { min: 0, max: 1e12 }, { title: 'Lowest density that glows', unit: 'nA/µm²', description: 'Below this a reference is not known to glow.' }),
  maxNaPerUm2: numberField(30, { above: 0, max: 1e12 }, { title: 'Highest density', unit: 'nA/µm²', description: 'Above this a reference leaks rather than glows.' }),
  deviceFieldVPerNm: numberField(0.8, { above: 0, max: 10 }, { title: 'Field limit of the device', unit: 'V/nm', description: 'A device bias that puts more than this on the reference terrace is warned of. Breakdown of hBN is near 1.2 V/nm and varies; the limit keeps a distance.' }),
  shortMaxUm2: numberField(0.02, { min: 0, max: 1e6 }, { title: 'Largest short', unit: 'µm²', description: 'Larger saturated ground is a thin terrace, not a short.' }),
  terraceMinUm2: numberField(0.25, { min: 0, max: 1e6 }, { title: 'Smallest terrace', unit: 'µm²', description: 'Dead ground smaller than this is an open spot, larger is a thick terrace.' }),
  strayMinUm2: numberField(0, { min: 0, max: 1e6 }, { title: 'Smallest useful patch', unit: 'µm²', description: 'Patches in band but smaller are booked as stray; 0 switches the test off.' }),
  rimUm: numberField(0, { min: 0, max: 1e4 }, { title: 'Rim at the edge', unit: 'µm', description: 'Safety distance from the footprint’s edge; 0 switches it off.' }),
  shortRimUm: numberField(0, { min: 0, max: 1e4 }, { title: 'Rim at shorts', unit: 'µm', description: 'Safety distance from a short; 0 switches it off.' }),
});

export type BandSection = z.output<typeof bandSection>;
