/** Invented scans with known truth that are kept outside the project (../shared/scenes); skipped where they are not at hand. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { StageCache } from '../../src/evaluate/stage-cache.ts';
import { codeOf } from '../../src/ledger/book-causes.ts';
import { channelOf } from '../../src/read/sample.ts';
import { answerOf } from '../accuracy/score-answer.ts';
import { poolScores } from '../accuracy/score-pool.ts';
import { scoreScene } from '../accuracy/score-scene.ts';
import type { SceneScore } from '../accuracy/score-scene.ts';
import { sharedNames, sharedScene } from '../accuracy/shared-scenes.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import { streakRatio } from '../fixtures/streaks.ts';

const names = sharedNames();
const scores: SceneScore[] = [];
/** The device's bias is what a person would state; all else is the default. */
const changes = { stack: { biasV: 4 } };
const missing = names.length === 0 && 'no ../shared/scenes';

test('outside: nine scenes are at hand', { skip: missing }, () => {
  assert.equal(names.length, 9);
});

for (const name of names) {
  // The model's own terraces carry the currents of 9 to 15 layers, so there layers can be checked.
  const modelled = name.startsWith('model-');
  test(`outside: ${name}, usable share within 0.02 of the truth, levelled without streaks${modelled ? ', layers right on 95 % of the usable' : ''} [known truth]`, async () => {
    const { sample, truth } = await sharedScene(name, changes);
    const cache = new StageCache(2e8);
    const appraisal = evaluate(sample, createRecipe(changes), { cache });
    const { ledger, ground } = appraisal;
    const codes = ledger.codes.data;
    assert.equal(ledger.footprintPixels, codes.length);
    assert.equal(ledger.rows.reduce((sum, row) => sum + row.pixels, 0), codes.length);
    assert.ok(codes.every((code) => code >= 1 && code <= 12));
    const score = scoreScene(answerOf(appraisal), truth);
    scores.push(score);
    const [found, there] = score.usable;
    assert.ok(Math.abs(found - there) <= 0.02, `${found} for ${there}`);

    const { columns, rows } = sample.grid;
    const bare = new Set([codeOf('usable'), codeOf('thin'), codeOf('thick')]);
    const streaks = (values: Float32Array): number => streakRatio(values.map((value, i) => (bare.has(truth.codes[i]!) ? value : Number.NaN)), columns, rows);
    const [before, after] = [streaks(channelOf(sample, 'height')!.values.data), streaks(ground.height!.levelled.data)];
    assert.ok(before > 100 && after < 10, `streaks ${before} before, ${after} after`);

    if (!modelled) return;
    const { barrier } = evaluate(sample, createRecipe({ ...changes, barrier: { referenceLayers: 11 } }), { cache });
    let right = 0;
    let judged = 0;
    for (let i = 0; i < codes.length; i++) {
      if (codes[i] !== codeOf('usable')) continue;
      judged++;
      if (barrier!.layers!.data[i] === truth.layers[i]) right++;
    }
    assert.ok(right >= 0.95 * judged, `layers right on ${right} of ${judged} usable pixels`);
  });
}

test('outside: over all scenes, bubbles, residue and wrinkles by pixels, whole bubbles and shorts, levelled height [known truth]', { skip: missing }, () => {
  const pool = poolScores(scores);
  assert.equal(pool.scenes, names.length);
  const least = (value: number, limit: number, what: string): void => assert.ok(value >= limit, `${what}: ${value}, wanted ${limit}`);
  least(pool.f1.bubble, 0.95, 'F1 of bubbles');
  least(pool.f1.residue, 0.85, 'F1 of residue');
  least(pool.f1.wrinkle, 0.85, 'F1 of wrinkles');
  least(pool.bubblesFound, 0.95, 'bubbles found');
  least(pool.bubblesTrue, 0.95, 'bubbles true');
  least(pool.shortsFound, 0.95, 'shorts found');
  least(pool.shortsTrue, 0.9, 'shorts true');
  // In multiples of the white noise, which is all that a perfect levelling would leave.
  assert.ok(pool.levelMedian <= 1.5, `levelled height off by ${pool.levelMedian} of the noise`);
  assert.equal(pool.covered, 1, 'an interval of the usable share does not hold the truth');
});
