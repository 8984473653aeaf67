import assert from 'node:assert/strict';
import test from 'node:test';
import { buildNetwork } from '../../src/sheet/build-network.ts';
import { cycle } from '../../src/sheet/cycle.ts';
import { groundOfSheet } from '../../src/sheet/ground-of-sheet.ts';
import { hierarchy } from '../../src/sheet/network.ts';
import type { Level } from '../../src/sheet/network.ts';
import { spreadSlopes } from '../../src/sheet/tunnel-slopes.ts';
import { createGrid, seeded } from './device.ts';

/** 37 × 22 pixels with holes, two sheets, pitches 3 : 1, slopes over six decades. */
function createLevels(): readonly Level[] {
  const grid = createGrid(37, 22, 3, 1);
  const random = seeded(3);
  const ground = () => groundOfSheet(grid, Uint8Array.from({ length: 37 * 22 }, () => (random() < 0.06 ? 0 : 1)), undefined);
  const level = buildNetwork(grid, [{ ground: ground(), sheetOhm: 1e3, contactOhmM: 0 }, { ground: ground(), sheetOhm: 2e5, contactOhmM: 1 }], 2e5);
  for (let i = 0; i < level.size; i++) {
    const slope = 10 ** (6 * random() - 4);
    const [a, b] = [level.fields[0]!.free[i]!, level.fields[1]!.free[i]!];
    level.slope0[i] = a * slope;
    level.slope1[i] = b * slope;
    level.slope01[i] = a * b * slope;
  }
  const levels = hierarchy(level);
  spreadSlopes(levels, 0);
  return levels;
}

/** The cycle's answer to a right-hand side, both sheets in one vector. */
function answer(levels: readonly Level[], rhs: readonly Float32Array[]): readonly Float32Array[] {
  levels[0]!.fields.forEach((field, f) => field.rhs.set(rhs[f]!));
  cycle(levels, 0);
  return levels[0]!.fields.map((field) => field.x.slice());
}

function product(a: readonly Float32Array[], b: readonly Float32Array[]): number {
  return a.reduce((sum, part, f) => sum + part.reduce((inner, value, i) => inner + value * b[f]![i]!, 0), 0);
}

test('the cycle is symmetric and positive, as conjugate gradients need', () => {
  const levels = createLevels();
  const random = seeded(5);
  const draw = () => levels[0]!.fields.map(({ free }) => Float32Array.from(free, (value) => value * (random() - 0.5)));
  for (let k = 0; k < 5; k++) {
    const [u, v] = [draw(), draw()];
    const [mu, mv] = [answer(levels, u), answer(levels, v)];
    const scale = Math.sqrt(product(u, mu) * product(v, mv));
    assert.ok(Math.abs(product(u, mv) - product(v, mu)) < 1e-4 * scale);
    assert.ok(product(u, mu) > 0);
  }
});

test('every level carries the slopes and the ground of the finest', () => {
  const levels = createLevels();
  const sum = (values: Float32Array) => values.reduce((total, value) => total + value, 0);
  assert.equal(levels.at(-1)!.columns * levels.at(-1)!.rows, 1);
  for (const level of levels) assert.ok(Math.abs(sum(level.slope01) / sum(levels[0]!.slope01) - 1) < 1e-4);
});
