import assert from 'node:assert/strict';
import { test } from 'node:test';
import { innerPoints } from '../../src/flaws/inner-points.ts';
import type { Flaw } from '../../src/flaws/flaws.ts';
import { labelMap } from '../../src/grid/maps.ts';

/** Inner points as [column, row] of a drawing whose digits are labels; pitch 1 m. */
function inner(...lines: string[]): [number, number][] {
  const [columns, rows] = [lines[0]!.length, lines.length];
  const grid = { columns, rows, pitchXM: 1, pitchYM: 1 };
  const labels = Uint32Array.from(lines.join(''), (digit) => Number(digit) || 0);
  const list = Array.from({ length: Math.max(...labels) }, (_, k) => {
    const own = [...labels.keys()].filter((i) => labels[i] === k + 1);
    const mean = (of: (i: number) => number): number => own.reduce((sum, i) => sum + of(i), 0) / own.length;
    return { flaw: k + 1, xM: mean((i) => (i % columns) + 0.5), yM: mean((i) => rows - Math.floor(i / columns) - 0.5) } as Flaw;
  });
  return innerPoints({ labels: labelMap(grid, labels), list, warnings: [] }, grid).map(({ xM, yM }) => [xM - 0.5, rows - yM - 0.5]);
}

test('the deepest pixel, though the centre of area lies elsewhere', () => {
  assert.deepEqual(inner('.............', '.11111.......', '.11111.......', '.111111111111', '.11111.......', '.11111.......', '.............'), [[3, 3]]);
});

test('a bent flaw: a pixel of its own, not the hollow that it surrounds', () => {
  const [[column, row]] = inner('.11111.', '.1...1.', '.1...1.', '.1...1.') as [[number, number]];
  assert.ok(row === 0 || column === 1 || column === 5);
});

test('flaws that touch: each counts the other as outside', () => {
  assert.deepEqual(inner('.......', '1111222', '1111222', '1111222', '.......'), [[1, 2], [5, 2]]);
});

test('single pixels, flaws that fill the map, none at all', () => {
  assert.deepEqual(inner('1.2'), [[0, 0], [2, 0]]);
  assert.deepEqual(inner('111', '111', '111'), [[1, 1]]);
  assert.deepEqual(inner('...'), []);
});
