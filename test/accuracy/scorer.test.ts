/** The scorer: a perfect answer scores 1, a known wrong one what a person computes by hand. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { labelComponents } from '../../src/grid/label-components.ts';
import { codeOf } from '../../src/ledger/book-causes.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import { baselineAnswer } from './baseline.ts';
import { kindOf, sized } from './paint-kinds.ts';
import { paintScene } from './paint-scene.ts';
import type { Truth } from './paint-truth.ts';
import { planeResidualRms } from './plane.ts';
import type { Answer } from './score-answer.ts';
import { answerOf } from './score-answer.ts';
import { poolScores } from './score-pool.ts';
import { scoreScene } from './score-scene.ts';

/** The truth itself as an answer: every connected region of a flaw's code is a flaw. */
function perfect(truth: Truth): Answer {
  const { columns, rows } = truth.grid;
  const flawLabels = new Uint32Array(truth.codes.length);
  const flawCauses: (Answer['flawCauses'][number])[] = [undefined];
  for (const cause of ['short', 'bubble', 'residue', 'wrinkle'] as const) {
    const regions = labelComponents(truth.codes.map((code) => (code === codeOf(cause) ? 1 : 0)), columns, rows, 8);
    const first = flawCauses.length - 1;
    regions.labels.forEach((label, i) => {
      if (label > 0) flawLabels[i] = first + label;
    });
    for (let n = 0; n < regions.count; n++) flawCauses.push(cause);
  }
  const share = truth.codes.filter((code) => code === codeOf('usable')).length / truth.codes.length;
  return {
    codes: truth.codes, flawLabels, flawCauses, wearDecades: truth.wearDecades, lagPx: truth.lagPx, interval: [share, share],
    // A plane is nobody's error.
    levelledNm: Float64Array.from(truth.cleanNm, (value, i) => value + 3 - 0.02 * (i % columns) + 0.01 * Math.floor(i / columns)),
  };
}

for (const kind of ['flat', 'crowded']) {
  test(`perfect answers about ${kind} scenes have no error`, () => {
    // Numbers are per 100 µm²: on so small a part some kinds of flaw would be missing.
    const part = sized(kindOf(kind), 0.4);
    const { truth } = paintScene({ ...part, population: { ...part.population, residues: [60, 60], wrinkles: [18, 18], pinholes: [60, 60] } }, 'perfect');
    const pool = poolScores([scoreScene(perfect(truth), truth)]);
    assert.deepEqual(pool.f1, { bubble: 1, residue: 1, wrinkle: 1 });
    assert.equal(pool.right, 1);
    assert.deepEqual([pool.bubblesFound, pool.bubblesTrue, pool.shortsFound, pool.shortsTrue], [1, 1, 1, 1]);
    assert.deepEqual([pool.usableWorst, pool.wearWorst, pool.lagWorst], [0, 0, 0]);
    assert.ok(pool.levelWorst < 1e-9);
    assert.deepEqual([pool.covered, pool.widthMedian, pool.withoutReport], [1, 0, 0]);
  });
}

/** A map of 12 × 12 pixels of 10 nm with a bubble of 32 pixels, one of 12 that is too small to be counted, and two pinholes of one pixel, the second on ground that saturates. */
function drawn(): Truth {
  const grid = { columns: 12, rows: 12, pitchXM: 10e-9, pitchYM: 10e-9 };
  const rows = [
    '111111111111',
    '113333111111',
    '133333311331',
    '133333313333',
    '133333313333',
    '133333311331',
    '113333111111',
    '111111111111',
    '116111111111',
    '888888888888',
    '888888886888',
    '888888888888',
  ];
  const codes = Uint8Array.from(rows.join(''), Number);
  const disc = (kind: 'bubble' | 'pinhole', column: number, row: number, radius: number) => ({ kind, xM: column * 1e-8, topM: row * 1e-8, radiusM: radius * 1e-8 });
  return {
    grid, codes, layers: new Uint8Array(144).fill(12), cleanNm: new Float64Array(144), whiteNm: 0.1, wearDecades: 0.3, lagPx: 1,
    rounds: [disc('bubble', 4, 4, 3.17), disc('bubble', 10, 4, 2.1), disc('pinhole', 2.5, 8.5, 0.6), disc('pinhole', 8.5, 10.5, 0.6)],
    saturatedGround: Uint8Array.from(codes, (_, i) => (i >= 9 * 12 ? 1 : 0)),
  };
}

