import assert from 'node:assert/strict';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { test } from 'node:test';
import { demoFiles, demoSamples } from '../../src/demo/demo-samples.ts';

const bytesOf = (name: string, size: number): Record<string, Uint8Array> => Object.fromEntries(demoFiles(name, size).map((file) => [file.name, file.bytes]));

test('six samples, each with a name of its own, as height, current and sidecar; one with outlines', () => {
  assert.equal(new Set(demoSamples.map(({ name }) => name)).size, 6);
  const endings = demoSamples.map(({ name, files }) => {
    const written = demoFiles(name, 32).map((file) => file.name);
    assert.deepEqual(files, written);
    return written.map((file) => {
      assert.ok(file.startsWith(`${name}.`), file);
      return file.slice(name.length);
    }).join(' ');
  });
  const plain = '.current.tif .height.tif .json';
  assert.equal(endings.filter((found) => found === plain).length, 5);
  assert.equal(endings.filter((found) => found === `${plain} .outlines.geojson`).length, 1);
});

test('the same name and size give the same bytes, other names and sizes do not', () => {
  const [first, second] = demoSamples;
  assert.deepEqual(bytesOf(first!.name, 48), bytesOf(first!.name, 48));
  const maps = [demoFiles(first!.name, 48), demoFiles(second!.name, 48), demoFiles(first!.name, 64)].map((files) => Buffer.from(files[0]!.bytes).toString('base64'));
  assert.equal(new Set(maps).size, 3);
});

test('an unknown name and an impossible size are refused', () => {
  assert.throws(() => demoFiles('quarry-99', 32), /no demo sample called quarry-99/);
  for (const size of [0, 15, 100.5, 8193, Number.NaN]) assert.throws(() => demoFiles(demoSamples[0]!.name, size), RangeError);
});

test('every sidecar says that the sample is invented', () => {
  for (const { name } of demoSamples) {
    const sidecar = JSON.parse(new TextDecoder().decode(bytesOf(name, 32)[`${name}.json`])) as Record<string, unknown>;
    assert.match(String(sidecar['role']), /invented/);
    assert.equal(sidecar['sample'], name);
    assert.equal(sidecar['surface'], 'barrier');
  }
});

test('page and workers get the files only: neither imports what is behind them', () => {
  const root = fileURLToPath(new URL('../../', import.meta.url));
  let seen = 0;
  for (const folder of ['web', 'workers']) {
    for (const file of readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })) {
      if (!file.endsWith('.ts')) continue;
      seen++;
      for (const [, from] of readFileSync(join(root, folder, file), 'utf8').matchAll(/(?:from|import\()\s*'([^']*\/demo\/[^']*)'/g)) {
        assert.match(from!, /\/demo\/demo-samples\.ts$/, `${folder}/${file} imports ${from}`);
      }
    }
  }
  assert.ok(seen > 0);
});
