/** The ledger bar: order, widths, labels that never collide, and what mouse and keys do. */
import { assert } from 'chai';
import { LedgerBar } from '../../web/ledger/ledger-bar.ts';
import { labelRow, leaderRoutes, leastWidth, segmentSpans } from '../../web/ledger/layout.ts';
import { notAssessed, orderEntries } from '../../web/ledger/order.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { facts, ledger, mount, settled, unmountAll } from './fake-sample.ts';

describe('the order of the ledger', () => {
  it('is usable, thick and thin as a pair, flaws by area, then the rest, without what has no area', () => {
    assert.deepEqual(orderEntries(ledger).map(({ cause }) => cause), ['usable', 'thick', 'thin', 'bubble', 'wrinkle', 'residue', 'short', 'rim']);
  });

  it('keeps thick before thin also when thin is larger', () => {
    const turned = ledger.map((entry) => (entry.cause === 'thin' ? { ...entry, areaUm2: 60 } : entry));
    assert.deepEqual(orderEntries(turned).slice(1, 3).map(({ cause }) => cause), ['thick', 'thin']);
  });

  it('names what was not assessed', () => {
    assert.deepEqual(notAssessed(ledger), ['starved']);
  });
});

describe('the widths of the segments', () => {
  it('fill the bar, in proportion where nothing is small', () => {
    assert.deepEqual(segmentSpans([0.5, 0.25, 0.25], 408, [0, 4, 4]), [{ x: 0, width: 200 }, { x: 204, width: 100 }, { x: 308, width: 100 }]);
  });

  it('give every segment at least three pixels and still fill the bar', () => {
    const random = seededRandom('ledger widths');
    for (let trial = 0; trial < 200; trial++) {
      const raw = Array.from({ length: 2 + Math.floor(random.uniform() * 10) }, () => 10 ** (-5 * random.uniform()));
      const sum = raw.reduce((total, each) => total + each, 0);
      const gaps = raw.map((_, i) => (i === 0 ? 0 : 4));
      const spans = segmentSpans(raw.map((each) => each / sum), 300, gaps);
      const last = spans[spans.length - 1]!;
      assert.closeTo(last.x + last.width, 300, 1e-6);
      for (const span of spans) assert.isAtLeast(span.width, leastWidth - 1e-9);
    }
  });

  it('are equal when there is no room for three pixels each', () => {
    assert.deepEqual(segmentSpans([0.9, 0.05, 0.05], 6, [0, 0, 0]).map(({ width }) => width), [2, 2, 2]);
  });
});

describe('the row of labels', () => {
  it('keeps labels at their segments where they fit', () => {
    assert.deepEqual(labelRow([0, 100, 200], [50, 50, 50], 300, 10), [0, 100, 200]);
  });

  it('pushes them apart and back from the right end', () => {
    assert.deepEqual(labelRow([0, 280, 290], [50, 50, 50], 300, 10), [0, 190, 250]);
  });

  it('gives up when the row is too short', () => {
    assert.isUndefined(labelRow([0, 50], [80, 80], 160, 10));
  });

  it('never lets labels overlap or lines cross', () => {
    const random = seededRandom('ledger labels');
    let rows = 0;
    for (let trial = 0; trial < 300; trial++) {
      const count = 2 + Math.floor(random.uniform() * 8);
      const shares = Array.from({ length: count }, () => 10 ** (-4 * random.uniform()));
      const sum = shares.reduce((total, each) => total + each, 0);
      const spans = segmentSpans(shares.map((each) => each / sum), 900, shares.map(() => 1));
      const widths = shares.map(() => 60 + 50 * random.uniform());
      const places = labelRow(spans.map(({ x }) => x), widths, 900, 18);
      if (!places) continue;
      rows++;
      places.forEach((place, i) => {
        assert.isAtLeast(place, 0);
        assert.isAtMost(place + widths[i]!, 900 + 1e-9);
        if (i > 0) assert.isAtLeast(place, places[i - 1]! + widths[i - 1]! + 18 - 1e-9);
      });
      assertNoCrossing(leaderRoutes(spans, places, 6).filter((route) => route !== undefined));
    }
    assert.isAbove(rows, 100);
  });
});

/** Each line: down at `from` to its level, level to `to`, down to the labels. Level runs of one line must not meet the upright parts of another. */
function assertNoCrossing(routes: readonly { readonly from: number; readonly to: number; readonly level: number }[]): void {
  for (const a of routes) {
    for (const b of routes) {
      if (a === b) continue;
      const [low, high] = [Math.min(a.from, a.to), Math.max(a.from, a.to)];
      const meetsUpper = b.from > low && b.from < high && b.level > a.level;
      const meetsLower = b.to > low && b.to < high && b.level < a.level;
      assert.isFalse(meetsUpper || meetsLower, JSON.stringify(routes));
    }
  }
}

