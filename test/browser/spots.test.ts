/** Ground picked by hand: places on the map by pointer, finger and keys, the list in the chapter, the recipe and its undo. */
import { assert } from 'chai';
import { groundSection } from '../../src/ground/recipe.ts';
import { Drawing } from '../../web/hand/drawing.ts';
import type { PointUm } from '../../web/hand/hand.ts';
import type { MapStage } from '../../web/map/map-stage.ts';
import type { Readout } from '../../web/map/readout.ts';
import type { Chapter } from '../../web/sample/chapter.ts';
import type { SpotsEvent } from '../../web/sample/events.ts';
import { SamplePlace } from '../../web/sample/sample-place.ts';
import { redo, undo } from '../../web/session/actions/move-in-history.ts';
import { openFiles } from '../../web/session/actions/open-files.ts';
import { pickSpots } from '../../web/session/actions/pick-spots.ts';
import { emptyRecipe, recipeOf, spotsOf, withSpots, withValue } from '../../web/session/recipe.ts';
import type { Spot } from '../../web/session/recipe.ts';
import { Session } from '../../web/session/session.ts';
import { FakeCompute, createSummary, settle } from './fake-compute.ts';
import { facts, fakeCompute, mount, sampleState, settled, unmountAll } from './fake-sample.ts';

const three: readonly Spot[] = [{ xUm: 1, yUm: 1 }, { xUm: 9, yUm: 1 }, { xUm: 5, yUm: 8 }];

describe('places', () => {
  it('are set one by one, a second time taken out, and end only when there are three', () => {
    const paths: (readonly PointUm[])[] = [];
    const drawing = new Drawing('places', (path) => { paths.push(path); }, () => {}, [[1, 1]]);
    drawing.add([2, 2], 0.1);
    drawing.finish();
    assert.deepEqual(paths, []);
    drawing.add([1.05, 1], 0.1);
    assert.deepEqual(drawing.points, [[2, 2]]);
    drawing.add([3, 3], 0.1);
    drawing.add([4, 3], 0.1);
    drawing.back();
    drawing.add([5, 5], 0.1);
    drawing.finish();
    assert.deepEqual(paths, [[[2, 2], [3, 3], [5, 5]]]);
  });
});

describe('spots in the recipe', () => {
  it('are what a recipe takes, leave other settings alone, and no trace when taken back', () => {
    const other = withValue(emptyRecipe, 'ground.order', 1);
    const recipe = withSpots(other, three);
    assert.deepEqual(spotsOf(recipe), three);
    assert.equal(groundSection.parse(recipe['ground']).spots.length, 3);
    assert.deepEqual(withSpots(recipe, []), other);
    assert.deepEqual(withSpots(withSpots(emptyRecipe, three), []), emptyRecipe);
    assert.equal(withSpots(recipe, [...three]), recipe);
    assert.isFalse(groundSection.safeParse({ spots: three.slice(1) }).success);
  });

  it('are one step of the history', async () => {
    const compute = new FakeCompute();
    compute.reply = { samples: [{ id: 's', name: 's', files: ['s.tif'] }], skipped: [], failed: [] };
    const session = new Session(compute);
    void session.do(openFiles, [new File([''], 's.tif')]);
    await settle();
    compute.last('s').answer(createSummary('s'));
    await settle();
    void session.do(pickSpots, 's', three, 'ground by 3 spots');
    await settle();
    assert.deepEqual(spotsOf(compute.last('s').recipe), three);
    void session.do(undo, 's');
    await settle();
    assert.deepEqual(spotsOf(recipeOf(session.sample('s')!)), []);
    void session.do(redo, 's');
    await settle();
    assert.deepEqual(spotsOf(recipeOf(session.sample('s')!)), three);
    assert.equal(session.sample('s')!.history.length, 2);
  });
});

