import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { decadeTicks, displayRange, linearTicks } from '../../src/report/display-range.ts';
import { counted, decimalsFor, figure, heightFigure, interval, niceBelow, percent, plain, withError, withPrefix, withUnit } from '../../src/report/numbers.ts';

const spaced = (text: string): string => text.replaceAll('\u00a0', ' ');

describe('numbers for readers', () => {
  it('keeps significant digits, also trailing zeros', () => {
    assert.deepEqual([40.7, 40, 0.123456, 12345.6, 99.96, 0].map((value) => figure(value)), ['40.7', '40.0', '0.123', '12346', '100', '0']);
    assert.equal(spaced(figure(1.18e-10)), '1.18 × 10⁻¹⁰');
    assert.equal(spaced(figure(250000)), '2.50 × 10⁵');
    assert.equal(figure(-3.2, 2), '−3.2');
    assert.equal(spaced(figure(99999.9)), '1.00 × 10⁵');
  });

  it('shows a dash for what is missing, without a unit', () => {
    for (const value of [Number.NaN, Infinity, undefined]) {
      assert.equal(withUnit(value, 'nm'), '–');
      assert.equal(withPrefix(value, 'A'), '–');
      assert.equal(percent(value), '–');
      assert.equal(plain(value), '–');
      assert.equal(interval(1, value, 'nm'), '–');
    }
  });

  it('gives value and error one unit, the error one digit, and the value the same place', () => {
    assert.deepEqual([[1.5e-13, 2.55e-16], [1.5e-13, 9.6e-15], [9.996e-10, 4e-13], [-2e-16, 3e-14], [1.5e-13, 0], [1.5e-13, undefined]].map(([value, error]) => spaced(withError(value!, error, 'A'))),
      ['150.0 ± 0.3 fA', '150 ± 10 fA', '999.6 ± 0.4 pA', '0 ± 30 fA', '150 fA', '150 fA']);
    assert.equal(withError(12.345, 0.027, ''), '12.35 ± 0.03');
  });

  it('shows no height finer than a tenth of the noise', () => {
    assert.deepEqual([[3.6412, 0.08], [20.24, 0.08], [0.3333, 0.08], [48.2, 3], [0.333, undefined]].map(([nm, noise]) => heightFigure(nm, noise)), ['3.64', '20.2', '0.33', '48', '0.333']);
  });

  it('chooses SI prefixes after rounding', () => {
    const texts = [1.18e-10, 9.996e-10, 1e-13, 2.5, -3e-9, 0].map((value) => spaced(withPrefix(value, 'A')));
    assert.deepEqual(texts, ['118 pA', '1.00 nA', '100 fA', '2.50 A', '−3.00 nA', '0 A']);
  });

  it('writes shares, given values, counts and intervals', () => {
    assert.deepEqual([0.407, 0.032, 0.0001, 0, 1].map((share) => spaced(percent(share))), ['41 %', '3.2 %', '< 0.1 %', '0 %', '100 %']);
    assert.equal(plain(4), '4');
    assert.equal(plain(-3.6200001), '−3.62');
    assert.equal(spaced(counted(1, 'pixel')), '1 pixel');
    assert.equal(spaced(counted(0, 'patch', 'patches')), '0 patches');
    assert.equal(spaced(interval(37.9, 43.2, 'µm²')), '37.9 – 43.2 µm²');
  });

  it('finds round lengths and column decimals', () => {
    assert.deepEqual([3.33, 2, 0.9, 0.2, 7e-4, 10].map(niceBelow), [2, 2, 0.5, 0.2, 5e-4, 10]);
    assert.deepEqual([100, 99, 5.6, 2e5, 0].map(decimalsFor), [2, 2, 3, 0, 2]);
  });
});

describe('ranges and ticks of a colour scale', () => {
  it('takes the bulk of the values, skips what is missing and says what is clipped', () => {
    const values = Float32Array.from({ length: 1001 }, (_, index) => index);
    values[1000] = 1e6;
    values[500] = Number.NaN;
    const range = displayRange(values);
    assert.ok(range && range.low >= 4 && range.low <= 6 && range.high >= 994 && range.high <= 996);
    assert.deepEqual([range.clipsLow, range.clipsHigh, range.missingPixels], [true, true, 1]);
    assert.equal(displayRange(Float32Array.of(Number.NaN, Infinity)), undefined);
    assert.deepEqual(displayRange(Float32Array.of(2, 2)), { low: 2, high: 2, clipsLow: false, clipsHigh: false, missingPixels: 0 });
  });

  it('labels round values inside the range', () => {
    assert.deepEqual(linearTicks(-19.9, 47.9), [0, 20, 40]);
    assert.deepEqual(linearTicks(0, 1), [0, 0.2, 0.4, 0.6, 0.8, 1]);
    assert.deepEqual(linearTicks(3, 3), [3]);
    assert.deepEqual(decadeTicks(-13, -8), [-13, -12, -11, -10, -9, -8]);
    assert.deepEqual(decadeTicks(-10.1, -9.5).map((tick) => Number((10 ** (tick + 10)).toPrecision(3))), [1, 2]);
    assert.deepEqual(decadeTicks(0.35, 0.45), [0.35, 0.45]);
  });
});
