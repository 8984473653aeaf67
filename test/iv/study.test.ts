/**
 * Do the intervals keep what they promise? Seeded curves of known barrier, with the amplifier's noise and offset, noise that grows with the
 * current, leakage and saturation, through the whole analysis with the straight stretch found by itself.
 */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { coverageOf } from './study.ts';
import type { Scenario } from './study.ts';

const scenarios: Record<string, Scenario> = {
  'one way': () => ({}),
  'there and back': () => ({ both: true }),
  leaky: (draw) => ({ leakS: 10 ** draw(-14, -12) }),
  saturated: (draw) => ({ limitA: 10 ** draw(-10, -8.5) }),
  'few points, much noise': (draw) => ({ points: Math.round(draw(25, 60)), share: draw(0.05, 0.2) }),
  // Begins above the floor: then nothing shows the amplifier's offset, which has to be nulled before.
  'from 3 V': () => ({ fromV: 3, offsetA: 0 }),
};

for (const [name, scenario] of Object.entries(scenarios)) {
  test(`95 % intervals of slope and height hold the truth in 90–99 % of 400 curves: ${name}`, () => {
    const { slope, height, without, meanPull } = coverageOf(`study, ${name}`, 400, scenario);
    const found = JSON.stringify({ slope, height, without, meanPull });
    assert.ok(without <= 8, found);
    assert.ok(slope >= 0.9 && slope <= 0.99, found);
    assert.ok(height >= 0.9 && height <= 0.99, found);
    assert.ok(Math.abs(meanPull) < 0.35, found);
  });
}
