/** The Sample place: what a person sees and does there. */
import { assert } from 'chai';
import type { Chapter } from '../../web/sample/chapter.ts';
import type { ChapterName } from '../../web/sample/knobs.ts';
import type { RecipeChange } from '../../web/sample/events.ts';
import { FlawTable } from '../../web/sample/flaw-table.ts';
import { Knob } from '../../web/sample/knob.ts';
import { SamplePlace } from '../../web/sample/sample-place.ts';
import type { SampleState } from '../../web/session/state.ts';
import { facts, fakeCompute, flaws, mount, sampleState, settled, summary, unmountAll } from './fake-sample.ts';
import type { FakeCompute } from './fake-sample.ts';

const plainSpaces = (text: string | null | undefined): string => (text ?? '').replace(/\s+/g, ' ').trim();
const recipe = (more: object) => ({ format: 'evenglow-recipe', version: 1, ...more });

describe('the sample’s place', () => {
  afterEach(unmountAll);
  let compute: FakeCompute;

  async function open(more: Partial<SampleState> = {}): Promise<SamplePlace> {
    compute = fakeCompute();
    return mount(Object.assign(new SamplePlace(), { sample: sampleState(more), facts, compute }), 1440, 850);
  }
  /** The same with the named chapters opened. */
  async function unfolded(names: readonly ChapterName[], more: Partial<SampleState> = {}): Promise<SamplePlace> {
    const element = await open(more);
    for (const name of names) (inside(element, `eg-chapter-${name}`) as unknown as Chapter).open = true;
    await settled();
    return element;
  }
  const inside = (element: SamplePlace, selector: string) => element.renderRoot.querySelector<HTMLElement & { shadowRoot: ShadowRoot }>(selector)!;
  const textOf = (element: SamplePlace, selector: string) => plainSpaces(inside(element, selector).shadowRoot.textContent);
  const steps = (element: SamplePlace) => [...element.renderRoot.querySelectorAll<HTMLButtonElement>('.steps button')];
  const listen = (element: SamplePlace, ...types: string[]): string[] => {
    const heard: string[] = [];
    for (const type of types) element.addEventListener(type, () => { heard.push(type); });
    return heard;
  };
  const press = (key: string, more: KeyboardEventInit = {}, on: EventTarget = window) => on.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, composed: true, cancelable: true, ...more }));

  it('says the verdict: area, interval, largest patch, bound, remarks', async () => {
    const element = await open();
    const text = textOf(element, 'eg-verdict-line');
    assert.match(text, /40\.7 µm² of 100 µm² is even barrier, within a factor of 3 at 4 V/);
    assert.match(text, /95 %: 37\.9–43\.2 µm² · largest patch 22\.4 µm² · an upper bound, as a bare barrier was scanned · 2 remarks/);
    inside(element, 'eg-verdict-line').shadowRoot.querySelector('button')!.click();
    await settled();
    assert.include(textOf(element, 'eg-verdict-line'), 'Second remark.');
  });

  it('isolates on the map what is chosen in the ledger, and shows all again by Escape', async () => {
    const element = await open();
    inside(element, 'eg-ledger-bar').shadowRoot.querySelectorAll('button')[1]!.click();
    await settled();
    assert.deepEqual(compute.pictures.at(-1)!.causes, [9]);
    press('Escape');
    await settled();
    assert.equal(compute.pictures.at(-1)!.causes, 'all');
  });

  it('says per chapter how many settings were changed, and passes a change on', async () => {
    const element = await unfolded(['glow'], { history: [{ recipe: recipe({ band: { factor: 5, shortMaxUm2: 0.1 } }), label: '' }] });
    const count = (name: string) => plainSpaces(inside(element, `eg-chapter-${name}`).shadowRoot.querySelector('.count')?.textContent);
    assert.deepEqual(['scan', 'ground', 'flaws', 'glow'].map(count), ['all by default', 'all by default', '1 changed', '1 changed']);
    const changes: RecipeChange[] = [];
    document.addEventListener('recipe-change', (event) => { changes.push((event as CustomEvent<RecipeChange>).detail); }, { once: true });
    inside(element, 'eg-chapter-glow').shadowRoot.querySelectorAll<Knob>('eg-knob')[2]!.renderRoot.querySelector<HTMLElement>('.reset')!.click();
    assert.deepEqual(changes, [{ path: 'band.factor', value: undefined, label: 'band factor back to default' }]);
  });

  it('warns where a bias is set', async () => {
    const element = await unfolded(['scan', 'glow']);
    assert.match(textOf(element, 'eg-chapter-glow'), /breaks down near 1\.2 V\/nm.*4 V on the reference is 1\.00 V\/nm.*current limit.*trained staff/);
    assert.match(textOf(element, 'eg-chapter-scan'), /current limit.*trained staff/);
  });

  it('names the steps on undo and redo, by button and key, but leaves keys to fields of text', async () => {
    const history = [{ recipe: recipe({}), label: '' }, { recipe: recipe({ band: { factor: 5 } }), label: 'band factor 5' }, { recipe: recipe({ band: { factor: 7 } }), label: 'band factor 7' }];
    const element = await unfolded(['glow'], { history, at: 1 });
    assert.deepEqual(steps(element).map((button) => button.textContent), ['Undo: band factor 5', 'Redo: band factor 7']);
    const heard = listen(element, 'undo', 'redo');
    steps(element)[0]!.click();
    press('z', { ctrlKey: true });
    press('Z', { ctrlKey: true, shiftKey: true });
    press('z', { ctrlKey: true }, inside(element, 'eg-chapter-glow').shadowRoot.querySelector<Knob>('eg-knob')!.renderRoot.querySelector('input[type="text"]')!);
    assert.deepEqual(heard, ['undo', 'undo', 'redo']);
  });

  it('closes the remarks with Escape before it means anything else', async () => {
    const element = await open();
    const line = inside(element, 'eg-verdict-line');
    const button = () => line.shadowRoot.querySelector<HTMLButtonElement>('button')!;
    element.isolated = 3;
    button().click();
    await settled();
    assert.equal(line.shadowRoot.querySelectorAll('#remarks li').length, 2);
    press('Escape');
    await settled();
    assert.equal(line.shadowRoot.querySelectorAll('#remarks').length, 0);
    assert.equal(button().getAttribute('aria-expanded'), 'false');
    assert.equal(element.isolated, 3);
    press('Escape');
    assert.isUndefined(element.isolated);
  });

  it('has nothing to undo at the first step', async () => {
    const element = await open();
    const heard = listen(element, 'undo', 'redo');
    press('z', { ctrlKey: true });
    assert.isTrue(steps(element).every((button) => button.disabled));
    assert.deepEqual(heard, []);
  });

  it('shows what the last change did, in its chapter', async () => {
    const element = await open();
    element.sample = sampleState({ history: [{ recipe: recipe({}), label: '' }, { recipe: recipe({ flaws: { heightNm: 2 } }), label: 'x' }], at: 1, previous: { usableUm2: 40.4, ledger: summary.ledger, flaws: summary.flaws } });
    await settled();
    assert.equal(plainSpaces((inside(element, 'eg-chapter-flaws') as unknown as Chapter).effect.words), 'This returned 0.300 µm².');
    assert.include(textOf(element, 'eg-chapter-flaws'), 'This returned 0.300 µm².');
    const colour = () => getComputedStyle(inside(element, 'eg-chapter-flaws').shadowRoot.querySelector('.effect')!).color;
    const gain = colour();
    element.sample = { ...element.sample, previous: { usableUm2: 41, ledger: summary.ledger, flaws: summary.flaws } };
    await settled();
    assert.include(textOf(element, 'eg-chapter-flaws'), 'This cost 0.300 µm².');
    assert.notEqual(colour(), gain);
    assert.notInclude(textOf(element, 'eg-verdict-line'), 'returned');
  });

  it('keeps the old result on show while working, and cancels', async () => {
    const element = await open({ status: 'working', progress: { stage: 'flaws', done: 2, total: 7 } });
    assert.include(textOf(element, 'eg-verdict-line'), '40.7');
    const line = inside(element, 'eg-progress-line');
    assert.include(plainSpaces(line.shadowRoot.textContent), 'flaws');
    assert.equal(line.shadowRoot.querySelector('progress')?.value, 2);
    assert.isBelow(Number(getComputedStyle(inside(element, 'eg-verdict-line')).opacity), 1);
    const heard = listen(element, 'cancel');
    line.shadowRoot.querySelector('button')!.click();
    assert.deepEqual(heard, ['cancel']);
  });

  it('says what failed, beside the last result or without one', async () => {
    const error = { code: 'x', message: 'recipe.band.factor: 0 is below 1.' };
    const beside = await open({ status: 'failed', error });
    assert.match(plainSpaces(inside(beside, '.error').textContent), /0 is below 1\. What is shown is the last result\./);
    const { summary: _summary, ...bare } = sampleState({ status: 'failed', error });
    beside.sample = bare;
    await settled();
    assert.match(plainSpaces(inside(beside, '.error').textContent), /0 is below 1\./);
    const heard = listen(beside, 'leave', 'retry');
    beside.renderRoot.querySelectorAll<HTMLElement>('.empty button').forEach((button) => { button.click(); });
    assert.deepEqual(heard, ['retry', 'leave']);
  });

  it('links table and map: a row outlines the flaw, a click on the map opens its row', async () => {
    const element = await unfolded(['flaws']);
    const chapter = inside(element, 'eg-chapter-flaws');
    const table = () => chapter.shadowRoot.querySelector<FlawTable>('eg-flaw-table')!;
    table().renderRoot.querySelector<HTMLElement>('tbody td button')!.click();
    await settled();
    assert.equal(compute.pictures.at(-1)!.flaw, 2);
    (chapter as unknown as Chapter).open = false;
    await settled();
    inside(element, 'eg-map-panel').dispatchEvent(new CustomEvent('flaw-select', { detail: { flaw: 1 } }));
    await settled();
    assert.equal(compute.pictures.at(-1)!.flaw, 1);
    assert.equal(plainSpaces(table().renderRoot.querySelector('tr[aria-current] td')?.textContent), '1');
    assert.isTrue((chapter as unknown as Chapter).open);
  });

  it('finds the selected flaw again after an appraisal that numbers anew', async () => {
    const element = await open();
    element.flaw = 2;
    await settled();
    element.sample = sampleState({ summary: { ...summary, flaws: [{ ...flaws[1]!, flaw: 9, xUm: 8.1 }, flaws[0]!] } });
    await settled();
    assert.equal(element.flaw, 9);
  });

  it('has keys for the map from anywhere but a field of text', async () => {
    const element = await unfolded(['glow']);
    press('r');
    await settled();
    assert.equal(compute.pictures.at(-1)!.map, 'rawCurrent');
    const count = compute.pictures.length;
    press('c', {}, inside(element, 'eg-chapter-glow').shadowRoot.querySelector<Knob>('eg-knob')!.renderRoot.querySelector('input[type="text"]')!);
    await settled();
    assert.equal(compute.pictures.length, count);
  });
});
