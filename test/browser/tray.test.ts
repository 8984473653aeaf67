/** The tray as a person sees and uses it. */
import { assert } from 'chai';
import type { ImportForm } from '../../web/import/import-form.ts';
import { emptyRecipe } from '../../web/session/recipe.ts';
import type { SampleState } from '../../web/session/state.ts';
import { rankSamples } from '../../web/tray/rank.ts';
import { judge } from '../../web/tray/requirement.ts';
import type { TrayRow } from '../../web/tray/row.ts';
import { Tray } from '../../web/tray/tray.ts';
import { FakeCompute, createFacts, createSummary, settle } from './fake-compute.ts';

function createSample(id: string, more: Partial<SampleState> = {}): SampleState {
  return { id, name: id, files: [`${id}.tif`], status: 'ready', history: [{ recipe: emptyRecipe, label: '' }], at: 0, run: 1, ...more };
}

const ready = (id: string, usable: Parameters<typeof createSummary>[1]): SampleState => createSample(id, { summary: createSummary(id, usable) });

describe('the order of the tray', () => {
  const samples = [
    ready('height alone', { areaUm2: 49, meaning: 'flaw-free', knownToGlow: false }),
    ready('even', { areaUm2: 45, knownToGlow: false }),
    ready('small', { areaUm2: 10, largestPatchUm2: 9 }),
    ready('scattered', { areaUm2: 20, largestPatchUm2: 2 }),
    createSample('broken', { status: 'failed' }),
    createSample('asks', { status: 'asking' }),
    createSample('works', { status: 'working' }),
  ];
  const names = (requiredUm2: number | undefined) => rankSamples(samples, requiredUm2).map(({ rows }) => rows.map(({ sample, rank }) => `${rank ?? '-'} ${sample.name}`));

  it('ranks groups apart, by the largest patch where no area is required', () => {
    assert.deepEqual(names(undefined), [['- asks'], ['1 small', '2 scattered'], ['- even'], ['1 height alone'], ['- works'], ['- broken']]);
  });

  it('ranks by the required area and then by usable area', () => {
    assert.deepEqual(names(5)[1], ['1 scattered', '2 small']);
    assert.deepEqual(names(15)[1], ['1 scattered', '2 small']);
  });

  it('keeps the place of a sample that is computed anew', () => {
    const again = { ...ready('small', { areaUm2: 10 }), status: 'working' as const };
    assert.deepEqual(rankSamples([again], undefined).map(({ name }) => name), ['glows']);
  });
});

describe('the verdict against a required area', () => {
  const usable = createSummary('a', { areaUm2: 20, low95Um2: 18, high95Um2: 23, largestPatchUm2: 15 }).usable;
  const headline = (requiredUm2: number) => judge(usable, requiredUm2).headline;

  it('says how sure it is', () => {
    assert.deepEqual([10, 19, 22, 30].map(headline), ['Enough', 'Probably enough', 'Probably too little', 'Too little']);
  });

  it('says when the area is there but in no single patch', () => {
    assert.match(judge(usable, 10).detail, /10\.0.µm² to spare/);
    assert.match(judge(usable, 17).detail, /no single patch/);
  });
});

