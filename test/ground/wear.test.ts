import assert from 'node:assert/strict';
import { test } from 'node:test';
import { findDrift, isWear, wearPerRow } from '../../src/ground/wear.ts';
import type { Drift } from '../../src/ground/wear.ts';
import { levelGround } from '../../src/ground/level-ground.ts';
import { scalarMap } from '../../src/grid/maps.ts';
import type { Channel } from '../../src/read/sample.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { smeared } from '../fixtures/amplify.ts';
import { createRecipe, createSample } from '../fixtures/create-sample.ts';
import { createScene, noiseA, saturationA, typicalThings } from '../fixtures/create-scene.ts';

const size = 192;
const step = 1.1;

/** Slow variation of a barrier: plane waves of a quarter of the map and less, of the standard deviation given. */
function variation(seed: string, decades: number): (u: number, v: number) => number {
  const random = seededRandom(`variation ${seed}`);
  const waves = Array.from({ length: 30 }, () => ({ kx: (Math.SQRT2 / 0.12) * random.normal(), ky: (Math.SQRT2 / 0.12) * random.normal(), phase: 2 * Math.PI * random.uniform() }));
  return (u, v) => decades * Math.sqrt(2 / waves.length) * waves.reduce((sum, { kx, ky, phase }) => sum + Math.cos(kx * u + ky * v + phase), 0);
}

const layouts: Record<string, (u: number, v: number) => number> = {
  'terraces across': (u, v) => (u + 0.4 * v < 0.45 ? 0 : u - 0.3 * v > 0.6 ? 2 : 1),
  'stripes along the fast axis': (_, v) => [1, 0, 1, 2, 1, 0][Math.min(5, Math.floor(6 * v))]!,
  'stairs down the scan': (_, v) => Math.min(3, Math.floor(4 * v)),
};

interface Worn { readonly seed: string; readonly layout: string; readonly wear: number; readonly vary?: number; readonly cover?: boolean; readonly power?: number }

/** Log current of a worn map and which pixels are ground. Bubbles, where asked for, cover two fifths. */
function worn({ seed, layout, wear, vary = 0, cover = false, power = 1 }: Worn): { log10: Float32Array; use: (i: number) => boolean; covered: number } {
  const random = seededRandom(`${seed} ${layout}`);
  const field = vary > 0 ? variation(`${seed} ${layout}`, vary) : () => 0;
  const blocked = new Uint8Array(size * size);
  for (let covered = 0; cover && covered < 0.4 * size * size;) {
    const [cx, cy, radius] = [size * random.uniform(), size * random.uniform(), 3 + 12 * random.uniform()];
    for (let i = 0; i < blocked.length; i++) if (blocked[i] === 0 && Math.hypot(i % size - cx, Math.floor(i / size) - cy) < radius) covered += blocked[i] = 1;
  }
  const log10 = new Float32Array(size * size);
  for (let i = 0; i < log10.length; i++) {
    const [u, v] = [(i % size) / (size - 1), Math.floor(i / size) / (size - 1)];
    log10[i] = -10 - step * layouts[layout]!(u, v) + field(u, v) - wear * v ** power + 0.03 * random.normal();
  }
  return { log10, use: (i) => blocked[i] === 0, covered: blocked.reduce((sum, mark) => sum + mark, 0) / blocked.length };
}
const drift = (spec: Worn): Drift => {
  const { log10, use } = worn(spec);
  return findDrift(log10, size, size, use, false);
};

for (const layout of Object.keys(layouts)) {
  test(`half a decade of wear is found within 0.03 decades on an even barrier: ${layout}, free and two fifths covered`, () => {
    for (const cover of [false, true]) {
      for (const power of [0.8, 1, 1.5]) {
        const spec = { seed: 'even', layout, wear: 0.5, cover, power };
        if (cover) assert.ok(worn(spec).covered >= 0.4);
        const found = drift(spec);
        assert.ok(Math.abs(found.decades - 0.5) < 0.03, `${found.decades} with power ${power}, covered ${cover}`);
        assert.ok(isWear(found));
      }
    }
  });

  test(`with a real variation of 0.12 decades: told, right within its error, hardly ever told without wear: ${layout}`, () => {
    let squares = 0;
    let standard = 0;
    let mistaken = 0;
    const maps = 10;
    for (let k = 0; k < maps; k++) {
      const cover = k % 2 === 1;
      const found = drift({ seed: `map ${k}`, layout, wear: 0.5, vary: 0.12, cover });
      assert.ok(isWear(found), `map ${k}: ${found.decades} ± ${found.seDecades}`);
      assert.ok(Math.abs(found.decades - 0.5) < 4 * found.seDecades, `map ${k}: ${found.decades} ± ${found.seDecades}`);
      squares += (found.decades - 0.5) ** 2 / maps;
      standard += ((found.decades - 0.5) / found.seDecades) ** 2 / maps;
      const none = drift({ seed: `map ${k}`, layout, wear: 0, vary: 0.12, cover });
      if (isWear(none)) mistaken++;
      // The trend is linear in what is added: the same map with wear shows that much more.
      assert.ok(Math.abs(found.decades - none.decades - 0.5) < 0.02, `${found.decades} - ${none.decades}`);
    }
    // Two standard errors are one map in forty: two or more of ten by chance are one test in forty, and the seeds are fixed.
    assert.ok(mistaken <= 1, `wear told on ${mistaken} of ${maps} maps without any`);
    // No terrace comes back further down the stairs: only the three borders tell, so well as the standard error says.
    if (layout !== 'stairs down the scan') assert.ok(Math.sqrt(squares) < 0.1, `root mean square error ${Math.sqrt(squares)}`);
    assert.ok(Math.sqrt(standard) > 0.4 && Math.sqrt(standard) < 1.7, `errors are ${Math.sqrt(standard)} standard errors`);
  });
}

