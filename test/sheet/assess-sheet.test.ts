import assert from 'node:assert/strict';
import test from 'node:test';
import { maskMap, scalarMap } from '../../src/grid/maps.ts';
import { Problem } from '../../src/problems/problem.ts';
import { assessSheet } from '../../src/sheet/assess-sheet.ts';
import type { SheetInput } from '../../src/sheet/sheet-input.ts';
import { createBox, createGrid, createInput, createMask, evenRatio, seeded, tunnelDensity } from './device.ts';

const device = { biasV: 4, densityAPerM2: tunnelDensity(5000) };
const codes = (input: SheetInput) => assessSheet(input).warnings.map((warning) => warning.code);

/** 64 × 48 pixels over 6.4 × 4.8 µm: scattered ratios, blocked spots, shorts, a hole; emitter fed left, injector below. */
function createRough(): SheetInput {
  const grid = createGrid(64, 48, 0.1);
  const random = seeded(11);
  const log10Relative = evenRatio(grid);
  const footprint = maskMap(grid);
  for (let p = 0; p < log10Relative.data.length; p++) {
    const [x, y] = [p % 64, Math.floor(p / 64)];
    footprint.data[p] = Math.hypot(x - 40, y - 20) < 6 ? 0 : 1;
    const draw = random();
    log10Relative.data[p] = draw < 0.03 ? Number.NaN : draw > 0.998 ? 4 : 0.6 * (random() - 0.5) - (x > 32 ? 0.8 : 0);
  }
  const outlines = [createBox(grid, 'contact-emitter', 0, 0, 2, 48), createBox(grid, 'contact-injector', 0, 46, 64, 48)];
  return { ...createInput(grid), footprint, log10Relative, outlines, device };
}

test('without sheet resistance the density is the ratio, nothing is starved, no contact means no unconnected', () => {
  const grid = createGrid(3, 1);
  const sheet = assessSheet(createInput(grid, { log10Relative: scalarMap(grid, Float32Array.of(0, -1, Number.NaN)), device }));
  assert.deepEqual(Array.from(sheet.relativeDensity.data, (value) => Math.fround(value)), [1, Math.fround(0.1), Number.NaN]);
  assert.equal(sheet.localBiasV, undefined);
  assert.equal(sheet.starved, undefined);
  assert.equal(sheet.unconnected, undefined);
  assert.deepEqual(sheet.warnings, []);
  assert.ok(Math.abs(sheet.totals!.deviceCurrentA! / (5000 * 1.1e-12) - 1) < 1e-7);
});

test('off the footprint the density is missing', () => {
  const grid = createGrid(2, 1);
  const sheet = assessSheet(createInput(grid, { footprint: maskMap(grid, Uint8Array.of(1, 0)) }));
  assert.deepEqual([...sheet.relativeDensity.data], [1, Number.NaN]);
});

for (const sheets of ['emitter', 'injector', 'both'] as const) {
  test(`every resistance from 0 to 1 GΩ/sq settles from a cold start, and more resistance carries less: ${sheets}`, () => {
    const rough = createRough();
    const noDrop = assessSheet(rough).totals!.deviceCurrentA!;
    let before = noDrop;
    for (const ohm of [0, 1, 1e3, 1e6, 1e9]) {
      const sheet = assessSheet({ ...rough, emitterSheetOhm: sheets === 'injector' ? 0 : ohm, injectorSheetOhm: sheets === 'emitter' ? 0 : ohm });
      assert.deepEqual(sheet.warnings, []);
      const current = sheet.totals!.deviceCurrentA!;
      assert.ok(current <= before, `${ohm}: ${current} after ${before}`);
      if (ohm > 0) assert.ok(sheet.totals!.imbalance! <= 1e-9);
      if (ohm === 1) assert.ok(Math.abs(current / noDrop - 1) < 1e-4 && current < noDrop);
      if (ohm === 1e9) assert.ok(current < 0.3 * noDrop);
      before = current;
    }
  });
}

