/** Correcting flaws by hand: drawing by pointer and keys, tools, corrections with their names, undo. */
import { assert } from 'chai';
import { correctionEntry } from '../../src/flaws/correction-recipe.ts';
import type { Correction } from '../../workers/api.ts';
import { drawHand } from '../../web/hand/draw-hand.ts';
import { Drawing } from '../../web/hand/drawing.ts';
import type { PointUm } from '../../web/hand/hand.ts';
import { dismissFlaw, drawn, firstWidthUm, mergeFlaws, setCause } from '../../web/hand/hand.ts';
import { HandTools } from '../../web/hand/hand-tools.ts';
import type { Chapter } from '../../web/sample/chapter.ts';
import type { CorrectionEvent } from '../../web/sample/events.ts';
import { SamplePlace } from '../../web/sample/sample-place.ts';
import { correct, takeOutCorrection } from '../../web/session/actions/correct.ts';
import { redo, undo } from '../../web/session/actions/move-in-history.ts';
import { openFiles } from '../../web/session/actions/open-files.ts';
import { restore, serialise } from '../../web/session/document.ts';
import { correctionsOf, emptyRecipe, recipeOf, withCorrection, withoutCorrection } from '../../web/session/recipe.ts';
import { Session } from '../../web/session/session.ts';
import { FakeCompute, createSummary, settle } from './fake-compute.ts';
import { facts, fakeCompute, flaws, mount, sampleState, settled, summary, unmountAll } from './fake-sample.ts';
import type { FakeCompute as FakeSampleCompute } from './fake-sample.ts';

const plainSpaces = (text: string | null | undefined): string => (text ?? '').replace(/\s+/g, ' ').trim();

describe('a drawing', () => {
  const paths: (readonly PointUm[])[] = [];
  const make = (kind: 'stroke' | 'line' | 'corners'): Drawing => {
    paths.length = 0;
    return new Drawing(kind, (path) => { paths.push(path); }, () => {});
  };

  it('a stroke takes the way of a held pointer, a click makes a dot, a second finger drops it', () => {
    const drawing = make('stroke');
    drawing.pointer('start', [1, 1], false, 0.1);
    for (const x of [1.05, 1.2, 1.25, 1.4]) drawing.pointer('move', [x, 1], true, 0.1);
    drawing.pointer('end', [1.6, 1], true, 0.1);
    drawing.pointer('start', [3, 3], false, 0.1);
    drawing.pointer('end', [3, 3], false, 0.1);
    drawing.pointer('start', [4, 4], false, 0.1);
    drawing.pointer('move', [5, 5], true, 0.1);
    drawing.pointer('cancel', [0, 0], false, 0.1);
    drawing.pointer('end', [6, 6], true, 0.1);
    assert.deepEqual(paths, [[[1, 1], [1.2, 1], [1.4, 1], [1.6, 1]], [[3, 3]]]);
    assert.deepEqual(drawing.settling, paths);
    drawing.settled();
    assert.deepEqual(drawing.settling, []);
  });

  it('a line is a drag, or two clicks', () => {
    const drawing = make('line');
    drawing.pointer('start', [1, 1], false, 0.1);
    drawing.pointer('move', [2, 2], true, 0.1);
    drawing.pointer('end', [3, 3], true, 0.1);
    for (const at of [[1, 0], [2, 0]] as const) {
      drawing.pointer('start', at, false, 0.1);
      drawing.pointer('end', at, false, 0.1);
    }
    assert.deepEqual(paths, [[[1, 1], [3, 3]], [[1, 0], [2, 0]]]);
  });

  it('an outline closes at its first corner or by its last one again, never with two', () => {
    const drawing = make('corners');
    for (const at of [[0, 0], [1, 0], [1, 0]] as const) drawing.add(at, 0.1);
    assert.deepEqual(paths, []);
    assert.equal(drawing.points.length, 2);
    for (const at of [[1, 1], [0.05, 0]] as const) drawing.add(at, 0.1);
    for (const at of [[5, 5], [6, 5], [6, 6], [6, 6]] as const) drawing.add(at, 0);
    assert.deepEqual(paths, [[[0, 0], [1, 0], [1, 1]], [[5, 5], [6, 5], [6, 6]]]);
  });

  it('takes corners back, and drops all', () => {
    const drawing = make('corners');
    drawing.add([0, 0], 0.1);
    drawing.add([1, 0], 0.1);
    assert.isTrue(drawing.back());
    assert.deepEqual(drawing.points, [[0, 0]]);
    assert.isTrue(drawing.cancel());
    assert.isFalse(drawing.back() || drawing.cancel());
  });
});

