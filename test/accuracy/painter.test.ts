/** The painter: the same seed gives the same scene, and the truth agrees with what was painted. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { codeOf } from '../../src/ledger/book-causes.ts';
import { channelOf } from '../../src/read/sample.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { amplified } from './paint-scan.ts';
import { kindOf, kinds, sized } from './paint-kinds.ts';
import { paintScene } from './paint-scene.ts';
import { visiblePixels } from './score-scene.ts';

const small = (name: string) => sized(kindOf(name), 0.2);

test('the same kind and seed give the same scene to the bit, another seed another one', () => {
  const first = paintScene(small('family'), 'a');
  const again = paintScene(small('family'), 'a');
  const other = paintScene(small('family'), 'b');
  assert.deepEqual(again.sample.sources, first.sample.sources);
  assert.deepEqual(again.truth, first.truth);
  assert.notEqual(other.sample.sources[0]!.sha256, first.sample.sources[0]!.sha256);
});

for (const { name } of kinds) {
  test(`${name}: causes and currents agree with the objects`, () => {
    const { sample, truth } = paintScene(small(name), 'truth');
    const { codes, grid } = truth;
    const current = channelOf(sample, 'current')!.values.data;
    assert.ok(codes.every((code) => code >= 1 && code <= 9 && code !== codeOf('open')));
    for (const [kind, cause] of [['bubble', 'bubble'], ['pinhole', 'short']] as const) {
      const drawn = visiblePixels(truth, kind, 0).flat();
      assert.equal(new Set(drawn).size, drawn.length, 'a pixel belongs to one object');
      assert.equal(drawn.length, codes.filter((code) => code === codeOf(cause)).length);
    }
    if (name === 'clean') assert.ok(codes.every((code) => [1, 2, 8, 9].includes(code)));
    // A double's 1e-8 is not a Float32's.
    assert.ok(current.every((value) => Number.isNaN(value) || value <= Math.fround(1e-8)));
    for (let i = 0; i < codes.length; i++) {
      assert.equal(codes[i] === codeOf('unmeasured'), Number.isNaN(current[i]!) && ![3, 4, 5, 6].includes(codes[i]!));
      // The amplifier's floor is 1e-13 A; a blocked pixel shows no more than that and its noise, unless a lag smears its neighbours over it.
      if (codes[i] === codeOf('bubble') && truth.lagPx === 0 && !Number.isNaN(current[i]!)) assert.ok(current[i]! < 6e-13, `${current[i]} A on a bubble`);
    }
    assert.ok(Math.abs(grid.pitchXM * grid.columns * 1e9 - small(name).widthNm) < 1e-6);
  });
}

test('geometry does not depend on the pixel count: twice as many pixels, the same objects and areas', () => {
  const kind = sized(kindOf('family'), 0.4);
  const coarse = paintScene(kind, 'pixels');
  const fine = paintScene({ ...kind, columns: 2 * kind.columns, rows: 2 * kind.rows }, 'pixels');
  assert.deepEqual(fine.objects, coarse.objects);
  for (const cause of ['usable', 'bubble', 'residue', 'wrinkle', 'thin', 'thick'] as const) {
    const share = ({ truth: { codes } }: typeof fine): number => codes.filter((code) => code === codeOf(cause)).length / codes.length;
    assert.ok(Math.abs(share(fine) - share(coarse)) < 0.004, `${cause}: ${share(fine)} and ${share(coarse)}`);
  }
});

test('crowded maps are covered by bubbles on two fifths of their area', () => {
  const { truth } = paintScene(sized(kindOf('crowded'), 0.5), 'cover');
  const cover = truth.codes.filter((code) => code === codeOf('bubble')).length / truth.codes.length;
  assert.ok(Math.abs(cover - 0.4) < 0.03, `${cover}`);
});

test('the amplifier: one pole from left to right before it limits, floor, saturation', () => {
  const keep = Math.exp(-1 / 2);
  const out = amplified(seededRandom('amplifier'), Float64Array.of(0, 4e-9, 4e-9, 0, 1, 0), 3, 2, 0);
  // The second line starts afresh; its bright pixel stays beyond the limit for one pixel more.
  const expected = [1e-13, (1 - keep) * 4e-9, (1 - keep * keep) * 4e-9, 1e-13, 1e-8, 1e-8];
  expected.forEach((value, i) => assert.ok(Math.abs(out[i]! - value) <= 1e-6 * value, `${i}: ${out[i]} for ${value}`));
});
