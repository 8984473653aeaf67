import assert from 'node:assert/strict';
import { test } from 'node:test';
import { readCurves } from '../../src/iv/read-curves.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { refused, textBytes } from '../read/refused.ts';

const read = (text: string, name = 'pad.iv.csv') => readCurves({ name, bytes: textBytes(text) });
const values = (array: Float64Array | undefined) => Array.from(array ?? []);

test('a plain table: quantities and units from the header, SI inside, order kept', () => {
  const { curves, warnings } = read('bias_V,current_nA\n0,0.5\n1,2\n0.5,-1\n');
  assert.equal(curves.length, 1);
  assert.equal(curves[0]!.name, 'pad');
  assert.deepEqual(values(curves[0]!.biasV), [0, 1, 0.5]);
  assert.deepEqual(values(curves[0]!.currentA), [0.5e-9, 2e-9, -1e-9]);
  assert.equal(curves[0]!.temperatureK, undefined);
  assert.deepEqual(warnings, []);
});

test('the same table in other spellings gives the same numbers', () => {
  const spellings = [
    'Bias (V);Current (nA)\n1,5;2,25\n2;3\n', '# bias_mV\tcurrent [pA]\n1500\t2250\n2000\t3000\n', 'voltage / V, I / µA\n1.5, 2.25e-3\n2, 3e-3\n',
    'Sweep 3 of pad B\n\nU_V current_A\n1.5 2.25e-9\n2 3e-9\n', '\uFEFF"bias (V)","current (nA)"\r\n1.5,2.25\r\n2,3\r\n', 'V_V,i_fA,\n1.5,2250000,\n2,3000000,\n',
  ];
  for (const text of spellings) {
    const [curve] = read(text).curves;
    assert.deepEqual(values(curve?.biasV), [1.5, 2], text);
    values(curve?.currentA).forEach((value, k) => assertClose(value, [2.25e-9, 3e-9][k]!, 1e-12, text));
  }
});

test('several current columns are several curves, missing cells leave points out, other columns are named and ignored', () => {
  const { curves, warnings } = read('time_s,bias_V,current_up_nA,current_nA,current_nA\n0,1,2,3,\n1,2,nan,5,6\n2,,7,8,9\n');
  assert.deepEqual(curves.map((curve) => curve.name), ['pad current_up', 'pad current 1', 'pad current 2']);
  assert.deepEqual(curves.map((curve) => values(curve.biasV)), [[1], [1, 2], [2]]);
  assert.deepEqual(warnings.map((one) => one.code), ['iv-columns-ignored']);
  assert.match(warnings[0]!.message, /time_s/);
});

test('temperatures part a table into curves; one that wanders does not; a column may state its own', () => {
  const { curves } = read('bias_V,current_nA,temperature_K\n1,1,299.8\n2,2,300.1\n1,3,77\n2,4,77.2\n3,5,299.9\n');
  assert.deepEqual(curves.map((curve) => curve.name), ['pad 77.1 K', 'pad 299.93 K']);
  assertClose(curves[1]!.temperatureK, (299.8 + 300.1 + 299.9) / 3, 1e-12);
  assert.deepEqual(values(curves[1]!.biasV), [1, 2, 3]);
  assertClose(read('bias_V,current_nA,temperature_C\n1,1,25\n2,1,25\n').curves[0]!.temperatureK, 298.15, 1e-12);
  assert.deepEqual(read('bias_V,current_300K_nA,current_77K_nA\n1,1,1\n').curves.map((curve) => curve.temperatureK), [300, 77]);
});

test('bad tables are refused with file, line, value and a way out', async () => {
  const cases: [string, RegExp][] = [
    ['', /pad\.iv\.csv is empty/],
    ['1,2\n3,4\n', /no header .*bias_V,current_nA/],
    ['current_nA,time_s\n1,2\n', /no header/],
    ['bias,current_nA\n1,2\n', /line 1: "bias" states no unit .*bias_V/],
    ['bias_V,current_relative\n1,2\n', /"current_relative" states no unit of a current/],
    ['bias_V,current_m\n1,2\n', /"current_m" states no unit/],
    ['bias_V,current_nA,voltage_mV\n1,2,3\n', /line 1: "bias_V" and "voltage_mV" are both a bias/],
    ['title\nbias_V,current_nA\n1,2\n2,abc\n', /line 4, current: "abc" is not a number/],
    ['bias_V,current_nA,temperature_K\n1,2,-3\n', /line 2: a temperature of "-3"/],
    ['bias_V,current_nA\n1|2\n', /line 2: "1\|2" does not part into 2 cells/],
    ['bias_V,current_nA\n', /no line with both/],
    ['bias_V,current_nA\n1,\n,2\n', /no line with both/],
  ];
  for (const [text, message] of cases) assert.match((await refused(() => read(text))).message, message, text);
});
