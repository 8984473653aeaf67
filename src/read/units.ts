/** Units that files and people write, and their SI factors. */
import { currentUnits, heightUnits } from './recipe.ts';
import type { Quantity } from './sample.ts';

export type HeightUnit = (typeof heightUnits)[number];
export type CurrentUnit = (typeof currentUnits)[number];

const heightFactors: Readonly<Record<HeightUnit, number>> = { m: 1, mm: 1e-3, um: 1e-6, nm: 1e-9, pm: 1e-12, angstrom: 1e-10 };
const currentFactors: Readonly<Record<CurrentUnit, number>> = { A: 1, mA: 1e-3, uA: 1e-6, nA: 1e-9, pA: 1e-12, fA: 1e-15, relative: 1 };

/** Other spellings, with the two micro signs already written as u. */
const spellings: Readonly<Record<string, HeightUnit | CurrentUnit>> = {
  metre: 'm', meter: 'm', metres: 'm', meters: 'm', '\u00c5': 'angstrom', '\u212b': 'angstrom', Angstrom: 'angstrom', ANGSTROM: 'angstrom',
  ampere: 'A', amperes: 'A', amp: 'A', 'a.u.': 'relative', 'arb. units': 'relative',
};

/** A unit known to the recipe and the quantity that it belongs to. */
export type KnownUnit =
  | { readonly quantity: 'height'; readonly unit: HeightUnit }
  | { readonly quantity: 'current'; readonly unit: CurrentUnit };

/** Recognises a unit as a file spells it; undefined when it is neither a length nor a current. */
export function knownUnit(word: string): KnownUnit | undefined {
  const plain = word.trim().replace(/[µμ]/g, 'u');
  const name = Object.hasOwn(spellings, plain) ? spellings[plain] : plain;
  const height = heightUnits.find((unit) => unit === name);
  if (height !== undefined) return { quantity: 'height', unit: height };
  const current = currentUnits.find((unit) => unit === name);
  return current === undefined ? undefined : { quantity: 'current', unit: current };
}

/** Factor from the file's unit to SI (metres, amperes; 1 for relative currents). */
export function siFactor(unit: KnownUnit): number {
  return unit.quantity === 'height' ? heightFactors[unit.unit] : currentFactors[unit.unit];
}

/** The recipe field that supplies the unit of a quantity, with an example. */
export function unitOption(quantity: Quantity): string {
  return quantity === 'height' ? '--set scan.heightUnit=nm' : '--set scan.currentUnit=nA (or relative)';
}
