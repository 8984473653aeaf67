/** Recipe section `barrier`: the tunnelling model and what anchors the layer count. */
import type { z } from 'zod';
import { choiceField, numberField, optionalNumberField, section } from '../schema/fields.ts';

export const barrierModels = ['wkb', 'fowler-nordheim', 'simmons'] as const;
export type BarrierModelName = (typeof barrierModels)[number];

export const barrierSection = section({
  heightEv: numberField(2.5, { min: 0.2, max: 10 }, { title: 'Barrier height', unit: 'eV', description: 'Energy from the emitting electrode’s Fermi level to the band edge of the barrier.' }),
  massRatio: numberField(0.5, { min: 0.01, max: 5 }, { title: 'Tunnelling mass', description: 'Effective mass in the barrier over the electron mass.' }),
  layerNm: numberField(0.333, { min: 0.05, max: 2 }, { title: 'Layer spacing', unit: 'nm', description: 'Thickness of one layer of the barrier.' }),
  tipAreaNm2: numberField(17, { min: 0.01, max: 1e6 }, { title: 'Contact area', unit: 'nm²', description: 'Area through which the probe’s current flows; known to about a decade, which the intervals carry.' }),
  referenceLayers: optionalNumberField({ min: 1, max: 200, integer: true }, { title: 'Reference layers', unit: 'layers', description: 'Known layer count of the reference terrace (from an edge or optical contrast).', absent: 'estimated from current and contact area' }),
  model: choiceField(barrierModels, 'wkb', { title: 'Model', description: 'Tunnelling model that turns current into thickness and thickness into density.' }),
  withinTerrace: choiceField(['contact', 'barrier'], 'contact', { title: 'Scatter within a terrace', description: 'Whether the scatter of current inside a terrace belongs to the probe’s contact, or to the barrier and so to the device.' }),
});

export type BarrierSection = z.output<typeof barrierSection>;
