/** [P] Otsu thresholds of scikit-image's test pictures (scikit-image 0.19 and exhaustive search); skipped where the pictures are not at hand. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { otsuBin } from '../../src/stats/otsu.ts';
import { greyHistogram, readGreyPicture } from '../fixtures/grey-picture.ts';

for (const [name, threshold, foreground] of [['coins', 107, 45117], ['camera', 102, 177984], ['page', 157, 46818], ['microaneurysms', 93, undefined]] as const) {
  const picture = readGreyPicture(name);
  test(`[P] Otsu of ${name} is ${threshold}`, { skip: picture === undefined ? 'picture not at hand' : false }, () => {
    const got = otsuBin(greyHistogram(picture!));
    assert.equal(got, threshold);
    if (foreground !== undefined) assert.equal(picture!.data.reduce((count, value) => count + (value > got ? 1 : 0), 0), foreground);
  });
}
