/** The unit of one channel from the file, the sidecar and the recipe. */
import { notice, Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import type { UnitStatement } from './decoded-map.ts';
import type { Quantity } from './sample.ts';
import { knownUnit } from './units.ts';
import type { KnownUnit } from './units.ts';

/** A unit that the recipe or a sidecar gives, and who gives it ("scan.heightUnit", "the sidecar S.json"). */
export interface GivenUnit {
  readonly by: string;
  readonly word: string;
}

export interface UnitQuestion {
  readonly file: string;
  readonly quantity: Quantity;
  readonly stated?: UnitStatement | undefined;
  readonly sidecar?: GivenUnit | undefined;
  readonly recipe?: GivenUnit | undefined;
}

/**
 * The unit to read a channel in, undefined when nothing states it. The recipe wins over sidecar and foreign
 * descriptions (with a remark) but must not contradict our own tag; file and sidecar must agree.
 * Throws `unit-mismatch` for a height in amperes or a current in metres, `unit-disagreement` otherwise.
 */
export function resolveUnit(question: UnitQuestion): { unit?: KnownUnit; warnings: readonly Notice[] } {
  const { file, quantity, stated, sidecar, recipe } = question;
  const inFile = stated === undefined ? undefined : knownUnit(stated.word);
  if (inFile !== undefined && inFile.quantity !== quantity) {
    throw new Problem('unit-mismatch', { file, quantity, unit: inFile.unit, way: `rename it if it is a ${inFile.quantity}, or export it again` });
  }
  const given = recipe ?? sidecar;
  if (given === undefined) return { ...(inFile === undefined ? {} : { unit: inFile }), warnings: [] };
  const unit = knownUnit(given.word);
  if (unit === undefined || unit.quantity !== quantity) throw new Problem('unit-mismatch', { file, quantity, unit: given.word, way: `correct ${given.by}` });

  const warnings: Notice[] = [];
  if (inFile !== undefined && inFile.unit !== unit.unit) {
    if (recipe === undefined || stated?.by === 'tag') throw new Problem('unit-disagreement', { file, stated: inFile.unit, asked: unit.unit, by: given.by });
    warnings.push(notice('unit-overridden', { file, stated: inFile.unit, statedBy: 'the file', used: unit.unit, by: given.by }));
  }
  if (recipe !== undefined && sidecar !== undefined && sidecar.word !== recipe.word) {
    warnings.push(notice('unit-overridden', { file, stated: sidecar.word, statedBy: sidecar.by, used: unit.unit, by: recipe.by }));
  }
  return { unit, warnings };
}
