import assert from 'node:assert/strict';
import { test } from 'node:test';
import { degeneracyOf } from '../../src/barrier/degeneracy-of-map.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { degeneracyFigure } from '../../src/report/degeneracy-figure.ts';
import { writeReport } from '../../src/report/report.ts';
import { resultMaps } from '../../src/report/result-maps.ts';
import { verdictOf } from '../../src/report/verdict.ts';
import { createBiasMaps, slantedTerraces } from '../fixtures/create-bias-maps.ts';
import { createRecipe } from '../fixtures/create-sample.ts';

const app = { name: 'Evenglow', version: '0' };
const { sample } = createBiasMaps({ seed: 'report', size: 128, biasesV: [5.9, 5], contactM2: 60e-18, layersAt: slantedTerraces });
const appraisal = evaluate(sample, createRecipe({ stack: { biasV: 4 } }));
const degeneracy = degeneracyOf(appraisal.barrier!, appraisal.recipe.barrier, 5.9)!;
const report = writeReport(appraisal, app);

test('verdict.json: anchors with errors and sentences, terraces by biases, fields of the density; numbers only', () => {
  const { thickness, device } = verdictOf(appraisal, app);
  assert.deepEqual(thickness!.anchors.map(({ kind, taken }) => [kind, taken]), [['biases', true], ['area', false]]);
  for (const { sdNm, materialSdNm, layersSd, sentence } of thickness!.anchors) assert.ok(sdNm > 0 && materialSdNm > 0 && layersSd > 0 && sentence.endsWith('.'));
  assert.deepEqual(thickness!.biases!.biasesV, [5.9, 5]);
  assert.deepEqual(thickness!.biases!.terraces.map(({ step, layers }) => [step, Math.round(layers)]), [[-1, 10], [0, 11], [1, 12]]);
  assert.ok(Math.abs(device!.fieldRatio - 4 / 5.9) < 1e-9);
  assert.ok(Math.abs(device!.probeFieldVPerNm - 5.9 / 3.663) < 1e-9);
  assert.ok(!/NaN|Infinity|null/.test(JSON.stringify(verdictOf(appraisal, app))));
});

test('the report lists the anchors, draws what cannot be told apart, and says from which field the density is extrapolated', () => {
  for (const part of ['<h2>Thickness</h2>', 'Taken.', 'ln I(5.9', 'Height and thickness cannot be told apart', 'barrier height, eV', 'Extrapolated', '0.68 times the field']) assert.ok(report.includes(part), part);
  assert.ok(!/NaN|undefined/.test(report.replace(/<pre>[\s\S]*?<\/pre>/, '')));
});

test('the thickness by biases is a map of its own', () => {
  assert.ok(resultMaps(appraisal).some(({ file }) => file === 'bias-thickness.tif'));
  const single = evaluate({ ...sample, channels: sample.channels.slice(0, 2) }, createRecipe({ stack: { biasV: 4 } }));
  assert.ok(!resultMaps(single).some(({ file }) => file === 'bias-thickness.tif'));
  assert.equal(verdictOf(single, app).thickness!.biases, undefined);
  assert.ok(writeReport(single, app).includes('the same current through the stated contact'));
});

test('the figure has one line a mass and kind, the published range and the pair that was taken, all inside the picture', () => {
  const picture = degeneracyFigure(degeneracy, 0.333)!.text;
  // 0.26 and 0.5, the latter also the stated one, by ratio and by current.
  assert.equal(picture.match(/stroke-dasharray/g)!.length, 4);
  assert.equal(picture.match(/<circle/g)!.length, 1);
  assert.match(picture, /fill="#f3f5f7"/);
  for (const [, x, y] of picture.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)) assert.ok(Number(x) >= 0 && Number(x) <= 720 && Number(y) >= 0 && Number(y) <= 330, `${x} ${y}`);
  assert.equal(degeneracyFigure({ ...degeneracy, curves: [] }, 0.333), undefined);
});
