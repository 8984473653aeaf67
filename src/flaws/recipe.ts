/** Recipe section `flaws`: what counts as a flaw. */
import type { z } from 'zod';
import { numberField, section } from '../schema/fields.ts';

export { correctionList } from './correction-recipe.ts';
export type { CorrectionEntry } from './correction-recipe.ts';

export const flawsSection = section({
  heightNm: numberField(0.8, { above: 0, max: 1000 }, {
    title: 'Height above ground', unit: 'nm', description: 'A rise of at least this much over its surroundings starts a flaw.',
  }),
  heightNoise: numberField(6, { min: 0, max: 100 }, {
    title: 'Height above noise', unit: '× noise', description: 'The rise must also be this many times the noise of the map’s height; the larger of both limits holds. 0 leaves the noise out.',
  }),
  dropDecades: numberField(0.5, { above: 0, max: 10 }, {
    title: 'Current drop', unit: 'decades', description: 'A rise is a flaw only where the current also falls by this much below its surroundings.',
  }),
  edgeShare: numberField(0.35, { above: 0, max: 1 }, {
    title: 'Edge share', description: 'A flaw extends to where height or current drop falls to this share of the starting threshold.',
  }),
  minPixels: numberField(4, { min: 1, max: 1e6, integer: true }, {
    title: 'Smallest flaw', unit: 'px', description: 'Raised regions of fewer pixels are taken for noise; shorts are exempt.',
  }),
  shortLayers: numberField(2, { above: 0, max: 20 }, {
    title: 'Short, layers above', unit: 'layers', description: 'A spot this many layers’ worth of current above its surroundings is a short.',
  }),
});

export type FlawsSection = z.output<typeof flawsSection>;