describe('the ledger bar', () => {
  afterEach(unmountAll);

  async function bar(width: number, more: Partial<LedgerBar> = {}): Promise<LedgerBar> {
    return mount(Object.assign(new LedgerBar(), { entries: ledger, causes: facts.causes, hatchPeriod: facts.hatchPeriod, ...more }), width);
  }
  const buttons = (element: LedgerBar) => [...element.renderRoot.querySelectorAll('button')];

  it('offers a list of buttons with area and share', async () => {
    const element = await bar(1000);
    assert.equal(buttons(element).length, 8);
    assert.equal(buttons(element)[1]?.getAttribute('aria-label'), 'thick, 27.6\u00a0µm², 28\u00a0%');
  });

  it('draws each segment where its button lies, three pixels wide at least, and a mere mark for what is not a quarter of one', async () => {
    const element = await bar(1000);
    const segments = [...element.renderRoot.querySelectorAll('.segment')];
    buttons(element).forEach((button, index) => {
      const drawn = segments[index]!.getBoundingClientRect();
      assert.closeTo(button.parentElement!.getBoundingClientRect().x, drawn.x, 0.5);
      assert.isAtLeast(drawn.width, index === 6 ? 1.49 : 2.99);
    });
    const short = segments[6]!.getBoundingClientRect();
    assert.closeTo(short.width, 1.5, 0.1);
  });

  for (const width of [1392, 900, 362]) {
    it(`shows every cause by name at ${width} px, none over another`, async () => {
      const element = await bar(width);
      const labels = [...element.renderRoot.querySelectorAll('.labels text, .legend > span')];
      assert.equal(labels.length, 8);
      const boxes = labels.map((label) => label.getBoundingClientRect());
      boxes.forEach((a, i) => {
        assert.isAtMost(a.right, element.getBoundingClientRect().right + 1, labels[i]!.textContent ?? '');
        boxes.slice(i + 1).forEach((b) => {
          assert.isTrue(a.right <= b.left + 0.5 || b.right <= a.left + 0.5 || a.bottom <= b.top + 0.5 || b.bottom <= a.top + 0.5, `${i}`);
        });
      });
    });
  }

  it('isolates a cause by click, takes it back by a second click and by Escape', async () => {
    const element = await bar(1000);
    const heard: (number | undefined)[] = [];
    element.addEventListener('isolate', (event) => { heard.push((event as CustomEvent<{ code: number | undefined }>).detail.code); });
    buttons(element)[1]!.click();
    element.isolated = 9;
    await element.updateComplete;
    assert.equal(buttons(element)[1]?.getAttribute('aria-pressed'), 'true');
    assert.equal(element.renderRoot.querySelectorAll('.segment.dimmed').length, 7);
    buttons(element)[1]!.click();
    buttons(element)[1]!.dispatchEvent(new KeyboardEvent('keydown', { key: 'Escape', bubbles: true }));
    assert.deepEqual(heard, [9, undefined, undefined]);
  });

  it('is one stop for Tab and walks by arrow keys', async () => {
    const element = await bar(1000);
    const focused = () => element.shadowRoot?.activeElement?.getAttribute('aria-label')?.split(',')[0];
    const press = async (key: string) => {
      element.shadowRoot?.activeElement?.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true }));
      await element.updateComplete;
    };
    buttons(element)[0]!.focus();
    await press('ArrowRight');
    assert.equal(focused(), 'thick');
    await press('End');
    assert.equal(focused(), 'rim');
    await press('ArrowRight');
    assert.equal(focused(), 'rim');
    await press('ArrowLeft');
    assert.equal(focused(), 'short');
    assert.deepEqual(buttons(element).map((button) => button.tabIndex), [-1, -1, -1, -1, -1, -1, 0, -1]);
  });

  it('spells out area and share of the cause that has the focus', async () => {
    const element = await bar(1000);
    // A page in the background gets no focus events of its own.
    buttons(element)[2]!.dispatchEvent(new FocusEvent('focus'));
    await element.updateComplete;
    assert.match(element.renderRoot.querySelector('.detail')?.textContent ?? '', /thin\s+25\.0\u00a0µm², 25\u00a0% of the footprint/);
  });

  it('hatches each cause as the facts say', async () => {
    const element = await bar(1000);
    for (const look of facts.causes) {
      const pattern = element.renderRoot.querySelector(`#hatch-${look.code}`);
      assert.equal(pattern?.querySelector('rect')?.getAttribute('fill'), look.fill);
      assert.equal(pattern?.querySelector('path')?.getAttribute('d') ?? '', look.hatchPath);
    }
  });

  it('is 14 px high without labels or buttons when compact, its words in the title', async () => {
    const element = await bar(300, { compact: true });
    await settled();
    assert.equal(element.getBoundingClientRect().height, 14);
    assert.equal(buttons(element).length, 0);
    assert.match(element.renderRoot.querySelector('[role="img"]')?.getAttribute('title') ?? '', /^usable 40\.7\u00a0µm², thick 27\.6\u00a0µm², thin/);
  });

  it('shows nothing and does not fail for an empty ledger', async () => {
    const element = await bar(1000, { entries: [] });
    assert.equal(buttons(element).length, 0);
  });
});
