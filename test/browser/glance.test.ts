/** Looking at where a held handle would lead: overlay and areas follow, late answers are dropped, one undo step comes of it. */
import { assert } from 'chai';
import type { LedgerBar } from '../../web/ledger/ledger-bar.ts';
import { StagePictures } from '../../web/map/stage-pictures.ts';
import type { Chapter } from '../../web/sample/chapter.ts';
import type { Knob } from '../../web/sample/knob.ts';
import { SamplePlace } from '../../web/sample/sample-place.ts';
import { changeRecipe } from '../../web/session/actions/change-recipe.ts';
import { openFiles } from '../../web/session/actions/open-files.ts';
import { Session } from '../../web/session/session.ts';
import { FakeCompute, createSummary, settle } from './fake-compute.ts';
import { facts, fakeCompute, mount, sampleState, settled, summary, unmountAll } from './fake-sample.ts';
import type { FakeCompute as FakeSampleCompute } from './fake-sample.ts';

describe('a held handle', () => {
  afterEach(unmountAll);
  let compute: FakeSampleCompute;
  let place: SamplePlace;

  beforeEach(async () => {
    compute = fakeCompute();
    place = await mount(Object.assign(new SamplePlace(), { sample: sampleState(), facts, compute }), 1440, 850);
    chapter().open = true;
    await settled();
  });

  const chapter = (): Chapter => place.renderRoot.querySelector<Chapter>('eg-chapter-flaws')!;
  const slider = (): HTMLInputElement => {
    const knob = [...chapter().renderRoot.querySelectorAll<Knob>('eg-knob')].find(({ field }) => field.path === 'flaws.heightNm')!;
    return knob.renderRoot.querySelector<HTMLInputElement>('input[type="range"]')!;
  };
  const slide = (to: number, type = 'input'): void => {
    const handle = slider();
    handle.value = String(to);
    handle.dispatchEvent(new Event(type));
  };
  const usable = (): number => place.renderRoot.querySelector<LedgerBar>('eg-ledger-bar')!.entries.find(({ cause }) => cause === 'usable')!.areaUm2;
  const headline = (): string => (place.renderRoot.querySelector('eg-verdict-line')!.shadowRoot!.querySelector('.look')?.textContent ?? '').replace(/\s+/g, ' ').trim();
  const listen = (): unknown[] => {
    const heard: unknown[] = [];
    place.addEventListener('recipe-change', (event) => { heard.push((event as CustomEvent<{ value: unknown }>).detail.value); });
    return heard;
  };

  it('shows where it would lead on the map and in the areas, and changes no recipe', async () => {
    const changes = listen();
    const tall = place.renderRoot.querySelector<HTMLElement>('eg-verdict-line')!.offsetHeight;
    slide(250);
    await settled();
    const [asked] = compute.previews;
    assert.deepEqual(asked!.recipe['flaws'], { heightNm: 2.7 });
    assert.equal(asked!.picture!.map, 'current');
    assert.isUndefined(asked!.picture!.flaw);
    assert.equal(usable(), 42.7);
    assert.equal(place.renderRoot.querySelector<HTMLElement>('eg-verdict-line')!.offsetHeight, tall, 'nothing moves under the handle');
    assert.equal(headline(), '42.7 µm² of 100 µm² would be usable a quick look; letting go of the handle computes the result');
    assert.deepEqual(changes, []);
    const words = [...chapter().renderRoot.querySelectorAll<Knob>('eg-knob')].map(({ renderRoot }) => renderRoot.querySelector('.look')?.textContent ?? '').filter((text) => text !== '');
    assert.deepEqual(words.map((text) => text.replace(/\s+/g, ' ')), ['About 42.7 µm² usable; 1 bubble, 2 residue patches; a quick look at every 2nd pixel. Let go for the result.']);
  });

  it('has the look at the value in force made when it is taken, without a picture', async () => {
    slider().dispatchEvent(new PointerEvent('pointerdown'));
    await settled();
    assert.deepEqual(compute.previews.map(({ recipe, picture }) => [recipe['flaws'], picture]), [[undefined, undefined]]);
    assert.equal(usable(), 40.7);
    slider().dispatchEvent(new KeyboardEvent('keydown', { key: 'Tab' }));
    slider().dispatchEvent(new KeyboardEvent('keyup', { key: 'Tab' }));
    assert.equal(compute.previews.length, 1);
    slider().dispatchEvent(new KeyboardEvent('keydown', { key: 'ArrowRight' }));
    slider().dispatchEvent(new KeyboardEvent('keydown', { key: 'ArrowRight' }));
    assert.equal(compute.previews.length, 2);
  });

  it('asks one question at a time and only the newest next; one that comes after the handle was let go counts no more', async () => {
    compute.holdPreviews = true;
    slide(200);
    slide(220);
    slide(240);
    await settled();
    assert.equal(compute.previews.length, 1);
    compute.answerPreview();
    await settled();
    assert.deepEqual(compute.previews.map(({ recipe }) => (recipe['flaws'] as { heightNm: number }).heightNm), [1.4, 2.4]);
    const changes = listen();
    slide(240, 'change');
    const before = usable();
    compute.answerPreview();
    await settled();
    assert.equal(usable(), before);
    assert.deepEqual(changes, [2.4]);
  });

  it('gives the map back when it returns to where it was taken, and when the result is there', async () => {
    slide(250);
    await settled();
    const asked = compute.pictures.length;
    slide(157);
    slide(157, 'change');
    await settled();
    assert.equal(usable(), 40.7);
    assert.isAbove(compute.pictures.length, asked);
    slide(250);
    await settled();
    place.sample = sampleState({ status: 'working' });
    await settled();
    assert.equal(usable(), 42.7, 'stays in sight while the result is computed');
    place.sample = sampleState({ summary: { ...summary } });
    await settled();
    assert.equal(usable(), 40.7);
  });

  it('asks for no look at the ground, which takes a whole appraisal', async () => {
    const ground = place.renderRoot.querySelector<Chapter>('eg-chapter-ground')!;
    ground.open = true;
    await settled();
    const order = [...ground.renderRoot.querySelectorAll<Knob>('eg-knob')].find(({ field }) => field.path === 'ground.order')!;
    const handle = order.renderRoot.querySelector<HTMLInputElement>('input[type="range"]')!;
    handle.value = '400';
    handle.dispatchEvent(new Event('input'));
    await settled();
    assert.equal(compute.previews.length, 0);
  });
});