describe('corrections by hand', () => {
  it('are what a recipe takes, in metres and never numbers, whatever the tool', () => {
    const path: PointUm[] = [[1.00004999, 2], [3, 4], [5, 6]];
    const flaw = { ...flaws[0]!, insideUm: [2.01, 7.02] as const };
    const all = [
      setCause(flaw, 'residue'), dismissFlaw(flaw), mergeFlaws(flaw, flaws[1]!), drawn({ tool: 'split' }, path), drawn({ tool: 'brush', as: 'short', widthUm: 0.2 }, path),
      drawn({ tool: 'brush', as: 'none', widthUm: 0.2 }, path), drawn({ tool: 'outline', as: 'bubble' }, path), drawn({ tool: 'outline', as: 'none' }, path),
    ].map((named) => named!);
    assert.deepEqual(all.map(({ label }) => label), [
      'flaw set to residue', 'flaw dismissed', 'flaws merged', 'flaw split', 'short painted', 'flaws erased', 'outline filled with bubble', 'outline cleared',
    ]);
    for (const { correction } of all) assert.isTrue(correctionEntry.safeParse(correction).success, JSON.stringify(correction));
    assert.deepEqual(all[0]!.correction, { kind: 'reclassify', xUm: 2.01, yUm: 7.02, cause: 'residue' });
    assert.deepEqual((all[3]!.correction as { readonly pointsUm: readonly PointUm[] }).pointsUm[0], [1, 2]);
  });

  it('begin with a brush that suits the map', () => {
    assert.deepEqual([10, 2, 100].map(firstWidthUm), [0.2, 0.05, 2]);
  });

  it('stand behind each other in the recipe; one taken out leaves the rest, the last one no trace', () => {
    const [a, b] = [dismissFlaw(flaws[0]!).correction, dismissFlaw(flaws[1]!).correction];
    const both = withCorrection(withCorrection(emptyRecipe, a), b);
    assert.deepEqual(correctionsOf(both), [a, b]);
    assert.deepEqual(correctionsOf(withoutCorrection(both, 0)), [b]);
    assert.deepEqual(withoutCorrection(withCorrection(emptyRecipe, a), 0), emptyRecipe);
    assert.equal(withoutCorrection(both, 2), both);
  });

  it('go through the history of the session, with their names, and into its document', async () => {
    const compute = new FakeCompute();
    const session = new Session(compute);
    compute.reply = { samples: [{ id: 'a', name: 'a', files: ['a.tif'] }], skipped: [], failed: [] };
    void session.do(openFiles, [new File(['x'], 'a.tif')]);
    await settle();
    compute.last('a').answer(createSummary('a'));
    await settle();
    const { correction, label } = setCause(flaws[0]!, 'residue');
    void session.do(correct, 'a', correction, label);
    assert.deepEqual(compute.last('a').recipe, { ...emptyRecipe, corrections: [correction] });
    assert.equal(session.sample('a')!.history.at(-1)!.label, 'flaw set to residue');
    void session.do(undo, 'a');
    assert.deepEqual(compute.last('a').recipe, emptyRecipe);
    void session.do(redo, 'a');
    assert.deepEqual(correctionsOf(compute.last('a').recipe), [correction]);
    assert.deepEqual(correctionsOf(recipeOf(restore(serialise(session.state)).samples[0]!)), [correction]);
    void session.do(takeOutCorrection, 'a', 0, 'correction taken out');
    assert.deepEqual(compute.last('a').recipe, emptyRecipe);
    void session.do(undo, 'a');
    assert.deepEqual(correctionsOf(compute.last('a').recipe), [correction]);
  });
});

