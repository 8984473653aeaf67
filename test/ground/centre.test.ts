import assert from 'node:assert/strict';
import { test } from 'node:test';
import { centreAndScatter, mostCommon } from '../../src/ground/centre.ts';
import { madScale } from '../../src/stats/mad.ts';
import { seededRandom } from '../../src/stats/random.ts';

test('the scatter is the scaled median distance of the values below the most common one, from one sort', () => {
  const random = seededRandom('centre');
  for (const size of [1, 2, 3, 10, 63, 64, 65, 1000, 1001]) {
    // Rounded to quarters, so that many values are equal and some equal the centre.
    const sample = Float64Array.from({ length: size }, () => Math.round(4 * random.normal()) / 4);
    const before = sample.slice();
    const { centre, scatter } = centreAndScatter(sample);
    const below = sample.filter((value) => value < centre).map((value) => centre - value).sort();
    assert.equal(centre, mostCommon(sample), `${size} values`);
    assert.equal(scatter, below.length === 0 ? 0 : madScale * below[below.length >> 1]!, `${size} values`);
    assert.deepEqual(sample, before);
  }
});

test('an empty sample has no centre, and equal values do not scatter', () => {
  assert.deepEqual(centreAndScatter(new Float64Array(0)), { centre: Number.NaN, scatter: 0 });
  assert.deepEqual(centreAndScatter(new Float64Array(200).fill(3)), { centre: 3, scatter: 0 });
});
