/** The map: where things lie, and what is asked of the computation. */
import { assert } from 'chai';
import { profileAxis, profilePath } from '../../web/map/cut-plot.ts';
import { drawMap } from '../../web/map/draw-map.ts';
import { Latest } from '../../web/map/latest.ts';
import { placeLabels } from '../../web/map/place-labels.ts';
import { axisOf, firstLimits, layerTicks, referenceMark, roundTicks, shareOf, valueAt } from '../../web/map/value-axis.ts';
import { boxOnStage, centreView, fitView, panView, roundLength, toSample, toStage, visiblePart, zoomView } from '../../web/map/view.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { settled, summary } from './fake-sample.ts';

const extent = { columns: 200, rows: 100, widthUm: 10, heightUm: 10 };
const stage = { width: 600, height: 400 };
const info = (name: string) => summary.maps.find((map) => map.name === name)!;

describe('the view', () => {
  it('fits the whole map in the middle', () => {
    assert.deepEqual(fitView(extent, stage), { scale: 40, leftUm: -2.5, topUm: 0 });
  });

  it('keeps the point under the cursor while zooming', () => {
    const before = fitView(extent, stage);
    const after = zoomView(before, 3, 350, 120, extent, stage);
    assert.closeTo(after.scale, 120, 1e-9);
    assert.closeTo(toSample(after, 350, 120, extent)!.xUm, toSample(before, 350, 120, extent)!.xUm, 1e-9);
    assert.closeTo(toSample(after, 350, 120, extent)!.yUm, toSample(before, 350, 120, extent)!.yUm, 1e-9);
  });

  it('counts y upwards from the lower edge, and there and back is the same place', () => {
    const view = zoomView(fitView(extent, stage), 2, 100, 100, extent, stage);
    const place = toSample(view, 333, 222, extent)!;
    assert.isAbove(toSample(view, 333, 200, extent)!.yUm, place.yUm);
    const back = toStage(view, place.xUm, place.yUm, extent);
    assert.closeTo(back.x, 333, 1e-9);
    assert.closeTo(back.y, 222, 1e-9);
    assert.isUndefined(toSample(fitView(extent, stage), 10, 10, extent));
  });

  it('never loses the map when it is dragged far', () => {
    const far = panView(fitView(extent, stage), 1e5, -1e5, extent, stage);
    assert.isDefined(toSample(far, 300, 200, extent));
  });

  it('asks for the visible part only, in pixels of the screen, with unequal pitches', () => {
    const whole = visiblePart(fitView(extent, stage), extent, stage, 2)!;
    assert.deepEqual(whole, { part: { left: 0, top: 0, columns: 200, rows: 100 }, picture: { width: 800, height: 800 } });
    const near = visiblePart({ scale: 100, leftUm: 2, topUm: 8 }, extent, stage, 1)!;
    assert.deepEqual(near, { part: { left: 40, top: 80, columns: 120, rows: 20 }, picture: { width: 600, height: 200 } });
    assert.deepEqual(boxOnStage(near.part, { scale: 100, leftUm: 2, topUm: 8 }, extent), { left: 0, top: 0, width: 600, height: 200 });
    assert.isUndefined(visiblePart({ scale: 100, leftUm: 20, topUm: 0 }, extent, stage, 1));
  });

  it('centres a place without uncovering ground beside the map', () => {
    const view = centreView(fitView(extent, stage), 9.9, 0.1, 200, extent, stage);
    assert.deepEqual(view, { scale: 200, leftUm: 7, topUm: 0 });
    const middle = centreView(fitView(extent, stage), 5, 5, 200, extent, stage);
    assert.deepEqual(middle, { scale: 200, leftUm: 3.5, topUm: 4 });
  });

  it('measures with round lengths', () => {
    assert.deepEqual([40, 61, 160, 3000].map((scale) => roundLength(scale, 150)), [2, 2, 0.5, 0.05]);
  });
});

describe('the drawing of the map', () => {
  it('moves and scales the picture at hand with the view', () => {
    const image = document.createElement('canvas');
    image.width = 2;
    image.height = 1;
    image.getContext('2d')!.putImageData(new ImageData(Uint8ClampedArray.of(255, 0, 0, 255, 0, 0, 255, 255), 2, 1), 0, 0);
    const canvas = document.createElement('canvas');
    canvas.width = 600;
    canvas.height = 400;
    const pen = canvas.getContext('2d')!;
    const colours = { background: '#010203', line: '#010203', ink: '#fff', mark: '#fff', halo: '#000' };
    const picture = { image, part: { left: 0, top: 0, columns: 200, rows: 100 } };
    const at = (x: number, y: number) => [...pen.getImageData(x, y, 1, 1).data].slice(0, 3);
    const draw = (view: ReturnType<typeof fitView>) => { drawMap(pen, { extent, stage, pixelRatio: 1, view, picture, flaw: undefined, cut: undefined, cross: undefined, colours }); };
    draw(fitView(extent, stage));
    assert.deepEqual([at(50, 100), at(290, 100), at(310, 100), at(550, 100)], [[1, 2, 3], [255, 0, 0], [0, 0, 255], [1, 2, 3]]);
    draw(panView(fitView(extent, stage), 60, 0, extent, stage));
    assert.deepEqual([at(150, 100), at(350, 100), at(370, 100)], [[1, 2, 3], [255, 0, 0], [0, 0, 255]]);
    draw(zoomView(fitView(extent, stage), 2, 100, 0, extent, stage));
    assert.deepEqual([at(490, 100), at(510, 100)], [[255, 0, 0], [0, 0, 255]]);
  });
});