test('the current is the sum of the densities', () => {
  const sheet = assessSheet({ ...createRough(), emitterSheetOhm: 1e6, injectorSheetOhm: 1e5 });
  const sum = sheet.relativeDensity.data.reduce((total, value) => total + (Number.isNaN(value) ? 0 : value), 0);
  assert.ok(Math.abs((sum * 5000 * 1e-14) / sheet.totals!.deviceCurrentA! - 1) < 1e-6);
});

test('a mirrored and turned device gives the mirrored and turned answer, pitches exchanged', () => {
  const rough = createRough();
  const stretched = { ...rough.grid, pitchYM: rough.grid.pitchXM * 5 };
  const metal = (grid: typeof stretched) => [createBox(grid, 'contact-emitter', 0, 0, 2, 2)];
  const turned = { columns: 48, rows: 64, pitchXM: stretched.pitchYM, pitchYM: stretched.pitchXM };
  const turn = <T extends Float32Array | Uint8Array>(from: T, to: T): T => {
    for (let r = 0; r < 48; r++) for (let c = 0; c < 64; c++) to[c * 48 + r] = from[r * 64 + c]!;
    return to;
  };
  const lying = assessSheet({ ...rough, grid: stretched, outlines: metal(stretched), emitterSheetOhm: 1e5 });
  const standing = assessSheet({
    ...rough, grid: turned, outlines: metal(turned), emitterSheetOhm: 1e5,
    footprint: maskMap(turned, turn(rough.footprint.data, new Uint8Array(48 * 64))),
    log10Relative: scalarMap(turned, turn(rough.log10Relative.data, new Float32Array(48 * 64))),
  });
  assert.ok(Math.abs(lying.totals!.deviceCurrentA! / standing.totals!.deviceCurrentA! - 1) < 1e-9);
  const expected = turn(lying.localBiasV!.data, new Float32Array(48 * 64));
  standing.localBiasV!.data.forEach((value, p) => assert.ok(Number.isNaN(value) === Number.isNaN(expected[p]!) && !(Math.abs(value - expected[p]!) > 1e-6)));
});

test('starved is ground in band before the drop and below the band after it', () => {
  const rough = createRough();
  const sheet = assessSheet({ ...rough, emitterSheetOhm: 1e7 });
  let starved = 0;
  for (let p = 0; p < sheet.starved!.data.length; p++) {
    const inBand = Math.abs(rough.log10Relative.data[p]!) <= Math.log10(3) && rough.footprint.data[p] === 1;
    const expected = inBand && sheet.relativeDensity.data[p]! < 1 / 3 ? 1 : 0;
    assert.equal(sheet.starved!.data[p], expected);
    starved += expected;
  }
  assert.ok(starved > 100 && starved < 2500, `${starved}`);
});

test('a negative bias mirrors the local bias and nothing else', () => {
  const rough = { ...createRough(), emitterSheetOhm: 1e6 };
  const up = assessSheet(rough);
  const down = assessSheet({ ...rough, device: { ...device, biasV: -4 } });
  assert.deepEqual(down.relativeDensity.data, up.relativeDensity.data);
  assert.equal(down.totals!.deviceCurrentA, up.totals!.deviceCurrentA);
  assert.ok(down.localBiasV!.data.every((value, p) => Number.isNaN(value) || value === -up.localBiasV!.data[p]!));
});

const twoPieces = createMask(['####.##', '####.##', '####.##']);
for (const emitterSheetOhm of [undefined, 1e6]) {
  test(`an emitter island without a path to the contact is unconnected, carries nothing and is not starved (${emitterSheetOhm} Ω/sq)`, () => {
    const grid = createGrid(7, 3);
    const sheet = assessSheet(createInput(grid, {
      footprint: maskMap(grid, twoPieces), outlines: [createBox(grid, 'contact-emitter', 0, 0, 1, 3)], emitterSheetOhm, device,
    }));
    assert.deepEqual(sheet.unconnected!.data, createMask(['.....##', '.....##', '.....##']));
    assert.equal(sheet.relativeDensity.get(1, 5), 0);
    assert.ok(sheet.relativeDensity.get(1, 3) > 0);
    if (emitterSheetOhm) {
      assert.equal(sheet.localBiasV!.get(1, 6), 0);
      assert.equal(sheet.starved!.get(1, 6), 0);
    } else assert.ok(Math.abs(sheet.totals!.deviceCurrentA! / (5000 * 12e-12) - 1) < 1e-9);
  });
}

