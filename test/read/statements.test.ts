import assert from 'node:assert/strict';
import { test } from 'node:test';
import { readManifest, isManifest } from '../../src/read/manifest.ts';
import { Problem } from '../../src/problems/problem.ts';
import { readSidecar } from '../../src/read/sidecar.ts';
import { parseStatement, writeStatement } from '../../src/read/tiff-statement.ts';
import { resolveUnit } from '../../src/read/unit-of-channel.ts';
import { knownUnit, siFactor } from '../../src/read/units.ts';
import { refused, textBytes } from './refused.ts';

const sidecar = (value: unknown) => readSidecar({ name: 'S.json', bytes: textBytes(JSON.stringify(value)) });
const manifest = (text: string) => readManifest({ name: 'm.csv', bytes: textBytes(text) });

test('our TIFF statement reads back what was written', async () => {
  for (const statement of [
    { quantity: 'height', unit: 'nm', pitchUnit: 'um' }, { quantity: 'current', unit: 'A', pitchUnit: 'um', direction: 'return', biasV: -4 }, { quantity: 'causes', pitchUnit: 'um' },
  ] as const) assert.deepEqual(parseStatement('a.tif', writeStatement(statement)), statement);
  assert.equal(writeStatement({ quantity: 'height', unit: 'nm', pitchUnit: 'um' }), '{"evenglow":1,"quantity":"height","unit":"nm","pitchUnit":"um"}');
  for (const other of ['', 'a picture', '{"shape": [4, 4]}', '[1]', '{broken']) assert.equal(parseStatement('a.tif', other), undefined);
  assert.match((await refused(() => parseStatement('a.tif', '{"evenglow":2,"quantity":"height","pitchUnit":"um"}'))).message, /version 2, this program knows up to 1/);
  assert.match((await refused(() => parseStatement('a.tif', '{"evenglow":1,"quantity":"height","pitchUnit":"mm"}'))).message, /"mm"/);
});

test('units as people write them', () => {
  const factors = ['m', 'µm', 'μm', 'um', 'nm', 'pm', 'Å', 'angstrom', 'A', 'nA', 'µA', 'pA', 'fA'].map((word) => siFactor(knownUnit(word)!));
  assert.deepEqual(factors, [1, 1e-6, 1e-6, 1e-6, 1e-9, 1e-12, 1e-10, 1e-10, 1, 1e-9, 1e-6, 1e-12, 1e-15]);
  assert.deepEqual([knownUnit('V'), knownUnit(''), knownUnit('constructor')], [undefined, undefined, undefined]);
});

test('a unit comes from recipe, sidecar or file, and contradictions are refused', async () => {
  const base = { file: 'a.tif', quantity: 'height' } as const;
  assert.equal(resolveUnit(base).unit, undefined);
  assert.equal(resolveUnit({ ...base, stated: { word: 'µm', by: 'description' } }).unit?.unit, 'um');
  const over = resolveUnit({ ...base, stated: { word: 'm', by: 'description' }, recipe: { by: 'scan.heightUnit', word: 'nm' } });
  assert.deepEqual([over.unit?.unit, over.warnings[0]?.code], ['nm', 'unit-overridden']);
  assert.equal((await refused(() => resolveUnit({ ...base, stated: { word: 'm', by: 'tag' }, recipe: { by: 'scan.heightUnit', word: 'nm' } }))).code, 'unit-disagreement');
  assert.equal((await refused(() => resolveUnit({ ...base, stated: { word: 'm', by: 'description' }, sidecar: { by: 'S.json', word: 'nm' } }))).code, 'unit-disagreement');
  assert.match((await refused(() => resolveUnit({ ...base, stated: { word: 'A', by: 'description' } }))).message, /taken for a height but its unit is A/);
  assert.match((await refused(() => resolveUnit({ file: 'b.tif', quantity: 'current', stated: { word: 'nm', by: 'tag' } }))).message, /taken for a current but its unit is nm/);
});

test('sidecars: known keys, unknown keys, wrong types', async () => {
  assert.deepEqual(sidecar({ widthUm: 10, heightUnit: 'nm', biasV: -4 }), { stated: { widthUm: 10, heightUnit: 'nm', biasV: -4 }, warnings: [] });
  const some = sidecar({ widthUm: 10, operator: 'x' });
  assert.deepEqual([some.stated, some.warnings[0]?.code], [{ widthUm: 10 }, 'sidecar-unknown-key']);
  assert.match(some.warnings[0]!.message, /"operator"/);
  for (const other of [{ material: 'x' }, [1, 2], 'text', {}]) assert.deepEqual(sidecar(other).warnings.map((warning) => warning.code), ['sidecar-ignored']);
  assert.match((await refused(() => sidecar({ widthUm: 'ten' }))).message, /^S\.json, widthUm: "ten" is not a number\.$/);
  assert.match((await refused(() => sidecar({ widthUm: -1 }))).message, /widthUm: -1 is not above 0/);
  assert.match((await refused(() => sidecar({ heightUnit: 'A' }))).message, /heightUnit: "A" is not one of m, mm, .*nm/);
  assert.equal((await refused(() => readSidecar({ name: 'S.json', bytes: textBytes('{') }))).code, 'sidecar-not-json');
});

test('manifests: quotes, decimal commas, bad rows spoil only themselves', async () => {
  assert.equal(isManifest(textBytes('sample,height\na,b\n')), true);
  assert.equal(isManifest(textBytes('samples,height\n')), false);
  const read = manifest('sample,height,current,widthUm,biasV,note\n"a, left","h 1.tif",,10,-4.5,x\nb,h2.tif,c2.tif,ten,4,\n,h3.tif\na2,h.tif,,,,,,7\nb,h4.tif\n');
  const [first, ...others] = read.rows;
  assert.deepEqual([first!.sample, first!.stated], ['a, left', { sample: 'a, left', height: 'h 1.tif', widthUm: 10, biasV: -4.5 }]);
  assert.deepEqual(others.map((row) => (row.stated instanceof Problem ? row.stated.message.slice(0, 40) : 'read')), [
    'm.csv, line 3, widthUm: "ten" is not a number.', 'm.csv, line 4: the row names no sample; ', 'm.csv, line 5: the row has 8 cells under', 'm.csv, line 6: sample b is named twice; ',
  ].map((text) => text.slice(0, 40)));
  assert.match(read.warnings[0]!.message, /"note"/);
  const [german] = manifest('sample;height;widthUm\r\na;h.tif;9,5\r\n').rows;
  assert.deepEqual(german!.stated, { sample: 'a', height: 'h.tif', widthUm: 9.5 });
  assert.equal((await refused(() => manifest('sample,height\n'))).code, 'manifest-sample');
});
