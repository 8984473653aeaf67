/** Texture through the whole chain. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { createRoughSurface } from '../fixtures/create-rough-surface.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';

const size = 192;
// Smooth against the step of a layer, 0.33 nm: on a rougher surface flat patches pass for planes of their own, and levelling takes less than is estimated.
const roughNm = 0.1;
const noiseNm = 0.025;

/** A rough sheet under tilt, bow and line offsets; a bump in one corner, a strip beyond the footprint. */
function roughSample(seed: string, lengthPx: number) {
  const random = seededRandom(seed);
  const offsets = Float64Array.from({ length: size }, () => 0.4 * random.normal());
  const surface = createRoughSurface(seed, size, size, lengthPx, 'gaussian', 300);
  const heightM = surface.map((z, i) => {
    const c = i % size;
    const r = Math.floor(i / size);
    const bump = Math.max(0, 20 * (1 - ((c - 30) ** 2 + (r - 30) ** 2) / 100));
    return 1e-9 * (roughNm * z + noiseNm * random.normal() + offsets[r]! + 0.1 * c - 0.05 * r + 3e-4 * c * c + bump);
  });
  return { surface, sample: createSample({ columns: size, rows: size, heightM, footprint: heightM.map((_, i) => (i % size < size - 12 ? 1 : 0)) }) };
}

test('texture counts the flawless measured ground of the footprint; what levelling took is added back to Sq', () => {
  let truth = 0;
  const maps = 6;
  let raw = 0;
  let corrected = 0;
  let lengthM = 0;
  for (let map = 0; map < maps; map++) {
    const { surface, sample } = roughSample(`chain ${map}`, 8);
    const { texture, flaws, ground } = evaluate(sample, createRecipe());
    assert.ok(texture && typeof texture.levelling !== 'string');
    let counted = 0;
    let squares = 0;
    for (let i = 0; i < size * size; i++) {
      if (i % size >= size - 12 || flaws.labels.data[i] !== 0 || ground.height!.repaired.data[i] !== 0) continue;
      counted++;
      squares += (roughNm * surface[i]!) ** 2;
    }
    truth += Math.sqrt(squares / counted + noiseNm ** 2) / maps;
    assert.equal(texture.pixels, counted);
    assert.ok(counted < size * (size - 12) - 200, 'the bump is a flaw and does not count');
    raw += (texture.sqM * 1e9) / maps;
    corrected += (Math.sqrt(texture.sqM ** 2 + texture.levelling.removedM2) * 1e9) / maps;
    lengthM += texture.levelling.correlationM / maps;
  }
  assert.ok(raw < truth && Math.abs(corrected - truth) < 0.7 * Math.abs(raw - truth), `Sq ${raw} corrected to ${corrected}, true ${truth}`);
  assertClose(lengthM, 8 * 20e-9, 0.15);
});

test('a map without a height has no texture', () => {
  const current = createSample({ columns: 32, rows: 32, currentA: Float64Array.from({ length: 1024 }, (_, i) => 1e-10 * (1 + 0.1 * Math.sin(i)) ) });
  assert.equal(evaluate(current, createRecipe()).texture, undefined);
});
