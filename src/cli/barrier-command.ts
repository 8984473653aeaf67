import type { BarrierDescription, InverseDescription } from '../barrier/model/describe.ts';
import { describeBarrier, describeFromCurrent } from '../barrier/model/describe.ts';
import { barrierModels, barrierPrefactors } from '../barrier/recipe.ts';
import { Problem } from '../problems/problem.ts';
import type { Command } from './command.ts';
import { exitCodes, numberOption } from './command.ts';

/** `evenglow barrier`: one barrier at one bias, forwards from its thickness or backwards from a current. */
export const barrierCommand: Command = {
  name: 'barrier',
  summary: 'Tunnelling through one barrier: density from thickness, or thickness from a current.',
  usage: [
    'evenglow barrier --thickness-nm D --bias-v V [options]',
    'evenglow barrier --current-a I --tip-area-nm2 A --bias-v V [options]',
  ],
  options: {
    'thickness-nm': { type: 'string' }, 'bias-v': { type: 'string' }, 'current-a': { type: 'string' }, 'tip-area-nm2': { type: 'string' },
    'height-ev': { type: 'string' }, mass: { type: 'string' }, 'layer-nm': { type: 'string' }, model: { type: 'string' },
    'image-permittivity': { type: 'string' }, prefactor: { type: 'string' }, 'temperature-k': { type: 'string' }, json: { type: 'boolean' },
  },
  optionText: {
    '--thickness-nm D': 'thickness of the barrier in nm',
    '--bias-v V': 'bias in volts',
    '--current-a I': 'current in amperes through the contact',
    '--tip-area-nm2 A': 'area of the contact in nm² (known to about a decade, 17 is usual)',
    '--height-ev E': 'barrier height in eV (2.5)',
    '--mass M': 'tunnelling mass over the electron mass (0.5)',
    '--layer-nm L': 'thickness of a layer in nm (0.333)',
    '--model NAME': 'wkb (default), fowler-nordheim or simmons',
    '--image-permittivity E': 'optical permittivity for the image charge (model fowler-nordheim)',
    '--prefactor NAME': 'inverse-mass (default) or none: prefactor of fowler-nordheim',
    '--temperature-k T': 'also print the factor by which this temperature raises the density',
    '--json': 'print JSON',
  },
  notes: ['Caution: a field near 1.2 V/nm breaks hexagonal boron nitride down (Hattori et al., ACS Nano 9, 916, 2015). Raise a bias slowly, with a current limit, and follow local rules and trained staff.'],
  async run({ values, positionals }, output) {
    if (positionals.length > 0) throw new Problem('command-surplus', { command: 'barrier', surplus: positionals[0]! });
    const description = describe(values);
    output.out(values['json'] === true ? `${JSON.stringify(description, null, 2)}\n` : inWords(description));
    if (values['json'] !== true) for (const { message } of description.warnings) output.err(`note: ${message}\n`);
    return exitCodes.good;
  },
};

function describe(values: Record<string, unknown>): BarrierDescription | InverseDescription {
  const biasV = numberOption(values, 'bias-v');
  const thicknessNm = numberOption(values, 'thickness-nm');
  const currentA = numberOption(values, 'current-a');
  const tipAreaNm2 = numberOption(values, 'tip-area-nm2');
  if (biasV === undefined) throw new Problem('option-absent', { command: 'barrier', option: '--bias-v' });
  const shared = { biasV, ...optional('heightEv', numberOption(values, 'height-ev')), ...optional('massRatio', numberOption(values, 'mass')),
    ...optional('layerNm', numberOption(values, 'layer-nm')), ...optional('imagePermittivity', numberOption(values, 'image-permittivity')), ...optional('model', wordOption(values, 'model', barrierModels)),
    ...optional('prefactor', wordOption(values, 'prefactor', barrierPrefactors)), ...optional('temperatureK', numberOption(values, 'temperature-k')) };
  if (thicknessNm !== undefined) {
    if (currentA !== undefined) throw new Problem('option-conflict', { command: 'barrier', first: '--thickness-nm', second: '--current-a' });
    return describeBarrier({ ...shared, thicknessNm });
  }
  if (currentA === undefined) throw new Problem('option-absent', { command: 'barrier', option: '--thickness-nm, or --current-a with --tip-area-nm2' });
  if (tipAreaNm2 === undefined) throw new Problem('option-absent', { command: 'barrier', option: '--tip-area-nm2' });
  return describeFromCurrent({ ...shared, currentA, tipAreaNm2 });
}

function optional<Key extends string, Value>(key: Key, value: Value | undefined): { [K in Key]?: Value } {
  return value === undefined ? {} : ({ [key]: value } as { [K in Key]?: Value });
}

function wordOption<const Words extends readonly string[]>(values: Record<string, unknown>, name: string, words: Words): Words[number] | undefined {
  const given = values[name];
  if (given === undefined) return undefined;
  const known = words.find((word) => word === given);
  if (known === undefined) throw new Problem('barrier-argument', { name: `--${name}`, value: String(given), reason: `is not one of ${words.join(', ')}` });
  return known;
}

function inWords(d: BarrierDescription | InverseDescription): string {
  const digits = (value: number): string => String(Number(value.toPrecision(5)));
  const lines: [string, string][] = [
    ['model', `${d.model}, height ${d.heightEv} eV, mass ${d.massRatio}${d.prefactor === 'none' ? ', prefactor without the mass' : ''}${d.imagePermittivity === undefined ? '' : `, image charge in ${d.imagePermittivity}`}`],
    ['thickness', `${digits(d.thicknessNm)} nm, ${d.layers} layers${rangeWords(d)}`],
    ['bias', `${d.biasV} V, field ${digits(d.fieldVPerNm)} V/nm, ${d.regime === 'direct' ? 'direct tunnelling' : 'Fowler–Nordheim regime'}`],
    ['density', d.densityNaPerUm2 === undefined ? 'not given by this model' : `${digits(d.densityNaPerUm2)} nA/µm² (${digits(d.densityAPerCm2!)} A/cm²)`],
  ];
  if (d.temperatureFactor !== undefined) lines.push(['at', `${d.temperatureK} K the density is ${digits(d.temperatureFactor)} times that`]);
  return lines.map(([name, text]) => `${name.padEnd(10)} ${text}\n`).join('');
}

/** The contact's area is known to a decade; what that leaves of the thickness is said with it. */
function rangeWords(d: BarrierDescription | InverseDescription): string {
  if (!('currentA' in d) || d.thicknessLowNm === undefined || d.thicknessHighNm === undefined) return '';
  return ` (${d.thicknessLowNm.toFixed(2)}–${d.thicknessHighNm.toFixed(2)} nm, ${d.layersLow}–${d.layersHigh} layers, for a decade in contact area)`;
}