describe('the tray', () => {
  let tray: Tray;
  let compute: FakeCompute;
  const seen: [string, unknown][] = [];

  beforeEach(async () => {
    seen.length = 0;
    compute = new FakeCompute();
    tray = new Tray();
    tray.facts = createFacts();
    tray.compute = compute;
    tray.samples = [ready('b', { areaUm2: 20 }), ready('a', { areaUm2: 30 }), createSample('w', { status: 'working', progress: { stage: 'flaws', done: 2, total: 5 } })];
    for (const name of ['open-sample', 'cancel-run', 'require', 'answer-samples', 'remove']) tray.addEventListener(name, (event) => { seen.push([name, (event as CustomEvent).detail]); });
    document.body.append(tray);
    await shown();
  });

  afterEach(() => { tray.remove(); });

  /** When rows and what is in them have been drawn. */
  async function shown(): Promise<void> {
    await tray.updateComplete;
    await Promise.all(rows().map((row) => row.updateComplete));
    await settle();
  }

  const rows = (): TrayRow[] => [...tray.renderRoot.querySelectorAll<TrayRow>('eg-tray-row')];
  const textOf = (row: TrayRow | undefined): string => (row?.renderRoot.textContent ?? '').replace(/\s+/g, ' ');
  const press = (key: string): void => {
    const row = rows().find((candidate) => candidate === tray.shadowRoot?.activeElement);
    row?.shadowRoot?.activeElement?.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, composed: true, cancelable: true }));
  };
  const focused = (): string | undefined => (tray.shadowRoot?.activeElement as TrayRow | null)?.sample?.name;

  it('shows a row per sample: area, interval, patch, remarks', () => {
    assert.deepEqual(rows().map((row) => row.sample?.name), ['a', 'b', 'w']);
    const text = textOf(rows()[0]);
    assert.match(text, /30\.0.µm²/);
    assert.match(text, /29\.0–31\.0 µm²/);
    assert.match(text, /15\.0.µm²\s*in its largest patch/);
    assert.match(text, /1 remark/);
    assert.match(text, /A runner-up is close\./);
    assert.match(text, /an upper bound/);
  });

  it('draws each thumbnail from the current, in the map’s own proportions, with its causes', () => {
    assert.equal(compute.pictures.length, 2);
    const { map, log, causes, width, height } = compute.pictures[0]!;
    assert.deepEqual({ map, log, causes }, { map: 'current', log: true, causes: 'all' });
    assert.equal(width, 2 * height);
    const canvas = rows()[0]?.renderRoot.querySelector('eg-thumbnail')?.shadowRoot?.querySelector('canvas');
    assert.deepEqual([...canvas!.getContext('2d')!.getImageData(1, 1, 1, 1).data], [200, 200, 200, 200]);
  });

  it('shows progress and cancels', () => {
    const row = rows()[2];
    const bar = row?.renderRoot.querySelector('progress');
    assert.deepEqual([bar?.value, bar?.max], [2, 5]);
    assert.match(textOf(row), /flaws/);
    row?.renderRoot.querySelector<HTMLElement>('.work button')?.click();
    assert.deepEqual(seen, [['cancel-run', { id: 'w' }]]);
  });

  it('is walked with the arrow keys and opened with Enter', () => {
    rows()[0]?.focus();
    press('ArrowDown');
    assert.equal(focused(), 'b');
    press('End');
    assert.equal(focused(), 'w');
    press('ArrowDown');
    assert.equal(focused(), 'w');
    press('Home');
    press('ArrowUp');
    assert.equal(focused(), 'a');
    // Enter on a button is a click; a script's key is not, so the button is clicked as the browser would.
    // Not found by :focus, which matches only while this window has the system's attention.
    const button = rows()[0]!.shadowRoot!.activeElement as HTMLElement;
    assert.isTrue(button.classList.contains('open'));
    button.click();
    assert.deepEqual(seen, [['open-sample', { id: 'a' }]]);
  });

  it('opens a row by a click anywhere but on what has its own use', () => {
    rows()[1]?.renderRoot.querySelector<HTMLElement>('.usable')?.click();
    rows()[1]?.renderRoot.querySelector<HTMLElement>('summary')?.click();
    rows()[2]?.renderRoot.querySelector<HTMLElement>('.middle')?.click();
    assert.deepEqual(seen, [['open-sample', { id: 'b' }]]);
  });

  it('keeps the keyboard on a row that moves as others finish', async () => {
    rows()[1]?.focus();
    tray.samples = [ready('b', { areaUm2: 45 }), ...tray.samples.slice(1)];
    await shown();
    assert.deepEqual(rows().map((row) => row.sample?.name), ['b', 'a', 'w']);
    assert.equal(focused(), 'b');
  });

  it('judges by the area that is typed, with a decimal comma too, and refuses what is none', async () => {
    const input = tray.renderRoot.querySelector('eg-required-area')!.shadowRoot!.querySelector('input')!;
    input.value = '29,5';
    input.dispatchEvent(new Event('change'));
    assert.deepEqual(seen, [['require', { value: 29.5 }]]);
    input.value = 'many';
    input.dispatchEvent(new Event('change'));
    assert.equal(seen.length, 1);
    tray.requiredUm2 = 25;
    await shown();
    assert.match(textOf(rows()[0]), /Enough.*no single patch/);
    assert.match(textOf(rows()[1]), /Too little.*5\.00.µm² short/);
  });

  it('asks in the row for what files do not state, and complains about what is no answer', async () => {
    const error = { code: 'statements-missing', message: '', detail: { sample: 'q', what: 'the role and the size', options: '--set scan.channel=height|current, --set scan.heightUnit=nm or --set scan.currentUnit=nA and --set scan.widthUm=10' } };
    tray.samples = [createSample('q', { status: 'asking', error }), createSample('r', { status: 'asking', error })];
    await shown();
    const form = rows()[0]!.renderRoot.querySelector<ImportForm>('eg-import-form')!;
    const field = (path: string) => form.renderRoot.querySelector<HTMLInputElement>(`#${CSS.escape(path)}`);
    const fill = async (path: string, value: string, event: string): Promise<void> => {
      field(path)!.value = value;
      field(path)!.dispatchEvent(new Event(event));
      await form.updateComplete;
    };
    assert.match(form.renderRoot.textContent ?? '', /do not state the role and the size.*q\.tif/s);
    assert.isNull(field('scan.currentUnit'));
    await fill('scan.channel', 'current', 'change');
    assert.isNull(field('scan.heightUnit'));
    await fill('scan.currentUnit', 'nA', 'change');
    const button = form.renderRoot.querySelector<HTMLElement>('button.main')!;
    button.click();
    await form.updateComplete;
    assert.equal(field('scan.widthUm')?.getAttribute('aria-invalid'), 'true');
    assert.equal(seen.length, 0);
    await fill('scan.widthUm', '10,5', 'input');
    form.renderRoot.querySelector<HTMLInputElement>('[name="for-all"]')!.checked = true;
    button.click();
    assert.deepEqual(seen, [['answer-samples', {
      values: { 'scan.channel': 'current', 'scan.currentUnit': 'nA', 'scan.widthUm': 10.5 }, label: 'stated channel current, current unit nA, width 10.5 µm', forAll: true, ids: ['q', 'r'],
    }]]);
  });
});
