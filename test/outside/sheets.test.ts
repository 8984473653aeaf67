/** Voltage drop in sheets against closed forms. */
import assert from 'node:assert/strict';
import test from 'node:test';
import { maskMap } from '../../src/grid/maps.ts';
import { assessSheet } from '../../src/sheet/assess-sheet.ts';
import { createBox, createGrid, createInput } from '../sheet/device.ts';

const V = 1;
/** Ohmic barrier of 1 nS/µm². */
const ohmic = { biasV: V, densityAPerM2: (v: number) => 1e3 * v };

function relativeError(found: number, expected: number): number {
  return Math.abs(found / expected - 1);
}

/** A strip of `length` µm fed at its left edge by one column of metal off the footprint. */
function strip(lengthUm: number, pixels: number, rows: number, widthUm: number, along: 'x' | 'y' = 'x') {
  const pitch = lengthUm / pixels;
  const grid = along === 'x' ? createGrid(pixels + 1, rows, pitch, widthUm / rows) : createGrid(rows, pixels + 1, widthUm / rows, pitch);
  const footprint = maskMap(grid);
  for (let p = 0; p < footprint.data.length; p++) {
    const place = along === 'x' ? p % grid.columns : Math.floor(p / grid.columns);
    footprint.data[p] = place > 0 ? 1 : 0;
  }
  const metal = (layer: 'contact-emitter' | 'contact-injector') => (along === 'x' ? createBox(grid, layer, 0, 0, 1, rows) : createBox(grid, layer, 0, 0, rows, 1));
  return { ...createInput(grid), footprint, outlines: [metal('contact-emitter'), metal('contact-injector')] };
}

// [F] far/edge = 1/cosh(L/λ), λ = 1/√(R_sh g) = 31.6228 µm.
for (const along of ['x', 'y'] as const) {
  test(`sheet fed at one edge, 1 MΩ/sq, 1 nS/µm², 10 µm along ${along}: far end at 0.95200 of the bias [F]`, () => {
    const sheet = assessSheet({ ...strip(10, 100, 3, 6, along), emitterSheetOhm: 1e6, device: ohmic });
    assert.ok(relativeError(sheet.localBiasV!.data.at(-1)!, 0.952) < 1e-4);
  });
}

// [F] With both sheets fed at the same edge the two resistances add up.
test('two sheets of 0.4 and 0.6 MΩ/sq fed at the same edge drop as one of 1 MΩ/sq [F]', () => {
  const sheet = assessSheet({ ...strip(10, 100, 3, 6), emitterSheetOhm: 4e5, injectorSheetOhm: 6e5, device: ohmic });
  assert.ok(relativeError(sheet.localBiasV!.data.at(-1)!, 0.952) < 1e-4);
});

test('the strip converges with the second order of its pitch [F]', () => {
  const lambda = 31.6227766;
  const length = 2 * lambda;
  // I = V g λ W tanh(L/λ), W 1 µm.
  const exact = V * 1e-9 * lambda * Math.tanh(length / lambda);
  const errors = [16, 32, 64].map((pixels) => {
    const sheet = assessSheet({ ...strip(length, pixels, 1, 1), emitterSheetOhm: 1e6, device: ohmic });
    return Math.abs(sheet.totals!.deviceCurrentA! - exact);
  });
  for (const ratio of [errors[0]! / errors[1]!, errors[1]! / errors[2]!]) assert.ok(ratio > 3.8 && ratio < 4.2, `error ratio ${ratio}`);
});

