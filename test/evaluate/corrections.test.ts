/** Corrections by hand through the whole chain. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { StageCache } from '../../src/evaluate/stage-cache.ts';
import { verdictOf } from '../../src/report/verdict.ts';
import { writeReport } from '../../src/report/report.ts';
import { checkRecipe } from '../../src/recipe/parse-recipe.ts';
import type { Recipe } from '../../src/recipe/recipe.ts';
import { createSample } from '../fixtures/create-sample.ts';
import { createScene, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';

const size = 96;
const scene = createScene({ seed: 'by hand', size, layersAt: threeTerraces(size), things: typicalThings(size) });
const app = { name: 'evenglow', version: 'test' };
const recipeWith = (corrections: readonly object[], more: object = {}): Recipe => checkRecipe({ format: 'evenglow-recipe', version: 1, ...more, corrections });
/** Centre of a pixel, µm; 20 nm pitch. */
const at = (c: number, r: number): [number, number] => [(c + 0.5) * 0.02, (size - r - 0.5) * 0.02];
const [bubble] = typicalThings(size) as unknown as [{ c: number; r: number }];
const [xUm, yUm] = at(bubble.c, bubble.r);
const asResidue = { kind: 'reclassify', xUm, yUm, cause: 'residue' };
const nowhere = { kind: 'dismiss', xUm: 500, yUm: 500 };
const painted = { kind: 'paint', pointsUm: [at(80, 10), at(88, 10)], widthUm: 0.12, cause: 'short' };

test('the ledger books a corrected flaw by its new cause, and areas add up to the footprint', () => {
  const plain = evaluate(scene.sample, recipeWith([])).ledger;
  const after = evaluate(scene.sample, recipeWith([asResidue, painted])).ledger;
  const pixels = (ledger: typeof plain, cause: string): number => ledger.rows.find((row) => row.cause === cause)!.pixels;
  const code = plain.codes.get(bubble.r, bubble.c);
  assert.equal(plain.rows[code - 1]!.cause, 'bubble');
  assert.equal(after.rows[after.codes.get(bubble.r, bubble.c) - 1]!.cause, 'residue');
  assert.equal(pixels(plain, 'bubble') + pixels(plain, 'residue'), pixels(after, 'bubble') + pixels(after, 'residue'));
  assert.ok(pixels(after, 'short') > pixels(plain, 'short') + 30);
  for (const { rows, footprintPixels } of [plain, after]) assert.equal(rows.reduce((sum, row) => sum + row.pixels, 0), footprintPixels);
});

test('a correction has no flaws sought again: the stage before it comes from the cache', () => {
  const cache = new StageCache(1e9);
  const first = evaluate(scene.sample, recipeWith([]), { cache });
  const second = evaluate(scene.sample, recipeWith([asResidue]), { cache });
  assert.equal(second.flaws.rise, first.flaws.rise, 'the very same map');
  assert.notEqual(second.flaws, first.flaws);
  assert.equal(evaluate(scene.sample, recipeWith([]), { cache }).ledger, first.ledger, 'undone, nothing is computed');
  assert.deepEqual(evaluate(scene.sample, recipeWith([asResidue])).ledger.rows, second.ledger.rows, 'with and without a cache');
});

test('undo is taking the entry out, to the bit', () => {
  const [before, after] = [recipeWith([painted]), recipeWith([painted, asResidue])];
  const undone = { ...after, corrections: after.corrections.slice(0, -1) };
  const [one, two] = [evaluate(scene.sample, before), evaluate(scene.sample, undone)];
  assert.deepEqual(two.ledger.codes.data, one.ledger.codes.data);
  assert.deepEqual(two.flaws.list, one.flaws.list);
});

test('verdict and report say how many were applied; one that meets nothing gives one notice', () => {
  const appraisal = evaluate(scene.sample, recipeWith([asResidue, nowhere, painted]));
  const verdict = verdictOf(appraisal, app);
  assert.deepEqual(verdict.corrections, { given: 3, applied: 2 });
  const notices = verdict.warnings.filter(({ code }) => code === 'correction-idle');
  assert.equal(notices.length, 1);
  assert.match(notices[0]!.message, /^Correction 2 \(flaw at x 500\.00, y 500\.00 µm dismissed\) meets no flaw and changes nothing/);
  const report = writeReport(appraisal, app);
  assert.match(report, /2 of 3 met something and were applied/);
  assert.match(report, /<li>short painted 0\.12 µm wide from x 1\.61, y 1\.71 µm<\/li>/);
  assert.ok(!('corrections' in verdictOf(evaluate(scene.sample, recipeWith([])), app)), 'nothing is said where there are none');
  assert.doesNotMatch(writeReport(evaluate(scene.sample, recipeWith([])), app), /Corrections by hand/);
});

test('maps of one quantity only: what is painted there is booked and told', () => {
  for (const [maps, cause] of [[{ heightM: scene.heightM }, 'short'], [{ currentA: scene.currentA, biasV: 5.9 }, 'bubble']] as const) {
    const { ledger } = evaluate(createSample({ columns: size, rows: size, ...maps }), recipeWith([{ ...painted, cause }]));
    const row = ledger.rows.find((candidate) => candidate.cause === cause)!;
    assert.ok(row.assessed && row.pixels > 30, cause);
  }
});

test('corrections with sheets: a painted short and a painted bubble leave finite numbers', () => {
  const sheets = { stack: { biasV: 4, emitterSheetOhm: 1e5, injectorSheetOhm: 300 } };
  const { sheet, ledger } = evaluate(scene.sample, recipeWith([painted, { ...painted, pointsUm: [at(10, 85)], cause: 'bubble' }], sheets));
  assert.ok(sheet?.totals === undefined || Object.values(sheet.totals).every((value) => Number.isFinite(value)));
  assert.ok(!/NaN|undefined|Infinity/.test(ledger.verdict));
});
