import assert from 'node:assert/strict';
import { test } from 'node:test';
import { formRange, formSurface } from '../../src/ground/form.ts';
import { slopeForm } from '../../src/ground/slope-form.ts';

const [columns, rows] = [96, 80];
const powers = [[1, 0], [0, 1], [2, 0], [1, 1], [0, 2]] as const;
const coefficients = [3e-9, -2e-9, 1e-9, 0.5e-9, -0.7e-9];

function map(more: (c: number, r: number) => number): Float32Array {
  return Float32Array.from({ length: columns * rows }, (_, i) => {
    const [c, r] = [i % columns, Math.floor(i / columns)];
    const [u, v] = [(2 * c) / (columns - 1) - 1, (2 * r) / (rows - 1) - 1];
    return powers.reduce((sum, [p, q], k) => sum + coefficients[k]! * u ** p * v ** q, 0) + more(c, r);
  });
}

function assertFound(values: Float32Array): void {
  slopeForm(values, columns, rows, powers).forEach((value, k) => assert.ok(Math.abs(value - coefficients[k]!) < 1e-13, `term ${k}: ${value}`));
}

test('slopes are found from differences, whatever the common level and missing pixels', () => {
  assertFound(map(() => 0));
  assertFound(map((c, r) => ((c + r) % 7 === 0 ? Number.NaN : 5e-9)));
});

test('a step that few differences cross does not bend the form', () => {
  assertFound(map((c) => (c < 40 ? -8e-9 : 0)));
});

test('the range of a form is that of its surface', () => {
  for (const order of [0, 1, 2, 4]) {
    const form = { order, coefficients: Float64Array.from({ length: ((order + 1) * (order + 2)) / 2 }, (_, k) => Math.cos(3 * k)) };
    const surface = formSurface(form, columns, rows);
    assert.equal(formRange(form, columns, rows), Math.max(...surface) - Math.min(...surface));
  }
});
