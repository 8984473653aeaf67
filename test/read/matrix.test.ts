import assert from 'node:assert/strict';
import { test } from 'node:test';
import { decodeMaps } from '../../src/read/decode.ts';
import { looksLikeMatrix } from '../../src/read/matrix.ts';
import { refused, textBytes } from './refused.ts';

const read = async (text: string) => (await decodeMaps({ name: 'a.txt', bytes: textBytes(text) }))[0]!;
const rows = [[1.5, -2, 3e-9, 4], [5, 6.25, 7, 8], [9, 10, 11, 12], [13, 14, 15, 16]];
const write = (delimiter: string, mark = '.', end = '\n') => rows.map((row) => row.map((v) => String(v).replace('.', mark)).join(delimiter)).join(end) + end;

test('tab, semicolon, comma and blanks, point and comma, all line ends', async () => {
  for (const text of [write('\t'), write(';'), write(','), write(' '), write('   ', '.', '\r\n'), write(', '), write(';', ','), write('\t', ',', '\r'), write(' ', ','), `\uFEFF${write(',')}`]) {
    const map = await read(text);
    assert.deepEqual([map.columns, map.rows, [...map.values]], [4, 4, rows.flat()], JSON.stringify(text.slice(0, 30)));
  }
});

test('UTF-16 and rows closed by a delimiter', async () => {
  const text = `\uFEFF${write('\t')}`;
  const bytes = new Uint8Array(text.length * 2);
  [...text].forEach((c, i) => new DataView(bytes.buffer).setUint16(2 * i, c.charCodeAt(0), true));
  assert.deepEqual([...(await decodeMaps({ name: 'a.txt', bytes }))[0]!.values], rows.flat());
  assert.deepEqual([...(await read(write(';').replaceAll('\n', ';\n'))).values], rows.flat());
});

test('headers and comments are skipped and nothing is guessed from them', async () => {
  const map = await read(`# Width: 10 um\nChannel: Height\nUnits: nm\nx a;b;c;d\n\n${write(';')}`);
  assert.deepEqual([map.rows, map.unit, map.quantity, map.pitches], [4, undefined, undefined, []]);
});

test('empty cells, nan and inf', async () => {
  const map = await read(',,,\n1,,nan,NaN\n-inf,2,3,NA\n4,5,6,7\n');
  assert.deepEqual([map.columns, map.rows], [4, 4]);
  assert.deepEqual([...map.values], [NaN, NaN, NaN, NaN, 1, NaN, NaN, NaN, NaN, 2, 3, NaN, 4, 5, 6, 7]);
});

test('ragged rows and words name their line', async () => {
  const ragged = await refused(() => read('header\n1 2 3 4\n5 6 7 8\n9 10 11\n'));
  assert.equal(ragged.message, 'a.txt, line 4 has 3 values where line 2 has 4; every row of a map has the same number.');
  const word = await refused(() => read('1,2,3,4\n5,6,x7,8\n'));
  assert.match(word.message, /line 2, column 3: "x7" is not a number/);
  assert.match((await refused(() => read('1,2,3,4\n5,6,0x7,8\n'))).message, /"0x7" is not a number/);
});

test('other texts are no maps', async () => {
  const cases: [string, RegExp][] = [
    ['Dear reader,\nnothing here.\n', /without rows of numbers/],
    ['{"a": [1, 2]}', /not a format Evenglow reads/],
    [Array.from({ length: 40 }, (_, i) => `${i} ${i} ${i}`).join('\n'), /list of points/],
    ['ncols 4\nnrows 4\ncellsize 1\n1 2 3 4\n1 2 3 4\n1 2 3 4\n1 2 3 4\n', /grid with a header/],
    ['1 2 3 4\n5 6 7 8\n', /at least 4 × 4/],
  ];
  for (const [text, sentence] of cases) assert.match((await refused(() => read(text))).message, sentence);
  assert.equal((await refused(() => decodeMaps({ name: 'e.csv', bytes: new Uint8Array(0) }))).code, 'file-empty');
  assert.equal((await refused(() => decodeMaps({ name: 'b.bin', bytes: Uint8Array.of(1, 0, 0, 2) }))).code, 'file-unrecognised');
});

test('a matrix is told from a note by its head', () => {
  assert.equal(looksLikeMatrix(textBytes(write(','))), true);
  assert.equal(looksLikeMatrix(textBytes('a note\n4 9 2024\n')), false);
  assert.equal(looksLikeMatrix(textBytes(Array(2000).fill('0.5').join('\t').slice(0, 4000))), true);
});
