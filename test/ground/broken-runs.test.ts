import assert from 'node:assert/strict';
import { test } from 'node:test';
import { fillFromNeighbours, markBrokenRuns, markSpikes } from '../../src/ground/broken-runs.ts';
import { seededRandom } from '../../src/stats/random.ts';

const columns = 80;
const rows = 24;
const noise = 0.08;
const rule = { noise, minLength: 8 };

interface Run {
  readonly r: number;
  readonly from: number;
  readonly to: number;
  readonly off: number;
}

/** A gentle slope with noise; runs stand off by so much. */
function map(runs: readonly Run[], seed = 'runs', under: (c: number, r: number) => number = (c, r) => 0.01 * c - 0.02 * r): Float32Array {
  const random = seededRandom(seed);
  return Float32Array.from({ length: columns * rows }, (_, i) => {
    const [c, r] = [i % columns, Math.floor(i / columns)];
    const run = runs.find((broken) => broken.r === r && c >= broken.from && c < broken.to);
    return under(c, r) + (run?.off ?? 0) + noise * random.normal();
  });
}

/** Marked pixels per run, at most one of its ends short; nothing else may be marked. */
function assertMarked(marks: Uint8Array, runs: readonly Run[], what: string): void {
  for (let i = 0; i < marks.length; i++) {
    const [c, r] = [i % columns, Math.floor(i / columns)];
    const inside = runs.some((run) => run.r === r && c >= run.from && c < run.to);
    if ((marks[i] === 1) !== inside) assert.fail(`${what}: row ${r}, column ${c} ${inside ? 'is not' : 'is'} marked`);
  }
}

test('one broken line, and two beside each other, of equal or different offset', () => {
  for (const seed of ['a', 'b', 'c']) {
    for (const runs of [
      [{ r: 10, from: 20, to: 60, off: -4 }],
      [{ r: 10, from: 20, to: 60, off: -4 }, { r: 11, from: 20, to: 60, off: -4 }],
      [{ r: 10, from: 20, to: 60, off: -4 }, { r: 11, from: 20, to: 60, off: 5 }],
      [{ r: 10, from: 20, to: 60, off: -4 }, { r: 11, from: 35, to: 75, off: -9 }],
    ]) assertMarked(markBrokenRuns(map(runs, seed), columns, rows, rule), runs, `${JSON.stringify(runs)}, seed ${seed}`);
  }
});

test('broken lines on and beside the upper and lower border', () => {
  for (const r of [0, 1, rows - 2, rows - 1]) {
    const runs = [{ r, from: 20, to: 60, off: -4 }];
    assertMarked(markBrokenRuns(map(runs), columns, rows, rule), runs, `row ${r}`);
  }
});

test('whole lines from one side of the map to the other', () => {
  const runs = [{ r: 7, from: 0, to: columns, off: 3 }];
  assertMarked(markBrokenRuns(map(runs), columns, rows, rule), runs, 'row 7');
});

test('too short a run, five lines together, a step across the lines and a slope are no broken runs', () => {
  const none = (values: Float32Array, what: string): void => assert.ok(markBrokenRuns(values, columns, rows, rule).every((mark) => mark === 0), what);
  none(map([{ r: 10, from: 20, to: 27, off: -4 }]), 'seven pixels');
  none(map([8, 9, 10, 11, 12].map((r) => ({ r, from: 20, to: 60, off: -4 }))), 'five lines');
  none(map([], 'step', (_, r) => (r < 12 ? 0 : 0.333)), 'a step');
  none(map([], 'slope', (_, r) => 2 * r), 'a slope');
  none(new Float32Array(columns * rows).fill(Number.NaN), 'nothing measured');
});

test('below only: what stands up is left alone', () => {
  const runs = [{ r: 6, from: 10, to: 50, off: -4 }, { r: 15, from: 10, to: 50, off: 4 }];
  assertMarked(markBrokenRuns(map(runs), columns, rows, { ...rule, only: 'below' }), runs.slice(0, 1), 'below');
  assertMarked(markBrokenRuns(map(runs), columns, rows, rule), runs, 'both ways');
});

