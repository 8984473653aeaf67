import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { PitchStatement } from '../../src/read/decoded-map.ts';
import { resolvePitch } from '../../src/read/pitch.ts';
import type { PitchQuestion } from '../../src/read/pitch.ts';
import { refused } from './refused.ts';

const scale = (x: number, y = x, plain = true): PitchStatement => ({ by: 'scale', x, y, plain });
const tag = (xUm: number, yUm = xUm): PitchStatement => ({ by: 'tag', xM: xUm * 1e-6, yM: yUm * 1e-6 });
const resolution = (xUm: number): PitchStatement => ({ by: 'resolution', xM: xUm * 1e-6, yM: xUm * 1e-6 });

function ask(pitches: PitchStatement[], sidecar: { widthUm?: number; heightUm?: number } = {}, recipe: { widthUm?: number; heightUm?: number } = {}) {
  const question: PitchQuestion = {
    file: 'a.tif', columns: 500, rows: 250, pitches, sidecar: { by: 'the sidecar a.json', ...sidecar }, recipe: { by: 'scan.widthUm', ...recipe },
  };
  const { pitch, warnings } = resolvePitch(question);
  return { nm: pitch === undefined ? undefined : [pitch.xM * 1e9, pitch.yM * 1e9].map((v) => Number(v.toPrecision(6))), codes: warnings.map((warning) => warning.code) };
}

test('nothing stated gives nothing', () => {
  assert.deepEqual(ask([]), { nm: undefined, codes: [] });
  // 30 is metres of a landscape, a geographic system is degrees: neither is taken for µm.
  assert.deepEqual(ask([scale(30)]), { nm: undefined, codes: [] });
  assert.deepEqual(ask([scale(0.02, 0.02, false)]), { nm: undefined, codes: [] });
  assert.deepEqual(ask([scale(2e-8)]), { nm: undefined, codes: [] });
});

test('our tag is certain, a bare scale below 10 µm is assumed with a remark', () => {
  assert.deepEqual(ask([tag(0.02, 0.03)]), { nm: [20, 30], codes: [] });
  assert.deepEqual(ask([scale(0.02)]), { nm: [20, 20], codes: ['size-assumed'] });
  assert.deepEqual(ask([resolution(0.001)]), { nm: [1, 1], codes: [] });
});

test('a scale that the sidecar confirms needs no remark, in µm or in another unit', () => {
  assert.deepEqual(ask([scale(0.02)], { widthUm: 10.05, heightUm: 5 }), { nm: [20.1, 20], codes: [] });
  assert.deepEqual(ask([scale(20)], { widthUm: 10 }), { nm: [20, 20], codes: [] });
  assert.deepEqual(ask([scale(2e-8, 4e-8)], { widthUm: 10 }), { nm: [20, 40], codes: [] });
  assert.deepEqual(ask([scale(0.02, 0.02, false)], { widthUm: 10 }), { nm: [20, 20], codes: [] });
});

test('width alone means square pixels, as does height alone', () => {
  assert.deepEqual(ask([], { widthUm: 10 }).nm, [20, 20]);
  assert.deepEqual(ask([], {}, { heightUm: 10 }).nm, [40, 40]);
  assert.deepEqual(ask([], {}, { widthUm: 10, heightUm: 10 }).nm, [20, 40]);
});

test('statements that disagree by more than 1 % are an error naming both', async () => {
  const cases: [() => unknown, RegExp][] = [
    [() => ask([tag(0.02)], { widthUm: 10.2 }), /a\.tif: the map is 10 µm wide by its own description but 10\.2 µm by the sidecar a\.json/],
    [() => ask([resolution(0.02)], { heightUm: 6 }), /6 µm high by the sidecar a\.json but 5 µm by its resolution tags/],
    [() => ask([tag(0.02), resolution(0.03)]), /15 µm by its resolution tags/],
    [() => ask([scale(0.02)], { widthUm: 20 }), /pixel scale but 20 µm by the sidecar a\.json; .*scan\.widthUm/],
    [() => ask([tag(0.02)], {}, { widthUm: 20 }), /20 µm by scan\.widthUm; leave out scan\.widthUm/],
    [() => ask([scale(0.02), resolution(0.04)]), /resolution tags/],
  ];
  for (const [run, sentence] of cases) assert.match((await refused(run)).message, sentence);
});

test('the recipe wins over sidecar, resolution and bare scale, and says so', () => {
  assert.deepEqual(ask([], { widthUm: 10, heightUm: 10 }, { widthUm: 20 }), { nm: [40, 40], codes: ['size-overridden'] });
  assert.deepEqual(ask([resolution(0.02)], {}, { widthUm: 20 }), { nm: [40, 40], codes: ['size-overridden'] });
  assert.deepEqual(ask([scale(0.02)], { widthUm: 10 }, { widthUm: 20 }), { nm: [40, 40], codes: ['size-overridden', 'size-overridden'] });
  // Where it agrees, the other axis may come from the sidecar.
  assert.deepEqual(ask([], { widthUm: 10, heightUm: 10 }, { widthUm: 10 }), { nm: [20, 40], codes: [] });
});
