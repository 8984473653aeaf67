/**
 * Components and distances against OpenCV (partitions compared, not numbers), and against figures of
 * scikit-image 0.19 and SciPy 1.10 on scikit-image's test pictures [P] where those are at hand.
 */
import assert from 'node:assert/strict';
import { createRequire } from 'node:module';
import { test } from 'node:test';
import { squaredDistance } from '../../src/grid/distance.ts';
import { labelComponents } from '../../src/grid/label-components.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { readGreyPicture } from '../fixtures/grey-picture.ts';

for (const [name, threshold, four, eight, largest, largestSquared, sumSquared] of [
  ['coins', 107, 154, 96, 8792, 1153, 2633557],
  ['camera', 102, 74, 48, 138999, 34645, 557365734],
] as const) {
  const picture = readGreyPicture(name);
  test(`[P] ${name} above ${threshold}: ${four} and ${eight} components, largest squared distance ${largestSquared}`, { skip: picture === undefined ? 'picture not at hand' : false }, () => {
    const { data, columns, rows } = picture!;
    const mask = data.map((value) => (value > threshold ? 1 : 0));
    assert.equal(labelComponents(mask, columns, rows, 4).count, four);
    const joined = labelComponents(mask, columns, rows, 8);
    assert.equal(joined.count, eight);
    assert.equal(Math.max(...joined.pixels.subarray(1)), largest);
    const distances = squaredDistance(mask, columns, rows);
    assert.equal(distances.reduce((top, value) => Math.max(top, value), 0), largestSquared);
    assert.equal(distances.reduce((sum, value) => sum + value, 0), sumSquared);
  });
}

/** Blobs at several scales, and noise. */
function randomMask(columns: number, rows: number, seed: string): Uint8Array {
  const random = seededRandom(seed);
  const waves = Array.from({ length: 6 }, () => [random.normal() * 0.25, random.normal() * 0.25, random.uniform() * 7] as const);
  return Uint8Array.from({ length: columns * rows }, (_, k) => {
    const x = k % columns;
    const y = Math.floor(k / columns);
    const level = waves.reduce((sum, [kx, ky, phase]) => sum + Math.sin(kx * x + ky * y + phase), 0);
    return level + 0.8 * random.normal() > -0.3 ? 255 : 0;
  });
}

test('OpenCV’s connectedComponentsWithStats parts the mask the same way; its distanceTransform agrees', async () => {
  const { cv } = await loadOpenCv();
  const columns = 190;
  const rows = 133;
  for (const seed of ['one', 'two', 'three']) {
    const mask = randomMask(columns, rows, seed);
    const source = cv.matFromArray(rows, columns, cv.CV_8UC1, mask);
    for (const connectivity of [4, 8] as const) {
      const [labels, stats, centroids] = [new cv.Mat(), new cv.Mat(), new cv.Mat()];
      const count = cv.connectedComponentsWithStats(source, labels, stats, centroids, connectivity, cv.CV_32S) - 1;
      const ours = labelComponents(mask, columns, rows, connectivity);
      assert.equal(ours.count, count);
      const theirs = new Map<number, number>();
      ours.labels.forEach((label, k) => {
        const other = labels.data32S[k]!;
        if (!theirs.has(label)) theirs.set(label, other);
        assert.equal(theirs.get(label), other, `pixel ${k}`);
      });
      // Same number of regions and a single-valued map between them: the partitions are equal. Column 4 of stats is the area.
      for (const [label, other] of theirs) assert.equal(ours.pixels[label], stats.data32S[other * 5 + 4]);
      for (const mat of [labels, stats, centroids]) mat.delete();
    }
    const distances = new cv.Mat();
    cv.distanceTransform(source, distances, cv.DIST_L2, cv.DIST_MASK_PRECISE);
    squaredDistance(mask, columns, rows).forEach((value, k) => assertClose(Math.sqrt(value), distances.data32F[k]!, 1e-5));
    distances.delete();
    source.delete();
  }
});

interface Mat {
  readonly data32S: Int32Array;
  readonly data32F: Float32Array;
  delete(): void;
}

/** The few of OpenCV's calls used here. */
interface OpenCv {
  readonly Mat: new () => Mat;
  readonly CV_8UC1: number;
  readonly CV_32S: number;
  readonly DIST_L2: number;
  readonly DIST_MASK_PRECISE: number;
  matFromArray(rows: number, columns: number, type: number, values: Uint8Array): Mat;
  connectedComponentsWithStats(source: Mat, labels: Mat, stats: Mat, centroids: Mat, connectivity: number, type: number): number;
  distanceTransform(source: Mat, target: Mat, distance: number, mask: number): void;
  onRuntimeInitialized?: () => void;
}

/** Wrapped in an object: the module has a `then` of its own, which an await would follow for ever. */
async function loadOpenCv(): Promise<{ cv: OpenCv }> {
  const cv = createRequire(import.meta.url)('@techstark/opencv-js') as OpenCv;
  if (typeof cv.Mat !== 'function') {
    await new Promise<void>((resolve) => {
      cv.onRuntimeInitialized = resolve;
    });
  }
  return { cv };
}
