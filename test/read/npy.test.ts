import assert from 'node:assert/strict';
import { test } from 'node:test';
import { decodeMaps } from '../../src/read/decode.ts';
import { refused } from './refused.ts';

function npy(header: string, data: Uint8Array, version = 1): Uint8Array {
  const text = new TextEncoder().encode(header);
  const lengthBytes = version === 1 ? 2 : 4;
  const bytes = new Uint8Array(8 + lengthBytes + text.length + data.length);
  bytes.set([0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, version, 0]);
  const view = new DataView(bytes.buffer);
  if (version === 1) view.setUint16(8, text.length, true); else view.setUint32(8, text.length, true);
  bytes.set(text, 8 + lengthBytes);
  bytes.set(data, 8 + lengthBytes + text.length);
  return bytes;
}

const header = (descr: string, shape = '(4, 5)', order = 'False') => `{'descr': '${descr}', 'fortran_order': ${order}, 'shape': ${shape}, }\n`;
const read = (bytes: Uint8Array) => decodeMaps({ name: 'a.npy', bytes });
const numbers = Array.from({ length: 20 }, (_, i) => i - 4);

function stored(size: number, set: (view: DataView, at: number, value: number) => void): Uint8Array {
  const view = new DataView(new ArrayBuffer(size * numbers.length));
  numbers.forEach((value, i) => set(view, i * size, value));
  return new Uint8Array(view.buffer);
}

test('numeric types in both byte orders and all header versions', async () => {
  const cases: [string, Uint8Array][] = [
    ['<f4', stored(4, (v, at, x) => v.setFloat32(at, x, true))],
    ['>f4', stored(4, (v, at, x) => v.setFloat32(at, x))],
    ['>f8', stored(8, (v, at, x) => v.setFloat64(at, x))],
    ['|i1', stored(1, (v, at, x) => v.setInt8(at, x))],
    ['>i2', stored(2, (v, at, x) => v.setInt16(at, x))],
    ['<i4', stored(4, (v, at, x) => v.setInt32(at, x, true))],
    ['>i8', stored(8, (v, at, x) => v.setBigInt64(at, BigInt(x)))],
  ];
  for (const [descr, data] of cases) {
    for (const version of [1, 2, 3]) {
      const [map] = await read(npy(header(descr), data, version));
      assert.deepEqual([map!.columns, map!.rows, [...map!.values]], [5, 4, numbers], `${descr}, version ${version}`);
    }
  }
});

test('half floats: IEEE 754 bit patterns', async () => {
  // [F] IEEE 754-2019, binary16: 1, −2, largest 65504, smallest normal 2⁻¹⁴, smallest subnormal 2⁻²⁴, 1/3 to 10 bits.
  const bits = [0x3c00, 0xc000, 0x7bff, 0x0400, 0x0001, 0x3555, 0x7c00, 0x7e00, 0x8000];
  const view = new DataView(new ArrayBuffer(32));
  bits.forEach((value, i) => view.setUint16(2 * i, value, true));
  const [map] = await read(npy(header('<f2', '(4, 4)'), new Uint8Array(view.buffer)));
  assert.deepEqual([...map!.values.subarray(0, 9)], [1, -2, 65504, 2 ** -14, 2 ** -24, 0.333251953125, Infinity, NaN, -0]);
});

test('Fortran order is turned, and the file’s own bytes stay as they were', async () => {
  const data = stored(8, (v, at, x) => v.setFloat64(at, x));
  const bytes = npy(header('>f8', '(4, 5)', 'True'), data);
  const before = bytes.slice();
  const [map] = await read(bytes);
  assert.deepEqual([...map!.values.subarray(0, 6)], [numbers[0], numbers[4], numbers[8], numbers[12], numbers[16], numbers[1]]);
  assert.deepEqual(bytes, before);
  // The same through Node's Buffer, whose slice() shares memory.
  await read(Buffer.from(bytes.buffer));
  assert.deepEqual(bytes, before);
});

test('other shapes, types and damage are refused by a true sentence', async () => {
  const data = new Uint8Array(1000);
  const cases: [Uint8Array, RegExp][] = [
    [npy(header('<f8', '()'), data), /0 dimensions \(shape \(\)\)/],
    [npy(header('<f8', '(20,)'), data), /1 dimensions \(shape \(20,\)\)/],
    [npy(header('<f8', '(2, 4, 5)'), data), /3 dimensions \(shape \(2, 4, 5\)\)/],
    [npy(header('<c8'), data), /type <c8/],
    [npy(header('|O'), data), /type \|O/],
    [npy(header('<f16'), data), /type <f16/],
    [npy("{'descr': [('x', '<f4')], 'fortran_order': False, 'shape': (4, 5), }", data), /structured/],
    [npy(header('<f8', '(400, 500)'), data), /ends too early: an array of 400 × 500 needs 16000\d\d bytes/],
    [npy(header('<f8', '(2147483648, 2147483648)'), data), /more than the 400000000/],
    [npy(header('<f8', '(1, 500)'), data), /at least 4 × 4/],
    [npy('not a header', data), /header cannot be understood/],
    [npy(header('<f8'), data).slice(0, 20), /ends too early: the header/],
    [npy(header('<f8'), data, 9), /version 9/],
  ];
  for (const [bytes, sentence] of cases) assert.match((await refused(() => read(bytes))).message, sentence);
});