describe('picking ground by hand', () => {
  afterEach(unmountAll);
  let place: SamplePlace;
  let heard: SpotsEvent['detail'][];

  async function open(spots: readonly Spot[] = []): Promise<void> {
    heard = [];
    const recipe = withSpots(emptyRecipe, spots);
    place = await mount(Object.assign(new SamplePlace(), { sample: sampleState({ history: [{ recipe, label: '' }] }), facts, compute: fakeCompute() }), 1440, 850);
    place.addEventListener('spots', (event) => { heard.push((event as SpotsEvent).detail); });
    place.renderRoot.querySelector<Chapter>('eg-chapter-ground')!.open = true;
    await settled();
  }
  const chapter = () => place.renderRoot.querySelector<Chapter>('eg-chapter-ground')!.renderRoot;
  const panel = () => place.renderRoot.querySelector('eg-map-panel')!.shadowRoot!;
  const stage = () => panel().querySelector<MapStage>('eg-map-stage')!;
  const canvas = () => stage().renderRoot.querySelector('canvas')!;
  async function press(root: ParentNode, word: RegExp): Promise<void> {
    const button = [...root.querySelectorAll('button')].find((each) => word.test(`${each.textContent.replace(/\s+/g, ' ').trim()} ${each.getAttribute('aria-label') ?? ''}`));
    assert.isDefined(button, String(word));
    button!.click();
    await settled();
  }
  async function tap(x: number, y: number, pointerType: string): Promise<void> {
    const { left, top } = canvas().getBoundingClientRect();
    for (const type of ['pointerdown', 'pointerup', 'pointerleave']) canvas().dispatchEvent(new PointerEvent(type, { pointerId: 7, pointerType, clientX: left + x, clientY: top + y, bubbles: true, cancelable: true }));
    await settled();
  }
  const strip = () => panel().querySelector('eg-hand-strip')?.shadowRoot;

  it('takes clicks and taps, and says when there are enough', async () => {
    await open();
    await press(chapter(), /^pick ground by hand/);
    assert.include(strip()!.textContent, 'Picking ground');
    await tap(100, 100, 'mouse');
    await tap(300, 120, 'touch');
    assert.isTrue([...strip()!.querySelectorAll('button')].find((each) => each.textContent.includes('2 of 3'))!.disabled);
    await tap(200, 300, 'touch');
    await press(strip()!, /level by these 3/);
    assert.equal(heard[0]!.spots.length, 3);
    assert.equal(heard[0]!.label, 'ground by 3 spots');
    assert.isUndefined(strip() ?? undefined, 'the tool is put away');
    const [first, second] = heard[0]!.spots;
    assert.isAbove(second!.xUm, first!.xUm);
    assert.isBelow(second!.yUm, first!.yUm, 'y goes up');
  });

  it('takes keys alone', async () => {
    await open();
    await press(chapter(), /^pick ground by hand/);
    const key = async (name: string): Promise<void> => {
      canvas().dispatchEvent(new KeyboardEvent('keydown', { key: name, bubbles: true, composed: true, cancelable: true }));
      await settled();
    };
    await key('+');
    for (const move of ['ArrowRight', 'ArrowUp', 'ArrowLeft']) {
      for (let i = 0; i < 6; i++) await key(move);
      await key('Enter');
    }
    await key('Enter');
    assert.include(strip()!.textContent, '2 of 3', 'the same place again takes it out');
    await key('Enter');
    await press(strip()!, /level by these 3/);
    assert.equal(heard[0]!.spots.length, 3);
  });

  it('goes on from the spots that there are; one is taken out in the list, and all give way to the automatic ground', async () => {
    await open([...three, { xUm: 2, yUm: 7 }]);
    assert.deepEqual(stage().spots, [...three, { xUm: 2, yUm: 7 }].map(({ xUm, yUm }) => [xUm, yUm]));
    await press(chapter(), /Take spot 2 out/);
    assert.deepEqual(heard[0], { spots: [three[0]!, three[2]!, { xUm: 2, yUm: 7 }], label: 'spot 2 taken out' });
    await press(chapter(), /^back to automatic/);
    assert.deepEqual(heard[1], { spots: [], label: 'automatic ground' });
    await press(chapter(), /^add or take out on the map/);
    assert.include(strip()!.textContent, 'level by these 4');
    await tap(250, 250, 'mouse');
    await press(strip()!, /level by these 5/);
    assert.equal(heard[2]!.spots.length, 5);
  });

  it('marks what was repaired on the map when asked', async () => {
    await open();
    chapter().querySelector<HTMLInputElement>('label.switch input')!.click();
    await settled();
    const { pictures } = place.compute as ReturnType<typeof fakeCompute>;
    assert.isTrue(pictures.at(-1)!.repaired);
  });

  it('reads out nothing once the pointer has left; what a finger tapped stays', async () => {
    await open();
    const readout = () => panel().querySelector<Readout>('eg-readout')!;
    const { left, top } = canvas().getBoundingClientRect();
    const at = { clientX: left + 200, clientY: top + 200, bubbles: true };
    canvas().dispatchEvent(new PointerEvent('pointermove', { ...at, pointerType: 'mouse' }));
    await settled();
    assert.isDefined(readout().point);
    canvas().dispatchEvent(new PointerEvent('pointerleave', { ...at, pointerType: 'mouse' }));
    await settled();
    assert.isUndefined(readout().point);
    await tap(200, 200, 'touch');
    assert.isDefined(readout().point);
  });
});