describe('the tools in the sample’s place', () => {
  afterEach(unmountAll);
  let compute: FakeSampleCompute;
  let heard: { correction: Correction; label: string }[];

  async function open(): Promise<SamplePlace> {
    compute = fakeCompute();
    heard = [];
    const place = await mount(Object.assign(new SamplePlace(), { sample: sampleState(), facts, compute }), 1440, 850);
    place.addEventListener('correction', (event) => { heard.push((event as CorrectionEvent).detail); });
    (chapter(place) as unknown as Chapter).open = true;
    await settled();
    return place;
  }
  const chapter = (place: SamplePlace) => place.renderRoot.querySelector<HTMLElement & { shadowRoot: ShadowRoot }>('eg-chapter-flaws')!;
  const tools = (place: SamplePlace) => chapter(place).shadowRoot.querySelector<HandTools>('eg-hand-tools')!;
  const stage = (place: SamplePlace) => place.renderRoot.querySelector('eg-map-panel')!.shadowRoot!.querySelector('eg-map-stage')!;
  const canvas = (place: SamplePlace) => stage(place).shadowRoot!.querySelector('canvas')!;
  const strip = (place: SamplePlace) => plainSpaces(place.renderRoot.querySelector('eg-map-panel')!.shadowRoot!.querySelector('eg-hand-strip')?.shadowRoot?.textContent);
  async function press(place: SamplePlace, word: string): Promise<void> {
    const button = [...tools(place).renderRoot.querySelectorAll('button')].find((each) => plainSpaces(each.textContent) === word);
    assert.isDefined(button, word);
    button!.click();
    await settled();
  }
  async function key(place: SamplePlace, name: string): Promise<void> {
    canvas(place).dispatchEvent(new KeyboardEvent('keydown', { key: name, bubbles: true, composed: true, cancelable: true }));
    await settled();
  }
  async function pointer(place: SamplePlace, ...steps: readonly (readonly [type: string, x: number, y: number, more?: PointerEventInit])[]): Promise<void> {
    const { left, top } = canvas(place).getBoundingClientRect();
    for (const [type, x, y, more] of steps) canvas(place).dispatchEvent(new PointerEvent(`pointer${type}`, { clientX: left + x, clientY: top + y, pointerId: 5, button: 0, bubbles: true, composed: true, ...more }));
    await settled();
  }

  it('say what a selected flaw is, or that it is none', async () => {
    const place = await open();
    place.flaw = 1;
    await settled();
    const text = plainSpaces(tools(place).renderRoot.textContent);
    for (const part of ['Flaw 1 is', 'certain · smooth dome', '0.420 µm²', '0.730 µm across', '48.0 nm high', 'x 2.00, y 7.00 µm']) assert.include(text, part);
    assert.equal(tools(place).renderRoot.querySelector('[aria-label="Flaw 1 is"] [aria-pressed="true"]')?.textContent?.trim(), 'bubble');
    await press(place, 'wrinkle');
    assert.deepEqual(heard, [{ correction: { kind: 'reclassify', xUm: 2, yUm: 7, cause: 'wrinkle' }, label: 'flaw set to wrinkle' }]);
    assert.equal(place.flaw, 1);
    place.flaw = 2;
    await settled();
    const noFlaw = [...tools(place).renderRoot.querySelectorAll<HTMLElement>('.row button')].find((each) => each.textContent === 'no flaw')!;
    noFlaw.click();
    await settled();
    assert.deepEqual(heard[1]!.correction, { kind: 'dismiss', xUm: 8, yUm: 3 });
    assert.isUndefined(place.flaw);
  });

  it('merge with the next flaw that is picked, on the map or in the list; Escape lets go', async () => {
    const place = await open();
    place.flaw = 2;
    await settled();
    await press(place, 'merge with …');
    assert.include(strip(place), 'Merging flaw 2: pick the other flaw');
    await key(place, 'Escape');
    assert.equal(strip(place), '');
    assert.equal(place.flaw, 2, 'the selection stays');
    await press(place, 'merge with …');
    // Flaw 1 covers the map left of 3 µm.
    const { width, height } = canvas(place).getBoundingClientRect();
    const left = (width - Math.min(width, height)) / 2 + 20;
    await pointer(place, ['down', left, height / 2], ['up', left, height / 2]);
    assert.deepEqual(heard, [{ correction: { kind: 'merge', pointsUm: [[8, 3], [2, 7]] }, label: 'flaws merged' }]);
    assert.equal(strip(place), '');
  });

  it('paint under a held pointer and stay in hand; the map moves by two fingers only', async () => {
    const place = await open();
    await press(place, 'brush');
    assert.include(strip(place), 'Painting residue, 0.2 µm wide');
    const { width, height } = canvas(place).getBoundingClientRect();
    const scale = Math.min(width, height) / 10;
    const before = compute.pictures.length;
    await pointer(place, ['down', width / 2, height / 2], ['move', width / 2 + 10, height / 2], ['move', width / 2 + 2 * scale, height / 2], ['up', width / 2 + 2 * scale, height / 2]);
    assert.equal(heard.length, 1);
    const { correction, label } = heard[0]!;
    assert.equal(label, 'residue painted');
    assert.ok(correction.kind === 'paint' && correction.cause === 'residue' && correction.widthUm === 0.2);
    assert.closeTo(correction.pointsUm[0]![0], 5, 1e-3);
    assert.closeTo(correction.pointsUm.at(-1)![0], 7, 1e-3);
    assert.equal(compute.pictures.length, before, 'the view did not move');
    await pointer(place, ['down', 100, 100], ['down', 200, 100, { pointerId: 6 }], ['move', 260, 100, { pointerId: 6 }], ['up', 260, 100, { pointerId: 6 }], ['up', 100, 100]);
    assert.equal(heard.length, 1, 'two fingers draw nothing');
    assert.isAbove(compute.pictures.length, before);
    assert.include(strip(place), 'Painting');
    await press(place, 'short');
    assert.include(strip(place), 'Painting short');
  });

  it('erase and outline, by the keyboard alone', async () => {
    const place = await open();
    const choice = [...tools(place).renderRoot.querySelectorAll<HTMLElement>('[aria-label="Draw as"] button')].at(-1)!;
    choice.click();
    await settled();
    await press(place, 'brush');
    assert.include(strip(place), 'Erasing flaws');
    await key(place, '+');
    await key(place, 'Enter');
    await key(place, 'ArrowRight');
    await key(place, 'Enter');
    await key(place, 'Enter');
    assert.equal(heard[0]?.label, 'flaws erased');
    assert.equal((heard[0]!.correction as { readonly pointsUm: readonly unknown[] }).pointsUm.length, 2);
    await press(place, 'outline');
    for (const move of ['ArrowRight', 'ArrowUp', 'ArrowLeft', 'ArrowLeft']) {
      await key(place, move);
      await key(place, 'Enter');
    }
    await key(place, 'Backspace');
    await key(place, 'Enter');
    await key(place, 'Enter');
    const outline = heard[1]!.correction;
    assert.ok(outline.kind === 'polygon' && outline.cause === 'none');
    assert.equal(outline.pointsUm.length, 4);
    await key(place, 'ArrowUp');
    await key(place, 'Enter');
    await key(place, 'Escape');
    assert.include(strip(place), 'Outlining', 'the first Escape drops the corner');
    await key(place, 'Escape');
    assert.equal(strip(place), '');
    assert.equal(heard.length, 2);
  });

  it('split along a line once, with the way out on the map', async () => {
    const place = await open();
    place.flaw = 1;
    await settled();
    await press(place, 'split …');
    await pointer(place, ['down', 200, 100], ['move', 220, 200], ['up', 230, 300]);
    assert.equal(heard[0]!.label, 'flaw split');
    assert.equal(strip(place), '');
    await press(place, 'split …');
    place.renderRoot.querySelector('eg-map-panel')!.shadowRoot!.querySelector('eg-hand-strip')!.shadowRoot!.querySelector('button')!.click();
    await settled();
    assert.equal(strip(place), '');
  });

  it('refuse a width that is none, list what was corrected, and take one out', async () => {
    const place = await open();
    const field = tools(place).renderRoot.querySelector<HTMLInputElement>('input')!;
    field.value = '-1';
    field.dispatchEvent(new Event('change'));
    await settled();
    assert.include(plainSpaces(tools(place).renderRoot.textContent), 'Type the brush’s width in µm');
    const corrections = [dismissFlaw(flaws[0]!).correction];
    const recipe = { ...emptyRecipe, corrections };
    place.sample = sampleState({ summary: { ...summary, corrections: ['flaw at x 2.00, y 7.00 µm dismissed'], recipe }, history: [{ recipe, label: '' }] });
    await settled();
    const out: unknown[] = [];
    place.addEventListener('correction-out', (event) => { out.push((event as CustomEvent).detail); });
    assert.equal(plainSpaces(chapter(place).shadowRoot.querySelector('.count')?.textContent), '1 by hand');
    await press(place, 'take out');
    assert.deepEqual(out, [{ index: 0, label: 'correction taken out' }]);
    place.sample = { ...place.sample, history: [{ recipe: emptyRecipe, label: '' }] };
    await settled();
    assert.isTrue([...tools(place).renderRoot.querySelectorAll('button')].at(-1)!.disabled, 'the list on show is not the one in force');
  });
});