describe('the history', () => {
  it('gets one step from a handle, whatever places it has been at', async () => {
    const compute = new FakeCompute();
    compute.reply = { samples: [{ id: 's', name: 's', files: ['s.tif'] }], skipped: [], failed: [] };
    const session = new Session(compute);
    void session.do(openFiles, [new File([''], 's.tif')]);
    await settle();
    compute.last('s').answer(createSummary('s'));
    await settle();
    void session.do(changeRecipe, 's', 'flaws.heightNm', 2.7, 'height above ground 2.7 nm');
    await settle();
    assert.deepEqual(session.sample('s')!.history.map(({ label }) => label), ['', 'height above ground 2.7 nm']);
    assert.equal(compute.asked.length, 2);
  });
});

describe('the pictures of the stage', () => {
  const request = { id: 's', map: 'height' as const, left: 0, top: 0, columns: 100, rows: 100, width: 2000, height: 1000, low: 0, high: 1, log: false, causes: 'all' as const, pixelRatio: 2, flaw: 3 };

  it('leave a quick look in sight until it ends', async () => {
    const shown: number[] = [];
    const pictures = new StagePictures(async ({ width }) => ({ width, height: 1, rgba: new Uint8ClampedArray(4 * width) }), ({ width }) => { shown.push(width); }, () => {});
    pictures.want(request);
    await settle();
    pictures.look(true);
    pictures.want({ ...request, width: 3 });
    await settle();
    assert.deepEqual(shown, [2000]);
    pictures.look(false);
    pictures.want({ ...request, width: 3 });
    await settle();
    assert.deepEqual(shown, [2000, 3]);
  });

  it('are coarser for a quick look where the screen has many pixels, and outline no flaw', () => {
    const pictures = new StagePictures(() => new Promise<never>(() => {}), () => {}, () => {});
    assert.isUndefined(pictures.glance);
    pictures.want(request);
    const { width, height, pixelRatio, ...rest } = pictures.glance!;
    assert.isAtMost(width * height, 401_000);
    assert.closeTo(width / height, 2, 0.01);
    assert.closeTo(pixelRatio, 2 * (width / 2000), 0.01);
    assert.notProperty(rest, 'flaw');
  });
});

