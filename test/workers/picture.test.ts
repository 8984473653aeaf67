import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { cividis } from '../../src/report/cividis.ts';
import { causeAppearance, isHatchInk } from '../../src/report/appearance.ts';
import { ComputeError } from '../../workers/api.ts';
import type { Picture, PictureRequest } from '../../workers/api.ts';
import { causeMix } from '../../workers/picture-causes.ts';
import { outlineColours } from '../../workers/picture-outline.ts';
import { drawPicture, missingColour } from '../../workers/picture.ts';
import { codes, createAppraisal, currentsA, grid, heightsM } from '../fixtures/create-appraisal.ts';

const { columns, rows } = grid;
const appraised = createAppraisal();

/** The whole height map, one picture pixel per map pixel, 0 to 20 nm. */
function whole(change: Partial<PictureRequest> = {}): PictureRequest {
  return { id: '', map: 'height', left: 0, top: 0, columns, rows, width: columns, height: rows, low: 0, high: 20, log: false, causes: 'none', pixelRatio: 1, ...change };
}

function at({ rgba, width }: Picture, x: number, y: number): number[] {
  return Array.from(rgba.subarray(4 * (y * width + x), 4 * (y * width + x) + 4));
}

const shade = (share: number): number[] => [...cividis(Math.round(255 * share)), 255];
const channels = (colour: string): number[] => [1, 3, 5].map((start) => Number.parseInt(colour.slice(start, start + 2), 16));
/** A colour mixed over another, rounded as the picture's bytes are. */
const mixed = (under: readonly number[], over: readonly number[], share: number): number[] => [...Uint8ClampedArray.from([0, 1, 2], (k) => (1 - share) * under[k]! + share * over[k]!), 255];

describe('a picture', () => {
  it('shows each pixel in the colour of its value, missing ones in slate', () => {
    const picture = drawPicture(appraised, whole());
    for (let i = 0; i < codes.length; i++) {
      const nm = Math.fround(heightsM[i]!) * 1e9;
      assert.deepEqual(at(picture, i % columns, Math.floor(i / columns)), Number.isNaN(nm) ? [...missingColour, 255] : shade(nm / 20), `pixel ${i}`);
    }
  });

  it('magnifies by the nearest pixel', () => {
    const picture = drawPicture(appraised, whole({ left: 3, top: 0.5, columns: 2, rows: 2, width: 8, height: 8 }));
    // Columns 3–5, rows 0.5–2.5: the bubble (20 nm) fills the right half from row 1 on.
    for (let y = 0; y < 8; y++) for (let x = 0; x < 8; x++) {
      assert.deepEqual(at(picture, x, y), shade(x >= 4 && y >= 2 ? 1 : 0.25 / 20), `${x}, ${y}`);
    }
  });

  it('reduces by the mean of the values present', () => {
    const picture = drawPicture(appraised, whole({ columns: 6, rows: 8, width: 3, height: 4 }));
    // Rows 0–1, columns 4–5: two of ground, two of bubble. Rows 2–3, columns 0–1: three of ground, one missing.
    assert.deepEqual(at(picture, 2, 0), shade((0.25 + 20) / 2 / 20));
    assert.deepEqual(at(picture, 0, 1), shade(0.25 / 20));
  });

  it('is transparent beside the map', () => {
    const picture = drawPicture(appraised, whole({ left: -1, top: -1, columns: columns + 2, rows: rows + 2, width: columns + 2, height: rows + 2 }));
    assert.deepEqual(at(picture, 0, 0), [0, 0, 0, 0]);
    assert.deepEqual(at(picture, columns + 1, 3), [0, 0, 0, 0]);
    assert.deepEqual(at(picture, 1, 1), shade(0.25 / 20));
  });

  it('spends its colours evenly on decades when it is logarithmic', () => {
    const picture = drawPicture(appraised, whole({ map: 'current', low: 1e-12, high: 1e-8, log: true }));
    const i = codes.indexOf(9);
    // `conditioned` is half as much again as the current of the fixture.
    assert.deepEqual(at(picture, i % columns, Math.floor(i / columns)), shade(Math.log10(1.5 * currentsA[i]! / 1e-12) / 4));
    assert.deepEqual(at(picture, 4, 1), shade(0), 'below the limit: the lowest colour');
    assert.deepEqual(at(picture, 4, 3), shade(1), 'above the limit: the highest colour');
  });

  it('refuses what it cannot draw', () => {
    for (const change of [{ width: 0 }, { columns: 0 }, { low: 2, high: 1 }, { low: 0, log: true }, { left: Number.NaN }, { width: 1e6 }, { pixelRatio: 0 }] satisfies Partial<PictureRequest>[]) {
      assert.throws(() => drawPicture(appraised, whole(change)), (error) => error instanceof ComputeError && error.code === 'request-value', JSON.stringify(change));
    }
    const { barrier: _, ...without } = appraised;
    assert.throws(() => drawPicture(without, whole({ map: 'layers' })), (error) => error instanceof ComputeError && error.code === 'map-absent');
  });
});

