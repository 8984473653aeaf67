/** Scans painted with the model's own currents, kept outside the project (../shared/scenes); skipped where they are not at hand. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { wkbModel } from '../../src/barrier/model/wkb.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { StageCache } from '../../src/evaluate/stage-cache.ts';
import { codeOf } from '../../src/ledger/book-causes.ts';
import { median } from '../../src/stats/median.ts';
import { answerOf } from '../accuracy/score-answer.ts';
import { scoreScene } from '../accuracy/score-scene.ts';
import { sharedNames, sharedScene } from '../accuracy/shared-scenes.ts';
import { createRecipe } from '../fixtures/create-sample.ts';

const names = sharedNames().filter((name) => name.startsWith('model-'));
const layerM = 0.333e-9;
const stack = { biasV: 4 };

test('outside: model scenes are at hand', { skip: names.length === 0 && 'no ../shared/scenes' }, () => assert.ok(names.length > 0));

for (const name of names) {
  test(`outside: ${name}, with the reference's count: layers within 0.1 (median), usable share within 0.02 at 4 V [known truth]`, async () => {
    const { sample, truth } = await sharedScene(name, { stack });
    const cache = new StageCache(2e8);
    // The truth's bands lie around its most common terrace.
    const counts = new Map<number, number>();
    truth.layers.forEach((layers, i) => { if (truth.codes[i] === codeOf('usable')) counts.set(layers, (counts.get(layers) ?? 0) + 1); });
    const [referenceLayers] = [...counts].sort((a, b) => b[1] - a[1])[0]!;
    const counted = evaluate(sample, createRecipe({ stack, barrier: { referenceLayers } }), { cache });
    const thickness = counted.barrier!.thickness!.data;
    const off: number[] = [];
    truth.codes.forEach((code, i) => {
      if ([codeOf('usable'), codeOf('thin'), codeOf('thick')].includes(code) && !Number.isNaN(thickness[i]!)) off.push(Math.abs(thickness[i]! / layerM - truth.layers[i]!));
    });
    assert.ok(median(off) <= 0.1, `${median(off)} layers`);
    const [found, there] = scoreScene(answerOf(counted), truth).usable;
    assert.ok(Math.abs(found - there) <= 0.02, `${found} for ${there}`);

    // Without the count the interval of the density on the reference still holds what that ground carries.
    const { barrier } = evaluate(sample, createRecipe({ stack }), { cache });
    const own: number[] = [];
    barrier!.step.data.forEach((step, i) => { if (step === 0 && truth.codes[i] !== codeOf('bubble')) own.push(truth.layers[i]!); });
    const carried = wkbModel.density({ heightEv: 2.5, massRatio: 0.5, thicknessM: median(own) * layerM }, 4);
    const { low95, high95 } = barrier!.device!;
    assert.ok(low95 < carried && carried < high95, `${low95}–${high95} A/m² without ${carried}`);
    // And what the measured ground does not say is not claimed: a decade of contact area is a factor of three either way at least.
    assert.ok(high95 / low95 > 4, `${high95 / low95}`);
  });
}
