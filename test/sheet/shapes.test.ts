/** Shapes, contacts and curves against the same device solved with a dense matrix. */
import assert from 'node:assert/strict';
import test from 'node:test';
import ndarray from 'ndarray';
import { maskMap, scalarMap } from '../../src/grid/maps.ts';
import type { Grid } from '../../src/grid/maps.ts';
import type { Outline } from '../../src/read/sample.ts';
import { assessSheet } from '../../src/sheet/assess-sheet.ts';
import type { SheetInput } from '../../src/sheet/sheet-input.ts';
import { denseLocalBias } from './dense-device.ts';
import { createBox, createGrid, createInput, createMask, seeded, tunnelDensity } from './device.ts';

const shapes: Record<string, readonly string[]> = {
  'L-shape': [
    '###.......',
    '###.......',
    '###.......',
    '###.......',
    '##########',
    '##########',
    '##########',
  ],
  'two holes': [
    '##########',
    '#####..###',
    '##.##..###',
    '##########',
    '###.######',
    '#########.',
    '##########',
  ],
  'one-pixel bridge': [
    '####..####',
    '####..####',
    '####..####',
    '##########',
    '####..####',
    '####..####',
    '####..####',
  ],
};
const everything = Array.from({ length: 7 }, () => '##########');
const leftMetal = Array.from({ length: 7 }, () => '#.........');
const bottomMetal = [...Array.from({ length: 6 }, () => '..........'), '##########'];
const device = { biasV: 4, densityAPerM2: tunnelDensity(3000) };

/** Ratios scattered over a decade, one pixel in ten unknown. */
function scattered(grid: Grid): Float32Array {
  const random = seeded(7);
  return Float32Array.from({ length: grid.columns * grid.rows }, () => (random() < 0.1 ? Number.NaN : random() - 0.5));
}

function compare(input: SheetInput, dense: number[], footprint: Uint8Array): void {
  const sheet = assessSheet(input);
  assert.deepEqual(sheet.warnings, []);
  assert.ok(sheet.totals!.imbalance! <= 1e-9);
  // A device without a drop would agree with anything.
  assert.ok(Math.min(...dense.filter((value, p) => footprint[p] === 1 && !Number.isNaN(value))) < 3.8);
  let compared = 0;
  for (let p = 0; p < dense.length; p++) {
    if (footprint[p] === 0) assert.ok(Number.isNaN(sheet.localBiasV!.data[p]!));
    else {
      // The curve's table is good to a few 1e-6.
      assert.ok(Math.abs(sheet.localBiasV!.data[p]! - dense[p]!) < 2e-5, `pixel ${p}: ${sheet.localBiasV!.data[p]} and ${dense[p]}`);
      compared++;
    }
  }
  assert.ok(compared > 40);
}

for (const [name, picture] of Object.entries(shapes)) {
  for (const [sheets, emitterSheetOhm, injectorSheetOhm, contactOhmUm] of [['emitter', 1e8, 0, 0], ['injector', 0, 1e8, 1e8], ['both', 1e8, 3e7, 5e7]] as const) {
    test(`${name}, ${sheets} resisting: as the dense solution, on pitches 1 × 0.5 µm`, () => {
      const grid = createGrid(10, 7, 1, 0.5);
      const footprint = createMask(picture);
      const log10 = scattered(grid);
      const ratio = Array.from(log10, (value, p) => (footprint[p] === 1 ? 10 ** value : Number.NaN));
      const list = [
        ...(emitterSheetOhm > 0 ? [{ sheetOhm: emitterSheetOhm, ground: footprint, metal: createMask(leftMetal) }] : []),
        ...(injectorSheetOhm > 0 ? [{ sheetOhm: injectorSheetOhm, ground: createMask(everything), metal: createMask(bottomMetal) }] : []),
      ];
      const dense = denseLocalBias(grid, list, ratio, (_, v) => device.densityAPerM2(v), device.biasV, contactOhmUm);
      const outlines = [createBox(grid, 'contact-emitter', 0, 0, 1, 7), createBox(grid, 'contact-injector', 0, 6, 10, 7), createBox(grid, 'injector', 0, 0, 10, 7)];
      compare({
        ...createInput(grid), footprint: maskMap(grid, footprint), log10Relative: scalarMap(grid, log10), outlines, emitterSheetOhm, injectorSheetOhm, contactOhmUm, device,
      }, dense, footprint);
    });
  }
}

test('each step may follow its own curve, scaled to its ratio', () => {
  const grid = createGrid(10, 7);
  const footprint = createMask(everything);
  const log10 = scattered(grid);
  const steps = Int8Array.from(log10, (_, p) => (p % 3) - 1);
  const densityAPerM2 = (step: number, v: number) => tunnelDensity(3000)(v) * Math.exp(step * (1 - v)) * Math.max(0, v) ** (step + 1);
  const reference = (v: number) => densityAPerM2(0, v);
  const full = (step: number) => densityAPerM2(step, 4);
  const dense = denseLocalBias(grid, [{ sheetOhm: 1e7, ground: footprint, metal: createMask(leftMetal) }], Array.from(log10, (value) => 10 ** value),
    (p, v) => (densityAPerM2(steps[p]!, v) / full(steps[p]!)) * full(0), 4, 0);
  const outlines: Outline[] = [createBox(grid, 'contact-emitter', 0, 0, 1, 7)];
  compare({
    ...createInput(grid), log10Relative: scalarMap(grid, log10), outlines, emitterSheetOhm: 1e7,
    device: { biasV: 4, densityAPerM2: reference }, steps: { map: ndarray(steps, [7, 10]), densityAPerM2 },
  }, dense, footprint);
});