test('a known wrong answer scores what a person computes', () => {
  const truth = drawn();
  const [bubble, residue, short] = [codeOf('bubble'), codeOf('residue'), codeOf('short')];
  const codes = truth.codes.slice();
  const flawLabels = new Uint32Array(144);
  const put = (flaw: number, code: number, pixels: readonly (readonly [row: number, column: number])[]): void => pixels.forEach(([r, c]) => {
    codes[12 * r + c] = code;
    flawLabels[12 * r + c] = flaw;
  });
  const all = (code: number, columns: readonly [number, number]): [number, number][] => [...truth.codes.keys()]
    .filter((i) => truth.codes[i] === code && i % 12 >= columns[0] && i % 12 <= columns[1]).map((i) => [Math.floor(i / 12), i % 12]);
  // The large bubble is found but for its upper two lines, the small one is called residue; a bubble is invented on two pixels of ground.
  put(1, bubble, all(3, [0, 6]).filter(([r]) => r > 2));
  put(0, 1, all(3, [0, 6]).filter(([r]) => r <= 2));
  put(2, residue, all(3, [7, 11]));
  put(3, bubble, [[0, 0], [0, 1]]);
  // The first pinhole is found, the second, on saturated ground, is not; a short is invented.
  put(4, short, [[8, 2], [8, 3]]);
  put(5, short, [[8, 10]]);
  put(0, 8, [[10, 8]]);
  const answer: Answer = {
    codes, flawLabels, flawCauses: [undefined, 'bubble', 'residue', 'bubble', 'short', 'short'], wearDecades: 0.1, interval: [0.2, 0.3],
    // A checkerboard of ±0.2 nm about a plane.
    levelledNm: Float64Array.from(codes, (_, i) => 5 + 0.1 * (i % 12) + ((i + Math.floor(i / 12)) % 2 === 0 ? 0.2 : -0.2)),
  };
  const score = scoreScene(answer, truth);
  assert.deepEqual(score.bubbles, { there: 1, found: 1, parted: 1, claimed: 2, true: 1 });
  assert.deepEqual(score.shorts, { there: 1, found: 1, parted: 1, claimed: 2, true: 1 });
  // 32 + 12 bubble pixels there; 22 of them and 2 others booked as bubble.
  const pool = poolScores([score]);
  assert.equal(pool.f1.bubble, (2 * 22) / (44 + 24));
  assert.equal(pool.f1.residue, 0);
  assert.ok(Number.isNaN(pool.f1.wrinkle));
  // 108 pixels without the thin ground less 44 of bubbles and 1 of a pinhole are usable; found: 10 more of the bubble, 2 + 2 fewer.
  assert.deepEqual(score.usable, [69 / 144, 63 / 144]);
  assert.ok(Math.abs(pool.wearWorst - 0.2) < 1e-12);
  assert.ok(Number.isNaN(pool.lagWorst));
  assert.ok(Math.abs(score.levelRatio - 2) < 0.02, `${score.levelRatio}`);
  assert.deepEqual([pool.covered, pool.withoutReport, score.flawsReported], [0, 0, 5]);
  assert.equal(pool.right, (144 - 10 - 12 - 2 - 2 - 1) / 144);
});

test('the plane is taken out of a tilted map, missing values left out', () => {
  const tilted = Float64Array.from({ length: 60 }, (_, i) => (i === 17 ? Number.NaN : 2 + 0.5 * (i % 10) - 3 * Math.floor(i / 10)));
  assert.ok(planeResidualRms(tilted, 10) < 1e-12);
});

test('small scenes of the family: usable share within 0.02 of the truth, and more pixels right than by the plain script', () => {
  for (const seed of ['small 1', 'small 2']) {
    const { sample, truth } = paintScene(sized(kindOf('family'), 0.3), seed);
    const ours = scoreScene(answerOf(evaluate(sample, createRecipe({ stack: { biasV: 4 } }))), truth);
    const plain = scoreScene(baselineAnswer(sample), truth);
    assert.ok(Math.abs(ours.usable[0] - ours.usable[1]) < 0.02, `${seed}: ${ours.usable.join(' for ')}`);
    assert.ok(poolScores([ours]).right > poolScores([plain]).right, seed);
  }
});

test('one flaw over two bubbles has found both and told neither apart', () => {
  const { sample: _sample, truth } = paintScene(sized(kindOf('crowded'), 0.5), 'merged');
  const merged: Answer = { ...perfect(truth), flawLabels: Uint32Array.from(truth.codes, (code) => (code === codeOf('bubble') ? 1 : 0)), flawCauses: [undefined, 'bubble'] };
  const { bubbles } = scoreScene(merged, truth);
  assert.ok(bubbles.there > 5);
  assert.equal(bubbles.found, bubbles.there);
  assert.equal(bubbles.parted, 0);
});

test('heights that are left out are no perfect ones', () => {
  const { truth } = paintScene(sized(kindOf('family'), 0.3), 'holes');
  const holed: Answer = { ...perfect(truth), levelledNm: Float64Array.from(truth.cleanNm, (height, i) => (i % 3 === 0 ? height : Number.NaN)) };
  assert.equal(scoreScene(holed, truth).levelRatio, Number.POSITIVE_INFINITY);
});