test('emitter outlines carry current past the footprint; an island ringed by thick barrier still glows', () => {
  const grid = createGrid(7, 3);
  const island = createMask(['.......', '...#...', '.......']);
  const sheet = assessSheet(createInput(grid, {
    footprint: maskMap(grid, island), outlines: [createBox(grid, 'emitter', 0, 0, 7, 3), createBox(grid, 'contact-emitter', 0, 0, 1, 3)], emitterSheetOhm: 1e4, device,
  }));
  assert.ok(!sheet.unconnected!.data.includes(1));
  const value = sheet.relativeDensity.get(1, 3);
  assert.ok(value > 0.99 && value < 1);
});

test('metal feeds the sheet beside it as well as the sheet under it', () => {
  const grid = createGrid(4, 1);
  const footprint = maskMap(grid, createMask(['.###']));
  const beside = assessSheet(createInput(grid, { footprint, outlines: [createBox(grid, 'contact-emitter', 0, 0, 1, 1)], emitterSheetOhm: 1e6, device }));
  const under = assessSheet(createInput(grid, { footprint, outlines: [createBox(grid, 'contact-emitter', 0, 0, 2, 1)], emitterSheetOhm: 1e6, device }));
  assert.ok(beside.localBiasV!.get(0, 1) < 4);
  assert.equal(under.localBiasV!.get(0, 1), 4);
});

test('sheets without contacts are fed all round, and a hole is no contact', () => {
  const grid = createGrid(9, 9);
  const ring = createMask(['#########', '#########', '#########', '###...###', '###...###', '###...###', '#########', '#########', '#########']);
  const input = createInput(grid, { footprint: maskMap(grid, ring), emitterSheetOhm: 1e5, injectorSheetOhm: 1e5, device });
  assert.deepEqual(codes(input), ['sheet-fed-all-round', 'sheet-fed-all-round']);
  const sheet = assessSheet(input);
  assert.equal(sheet.unconnected, undefined);
  assert.ok(sheet.localBiasV!.get(2, 4) < sheet.localBiasV!.get(1, 4));
  assert.ok(sheet.localBiasV!.get(1, 4) < sheet.localBiasV!.get(0, 4));
});

test('a contact that touches nothing is said so and nothing is alive', () => {
  const grid = createGrid(6, 1);
  const input = createInput(grid, { footprint: maskMap(grid, createMask(['###...'])), outlines: [createBox(grid, 'contact-emitter', 5, 0, 6, 1)], emitterSheetOhm: 1e6, device });
  assert.deepEqual(codes(input), ['sheet-contact-apart']);
  const sheet = assessSheet(input);
  assert.deepEqual([...sheet.unconnected!.data], [1, 1, 1, 0, 0, 0]);
  assert.equal(sheet.totals!.deviceCurrentA, 0);
});

test('shorts take their share of the current', () => {
  const grid = createGrid(4, 1);
  const mask = maskMap(grid, createMask(['...#']));
  const shorts = { mask, log10Relative: scalarMap(grid, Float32Array.of(Number.NaN, Number.NaN, Number.NaN, 1)) };
  const log10Relative = scalarMap(grid, Float32Array.of(0, 0, 0, Number.NaN));
  const even = assessSheet(createInput(grid, { log10Relative, shorts, device }));
  assert.ok(Math.abs(even.totals!.shortShareOfCurrent! - 10 / 13) < 1e-12);
  const outlines = [createBox(grid, 'contact-emitter', 0, 0, 1, 1)];
  const dropped = assessSheet(createInput(grid, { log10Relative, shorts, device, outlines, emitterSheetOhm: 1e7 }));
  assert.ok(dropped.totals!.shortShareOfCurrent! < 10 / 13);
  assert.equal(dropped.starved!.get(0, 3), 0);
});