describe('the axis of values', () => {
  it('turns values into shares and back', () => {
    const log = { low: 1e-12, high: 1e-9, log: true };
    assert.closeTo(shareOf(log, 1e-11), 1 / 3, 1e-12);
    assert.closeTo(valueAt(log, 1 / 3) / 1e-11, 1, 1e-12);
    assert.equal(shareOf(log, -1), 0);
    const even = { low: -1, high: 3, log: false };
    assert.equal(valueAt(even, shareOf(even, 2)), 2);
    assert.isNaN(shareOf(even, Number.NaN));
  });

  it('stays positive on a logarithmic axis also when the map is not', () => {
    const odd = { ...info('current'), low: -1e-13, least: -1e-12 };
    const axis = axisOf(odd, true);
    assert.isAbove(axis.low, 0);
    assert.isAbove(firstLimits(odd).low, 0);
    assert.isAbove(axis.high, axis.low);
  });

  it('is never empty', () => {
    const flat = { ...info('layers'), low: 12, high: 12, least: 12, most: 12 };
    assert.isAbove(firstLimits(flat).high, firstLimits(flat).low);
    assert.isAbove(axisOf(flat, false).high, axisOf(flat, false).low);
  });

  it('has ticks in layers at the rungs’ medians, bounds marked', () => {
    const ticks = layerTicks({ low: 1e-13, high: 1e-8, log: true }, summary.ladder);
    assert.deepEqual(ticks.map(({ label }) => label), ['11', '12 layers', '13', '≥15']);
    assert.closeTo(ticks[1]!.share, 3 / 5, 1e-9);
    assert.deepEqual(layerTicks({ low: 1e-11, high: 1e-8, log: true }, summary.ladder).map(({ label }) => label), ['11', '12 layers', '13']);
  });

  it('marks half a ladder step each way on the current, and the band on the glow', () => {
    const axis = { low: 1e-13, high: 1e-8, log: true };
    const mark = referenceMark(axis, info('current'), summary, 3)!;
    assert.closeTo(mark.to - mark.from, 0.8 / 5, 1e-9);
    const band = referenceMark({ low: 0.1, high: 10, log: true }, info('glow'), summary, 3)!;
    assert.closeTo(band.to - band.from, Math.log10(9) / 2, 1e-9);
    assert.isUndefined(referenceMark({ low: 0, high: 1, log: false }, info('height'), summary, 3));
  });

  it('has round values, whole ones for layers', () => {
    assert.deepEqual(roundTicks({ low: 3e-13, high: 2e-9, log: true }).map(({ value }) => value), [1e-12, 1e-11, 1e-10, 1e-9]);
    assert.deepEqual(roundTicks({ low: -1, high: 20, log: false }).map(({ value }) => value), [0, 5, 10, 15, 20]);
    assert.deepEqual(roundTicks({ low: 11.5, high: 13.6, log: false }, true).map(({ value }) => value), [12, 13]);
  });
});

describe('labels along a line', () => {
  it('never overlap, stay inside, and always show the two heaviest', () => {
    const random = seededRandom('labels');
    for (let trial = 0; trial < 300; trial++) {
      const labels = Array.from({ length: 2 + random.integer(10) }, (_, i) => ({ x: 400 * random.uniform(), width: 30 + 30 * random.uniform(), weight: i < 2 ? 2 : 1 }));
      const lefts = placeLabels(labels, 400, 6);
      assert.isDefined(lefts[0]);
      assert.isDefined(lefts[1]);
      const boxes = lefts.flatMap((left, i) => (left === undefined ? [] : [{ left, right: left + labels[i]!.width }])).sort((a, b) => a.left - b.left);
      boxes.forEach((box, i) => {
        assert.isAtLeast(box.left, -1e-9);
        assert.isAtMost(box.right, 400 + 1e-9);
        if (i > 0) assert.isAtLeast(box.left, boxes[i - 1]!.right + 6 - 1e-9);
      });
    }
  });
});

describe('questions one at a time', () => {
  it('has one in flight, and of those asked meanwhile asks only the last', async () => {
    const asked: number[] = [];
    const answered: number[] = [];
    const failed: number[] = [];
    const release: (() => void)[] = [];
    const latest = new Latest<number, number>(
      async (n) => { asked.push(n); await new Promise<void>((resolve) => { release.push(resolve); }); if (n === 4) throw new Error('no'); return n; },
      (n) => { answered.push(n); }, (n) => { failed.push(n); },
    );
    for (const n of [1, 2, 3, 4]) latest.ask(n);
    assert.deepEqual(asked, [1]);
    release[0]!();
    await settled();
    assert.deepEqual(asked, [1, 4]);
    release[1]!();
    await settled();
    assert.deepEqual([answered, failed], [[1], [4]]);
    latest.ask(5);
    latest.forget();
    release[2]!();
    await settled();
    assert.deepEqual(answered, [1]);
  });
});

describe('the profile of a cut', () => {
  it('breaks where values are missing', () => {
    const values = Float32Array.of(0, 1, Number.NaN, 1, 0);
    assert.equal(profilePath(values, { low: 0, high: 1, log: false }, 100, 50), 'M0.0 50.0L25.0 0.0M75.0 0.0L100.0 50.0');
    assert.isUndefined(profileAxis(Float32Array.of(Number.NaN), false));
    assert.isAbove(profileAxis(Float32Array.of(-1, 1e-3, 1), true)!.low, 0);
  });
});