test('a run over the flank of a feature goes on behind it', () => {
  const runs = [{ r: 10, from: 5, to: 75, off: -5 }];
  const marks = markBrokenRuns(map(runs, 'dome', (c, r) => Math.max(0, 20 * (1 - ((c - 40) ** 2 + (r - 10) ** 2) / 49))), columns, rows, rule);
  for (const c of [8, 20, 30, 50, 60, 72]) assert.equal(marks[10 * columns + c], 1, `column ${c}`);
});

test('a marked pixel takes what lies above and below; two lines are filled in between', () => {
  const values = Float32Array.from([
    1, 1, 1,
    9, 9, 9,
    9, 9, 9,
    4, 4, 4,
  ]);
  const marks = Uint8Array.from([0, 0, 0, 1, 1, 1, 1, 1, 1, 0, 0, 0]);
  assert.deepEqual([...fillFromNeighbours(values, marks, 3, 4, 10)], [...marks]);
  assert.deepEqual([...values], [1, 1, 1, 2, 2, 2, 3, 3, 3, 4, 4, 4]);
});

test('at the border a marked pixel takes what lies inwards, a missing one stays missing', () => {
  for (const marked of [true, false]) {
    const values = Float32Array.from([9, 9, 1, 2, 3, 4, 9, 9]);
    const marks = Uint8Array.from([1, 1, 0, 0, 0, 0, 1, 1]);
    if (!marked) for (const i of [0, 1, 6, 7]) values[i] = Number.NaN;
    fillFromNeighbours(values, marked ? marks : new Uint8Array(8), 2, 4, 10);
    assert.deepEqual([...values], marked ? [1, 2, 1, 2, 3, 4, 3, 4] : [Number.NaN, Number.NaN, 1, 2, 3, 4, Number.NaN, Number.NaN]);
  }
});

test('neighbours that disagree do not fill a missing pixel; a marked one takes the nearer, or what lies between when told so', () => {
  const fill = (mark: number, markedTolerance?: number): number => {
    const values = Float32Array.from([0, 0, 0, mark === 1 ? 50 : Number.NaN, 10, 10, 10]);
    fillFromNeighbours(values, Uint8Array.from([0, 0, 0, mark, 0, 0, 0]), 1, 7, 4, markedTolerance);
    return values[3]!;
  };
  assert.deepEqual([fill(0), fill(1), fill(0, 100), fill(1, 100)], [Number.NaN, 0, Number.NaN, 5]);
});

test('spikes up and down, but no pit that a probe could reach into, and no feature of two pixels', () => {
  const values = map([], 'spikes');
  const at = (c: number, r: number): number => r * columns + c;
  values[at(20, 10)]! += 4;
  values[at(40, 10)]! -= 9;
  values[at(60, 10)]! -= 4;
  values[at(30, 18)]! += 4;
  values[at(31, 18)]! += 4;
  const marks = new Uint8Array(values.length);
  markSpikes(values, marks, columns, rows, noise, 6);
  assert.deepEqual([...marks.keys()].filter((i) => marks[i] === 1), [at(20, 10), at(40, 10)]);
});

test('where only losses count, a gain on the line between two broken ones stands: it may be a short', () => {
  const lost: Run[] = [{ r: 10, from: 20, to: 60, off: -4 }, { r: 12, from: 20, to: 60, off: -4 }];
  for (const only of ['below', undefined] as const) {
    const values = map(lost);
    for (let c = 30; c < 33; c++) values[11 * columns + c]! += 2;
    const marks = markBrokenRuns(values, columns, rows, { ...rule, ...(only ? { only } : {}) });
    assert.equal(marks[11 * columns + 31], only ? 0 : 1);
    assert.equal(marks[10 * columns + 40], 1);
  }
});