test('ohmic shorts follow a straight line under a voltage drop, and the assumption is said', () => {
  const grid = createGrid(4, 1);
  const shorts = { mask: maskMap(grid, createMask(['...#'])), log10Relative: evenRatio(grid, 1), ohmic: { scanBiasV: 5.9, saturated: true } };
  const outlines = [createBox(grid, 'contact-emitter', 0, 0, 1, 1)];
  const sheet = assessSheet(createInput(grid, { shorts, device, outlines, emitterSheetOhm: 1e7 }));
  const local = sheet.localBiasV!.get(0, 3);
  assert.ok(local < 3.9, `${local} V left`);
  assert.ok(Math.abs(sheet.relativeDensity.get(0, 3) / (10 * (local / 4)) - 1) < 1e-5);
  assert.ok(sheet.relativeDensity.get(0, 2) < 0.99 * (sheet.localBiasV!.get(0, 2) / 4), 'the barrier beside it is not ohmic');
  const said = sheet.warnings.find(({ code }) => code === 'shorts-ohmic')!.message;
  for (const part of ['ohmic', '5.9 V', '4 V', 'lower bound']) assert.ok(said.includes(part), said);
  assert.deepEqual(codes(createInput(grid, { device })), [], 'no shorts, nothing to say');
});

test('ground exactly at the band’s edge is in band whatever the rounding: it can be starved', () => {
  const grid = createGrid(4, 1);
  const outlines = [createBox(grid, 'contact-emitter', 0, 0, 1, 1)];
  const starvedAt = (log10: number) => assessSheet(createInput(grid, { log10Relative: evenRatio(grid, log10), device, outlines, emitterSheetOhm: 1e11 })).starved!.get(0, 3);
  assert.deepEqual([starvedAt(-Math.log10(3) - 5e-7), starvedAt(-Math.log10(3) - 5e-6)], [1, 0]);
});

test('a curve that is dead below an offset settles', () => {
  const offset = { biasV: 4, densityAPerM2: (v: number) => 5000 * (Math.max(0, v - 1.5) / 2.5) ** 2 };
  const sheet = assessSheet({ ...createRough(), emitterSheetOhm: 1e9, injectorSheetOhm: 1e7, device: offset });
  assert.deepEqual(sheet.warnings, []);
  assert.ok(sheet.totals!.imbalance! <= 1e-9);
  assert.ok(sheet.localBiasV!.data.every((value) => Number.isNaN(value) || value > 1.4));
});

test('without amperes the drop is not assessed and a warning says so', () => {
  const grid = createGrid(2, 1);
  const sheet = assessSheet(createInput(grid, { emitterSheetOhm: 1e6 }));
  assert.deepEqual(sheet.warnings.map((warning) => warning.code), ['sheet-fed-all-round', 'sheet-no-density']);
  const asked = (noDensity: NonNullable<SheetInput['noDensity']>) => assessSheet(createInput(grid, { emitterSheetOhm: 1e6, noDensity })).warnings[1]!.message;
  assert.match(asked('bias-missing'), /scan\.biasV/);
  for (const reason of ['model', 'device-bias', 'stack-surface'] as const) assert.doesNotMatch(asked(reason), /scan\.biasV|unit/);
  assert.deepEqual([...sheet.relativeDensity.data], [1, 1]);
  assert.equal(sheet.starved, undefined);
});

test('what cannot settle is said so, and neither starved nor a current is claimed', () => {
  // 1 Ω/sq behind 1e15 Ω·µm: the drop is even to one part in 1e15, beyond the solver's single-precision cycle.
  const sheet = assessSheet({ ...createRough(), emitterSheetOhm: 1, injectorSheetOhm: 1, contactOhmUm: 1e15 });
  assert.deepEqual(sheet.warnings.map((warning) => warning.code), ['sheet-not-converged']);
  assert.equal(sheet.starved, undefined);
  assert.equal(sheet.localBiasV, undefined);
  assert.equal(sheet.totals, undefined);
  assert.ok(sheet.relativeDensity.data.some((value) => value > 0));
});

test('a density that falls with bias is refused with its place', () => {
  const input = createInput(createGrid(2, 1), { emitterSheetOhm: 1e6, device: { biasV: 4, densityAPerM2: (v) => 5 - v } });
  assert.throws(() => assessSheet(input), (error) => error instanceof Problem && error.code === 'sheet-density' && error.message.includes('falls as the bias rises'));
});