describe('causes over a map', () => {
  const plain = drawPicture(appraised, whole({ width: columns * 16, height: rows * 16 }));

  it('let the map show through, hatched in screen pixels, usable ground clear', () => {
    const picture = drawPicture(appraised, whole({ width: columns * 16, height: rows * 16, causes: 'all' }));
    const { fill, ink, hatch } = causeAppearance.bubble;
    let inked = 0;
    for (let y = 16; y < 48; y++) for (let x = 64; x < 96; x++) {
      const isInk = isHatchInk(hatch, x, y);
      if (isInk) inked++;
      assert.deepEqual(at(picture, x, y), mixed(at(plain, x, y), channels(isInk ? ink : fill), isInk ? causeMix.ink : causeMix.fill), `${x}, ${y}`);
    }
    assert.ok(inked > 100 && inked < 900);
    assert.ok(causeMix.fill >= 0.35 && causeMix.fill <= 0.45);
    assert.deepEqual(at(picture, 2 * 16 + 5, 7), at(plain, 2 * 16 + 5, 7), 'usable');
    assert.deepEqual(at(picture, 3, 3), mixed(at(plain, 3, 3), [0, 0, 0], causeMix.dim), 'outside the footprint');
  });

  it('make hatches twice as coarse on a screen of twice the pixels', () => {
    const once = drawPicture(appraised, whole({ width: columns * 16, height: rows * 16, causes: 'all' }));
    const twice = drawPicture(appraised, whole({ width: columns * 32, height: rows * 32, causes: 'all', pixelRatio: 2 }));
    for (let y = 0; y < rows * 16; y++) for (let x = 0; x < columns * 16; x++) assert.deepEqual(at(twice, 2 * x + 1, 2 * y), at(once, x, y));
  });

  it('move with the map, so that two halves join', () => {
    const all = drawPicture(appraised, whole({ width: columns * 15, height: rows * 15, causes: 'all' }));
    const right = drawPicture(appraised, whole({ left: 3, columns: 3, width: 45, height: rows * 15, causes: 'all' }));
    for (let y = 0; y < rows * 15; y++) for (let x = 0; x < 45; x++) assert.deepEqual(at(right, x, y), at(all, x + 45, y), `${x}, ${y}`);
  });

  it('dim everything but the ones picked out', () => {
    const picture = drawPicture(appraised, whole({ width: columns * 16, height: rows * 16, causes: [6] }));
    const short = channels(causeAppearance.short.fill);
    assert.deepEqual(at(picture, 4 * 16 + 8, 3 * 16 + 8), mixed(at(plain, 72, 56), short, causeMix.fill));
    for (const [x, y] of [[5, 1], [2, 0], [0, 0]] as const) assert.deepEqual(at(picture, 16 * x + 8, 16 * y + 8), mixed(at(plain, 16 * x + 8, 16 * y + 8), [0, 0, 0], causeMix.dim));
  });

  it('show the most common cause where the picture is coarser than the map', () => {
    const picture = drawPicture(appraised, whole({ columns: 6, rows: 8, width: 2, height: 2, causes: [1] }));
    const under = drawPicture(appraised, whole({ columns: 6, rows: 8, width: 2, height: 2 }));
    // Rows 4–7, columns 0–2: thick, wrinkle and residue three times each, no usable. Rows 0–3, columns 0–2: usable most often.
    assert.deepEqual(at(picture, 0, 1), mixed(at(under, 0, 1), [0, 0, 0], causeMix.dim));
    assert.deepEqual(at(picture, 0, 0), mixed(at(under, 0, 0), channels(causeAppearance.usable.fill), causeMix.fill));
  });
});

describe('the outline of a flaw', () => {
  it('runs around it in two lines and leaves it free', () => {
    const request = whole({ width: columns * 10, height: rows * 10 });
    const plain = drawPicture(appraised, request);
    const picture = drawPicture(appraised, { ...request, flaw: 1 });
    // Flaw 1 fills columns 4–5, rows 1–2.
    for (let y = 10; y < 30; y++) for (let x = 40; x < 60; x++) assert.deepEqual(at(picture, x, y), at(plain, x, y));
    assert.deepEqual(at(picture, 39, 20), [...outlineColours.inner, 255]);
    assert.deepEqual(at(picture, 38, 20), [...outlineColours.inner, 255]);
    assert.deepEqual(at(picture, 37, 20), [...outlineColours.outer, 255]);
    assert.deepEqual(at(picture, 35, 20), at(plain, 35, 20));
    assert.deepEqual(at(picture, 50, 9), [...outlineColours.inner, 255]);
  });

  it('does not lose a flaw smaller than a picture pixel', () => {
    const request = whole({ width: 2, height: 8 });
    const picture = drawPicture(appraised, { ...request, flaw: 4 });
    assert.notDeepEqual(picture.rgba, drawPicture(appraised, request).rgba);
  });
});
