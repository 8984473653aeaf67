import assert from 'node:assert/strict';
import { test } from 'node:test';
import ndarray from 'ndarray';
import { mapBytes, StageCache } from '../../src/evaluate/stage-cache.ts';

const never = (): never => assert.fail('computed again');

test('a kept result is handed on as the same object, another key is computed', () => {
  const cache = new StageCache(1000);
  const first = cache.take('a', () => new Float32Array(10));
  assert.equal(cache.take('a', never), first);
  assert.notEqual(cache.take('b', () => new Float32Array(10)), first);
  assert.equal(cache.bytes, 80);
});

test('the least recently used result goes first', () => {
  const cache = new StageCache(100);
  for (const key of ['a', 'b']) cache.take(key, () => new Float32Array(10));
  cache.take('a', never);
  cache.take('c', () => new Float32Array(10));
  cache.take('a', never);
  cache.take('c', never);
  let again = 0;
  cache.take('b', () => { again++; return new Float32Array(10); });
  assert.equal(again, 1);
  assert.ok(cache.bytes <= 100);
});

test('a result larger than the whole limit is handed on and not kept; a limit of 0 keeps no map', () => {
  const cache = new StageCache(100);
  cache.take('small', () => new Float32Array(20));
  assert.equal(cache.take('large', () => new Float32Array(26)).length, 26);
  assert.equal(cache.bytes, 80);
  cache.take('small', never);
  const none = new StageCache(0);
  let computed = 0;
  for (let k = 0; k < 3; k++) none.take('a', () => { computed++; return new Uint8Array(1); });
  assert.deepEqual([computed, none.bytes], [3, 0]);
});

test('bytes never exceed the limit, whatever comes', () => {
  const cache = new StageCache(1000);
  for (let k = 0; k < 200; k++) {
    cache.take(`key ${(k * 7) % 31}`, () => new Uint8Array((k * 37) % 700));
    assert.ok(cache.bytes <= 1000, `${cache.bytes}`);
  }
  cache.clear();
  assert.equal(cache.bytes, 0);
});

test('undefined is a result like any other; what throws is not kept', () => {
  const cache = new StageCache(10);
  assert.equal(cache.take('none', () => undefined), undefined);
  assert.equal(cache.take('none', never), undefined);
  assert.throws(() => cache.take('bad', () => { throw new RangeError('no'); }), RangeError);
  assert.equal(cache.take('bad', () => 7), 7);
});

test('bytes of all typed arrays reachable, a shared buffer once', () => {
  const shared = new Float32Array(8);
  const value = { a: { map: ndarray(shared, [2, 4]) }, list: [{ mask: new Uint8Array(3) }, shared.subarray(2)], word: 'x', none: null };
  assert.equal(mapBytes(value), 32 + 3);
  const loop: { self?: unknown; map: Uint8Array } = { map: new Uint8Array(5) };
  loop.self = loop;
  assert.equal(mapBytes(loop), 5);
});
