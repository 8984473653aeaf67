/** What this map's interval of the usable area answers to, on small invented scans. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import type { Usable } from '../../src/ledger/ledger.ts';
import { layerCostSpread } from '../../src/ledger/layer-cost-spread.ts';
import { usableInterval } from '../../src/ledger/usable-interval.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import type { RecipeChanges } from '../fixtures/create-sample.ts';
import { createScene, threeTerraces } from '../fixtures/create-scene.ts';

const size = 128;
const { sample } = createScene({ seed: 'a', size, layersAt: threeTerraces(size) });
const usable = (changes: RecipeChanges): Usable => evaluate(sample, createRecipe(changes)).ledger.usable;

test('a terrace near the band’s edge at the device’s bias is in the interval, as barrier height would book it', () => {
  // At 3.4 V a layer costs about 0.89 decades, so a band of ×/÷7.8 ends just there; heights one standard deviation apart book it differently.
  const at = (heightEv: number): Usable => usable({ stack: { biasV: 3.4 }, band: { factor: 7.8 }, barrier: { heightEv } });
  const [low, middle, high] = [2.4, 2.5, 2.6].map(at);
  assert.ok(low!.areaM2 > 2 * high!.areaM2, 'the heights differ');
  for (const found of [low!, middle!, high!]) {
    assert.ok(found.low95M2 <= high!.areaM2 && found.high95M2 >= 0.98 * low!.areaM2, `${found.low95M2}–${found.high95M2} for ${high!.areaM2} and ${low!.areaM2}`);
  }
});

test('a band whose edges lie clear of every terrace has a narrow interval, at either bias', () => {
  for (const stack of [{ biasV: 3.4 }, { biasV: 5.9 }]) {
    const { low95M2, high95M2, areaM2 } = usable({ stack });
    assert.ok(low95M2 < areaM2 && areaM2 < high95M2 && high95M2 - low95M2 < 0.02 * size ** 2 * 4e-16, `${low95M2}–${high95M2}`);
  }
});

test('layers: at the scan’s own bias only the ladder’s error counts, elsewhere height, mass and area as well', () => {
  const spread = (changes: RecipeChanges): { share: number; ladder: number } => {
    const recipe = createRecipe(changes);
    const barrier = evaluate(sample, recipe).barrier!;
    const share = layerCostSpread({ barrier, section: recipe.barrier, offsetV: recipe.stack.offsetV, scanBiasV: 5.9 });
    return { share, ladder: (1.96 * barrier.ladder.stepSeDecades) / barrier.ladder.stepDecades };
  };
  const same = spread({ stack: { biasV: 5.9 } });
  assert.equal(same.share, same.ladder);
  assert.ok(same.ladder > 0);
  const other = spread({ stack: { biasV: 3.4 } });
  assert.ok(other.share > 0.1 && other.share < 0.3, `${other.share}`);
  assert.ok(spread({ stack: { biasV: 5 } }).share > same.share);
  // What the layers are worth per pixel is a ratio of two biases, better known than either.
  const byPixel = spread({ stack: { biasV: 3.4 }, barrier: { withinTerrace: 'barrier' } });
  assert.ok(byPixel.share > 0 && byPixel.share < other.share, `${byPixel.share}`);
});

test('height alone: outlines only; nothing usable and nothing bordering it has no width', () => {
  const grid = { columns: 20, rows: 20, pitchXM: 1e-8, pitchYM: 1e-8 };
  const codes = new Uint8Array(400).fill(1);
  const whole = usableInterval({ grid, codes, usablePixels: 400, footprintPixels: 400 });
  assert.equal(whole.low95M2, whole.high95M2);
  for (let i = 0; i < 400; i++) if (i % 20 < 5) codes[i] = 3;
  // One outline of 20 pixels: 1.96 · 0.35 · (π/4) · 20 / 3 pixels.
  const { low95M2, high95M2 } = usableInterval({ grid, codes, usablePixels: 300, footprintPixels: 400 });
  const half = ((1.96 * 0.35 * Math.PI) / 4) * (20 / 3);
  assert.ok(Math.abs(low95M2 / 1e-16 - (300 - half)) < 1e-6 && Math.abs(high95M2 / 1e-16 - (300 + half)) < 1e-6, `${low95M2}–${high95M2}`);
});
