import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { codeOf } from '../../src/ledger/book-causes.ts';
import { glowMap } from '../../src/ledger/glow-map.ts';
import type { Cause } from '../../src/ledger/ledger.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import { createScene } from '../fixtures/create-scene.ts';

test('dark, unknown and bright causes; metal lets no light through whatever lies under it', () => {
  const row: Cause[] = ['usable', 'usable', 'thin', 'bubble', 'short', 'wrinkle', 'unmeasured', 'outside'];
  const codes = Uint8Array.from([...row, ...row], codeOf);
  const density = Float32Array.of(2, 2, 8, 2, 9, 2, Number.NaN, 2);
  const metal = Uint8Array.from(codes, (_, i) => (i >= row.length ? 1 : 0));
  const glow = Array.from(glowMap(codes, Float32Array.of(...density, ...density), metal));
  assert.deepEqual(glow, [1, 1, 4, 0, 0, Number.NaN, Number.NaN, Number.NaN, 0, 0, 0, 0, 0, 0, 0, Number.NaN]);
});

for (const layer of ['contact-emitter', 'contact-injector'] as const) {
  test(`a drawn ${layer} is dark in the glow map`, () => {
    const size = 64;
    const { heightM, currentA } = createScene({ seed: 'metal', size });
    const right = 10 * 20e-9;
    const top = size * 20e-9;
    const outlines = [{ layer, rings: [[[0, 0], [right, 0], [right, top], [0, top], [0, 0]]] }] as const;
    const { ledger } = evaluate(createSample({ columns: size, rows: size, heightM, currentA, biasV: 5.9, outlines }), createRecipe({ stack: { biasV: 4 } }));
    for (let i = 0; i < size * size; i++) if ((ledger.glow.data[i] === 0) !== (i % size < 10)) assert.fail(`glow ${ledger.glow.data[i]} at ${i}`);
  });
}
