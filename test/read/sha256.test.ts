import assert from 'node:assert/strict';
import { createHash } from 'node:crypto';
import { test } from 'node:test';
import { sha256, sha256Plain } from '../../src/read/sha256.ts';
import { textBytes } from './refused.ts';

const hex = (bytes: Uint8Array) => Buffer.from(bytes).toString('hex');

test('[P] SHA-256 of "abc" and of nothing (NIST, FIPS 180-4 examples), with and without the platform', async () => {
  const abc = 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad';
  const nothing = 'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855';
  assert.deepEqual([await sha256(textBytes('abc')), await sha256(new Uint8Array(0))], [abc, nothing]);
  assert.deepEqual([hex(sha256Plain(textBytes('abc'))), hex(sha256Plain(new Uint8Array(0)))], [abc, nothing]);
});

test('the plain digest equals Node’s at every length around a block', () => {
  const bytes = Uint8Array.from({ length: 200 }, (_, i) => (i * 73) & 255);
  for (let length = 0; length <= bytes.length; length++) {
    const part = bytes.slice(0, length);
    assert.equal(hex(sha256Plain(part)), createHash('sha256').update(part).digest('hex'), String(length));
  }
});
