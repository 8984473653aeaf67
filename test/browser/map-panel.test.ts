/** The map’s stage, its value scale and the panel around them: what mouse and keys do. */
import { assert } from 'chai';
import { CutPlot } from '../../web/map/cut-plot.ts';
import { MapPanel } from '../../web/map/map-panel.ts';
import { MapStage } from '../../web/map/map-stage.ts';
import { firstLimits } from '../../web/map/value-axis.ts';
import type { Limits } from '../../web/map/value-axis.ts';
import { ValueScale } from '../../web/map/value-scale.ts';
import { facts, fakeCompute, flaws, mount, settled, summary, unmountAll } from './fake-sample.ts';
import type { FakeCompute } from './fake-sample.ts';

const info = (name: string) => summary.maps.find((map) => map.name === name)!;

describe('the stage', () => {
  afterEach(unmountAll);
  const limits: Limits = { low: 1e-12, high: 1e-9, log: true };
  let compute: FakeCompute;

  async function open(more: Partial<MapStage> = {}): Promise<MapStage> {
    compute = fakeCompute();
    return mount(Object.assign(new MapStage(), { summary, compute, map: 'current', limits, causes: 'all', ...more }), 600, 400);
  }
  const canvas = (element: MapStage) => element.renderRoot.querySelector('canvas')!;
  const send = (element: MapStage, type: string, x: number, y: number, more: PointerEventInit = {}) => {
    const { left, top } = canvas(element).getBoundingClientRect();
    canvas(element).dispatchEvent(new PointerEvent(type, { clientX: left + x, clientY: top + y, pointerId: 7, button: 0, bubbles: true, ...more }));
  };

  it('asks for the whole map at the screen’s own pixels first', async () => {
    await open();
    const { map, left, top, columns, rows, width, causes, low, log } = compute.pictures[0]!;
    assert.deepEqual({ map, left, top, columns, rows, width, causes, low, log }, { map: 'current', left: 0, top: 0, columns: 200, rows: 200, width: 400 * devicePixelRatio, causes: 'all', low: 1e-12, log: true });
  });

  it('asks once for many moves while one picture is on its way, and last for the last', async () => {
    const element = await open();
    compute.hold = true;
    for (let i = 0; i < 8; i++) element.zoom(1.2, 300, 200);
    await settled();
    assert.equal(compute.pictures.length, 2);
    compute.answer();
    await settled();
    assert.equal(compute.pictures.length, 3);
    assert.closeTo(compute.pictures[2]!.rows, 200 / 1.2 ** 8, 1e-6);
    compute.answer();
  });

  it('zooms with the wheel about the cursor, back to the whole by a double click', async () => {
    const element = await open();
    const { left, top } = canvas(element).getBoundingClientRect();
    canvas(element).dispatchEvent(new WheelEvent('wheel', { deltaY: -200, clientX: left + 100, clientY: top, bubbles: true, cancelable: true }));
    await settled();
    const near = compute.pictures.at(-1)!;
    assert.closeTo(near.left, 0, 1e-6);
    assert.closeTo(near.top, 0, 1e-6);
    assert.isBelow(near.rows, 140);
    canvas(element).dispatchEvent(new MouseEvent('dblclick'));
    await settled();
    assert.equal(compute.pictures.at(-1)!.rows, 200);
  });

  it('moves with a drag and with the arrow keys, and zooms with + and −', async () => {
    const element = await open();
    element.press('+');
    element.press('+');
    await settled();
    const before = compute.pictures.at(-1)!;
    send(element, 'pointerdown', 300, 200);
    send(element, 'pointermove', 340, 200);
    send(element, 'pointerup', 340, 200);
    await settled();
    const dragged = compute.pictures.at(-1)!;
    // 40 stage pixels at 400 px per 200 map pixels, enlarged 1.96 times.
    assert.closeTo(before.left - dragged.left, 40 / 2 / 1.96, 1e-6);
    canvas(element).dispatchEvent(new KeyboardEvent('keydown', { key: 'ArrowRight', bubbles: true }));
    await settled();
    assert.isAbove(compute.pictures.at(-1)!.left, dragged.left);
  });

  it('tells the values under the cursor, and the flaw under a click, but not after a drag', async () => {
    const element = await open();
    const points: unknown[] = [];
    const selected: unknown[] = [];
    element.addEventListener('point', (event) => { points.push((event as CustomEvent<{ xUm: number } | undefined>).detail?.xUm); });
    element.addEventListener('flaw-select', (event) => { selected.push((event as CustomEvent<{ flaw: number | undefined }>).detail.flaw); });
    send(element, 'pointermove', 140, 200);
    await settled();
    assert.closeTo(points[0] as number, 1, 0.05);
    send(element, 'pointerdown', 140, 200);
    send(element, 'pointerup', 140, 200);
    await settled();
    send(element, 'pointerdown', 400, 200);
    send(element, 'pointerup', 400, 200);
    await settled();
    send(element, 'pointerdown', 140, 200);
    send(element, 'pointermove', 200, 200);
    send(element, 'pointerup', 200, 200);
    await settled();
    assert.deepEqual(selected, [1, undefined]);
  });

  it('asks anew after a new appraisal, and outlines the selected flaw', async () => {
    const element = await open();
    const count = compute.pictures.length;
    element.summary = { ...summary };
    element.flaw = flaws[1];
    await settled();
    assert.isAbove(compute.pictures.length, count);
    assert.equal(compute.pictures.at(-1)!.flaw, 2);
  });

  it('says why there is no picture', async () => {
    const element = await open();
    const messages: string[] = [];
    element.addEventListener('map-problem', (event) => { messages.push((event as CustomEvent<{ message: string }>).detail.message); });
    compute.picture = () => Promise.reject(new Error('The worker was lost.'));
    element.zoom(2);
    await settled();
    assert.deepEqual(messages, ['The worker was lost.']);
  });
});

