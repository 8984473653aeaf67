/** Recipe section `barrier`: the tunnelling model and what anchors the layer count. */
import type { z } from 'zod';
import { choiceField, numberField, optionalNumberField, section } from '../schema/fields.ts';

export const barrierModels = ['wkb', 'fowler-nordheim', 'simmons'] as const;
export type BarrierModelName = (typeof barrierModels)[number];
/** Conventions of Fowler–Nordheim's prefactor: divided by the mass ratio, or not. */
export const barrierPrefactors = ['inverse-mass', 'none'] as const;
export type BarrierPrefactor = (typeof barrierPrefactors)[number];

export const barrierSection = section({
  heightEv: numberField(2.5, { min: 0.2, max: 10 }, { title: 'Barrier height', unit: 'eV', description: 'Energy from the emitting electrode’s Fermi level to the band edge of the barrier.' }),
  massRatio: numberField(0.5, { min: 0.01, max: 5 }, { title: 'Tunnelling mass', description: 'Effective mass in the barrier over the electron mass.' }),
  layerNm: numberField(0.333, { min: 0.05, max: 2 }, { title: 'Layer spacing', unit: 'nm', description: 'Thickness of one layer of the barrier.' }),
  tipAreaNm2: numberField(17, { min: 0.01, max: 1e6 }, { title: 'Contact area', unit: 'nm²', description: 'Area through which the probe’s current flows; known to about a decade, which the intervals carry.' }),
  referenceLayers: optionalNumberField({ min: 1, max: 200, integer: true }, { title: 'Reference layers', unit: 'layers', description: 'Known layer count of the reference terrace (from an edge or optical contrast).', absent: 'estimated from current and contact area' }),
  model: choiceField(barrierModels, 'wkb', { title: 'Model', description: 'Tunnelling model that turns current into thickness and thickness into density.' }),
  prefactor: choiceField(barrierPrefactors, 'inverse-mass', { title: 'Prefactor', description: 'Whether Fowler–Nordheim’s prefactor is divided by the mass (Lenzlinger & Snow, 1969) or not, as in many papers. The other models have no such choice.' }),
  imagePermittivity: optionalNumberField({ min: 1, max: 100 }, { title: 'Image charge', description: 'Optical permittivity for the image charge, which lowers the barrier; for the model fowler-nordheim only.', absent: 'no image charge' }),
  finishedBiasV: optionalNumberField({ min: -100, max: 100 }, { title: 'Finished device, bias', unit: 'V', description: 'Bias at which a finished device on the most common terrace carries its known current; with its current and area it anchors the thickness.', absent: 'no finished device is known' }),
  finishedCurrentNa: optionalNumberField({ above: 0, max: 1e12 }, { title: 'Finished device, current', unit: 'nA', description: 'Current of the finished device at that bias, as a magnitude.', absent: 'no finished device is known' }),
  finishedAreaUm2: optionalNumberField({ above: 0, max: 1e9 }, { title: 'Finished device, area', unit: 'µm²', description: 'Area of even barrier that this current flows through.', absent: 'no finished device is known' }),
  withinTerrace: choiceField(['contact', 'barrier'], 'contact', { title: 'Scatter within a terrace', description: 'Whether the scatter of current inside a terrace belongs to the probe’s contact, or to the barrier and so to the device.' }),
});

export type BarrierSection = z.output<typeof barrierSection>;
