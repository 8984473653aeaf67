/** Shifts between maps against shifts that are known because the maps were sampled from a formula. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { registerMaps } from '../../src/ground/register-maps.ts';
import { seededRandom } from '../../src/stats/random.ts';

const size = 128;

/** A band-limited pattern: plane waves of six pixels and more, which a Fourier shift moves exactly by their phases. */
function pattern(seed: string): (x: number, y: number) => number {
  const random = seededRandom(seed);
  const waves = Array.from({ length: 40 }, () => {
    const angle = 2 * Math.PI * random.uniform();
    const k = (2 * Math.PI) / (6 + 24 * random.uniform());
    return { kx: k * Math.cos(angle), ky: k * Math.sin(angle), phase: 2 * Math.PI * random.uniform() };
  });
  return (x, y) => waves.reduce((sum, { kx, ky, phase }) => sum + Math.cos(kx * x + ky * y + phase), 0);
}

function sampled(at: (x: number, y: number) => number): Float32Array {
  return Float32Array.from({ length: size * size }, (_, i) => at(i % size, Math.floor(i / size)));
}

test('outside: a sub-pixel shift of a pattern (Fourier shift theorem) is recovered to 0.02 pixels, another factor and level besides [F]', () => {
  for (const [k, [dx, dy]] of ([[0.25, 0], [0.5, -0.5], [-1.37, 2.81], [3.1, 0.04], [0, 0]] as const).entries()) {
    const at = pattern(`exact ${k}`);
    const found = registerMaps(sampled(at), sampled((x, y) => 2.5 * at(x - dx, y - dy) - 7), size, size);
    assert.ok(found, `${dx}, ${dy}: nothing found`);
    assert.ok(Math.hypot(found.dxPx - dx, found.dyPx - dy) < 0.02, `${found.dxPx}, ${found.dyPx} for ${dx}, ${dy}`);
    assert.ok(found.correlation > 0.99);
  }
});

test('outside: with noise and missing pixels the shift is recovered within its standard error, over 40 maps [F]', () => {
  const squares = { x: 0, y: 0, n: 0 };
  for (let k = 0; k < 40; k++) {
    const random = seededRandom(`noisy ${k}`);
    const [dx, dy] = [6 * (random.uniform() - 0.5), 6 * (random.uniform() - 0.5)];
    const at = pattern(`noisy ${k}`);
    const reference = sampled((x, y) => at(x, y) + random.normal());
    const moved = sampled((x, y) => at(x - dx, y - dy) + 2 * random.normal());
    for (let lost = 0; lost < 200; lost++) (lost % 2 === 0 ? reference : moved)[random.integer(size * size)] = Number.NaN;
    const found = registerMaps(reference, moved, size, size);
    assert.ok(found, `map ${k}: nothing found`);
    assert.ok(Math.abs(found.dxPx - dx) < 5 * found.seXPx && Math.abs(found.dyPx - dy) < 5 * found.seYPx, `${found.dxPx} ± ${found.seXPx}, ${found.dyPx} ± ${found.seYPx} for ${dx}, ${dy}`);
    squares.x += ((found.dxPx - dx) / found.seXPx) ** 2;
    squares.y += ((found.dyPx - dy) / found.seYPx) ** 2;
    squares.n++;
  }
  // Of 40 the root mean square of a true standard error lies within 1 ± 0.34 with three of its own.
  for (const rms of [Math.sqrt(squares.x / squares.n), Math.sqrt(squares.y / squares.n)]) assert.ok(rms > 0.66 && rms < 1.5, `errors are ${rms} standard errors`);
});

test('outside: maps that have nothing to do with each other, and maps without features, are not registered [F]', () => {
  assert.equal(registerMaps(sampled(pattern('one')), sampled(pattern('other')), size, size), undefined);
  assert.equal(registerMaps(sampled(() => 1), sampled(pattern('one')), size, size), undefined);
  assert.equal(registerMaps(sampled(pattern('one')), new Float32Array(size * size).fill(Number.NaN), size, size), undefined);
  const at = pattern('far');
  assert.equal(registerMaps(sampled(at), sampled((x, y) => at(x - 9, y)), size, size), undefined, 'beyond its reach');
});
