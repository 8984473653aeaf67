/** When kernels run, when the plain TypeScript does, and that nobody can tell which. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { kernelsInstalled, withKernels } from '../../src/kernels/installed.ts';
import { labelRuns } from '../../src/kernels/label-runs.ts';
import { squaredDistances } from '../../src/kernels/squared-distances.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import { createScene, threeTerraces, typicalThings } from '../fixtures/create-scene.ts';
import { bothWays } from './both-ways.ts';

const megabyte = 2 ** 20;

test('without kernels the call is left to the plain TypeScript', () => {
  assert.equal(kernelsInstalled(), false);
  assert.equal(labelRuns(Uint8Array.of(1, 0), 2, 1, 4), undefined);
});

test('a call that needs too much memory, and a map with more rows than a step count holds, are left to it too', () => {
  const { kernel } = bothWays(() => 0, () => [
    withKernels([900 * megabyte], () => 'ran') ?? 'left',
    squaredDistances(new Uint8Array(65535), 1, 65535, 1, 1, true) ? 'ran' : 'left',
    squaredDistances(new Uint8Array(65534), 1, 65534, 1, 1, true) ? 'ran' : 'left',
  ]);
  assert.deepEqual(kernel, ['left', 'left', 'ran']);
});

test('parts of the memory do not overlap, and each has room behind it', () => {
  const { kernel } = bothWays(() => 0, () => withKernels([1, 16, 0, 100_000], ({ memory }, addresses) => ({ addresses, bytes: memory.buffer.byteLength })));
  const [a, b, c, d] = kernel.addresses as [number, number, number, number];
  assert.ok(kernel.addresses.every((address) => address % 16 === 0));
  assert.ok(b - a >= 1 + 32 && c - b >= 16 + 32 && d - c >= 32 && kernel.bytes >= d + 100_000 + 32);
});

test('memory that a large map needed is given back', () => {
  const bytes = (): number | undefined => withKernels([16], ({ memory }) => memory.buffer.byteLength);
  const { kernel } = bothWays(() => 0, () => [withKernels([100 * megabyte], ({ memory }) => memory.buffer.byteLength), bytes()]);
  assert.ok(kernel[0]! >= 100 * megabyte && kernel[1]! < 2 * megabyte, String(kernel));
});

test('the whole chain gives the same with and without kernels', () => {
  const size = 128;
  const { sample } = createScene({
    seed: 'kernels', size, layersAt: threeTerraces(size), things: typicalThings(size), tiltNm: 10, lineNm: 0.2, wearDecades: 0.3,
    broken: [{ r: 70, lines: 1, from: 10, to: 60, current: true }],
  });
  const recipe = createRecipe({ stack: { biasV: 4 }, barrier: { referenceLayers: 11 } });
  const appraise = (): object => {
    const { timings: _, ...rest } = evaluate(sample, recipe);
    return rest;
  };
  const { plain, kernel } = bothWays(appraise, appraise);
  assert.deepEqual(kernel, plain);
});