// [F] centre/rim = 1/I₀(2) = 0.438676. No contact is drawn: the disc is fed along its edge.
test('disc fed at its rim, R = 2λ: centre at 0.438676 of the rim, first order in the pitch [F]', () => {
  const errors = [41, 81, 161].map((pixels) => {
    const radius = 2 * 31.6227766;
    const grid = createGrid(pixels + 2, pixels + 2, (2 * radius) / pixels);
    const footprint = maskMap(grid);
    const middle = (pixels + 1) / 2;
    for (let r = 0; r < grid.rows; r++) {
      for (let c = 0; c < grid.columns; c++) footprint.data[r * grid.columns + c] = Math.hypot(r - middle, c - middle) < pixels / 2 ? 1 : 0;
    }
    const sheet = assessSheet({ ...createInput(grid), footprint, emitterSheetOhm: 1e6, device: ohmic });
    assert.deepEqual(sheet.warnings.map((warning) => warning.code), ['sheet-fed-all-round']);
    return relativeError(sheet.localBiasV!.data[middle * grid.columns + middle]!, 0.438676);
  });
  errors.forEach((error, k) => assert.ok(error < 0.4 / [41, 81, 161][k]!, `error ${error}`));
  assert.ok(errors[2]! < errors[0]! / 2.5, `errors ${errors}`);
});

// [F] J(x) = J_c sec²(κx), κ = √(R_sh J_c/2n): edge/far 2.020901, drop n·ln of it.
test('exponential element, n 0.2 V, 1 nA/µm² at the far end, 5 µm, 10 MΩ/sq: edge/far 2.020901, drop 140.709 mV [F]', () => {
  const biasV = 5;
  const edge = 2.020901e3;
  const device = { biasV, densityAPerM2: (v: number) => edge * Math.exp((v - biasV) / 0.2) };
  const sheet = assessSheet({ ...strip(5, 100, 2, 1), emitterSheetOhm: 1e7, device });
  assert.ok(relativeError(1 / sheet.relativeDensity.data.at(-1)!, 2.020901) < 1e-3);
  assert.ok(relativeError(biasV - sheet.localBiasV!.data.at(-1)!, 0.140709) < 1e-3);
});

// [F] R_c = √(R_sh ρ_c)/W · coth(d/L_T) (Berger, Solid-State Electron. 15, 145, 1972).
for (const [lengthUm, expected] of [[0.5, 21.6395], [1, 13.1304], [5, 10.0009]] as const) {
  test(`distributed contact, 1e-6 Ω cm², 100 Ω/sq, 10 µm wide, ${lengthUm} µm long: ${expected} Ω [F]`, () => {
    const device = { biasV: V, densityAPerM2: (v: number) => 1e10 * v };
    const sheet = assessSheet({ ...strip(lengthUm, 400, 2, 10), emitterSheetOhm: 100, device });
    assert.ok(relativeError(V / sheet.totals!.deviceCurrentA!, expected) < 1e-4);
  });
}

// [F] A well conducting sheet behind a contact's edge is two resistors in series.
test('a contact edge of 10 kΩ·µm over 6 µm adds 1667 Ω in series [F]', () => {
  const device = { biasV: V, densityAPerM2: (v: number) => 1e7 * v };
  const sheet = assessSheet({ ...strip(10, 50, 3, 6), emitterSheetOhm: 1e-3, contactOhmUm: 1e4, device });
  assert.ok(relativeError(V / sheet.totals!.deviceCurrentA!, 1e4 / 6 + 1 / (1e7 * 60e-12)) < 1e-6);
});

// [F] A slanted edge counts with its true length √2·n·h (less half a pixel at each end), not with the 2·n·h of its pixel sides.
test('a contact edge at 45° counts with its length', () => {
  const n = 64;
  const grid = createGrid(n, n, 0.1);
  const footprint = maskMap(grid);
  for (let p = 0; p < footprint.data.length; p++) footprint.data[p] = (p % n) + (n - 1 - Math.floor(p / n)) >= n ? 1 : 0;
  const side = n * grid.pitchXM + 1e-9;
  const outlines = [{ layer: 'contact-emitter' as const, rings: [[[0, 0], [side, 0], [0, side], [0, 0]] as const] }];
  const device = { biasV: V, densityAPerM2: (v: number) => 1e14 * v };
  const sheet = assessSheet({ ...createInput(grid), footprint, outlines, emitterSheetOhm: 1, contactOhmUm: 1e6, device });
  const length = Math.SQRT2 * n * grid.pitchXM * 1e6;
  assert.ok(relativeError(sheet.totals!.deviceCurrentA!, (V * length) / 1e6) < 0.02);
});
