import assert from 'node:assert/strict';
import { test } from 'node:test';
import { formSurface } from '../../src/ground/form.ts';
import { solvePlanes } from '../../src/ground/solve-planes.ts';
import type { PlanesChange, PlanesInput } from '../../src/ground/solve-planes.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const columns = 80;
const rows = 50;
const count = columns * rows;
/** Levels 1 and 2 beside ground whose plane is known (0), on every line. */
const level = Uint16Array.from({ length: count }, (_, i) => (i % columns < 30 ? 0 : i % columns < 55 ? 1 : 2));
const ground = new Uint8Array(count).fill(1);
const order = 2;
/** 1, u, v, u², uv, v² as Legendre products, nanometres. */
const coefficients = Float64Array.from([0, 4, 0, 1.5, -2, 0].map((nm) => nm * 1e-9));
const surface = formSurface({ order, coefficients }, columns, rows);
const levelsM = [0, 0.7e-9, -0.4e-9];

function map(offsetOfRow: (r: number) => number): Float32Array {
  return Float32Array.from({ length: count }, (_, i) => surface[i]! + levelsM[level[i]!]! + offsetOfRow(Math.floor(i / columns)));
}

/** Solved three times over, each time for what the time before left, as its caller does: the tie to zero is weak, and weaker each time. */
function solved(input: PlanesInput): PlanesChange {
  const rest = input.rest.slice();
  const coefficients = new Float64Array(6);
  const levelM = new Float64Array(input.levels + 1);
  for (let round = 0; round < 3; round++) {
    const change = solvePlanes({ ...input, rest });
    change.form.coefficients.forEach((value, k) => { coefficients[k]! += value; });
    change.levelM.forEach((value, k) => { levelM[k]! += value; });
    const moved = formSurface(change.form, columns, rows);
    for (let i = 0; i < count; i++) rest[i]! -= moved[i]! + change.levelM[input.level[i]!]!;
  }
  return { form: { order: input.order, coefficients }, levelM };
}

test('form and levels come out together, whatever the offsets of the lines are', () => {
  const random = seededRandom('offsets');
  const white = Array.from({ length: rows }, () => 20e-9 * random.normal());
  for (const offsetOfRow of [() => 0, (r: number) => white[r]!, (r: number) => 1e-9 * r]) {
    const change = solved({ rest: map(offsetOfRow), ground, columns, rows, order, lines: true, level, levels: 2 });
    assertClose(change.levelM[1], 0.7e-9, 0.01);
    assertClose(change.levelM[2], -0.4e-9, 0.01);
    assert.equal(change.levelM[0], 0);
    for (const k of [1, 3, 4]) assertClose(change.form.coefficients[k], coefficients[k]!, 0.01, `term ${k}`);
    // What only varies from row to row is the lines', not the form's.
    for (const k of [0, 2, 5]) assert.ok(Math.abs(change.form.coefficients[k]!) < 0.02e-9, `term ${k}: ${change.form.coefficients[k]}`);
  }
});

test('without lines the form has the terms across the lines too', () => {
  const tilted = Float64Array.from([0.3, 4, -3, 1.5, -2, 0.8].map((nm) => nm * 1e-9));
  const whole = formSurface({ order, coefficients: tilted }, columns, rows);
  const rest = Float32Array.from({ length: count }, (_, i) => whole[i]! + levelsM[level[i]!]!);
  const change = solved({ rest, ground, columns, rows, order, lines: false, level, levels: 2 });
  // The common height is nobody's.
  for (let k = 1; k < 6; k++) assert.ok(Math.abs(change.form.coefficients[k]! - tilted[k]!) < 0.03e-9, `term ${k}: ${change.form.coefficients[k]}`);
  assertClose(change.levelM[1], 0.7e-9, 0.02);
});

test('a level that shares no line with others stays at zero, as does one without ground', () => {
  const apart = Uint16Array.from({ length: count }, (_, i) => (Math.floor(i / columns) >= 30 ? 1 : 0));
  const rest = Float32Array.from({ length: count }, (_, i) => (apart[i] === 1 ? 5e-9 : 0));
  const { levelM } = solvePlanes({ rest, ground, columns, rows, order: 1, lines: true, level: apart, levels: 2 });
  assert.ok(Math.abs(levelM[1]!) < 1e-15 && Math.abs(levelM[2]!) < 1e-15, `${levelM}`);
});

test('what is no ground has no say, missing values there included', () => {
  const rest = map(() => 0);
  const masked = ground.slice();
  for (let i = 0; i < count; i++) {
    if (i % 7 !== 0) continue;
    masked[i] = 0;
    rest[i] = i % 14 === 0 ? Number.NaN : 1e-6;
  }
  const { levelM } = solved({ rest, ground: masked, columns, rows, order, lines: true, level, levels: 2 });
  assertClose(levelM[1], 0.7e-9, 0.01);
  assertClose(levelM[2], -0.4e-9, 0.01);
});
