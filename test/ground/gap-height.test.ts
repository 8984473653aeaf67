import assert from 'node:assert/strict';
import { test } from 'node:test';
import { heightPerGap, layersBetween, pairDistancePx } from '../../src/ground/gap-height.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const columns = 40;
const peaks = [0, 1, 2].map((rung) => ({ log10: -9 - 0.6 * rung, rung, share: 0.3 }));
const always = (): boolean => true;

/** Two stretches on each line, `gaps` rungs apart. */
function scan(rows: number, gaps: number, stepNm: number): { levelled: Float32Array; log10: Float32Array } {
  const random = seededRandom('gap');
  const lines = Array.from({ length: rows }, () => 5e-9 * random.normal());
  const upper = (i: number): number => (i % columns < 20 ? 0 : 1);
  return {
    levelled: Float32Array.from({ length: rows * columns }, (_, i) => 1e-9 * stepNm * upper(i) + lines[Math.floor(i / columns)]! + 0.08e-9 * random.normal()),
    log10: Float32Array.from({ length: rows * columns }, (_, i) => -9 - 0.6 * gaps * upper(i) + 0.03 * random.normal()),
  };
}

test('the height of one gap: a step over several rungs is divided by their number, whatever the lines do', () => {
  for (const gaps of [1, 2]) {
    const { levelled, log10 } = scan(60, gaps, 0.333 * gaps);
    assertClose(heightPerGap(levelled, log10, columns, peaks, 0.6, always), 0.333e-9, 0.05);
  }
  // Falling current over falling ground and rising ground are told apart by their sign.
  const { levelled, log10 } = scan(60, 1, -0.5);
  assertClose(heightPerGap(levelled, log10, columns, peaks, 0.6, always), -0.5e-9, 0.05);
});

test('missing values and ground that is not admitted take no part; fewer than thirty pairs say nothing', () => {
  const { levelled, log10 } = scan(60, 1, 0.333);
  for (let i = 0; i < levelled.length; i += 3) levelled[i] = Number.NaN;
  assertClose(heightPerGap(levelled, log10, columns, peaks, 0.6, always), 0.333e-9, 0.05);
  assert.ok(Number.isNaN(heightPerGap(levelled, log10, columns, peaks, 0.6, (i) => i % columns < 20)));
  // Six pairs on each line.
  const few = scan(4, 1, 0.333);
  assert.ok(Number.isNaN(heightPerGap(few.levelled, few.log10, columns, peaks, 0.6, always)));
});

test('a border that runs along the lines is there, though the height over it tells nothing; a slow change of the contact is no border', () => {
  const random = seededRandom('along');
  const rows = 90;
  const levels = [-9, -9.6, -11.4];
  const level = (at: number): number => levels[Math.min(2, Math.floor((at * levels.length) / rows))]!;
  const flat = Float32Array.from({ length: rows * columns }, () => 0.08e-9 * random.normal());
  const striped = Float32Array.from({ length: rows * columns }, (_, i) => level(Math.floor(i / columns)) + 0.02 * random.normal());
  assert.deepEqual(layersBetween(flat, striped, columns, levels, 0.333e-9, always), [undefined, undefined]);
  // From −9 to −9.6 over thirty lines, without a jump.
  const gradual = Float32Array.from({ length: rows * columns }, (_, i) => {
    const r = Math.floor(i / columns);
    return (r < 30 ? -9 : r < 60 ? -9 - 0.02 * (r - 30) : -9.6) + 0.02 * random.normal();
  });
  assert.ok(Number.isNaN(layersBetween(flat, gradual, columns, [-9, -9.6], 0.333e-9, always)[0]!));
});

test('pairs stand 60 nm apart, at least six columns and at most a sixteenth of a line', () => {
  assert.equal(pairDistancePx(20e-9, 512), 6);
  assert.equal(pairDistancePx(10e-9, 512), 6);
  assert.equal(pairDistancePx(2e-9, 1024), 30);
  assert.equal(pairDistancePx(2e-9, 320), 20);
});