describe('a drawing on the map', () => {
  const extent = { columns: 100, rows: 100, widthUm: 10, heightUm: 10 };
  const view = { scale: 10, leftUm: 0, topUm: 0 };

  /** Colour of a canvas of 100 × 100 pixels that was grey before, at some places. */
  function colours(kind: 'stroke' | 'corners', path: readonly PointUm[], fill: string | undefined, ...places: readonly (readonly [x: number, y: number])[]): number[][] {
    const pen = Object.assign(document.createElement('canvas'), { width: 100, height: 100 }).getContext('2d')!;
    pen.fillStyle = '#808080';
    pen.fillRect(0, 0, 100, 100);
    const drawing = new Drawing(kind, () => {}, () => {});
    for (const at of path) drawing.add(at, 0);
    drawing.finish();
    assert.equal(drawing.settling.length, 1);
    drawHand(pen, view, extent, { halo: '#000000' }, { drawing, widthUm: kind === 'stroke' ? 2 : undefined, fill }, (_width, trace) => {
      pen.beginPath();
      trace();
    });
    return places.map(([x, y]) => Array.from(pen.getImageData(x, y, 1, 1).data).slice(0, 3));
  }

  it('shows a stroke as wide as the brush, in the cause’s colour, until its result is there; y goes up', () => {
    const [on, edge, off, twin] = colours('stroke', [[2, 8], [8, 8]], '#ff0000', [50, 20], [50, 28], [50, 34], [50, 80]);
    assert.isAbove(on![0]!, 180);
    assert.isBelow(on![1]!, 70);
    assert.deepEqual(edge, on);
    assert.deepEqual(off, [128, 128, 128]);
    assert.deepEqual(twin, [128, 128, 128]);
  });

  it('shows flawless ground dark, and an outline filled', () => {
    const [dark] = colours('stroke', [[5, 5]], undefined, [50, 50]);
    assert.isBelow(dark![0]!, 70);
    const [inside, outside] = colours('corners', [[1, 1], [9, 1], [1, 9]], '#00ff00', [30, 70], [80, 20]);
    assert.isAbove(inside![1]!, 150);
    assert.deepEqual(outside, [128, 128, 128]);
  });
});
