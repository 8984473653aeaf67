/** From files named by their bias to a thickness. */
import assert from 'node:assert/strict';
import { test } from 'node:test';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { writeStatement } from '../../src/read/tiff-statement.ts';
import { writeGeoTiff } from '../../src/report/geotiff-writer.ts';
import { createBiasMaps, slantedTerraces } from '../fixtures/create-bias-maps.ts';
import { createRecipe } from '../fixtures/create-sample.ts';

test('S.current.5.9V.tif and S.current.5V.tif give a thickness without the contact’s area; the larger bias is the scan’s', async () => {
  const painted = createBiasMaps({ seed: 'files', size: 128, biasesV: [5.9, 5], contactM2: 60e-18, layersAt: slantedTerraces, shiftsPx: [[0, 0], [1.4, -2.3]] }).sample;
  const files = painted.channels.map(({ quantity, biasV, values }) => {
    const height = quantity === 'height';
    const statement = writeStatement({ quantity, unit: height ? 'nm' : 'A', pitchUnit: 'um' });
    return { name: height ? 'S.height.tif' : `S.current.${biasV}V.tif`, bytes: writeGeoTiff(painted.grid, height ? values.data.map((metres) => metres * 1e9) : values.data, statement) };
  });
  const recipe = createRecipe({ stack: { biasV: 4 } });
  const { samples } = groupInputs(files.map(({ name }) => ({ name, explicit: false })));
  assert.equal(samples.length, 1);
  const sample = await readSample(samples[0]!, files, recipe.scan, sha256);
  const { ground, barrier } = evaluate(sample, recipe);
  assert.equal(ground.current!.biasV, 5.9);
  assert.deepEqual(ground.further!.map(({ biasV, source }) => [biasV, source]), [[5, 'S.current.5V.tif']]);
  assert.equal(barrier!.reference.layers, 11);
  assert.equal(barrier!.anchors.find(({ taken }) => taken)!.kind, 'biases');
  // The other one can be the scan's: then it is the first, and the device's density stays.
  const other = evaluate(await readSample(samples[0]!, files, createRecipe({ scan: { biasV: 5 } }).scan, sha256), createRecipe({ scan: { biasV: 5 }, stack: { biasV: 4 } }));
  assert.equal(other.ground.current!.biasV, 5);
  assert.equal(other.barrier!.reference.layers, 11);
  assert.ok(Math.abs(Math.log(other.barrier!.device!.median / barrier!.device!.median)) < 0.1);
});
