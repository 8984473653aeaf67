import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { maskMap } from '../../src/grid/maps.ts';
import { resultFiles } from '../../src/report/result-files.ts';
import { verdictOf, writeVerdict } from '../../src/report/verdict.ts';
import { withoutMissing } from '../../src/report/without-missing.ts';
import { createAppraisal, createBarrier, createCurrentGround, createHeightOnlyAppraisal, createLedger, createRelativeAppraisal, createSample, grid } from '../fixtures/create-appraisal.ts';

const app = { name: 'Evenglow', version: '0.1.0' };

describe('leaving out what is missing', () => {
  it('drops NaN, infinite and undefined at any depth and keeps the rest', () => {
    const value = { a: Number.NaN, b: { c: Infinity, d: -0, e: null, f: [{ g: -Infinity, h: 'x' }] }, i: undefined, j: false };
    assert.equal(JSON.stringify(withoutMissing(value)), '{"b":{"d":0,"e":null,"f":[{"h":"x"}]},"j":false}');
  });

  it('refuses a list whose elements would shift', () => {
    assert.throws(() => withoutMissing([1, Number.NaN]), RangeError);
  });
});

describe('verdict.json', () => {
  it('has the frozen layout in the units of its names', () => {
    const verdict = verdictOf(createAppraisal(), app);
    assert.deepEqual(Object.keys(verdict), [
      'format', 'version', 'app', 'sample', 'verdict', 'sources', 'recipe', 'files', 'map', 'ground', 'ledger', 'usable', 'reference', 'ladder', 'device', 'flaws', 'warnings', 'timings',
    ]);
    assert.equal(verdict.format, 'evenglow-verdict');
    assert.deepEqual(verdict.files, resultFiles(createAppraisal(), app).map(({ name }) => name));
    assert.equal(verdict.version, 1);
    assert.deepEqual(verdict.app, app);
    assert.deepEqual(verdict.map, { columns: 6, rows: 8, pitchXUm: 0.5, pitchYUm: 0.25 });
    assert.deepEqual(verdict.ground, {
      height: { noiseNm: 0.12, repairedPixels: 2, tiltNm: 38 },
      current: { offsetA: 2e-13, noiseA: 5e-14, floorA: 1e-13, saturatedPixels: 1, repairedPixels: 1, wearDecades: 0.08, lagPx: 0, biasV: 4 },
    });
    assert.deepEqual(verdict.usable, {
      areaUm2: 2, share: 0.355555555556, low95Um2: 1.7, high95Um2: 2.2, largestPatchUm2: 1.625, knownToGlow: true, meaning: 'usable',
    });
    assert.deepEqual(verdict.reference, { layers: 12, thicknessNm: 3.996, medianA: 1.18e-10, areaUm2: 2.25, shareOfUnflawed: 0.6, inRange: true });
    // 1000 A/m² = 1000e9 nA per 1e12 µm².
    assert.deepEqual(verdict.device, { biasV: 3.62, proposed: true, medianNaPerUm2: 1, low95NaPerUm2: 0.15, high95NaPerUm2: 6.4, probeFieldVPerNm: 1.5, fieldVPerNm: 0.9, fieldRatio: 0.6 });
    assert.equal(verdict.recipe.band.factor, 4);
    assert.deepEqual(verdict.timings, { read: 1.2, ground: 2.5 });
    assert.equal(verdict.ladder?.rungs[0]?.bound, 'exact');
    assert.ok(verdict.ladder && !('scatterDecades' in (verdict.ladder.rungs[2] ?? {})));
  });

  it('gives the whole device’s current with the density’s interval, and says where it is only a bound', () => {
    const relativeDensity = createBarrier().log10Relative;
    const totals = { deviceCurrentA: 4e-9, shortShareOfCurrent: 0.25 };
    const { device } = verdictOf(createAppraisal({ sheet: { relativeDensity, totals, warnings: [] } }), app);
    assert.deepEqual(device, {
      biasV: 3.62, proposed: true, medianNaPerUm2: 1, low95NaPerUm2: 0.15, high95NaPerUm2: 6.4, probeFieldVPerNm: 1.5, fieldVPerNm: 0.9, fieldRatio: 0.6,
      currentA: 4e-9, currentLow95A: 6e-10, currentHigh95A: 2.56e-8, shortShareOfCurrent: 0.25, censored: true,
    });
    // The same saturated pixel beyond the footprint carries nothing in the device.
    const sample = createSample();
    const footprint = maskMap(grid, sample.footprint.data.map((mark, i) => (createCurrentGround().saturated.data[i] === 1 ? 0 : mark)));
    const beyond = verdictOf(createAppraisal({ sample: { ...sample, footprint }, sheet: { relativeDensity, totals, warnings: [] } }), app);
    assert.equal(beyond.device?.censored, false);
  });

  it('books causes that add up to the footprint, pixel by pixel', () => {
    const { ledger } = verdictOf(createAppraisal(), app);
    assert.equal(ledger.causes.length, 12);
    assert.equal(ledger.causes.reduce((sum, row) => sum + row.pixels, 0), 45);
    assert.equal(ledger.footprintUm2, 5.625);
    assert.ok(Math.abs(ledger.causes.reduce((sum, row) => sum + row.areaUm2, 0) - ledger.footprintUm2) < 1e-9);
    assert.equal(ledger.causes.find(({ cause }) => cause === 'starved')?.assessed, false);
  });

  it('counts flaws by cause and gives their density with the exact Poisson interval', () => {
    const { flaws } = verdictOf(createAppraisal(), app);
    assert.deepEqual(flaws.count, { bubble: 1, residue: 1, wrinkle: 1, short: 1, open: 1 });
    // [M] exact 95 % limits for five events, 1.6235 and 11.6683 (Garwood 1936; Pearson & Hartley, Biometrika Tables, table 40).
    assert.ok(Math.abs(flaws.densityPerUm2.estimate - 5 / 5.625) < 1e-11);
    assert.ok(Math.abs(flaws.densityPerUm2.low95 * 5.625 - 1.6235) < 1e-4);
    assert.ok(Math.abs(flaws.densityPerUm2.high95 * 5.625 - 11.6683) < 1e-4);
    assert.equal(flaws.expectedMissedShorts, 3.2);
    assert.deepEqual(flaws.shorts, { seen: 1, crossedShare: 0.24, densityPerUm2: { estimate: 0.74, low95: 0.02, high95: 4.1 } });
  });

  it('has no section and no number that the sample does not have', () => {
    const verdict = verdictOf(createHeightOnlyAppraisal(), app);
    for (const section of ['reference', 'ladder', 'device']) assert.ok(!(section in verdict), section);
    assert.deepEqual(Object.keys(verdict.ground), ['height']);
    assert.deepEqual(Object.keys(verdict.flaws), ['count', 'densityPerUm2'], 'nothing is known of shorts');
    assert.equal(verdict.usable.meaning, 'flaw-free');
    assert.ok(!('expectedMissedShorts' in verdict.flaws));
  });

  it('gives errors, lag, drift, alignment and the return scan where they were measured', () => {
    const shift = { dxPx: 2.25, dyPx: -0.5, seXPx: 0.125, seYPx: 0.25, correlation: 0.75, undoneXPx: 2, undoneYPx: 0 };
    const shown = { rightPx: 2.25, rightSePx: 0.125, downPx: -0.5, downSePx: 0.25, undoneRightPx: 2, undoneDownPx: 0, correlation: 0.75 };
    const current = createCurrentGround({
      offsetSeA: 1e-15, offsetFrom: 'blocked', floorSeA: 4e-15, stepA: 3e-13, driftDecades: 0.25, driftSeDecades: 0.125, lagPx: 1.5, lagSePx: 0.0625, shift,
    });
    const returned = { height: { noiseM: 0.25e-9 }, current: { noiseA: 6e-14, offsetA: 1e-13, lagPx: 1.25, driftDecades: Number.NaN, shift } };
    const { ground } = verdictOf(createAppraisal({ ground: { current, returned, warnings: [] } }), app);
    assert.deepEqual(ground.current, {
      offsetA: 2e-13, offsetSeA: 1e-15, noiseA: 5e-14, floorA: 1e-13, floorSeA: 4e-15, stepA: 3e-13, offsetFrom: 'blocked', saturatedPixels: 1, repairedPixels: 1,
      wearDecades: 0.08, driftDecades: 0.25, driftSeDecades: 0.125, lagPx: 1.5, lagSePx: 0.0625, shift: shown, biasV: 4,
    });
    assert.deepEqual(ground.returnScan, { height: { noiseNm: 0.25 }, current: { noiseA: 6e-14, offsetA: 1e-13, lagPx: 1.25, shift: shown } });
  });

  it('gives no ampere when the file has none', () => {
    const verdict = verdictOf(createRelativeAppraisal(), app);
    assert.deepEqual(Object.keys(verdict.ground.current ?? {}), ['offsetRelative', 'noiseRelative', 'floorRelative', 'saturatedPixels', 'repairedPixels', 'wearDecades', 'lagPx']);
    assert.deepEqual(verdict.reference, { medianRelative: 1.18e-10, areaUm2: 2.25, shareOfUnflawed: 0.6 });
    assert.ok(!('device' in verdict));
  });

  it('is plain JSON without NaN or null, whatever is missing', () => {
    const missedShorts = createLedger().missedShorts!;
    const barrier = createBarrier();
    const text = writeVerdict(createAppraisal({
      ledger: createLedger({ missedShorts: { ...missedShorts, expectedMissed: Infinity, high95PerM2: Infinity } }),
      barrier: { ...barrier, ladder: { ...barrier.ladder, stepSeDecades: Number.NaN } },
    }), app);
    assert.doesNotMatch(text, /NaN|Infinity|null/);
    assert.deepEqual(JSON.parse(text).flaws.shorts.densityPerUm2, { estimate: 0.74, low95: 0.02 });
    assert.ok(text.endsWith('}\n'));
  });

  it('gives the same bytes again, timings apart', () => {
    const first = writeVerdict(createAppraisal({ timings: {} }), app);
    assert.equal(writeVerdict(createAppraisal({ timings: {} }), app), first);
    assert.notEqual(writeVerdict(createAppraisal(), app), first);
  });
});
