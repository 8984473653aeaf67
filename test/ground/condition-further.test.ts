import assert from 'node:assert/strict';
import { test } from 'node:test';
import { conditionCurrent } from '../../src/ground/condition-current.ts';
import { conditionFurther, measuredOnly } from '../../src/ground/condition-further.ts';
import { channelOf } from '../../src/read/sample.ts';
import { median } from '../../src/stats/median.ts';
import { createBiasMaps } from '../fixtures/create-bias-maps.ts';
import { createRecipe } from '../fixtures/create-sample.ts';

const size = 160;
const { ground, scan } = createRecipe();

function condition(shiftsPx: readonly (readonly [number, number])[], section = ground) {
  const { sample } = createBiasMaps({ seed: 'further', size, biasesV: [5.9, 5], contactM2: 60e-18, layersAt: () => 11, contactDecades: 0.2, shiftsPx });
  const channel = channelOf(sample, 'current')!;
  const { current } = conditionCurrent(channel, sample.grid, section, scan, { slowUp: false });
  return { first: measuredOnly(current), current, ...conditionFurther(sample, channel, current, section, scan, { slowUp: false }) };
}

/** Scatter of the log ratio, decades, which registration has to make small; and the pixels that it is known at. */
function scatter(first: Float32Array, other: Float32Array): { decades: number; known: number } {
  const ratio = first.map((value, i) => value - other[i]!).filter((value) => !Number.isNaN(value));
  const middle = median(ratio);
  return { decades: median(ratio.map((value) => Math.abs(value - middle))), known: ratio.length / first.length };
}

for (const [dx, dy] of [[0, 0], [3, -2], [1.5, 0.5], [-9.3, 12.6]] as const) {
  test(`a scan ${dx} pixels to the right and ${dy} down is laid over the first, to a part of a pixel`, () => {
    const { first, further, warnings } = condition([[0, 0], [dx, dy]]);
    assert.deepEqual(warnings, []);
    const { shift, log10, biasV, source } = further[0]!;
    assert.deepEqual([biasV, source], [5, 'made.current.5V']);
    assert.ok(Math.abs(shift!.dxPx - dx) < 0.1 && Math.abs(shift!.dyPx - dy) < 0.1, `${shift!.dxPx}, ${shift!.dyPx}`);
    const { decades, known } = scatter(first, log10);
    assert.ok(decades < 0.002, `${decades}`);
    assert.ok(known > 0.8, `${known}`);
  });
}

test('with ground.align off a map stays where it was scanned', () => {
  const { first, further } = condition([[0, 0], [3, -2]], { ...ground, align: false });
  assert.equal(further[0]!.shift, undefined);
  assert.ok(scatter(first, further[0]!.log10).decades > 0.01);
});

test('censored and repaired pixels, and those within 10σ of zero, count as missing', () => {
  const { current } = condition([[0, 0], [0, 0]]);
  const marked = { ...current, repaired: { ...current.repaired, data: current.repaired.data.map((value, i) => (i === 7 ? 1 : value)) } } as typeof current;
  const known = measuredOnly(marked);
  assert.ok(Number.isNaN(known[7]!));
  known.forEach((value, i) => {
    if (current.saturated.data[i] === 1 || current.floor.data[i] === 1 || current.log10.data[i]! < Math.log10(current.floorA * (10 / 3))) assert.ok(Number.isNaN(value));
    else if (i !== 7) assert.equal(value, current.log10.data[i]);
  });
});
