/** Statistics against values from outside the program: [P] published, [F] computed from the named formula with another program. */
import { test } from 'node:test';
import { murphyYield, negativeBinomialYield, poissonYield, seedsYield } from '../../src/stats/defect-yield.ts';
import { chiSquareQuantile } from '../../src/stats/gamma.ts';
import { medianAbsoluteDeviation, scaledMad } from '../../src/stats/mad.ts';
import { normalQuantile } from '../../src/stats/normal.ts';
import { poissonInterval, poissonUpperBound } from '../../src/stats/poisson.ts';
import { wilsonInterval } from '../../src/stats/wilson.ts';
import { assertClose } from '../fixtures/assert-close.ts';

test('[F] MAD of {1,1,2,2,4,6,9}', () => {
  assertClose(medianAbsoluteDeviation([1, 1, 2, 2, 4, 6, 9]).mad, 1, 1e-12);
  assertClose(scaledMad([1, 1, 2, 2, 4, 6, 9]), 1.482602218505602, 1e-12);
});

test('[F] defect yield at A·D₀ = 1', () => {
  assertClose(poissonYield(1), 0.36788, 1e-4);
  assertClose(murphyYield(1), 0.39958, 1e-4);
  assertClose(seedsYield(1), 0.5, 1e-12);
  assertClose(negativeBinomialYield(1, 2), 0.44444, 1e-4);
});

test('[P] exact Poisson interval for 3 seen, one-sided bound for none', () => {
  const { low, high } = poissonInterval(3);
  assertClose(low, 0.61867, 1e-4);
  assertClose(high, 8.76727, 1e-4);
  assertClose(poissonUpperBound(0), 2.99573, 1e-4);
});

test('[F] exact Poisson intervals from SciPy 1.17 chi2.ppf', () => {
  for (const [seen, low, high] of [[1, 0.025317807984289876, 5.571643390938898], [10, 4.7953886961324335, 18.39035604201778], [100, 81.36399125092314, 121.62679379242638], [1000, 938.9730184076952, 1063.952136016302]] as const) {
    const got = poissonInterval(seen);
    assertClose(got.low, low, 1e-10);
    assertClose(got.high, high, 1e-10);
  }
});

test('[F] Wilson’s interval, 8 of 10; and from SciPy 1.17 binomtest at the ends', () => {
  const got = wilsonInterval(8, 10);
  assertClose(got.low, 0.49016, 1e-4);
  assertClose(got.high, 0.94332, 1e-4);
  assertClose(wilsonInterval(0, 20).high, 0.16112515805281935, 1e-10);
  assertClose(wilsonInterval(20, 20).low, 0.8388748419471808, 1e-10);
  assertClose(wilsonInterval(3, 1000).low, 0.0010207838811386186, 1e-10);
  assertClose(wilsonInterval(3, 1000).high, 0.008783014053503173, 1e-10);
});

test('[F] chi-square and normal quantiles from SciPy 1.17', () => {
  for (const [p, degrees, expected] of [[0.025, 6, 1.2373442457912027], [0.975, 8, 17.534546139484647], [0.95, 2, 5.991464547107979], [0.5, 1, 0.454936423119572], [0.001, 200, 143.8427949900008], [0.999, 200, 267.5405278227572], [1e-10, 3, 5.20939762143448e-7]] as const) {
    assertClose(chiSquareQuantile(p, degrees), expected, 1e-11, `χ² ${p} ${degrees}`);
  }
  for (const [p, expected] of [[0.975, 1.959963984540054], [0.75, 0.6744897501960817], [0.1, -1.2815515655446004], [0.02425, -1.972961051311885], [1e-3, -3.090232306167813], [1e-10, -6.361340902404056], [1e-100, -21.273453560965322], [0.999999, 4.753424308817087]] as const) {
    assertClose(normalQuantile(p), expected, 1e-11, `z ${p}`);
  }
});
