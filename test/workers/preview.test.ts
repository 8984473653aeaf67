import assert from 'node:assert/strict';
import { before, describe, it } from 'node:test';
import { demoFiles } from '../../src/demo/demo-samples.ts';
import type { PictureRequest, SampleSummary } from '../../workers/api.ts';
import { createCompute } from '../../workers/compute.ts';
import type { LocalCompute } from '../../workers/local-compute.ts';
import { markColour } from '../../workers/picture-marks.ts';
import { drawPicture } from '../../workers/picture.ts';
import { createAppraisal, grid } from '../fixtures/create-appraisal.ts';

const size = 320;

describe('a quick look', () => {
  let compute: LocalCompute;
  let id: string;
  let summary: SampleSummary;
  const picture = (): PictureRequest => ({ id, map: 'height', left: 0, top: 0, columns: size, rows: size, width: size, height: size, low: 0, high: 10, log: false, causes: 'all', pixelRatio: 1 });
  const share = (entries: SampleSummary['ledger'], cause: string): number => entries.find((entry) => entry.cause === cause)?.share ?? 0;

  before(async () => {
    compute = createCompute();
    [{ id }] = (await compute.open(demoFiles('quarry-07', size).map(({ name, bytes }) => ({ name, content: bytes as Uint8Array<ArrayBuffer> })))).samples as unknown as [{ id: string }];
    summary = await compute.appraise(1, id, {});
  });

  it('comes near the result of its recipe, from every n-th pixel', async () => {
    for (const flaws of [{}, { heightNm: 3 }]) {
      const look = await compute.preview({ id, recipe: { flaws } });
      const full = await compute.appraise(2, id, { flaws });
      assert.equal(look.everyPx, 2);
      for (const { cause } of full.ledger) assert.ok(Math.abs(share(look.ledger, cause) - share(full.ledger, cause)) < 0.02, `${cause}: ${share(look.ledger, cause)} for ${share(full.ledger, cause)}`);
      assert.ok(Math.abs(look.ledger.reduce((sum, entry) => sum + entry.areaUm2, 0) - full.footprintUm2) < 1e-6 * full.footprintUm2);
      assert.equal(look.thresholds!.heightNm, full.thresholds!.heightNm);
    }
    await compute.appraise(3, id, {});
  });

  it('shows the result itself where nothing is changed', async () => {
    for (const request of [{ id, recipe: {} }, { id, recipe: {}, picture: picture() }]) {
      const look = await compute.preview(request);
      assert.deepEqual(look.ledger.map(({ cause, areaUm2 }) => [cause, areaUm2.toPrecision(9)]), summary.ledger.map(({ cause, areaUm2 }) => [cause, areaUm2.toPrecision(9)]));
      assert.equal(look.flaws.bubble, summary.flaws.filter(({ cause }) => cause === 'bubble').length);
      assert.equal(look.usableUm2, look.ledger.find(({ cause }) => cause === 'usable')!.areaUm2);
      assert.equal(look.picture !== undefined, 'picture' in request);
    }
  });

  it('follows a threshold, draws what it found, and changes nothing of what is on show', async () => {
    const shown = await compute.picture(picture());
    const point = await compute.point(id, 1, 1);
    const [low, high] = [await compute.preview({ id, recipe: {}, picture: picture() }), await compute.preview({ id, recipe: { flaws: { heightNm: 20 } }, picture: picture() })];
    const flawed = (entries: SampleSummary['ledger']): number => ['bubble', 'residue', 'wrinkle'].reduce((sum, cause) => sum + share(entries, cause), 0);
    assert.ok(flawed(high.ledger) < flawed(low.ledger));
    assert.ok(high.flaws.bubble < low.flaws.bubble);
    assert.notDeepEqual(high.picture!.rgba, low.picture!.rgba);
    assert.deepEqual(await compute.picture(picture()), shown);
    assert.deepEqual(await compute.point(id, 1, 1), point);
  });

  it('keeps to the ground of the last appraisal', async () => {
    const plain = await compute.preview({ id, recipe: {} });
    assert.deepEqual(await compute.preview({ id, recipe: { ground: { order: 0, lines: false } } }), plain);
    assert.ok(share(plain.ledger, 'usable') > 0 && summary.usable.areaUm2 > 0);
  });

  it('refuses a recipe that is none, and a sample that is not there', async () => {
    await assert.rejects(compute.preview({ id, recipe: { flaws: { heightNm: -1 } } }), /flaws\.heightNm/);
    await assert.rejects(compute.preview({ id: 'nobody', recipe: {} }), { code: 'sample-unknown' });
  });
});

describe('repaired pixels', () => {
  const { columns, rows } = grid;
  const base: PictureRequest = { id: '', map: 'height', left: 0, top: 0, columns, rows, width: columns, height: rows, low: 0, high: 20, log: false, causes: 'none', pixelRatio: 1 };
  const appraised = createAppraisal();
  const index = 2 * columns + 3;
  const height = appraised.ground.height!;
  const marked = { ...appraised, ground: { ...appraised.ground, height: { ...height, repaired: { ...height.repaired, data: Uint8Array.from({ length: columns * rows }, (_, i) => Number(i === index)) } as typeof height.repaired } } };
  const isMarked = (rgba: Uint8ClampedArray, i: number): boolean => markColour.every((value, k) => rgba[4 * i + k] === value);

  it('are marked when asked, one by one, and only on maps of their own quantity', () => {
    const { rgba } = drawPicture(marked, { ...base, repaired: true });
    for (let i = 0; i < columns * rows; i++) assert.equal(isMarked(rgba, i), i === index, `pixel ${i}`);
    assert.ok(!isMarked(drawPicture(marked, base).rgba, index));
    assert.ok(!isMarked(drawPicture(marked, { ...base, map: 'current', low: 1e-13, high: 1e-9, repaired: true }).rgba, index));
  });

  it('are seen on a reduced picture too', () => {
    const { rgba, width, height: tall } = drawPicture(marked, { ...base, width: 2, height: 2, repaired: true });
    assert.equal(Array.from({ length: width * tall }, (_, i) => isMarked(rgba, i)).filter(Boolean).length, 1);
  });
});