describe('the value scale', () => {
  afterEach(unmountAll);

  it('has two handles that keys move, never past each other', async () => {
    const scale = Object.assign(new ValueScale(), { map: info('current'), summary, limits: firstLimits(info('current')), colours: facts.scale });
    scale.addEventListener('limits', (event) => { scale.limits = (event as CustomEvent<Limits>).detail; });
    await mount(scale, 500);
    const handle = (end: string) => scale.renderRoot.querySelector<HTMLElement>(`.handle.${end}`)!;
    const press = async (end: string, key: string) => {
      handle(end).dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true }));
      await scale.updateComplete;
    };
    assert.deepEqual([...scale.renderRoot.querySelectorAll('[role="slider"]')].map((each) => each.getAttribute('aria-valuetext')), ['1.00\u00a0pA', '1.00\u00a0nA']);
    await press('low', 'ArrowRight');
    assert.isAbove(scale.limits.low, 1e-12);
    await press('low', 'End');
    assert.isBelow(scale.limits.low, scale.limits.high);
    await press('high', 'End');
    assert.closeTo(scale.limits.high / scale.axis.high, 1, 1e-9);
  });

  it('labels both limits and the layers, none over another', async () => {
    const scale = await mount(Object.assign(new ValueScale(), { map: info('current'), summary, limits: firstLimits(info('current')), colours: facts.scale }), 700);
    assert.deepEqual([...scale.renderRoot.querySelectorAll('.rung')].map((each) => each.textContent), ['11', '12 layers', '13']);
    for (const row of scale.renderRoot.querySelectorAll('.ticks')) {
      const boxes = [...row.querySelectorAll('.tick')].map((tick) => tick.getBoundingClientRect()).sort((a, b) => a.left - b.left);
      boxes.slice(1).forEach((box, i) => { assert.isAtLeast(box.left, boxes[i]!.right); });
    }
    const limits = [...scale.renderRoot.querySelectorAll('.limit')].map((each) => each.textContent);
    assert.deepEqual(limits, ['1.00\u00a0pA', '1.00\u00a0nA']);
  });
});