test('a gain, a small loss, a loss within its error, and a loss that the return scan does not share are no wear', () => {
  assert.ok(!isWear({ decades: -0.5, seDecades: 0.05 }));
  assert.ok(!isWear({ decades: 0.15, seDecades: 0.01 }));
  assert.ok(!isWear({ decades: 0.3, seDecades: 0.2 }));
  assert.ok(!isWear({ decades: Number.NaN, seDecades: Number.NaN }));
  const lost = { decades: 0.5, seDecades: 0.08 };
  assert.ok(isWear(lost) && isWear(lost, { decades: 0.45, seDecades: 0.08 }) && isWear(lost, { decades: Number.NaN, seDecades: Number.NaN }));
  assert.ok(!isWear(lost, { decades: 0.1, seDecades: 0.08 }));
});

test('upside down and slow axis upwards is the same drift; a map with nothing to read has none', () => {
  const { log10, use } = worn({ seed: 'turned', layout: 'terraces across', wear: 0.4, vary: 0.1 });
  const down = findDrift(log10, size, size, use, false);
  const up = findDrift(log10, size, size, use, true);
  assert.equal(up.decades, -down.decades);
  const flipped = log10.map((_, i) => log10[(size - 1 - Math.floor(i / size)) * size + (i % size)]!);
  const turned = findDrift(flipped, size, size, () => true, true);
  assert.ok(Math.abs(turned.decades - down.decades) < 0.02, `${turned.decades} for ${down.decades}`);
  assert.ok(Number.isNaN(findDrift(log10, size, size, () => false, false).decades));
  assert.ok(Number.isNaN(findDrift(log10.slice(0, 24), 6, 4, () => true, false).decades));
  assert.deepEqual([...wearPerRow(0.4, 3, false)], [0, 0.2, 0.4]);
  assert.deepEqual([...wearPerRow(0.4, 3, true)], [0.4, 0.2, 0]);
});

test('wear is found through the amplifier’s lag, and undone', () => {
  const scene = createScene({ seed: 'worn and slow', size, layersAt: (c) => (c < 70 ? 10 : c < 130 ? 11 : 12), things: typicalThings(size), wearDecades: 0.5 });
  const before = scene.currentA.map((value) => (value >= Math.fround(saturationA) ? 2 * saturationA : value));
  const sample = createSample({ columns: size, rows: size, heightM: scene.heightM, currentA: smeared(before, size, 2, { noiseA, limitA: saturationA }), biasV: 5.9 });
  const recipe = createRecipe({});
  const { current, warnings } = levelGround(sample, recipe.ground, recipe.scan, 0.333e-9);
  assert.ok(Math.abs(current!.wearDecades - 0.5) < 0.05, `${current!.wearDecades}`);
  assert.ok(warnings.some(({ code }) => code === 'current-wear') && warnings.some(({ code }) => code === 'current-lag'));
});

test('the return scan’s word: the same loss is wear, another loss is said and not undone', () => {
  const scene = createScene({ seed: 'two ways', size, layersAt: (c) => (c < 90 ? 10 : 11), things: typicalThings(size), wearDecades: 0.5 });
  const unworn = createScene({ seed: 'two ways', size, layersAt: (c) => (c < 90 ? 10 : 11), things: typicalThings(size) });
  const recipe = createRecipe({});
  for (const [back, told] of [[scene.currentA, true], [unworn.currentA, false]] as const) {
    const channels: Channel[] = [...scene.sample.channels, { quantity: 'current', unit: 'A', direction: 'return', biasV: 5.9, source: 'made.return', values: scalarMap(scene.sample.grid, back) }];
    const { current, warnings } = levelGround({ ...scene.sample, channels }, recipe.ground, recipe.scan, 0.333e-9);
    assert.equal(current!.wearDecades > 0, told);
    assert.equal(warnings.some(({ code }) => code === 'current-drift-differs'), !told);
  }
});

test('a trend that the barrier could make by itself is said and not undone', () => {
  const field = variation('unclear', 0.25);
  const random = seededRandom('unclear');
  const currentA = Float32Array.from({ length: size * size }, (_, i) => {
    const [u, v] = [(i % size) / (size - 1), Math.floor(i / size) / (size - 1)];
    return 10 ** (-10 + field(u, v) - 0.25 * v + 0.03 * random.normal());
  });
  const recipe = createRecipe({});
  const { current, warnings } = levelGround(createSample({ columns: size, rows: size, currentA }), recipe.ground, recipe.scan, 0.333e-9);
  assert.equal(current!.wearDecades, 0);
  assert.ok(current!.driftDecades! > 0.15 && current!.driftSeDecades! > current!.driftDecades! / 2, `${current!.driftDecades} ± ${current!.driftSeDecades}`);
  assert.ok(warnings.some(({ code }) => code === 'current-drift-unclear'));
  assert.deepEqual(current!.conditioned.data, current!.offsetFree.data);
});