describe('the map panel', () => {
  afterEach(unmountAll);
  let compute: FakeCompute;

  async function open(more: Partial<MapPanel> = {}): Promise<MapPanel> {
    compute = fakeCompute();
    return mount(Object.assign(new MapPanel(), { summary, facts, compute, ...more }), 1300, 700);
  }
  const key = (name: string, timeStamp?: number): KeyboardEvent => {
    const event = new KeyboardEvent('keydown', { key: name });
    if (timeStamp !== undefined) Object.defineProperty(event, 'timeStamp', { value: timeStamp });
    return event;
  };
  const last = () => compute.pictures.at(-1)!;

  it('starts with the current and all causes, and asks for its histogram', async () => {
    await open();
    assert.equal(last().map, 'current');
    assert.equal(last().causes, 'all');
    assert.equal(compute.histograms.at(-1)?.map, 'current');
    assert.isTrue(compute.histograms.at(-1)?.log);
  });

  it('offers only the maps there are', async () => {
    const panel = await open({ summary: { ...summary, maps: [info('height'), info('rawHeight')] } });
    const words = [...panel.renderRoot.querySelector('eg-map-bar')!.shadowRoot!.querySelectorAll('[aria-label="Map"] button')].map((each) => each.textContent);
    assert.deepEqual(words, ['height']);
    assert.equal(last().map, 'height');
  });

  it('shows the raw map by R, toggled by a tap and only for a glance when held', async () => {
    const panel = await open();
    panel.press(key('r', 1000));
    panel.release(key('r', 1100));
    await settled();
    assert.equal(last().map, 'rawCurrent');
    panel.press(key('r', 2000));
    await settled();
    assert.equal(last().map, 'current');
    panel.release(key('r', 3000));
    await settled();
    assert.equal(last().map, 'rawCurrent');
  });

  it('switches causes by C and shows an isolated one alone', async () => {
    const panel = await open();
    panel.press(key('c'));
    await settled();
    assert.equal(last().causes, 'none');
    panel.isolated = 9;
    await settled();
    assert.deepEqual(last().causes, [9]);
  });

  it('draws a cut with X and two clicks, and forgets it with Escape', async () => {
    const panel = await open();
    const inner = panel.renderRoot.querySelector<MapStage>('eg-map-stage')!;
    panel.press(key('x'));
    await settled();
    const { width, height } = inner.getBoundingClientRect();
    inner.clicked(width / 2, height / 2);
    inner.clicked(width / 2 + 20, height / 2);
    await settled();
    const cut = compute.cuts.at(-1)!;
    assert.closeTo(cut.fromUm[0], 5, 0.05);
    assert.isAbove(cut.toUm[0], cut.fromUm[0]);
    assert.equal(cut.map, 'current');
    const plot = panel.renderRoot.querySelector<CutPlot>('eg-cut-plot')!;
    await plot.updateComplete;
    assert.match(plot.renderRoot.querySelector('.profile')?.getAttribute('d') ?? '', /^M.*L/);
    panel.press(key('Escape'));
    await settled();
    assert.isNull(panel.renderRoot.querySelector('eg-cut-plot'));
  });

  it('keeps limits per map, and takes them back to natural ones with the switch of the scale', async () => {
    const panel = await open();
    const scale = panel.renderRoot.querySelector<ValueScale>('eg-value-scale')!;
    scale.dispatchEvent(new CustomEvent('limits', { detail: { low: 1e-11, high: 1e-10, log: true } }));
    await settled();
    assert.deepEqual([last().low, last().high], [1e-11, 1e-10]);
    panel.renderRoot.querySelector<HTMLElement>('.log button')!.click();
    await settled();
    assert.isFalse(last().log);
    assert.deepEqual([last().low, last().high], [info('current').low, info('current').high]);
  });

  it('reads out all channels with units, and what the ground is booked as', async () => {
    const panel = await open();
    const inner = panel.renderRoot.querySelector<MapStage>('eg-map-stage')!;
    const { width, height } = inner.getBoundingClientRect();
    inner.hover(width / 2, height / 2);
    await settled();
    const text = (panel.renderRoot.querySelector('eg-readout')!.shadowRoot!.textContent ?? '').replace(/\s+/g, ' ');
    for (const part of ['5.00 µm', '3.41 nm', '118 pA', '4.00 nm', 'usable']) assert.include(text, part);
  });
});
