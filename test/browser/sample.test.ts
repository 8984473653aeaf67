/** What the Sample place is made of: its words and numbers, its knobs, its table. */
import { assert } from 'chai';
import { effectOf } from '../../web/sample/effect.ts';
import { flawsFinding, glowAssumption, glowFinding, groundFinding, scanFinding, verdictRest } from '../../web/sample/findings.ts';
import { area, biasText, confidenceWord, counted, density, figure, heightText, ledgerFigure, mapValue, percent, span, tickText, typedNumber, volts, withError, withPrefix } from '../../web/sample/format.ts';
import { groundFacts, loweredWords } from '../../web/sample/ground-facts.ts';
import type { RecipeChange } from '../../web/sample/events.ts';
import { FlawTable } from '../../web/sample/flaw-table.ts';
import { Knob } from '../../web/sample/knob.ts';
import { changedPaths, chapterKnobs, chapterOfChange, knobsOf, refusal, stepLabel } from '../../web/sample/knobs.ts';
import type { ChapterName } from '../../web/sample/knobs.ts';
import { dropMeaning, heightMeaning, noiseMeaning } from '../../web/sample/threshold-words.ts';
import { sortFlaws } from '../../web/sample/sort-flaws.ts';
import { emptyRecipe, withCorrection } from '../../web/session/recipe.ts';
import { facts, flaws, mount, summary, unmountAll } from './fake-sample.ts';

const plainSpaces = (text: string | null | undefined): string => (text ?? '').replace(/\s+/g, ' ').trim();
const fieldAt = (path: string) => facts.fields.find((field) => field.path === path)!;
const recipe = (more: object) => ({ format: 'evenglow-recipe', version: 1, ...more });

describe('numbers', () => {
  it('have three significant digits, a true minus and a dash where there is none', () => {
    assert.deepEqual([0, 1, 40.66, 99.96, 1234, 0.00123, -2.5, 1e-6, 2e7].map((value) => figure(value)), ['0', '1.00', '40.7', '100', '1234', '0.00123', '−2.50', '1.00·10⁻⁶', '2.00·10⁷']);
    assert.deepEqual([undefined, Number.NaN, Infinity].map((value) => figure(value)), ['–', '–', '–']);
  });

  it('carry SI prefixes, also where rounding reaches the next', () => {
    assert.deepEqual([1.18e-10, 9.996e-10, 9.94e-13, -3e-14, 0, 4.6e-6, 2e-20].map((value) => plainSpaces(withPrefix(value, 'A'))), ['118 pA', '1.00 nA', '994 fA', '−30.0 fA', '0 A', '4.60 µA', '0.0200 aA']);
    assert.equal(withPrefix(Number.NaN, 'A'), '–');
  });

  it('carry their units', () => {
    assert.equal(plainSpaces(area(40.66)), '40.7 µm²');
    assert.deepEqual([6.3, 0.0042, 25000].map((value) => plainSpaces(density(value))), ['6.3 nA/µm²', '4.2 pA/µm²', '25 µA/µm²']);
    assert.deepEqual([4, 5.9, 6.25, -3.999].map((value) => plainSpaces(volts(value))), ['4.0 V', '5.9 V', '6.25 V', '−4.0 V']);
    assert.deepEqual([0.276, 0.0123, 0.0002, 0, 1].map((value) => plainSpaces(percent(value))), ['28 %', '1.2 %', '<0.1 %', '0 %', '100 %']);
    assert.deepEqual([mapValue(3.41, 'nm'), mapValue(2e-12, 'A'), mapValue(0.5, ''), mapValue(7, 'relative')].map(plainSpaces), ['3.41 nm', '2.00 pA', '0.500', '7.00']);
    assert.deepEqual([tickText(1e-10, 'A'), tickText(0.5, 'nm'), tickText(20, 'nm')].map(plainSpaces), ['100 pA', '0.5 nm', '20 nm']);
    assert.equal(span(0.9, 40, 2), '0.90–40');
  });

  it('have one unit with their error, which has one digit', () => {
    const pairs = [[1.5e-13, 2.55e-16], [1.5e-13, 9.6e-15], [9.996e-10, 4e-13], [-2e-16, 3e-14], [1.5e-13, 0], [1.18e-10, 2.3e-11]] as const;
    assert.deepEqual(pairs.map(([value, error]) => plainSpaces(withError(value, error, 'A'))), ['150.0 ± 0.3 fA', '150 ± 10 fA', '999.6 ± 0.4 pA', '0 ± 30 fA', '150 fA', '118 ± 20 pA']);
    assert.equal(plainSpaces(withError(1.5e-13, undefined, 'A')), '150 fA');
  });

  it('are no finer than a tenth of the noise where they are heights', () => {
    assert.deepEqual([[3.6412, 0.08], [20.24, 0.08], [0.3333, 0.08], [48.2, 3], [0.0004, 0.1], [12345, 0.1], [0.333, undefined]].map(([nm, noise]) => plainSpaces(heightText(nm, noise))),
      ['3.64 nm', '20.2 nm', '0.33 nm', '48 nm', '0.00 nm', '12345 nm', '0.333 nm']);
  });

  it('give a proposed bias to three digits and a given one as given', () => {
    assert.deepEqual([biasText({ biasV: 3.7342, proposed: true }), biasText({ biasV: 3.7342, proposed: false }), biasText({ biasV: 4, proposed: false })].map(plainSpaces), ['3.73 V', '3.7342 V', '4 V']);
  });

  it('are read as typed', () => {
    assert.deepEqual([' 2,5 ', '−3', '1e-12', '10 000'].map(typedNumber), [2.5, -3, 1e-12, 10000]);
    assert.isNaN(typedNumber('two'));
    assert.isNaN(typedNumber(''));
  });

  it('have words for how sure and how many', () => {
    assert.deepEqual([1, 0.9, 0.8, 0.5].map(confidenceWord), ['certain', 'certain', 'likely', 'could be another']);
    // Shown as 0.90 and 0.65, as those are.
    assert.deepEqual([0.8951, 0.6451, 0.6449].map(confidenceWord), ['certain', 'likely', 'could be another']);
    assert.deepEqual([counted(0, 'short'), counted(1, 'short'), counted(2, 'residue patch', 'residue patches')], ['no shorts', '1 short', '2 residue patches']);
  });
});

describe('findings', () => {
  it('say what was scanned', () => {
    assert.equal(plainSpaces(scanFinding(summary)), 'Bare barrier, height and current, 5.9 V at the scan; 200 × 200 pixels on 10.0 × 10.0 µm.');
    const { current: _current, ...heightAlone } = summary;
    assert.match(scanFinding({ ...heightAlone, surface: 'stack' }), /^Finished stack, height only;/);
  });

  it('say what was done to the ground', () => {
    assert.equal(plainSpaces(groundFinding(summary)), '37 nm of tilt and 2.1 nm of bow removed, 7 pixels repaired in the height, 5 in the current, noise 0.080 nm; the tip lost 0.28 decades of conductance (a factor of 1.9).');
    const { height: _height, ...currentAlone } = summary;
    assert.equal(plainSpaces(groundFinding({ ...currentAlone, current: { ...summary.current!, repairedPixels: 0, wearDecades: -0.3, wearTold: false } })), 'Nothing to repair; tip wear cannot be told from the barrier, none undone.');
    const { levels: _levels, ...roughly } = summary.height!;
    const { current: _current, ...heightAlone } = summary;
    assert.equal(plainSpaces(groundFinding({ ...heightAlone, height: roughly, repairedUm2: 0.0123 })), '38 nm of tilt removed, 7 pixels repaired (0.0123 µm²), noise 0.080 nm.');
    assert.match(plainSpaces(groundFinding({ ...summary, repairedUm2: 0.0881, height: { ...summary.height!, levels: { ...summary.height!.levels!, order: 1 } } })), /^37 nm of tilt removed, 7 pixels repaired in the height, 5 in the current \(0\.0881 µm²\),/);
  });

  it('tell of the ground fact by fact, with units and what was done', () => {
    const facts = new Map(groundFacts(summary).map(({ name, value, note = '' }) => [name, `${plainSpaces(value)} | ${plainSpaces(note)}`]));
    assert.match(facts.get('Form removed')!, /^order 2 \(tilt and bow\): tilt 37\.0 nm, bow 2\.10 nm, peak to peak \| fitted to ground found automatically/);
    assert.match(facts.get('Line offsets')!, /^0\.12 nm rms, 0\.40 nm at most \|/);
    assert.match(facts.get('Terraces')!, /^3 heights taken as parallel planes, 0\.67 nm from lowest to highest \| one step of the current’s ladder is 0\.33 nm high/);
    assert.match(facts.get('Floor')!, /^90\.0 ± 0\.3 fA \|/);
    assert.match(facts.get('Wear of the tip')!, /^0\.28 decades lost \(a factor of 1\.9\), undone \| .*0\.28 ± 0\.03 decades \(powers of ten\)/);
    const { height: _height, ...alone } = summary;
    assert.isFalse(groundFacts(alone).some(({ name }) => name === 'Form removed'));
    const shift = { rightPx: 2.2, rightSePx: 0.1, downPx: 0, downSePx: 0.1, undoneRightPx: 2, undoneDownPx: 0 };
    const more = groundFacts({ ...summary, current: { ...summary.current!, lagPx: 1.5, lagSePx: 0.02, shift, wearTold: false } });
    assert.include(plainSpaces(more.find(({ name }) => name === 'Amplifier’s lag')?.value), '1.50 ± 0.02 pixels, undone');
    assert.include(more.find(({ name }) => name === 'Current against height')?.note ?? '', 'moved back by whole pixels: 2 to the left');
    assert.include(more.find(({ name }) => name === 'Wear of the tip')?.note ?? '', 'cannot be told from the barrier');
  });

  it('say to what the spots lower the order of the form', () => {
    assert.equal(loweredWords(2, { order: 1, spotsUsed: 3 }), 'lowered to 1: 3 spots support a tilt only');
    assert.equal(loweredWords(2, { order: 0, spotsUsed: 4 }), 'lowered to 0: 4 spots in these places support a level only');
    assert.equal(loweredWords(3, { order: 2, spotsUsed: 7 }), 'lowered to 2: 7 spots support tilt and bow only');
    assert.equal(loweredWords(1, { order: 1, spotsUsed: 3 }), '');
  });

  it('say what a threshold means on this map, and which limit rules', () => {
    const limits = { heightNoiseNm: 0.08, layerDecades: 0.8, layerFrom: 'map' as const, currentNoiseDecades: 0.05, dropDecades: 0.5 };
    assert.equal(plainSpaces(heightMeaning(0.8, 6, limits)), '= 10.0 × this map’s noise (0.080 nm); this limit rules here.');
    assert.equal(plainSpaces(heightMeaning(0.4, 6, limits)), '= 5.0 × this map’s noise (0.080 nm); the limit by noise, 0.480 nm, rules here.');
    assert.equal(plainSpaces(noiseMeaning(12, 0.8, limits)), '= 0.960 nm on this map; this limit rules here.');
    assert.equal(dropMeaning(0.5, limits, undefined), 'A decade is a factor of ten: to 1/3.2 of the current around; 0.63 layers of this map’s ladder (0.80 decades each); 10 × the noise of the log current (0.050 decades).');
    assert.equal(heightMeaning(0.8, 6, {}), '');
  });

  it('give areas that add up no more decimals than the whole asks for', () => {
    assert.deepEqual([84.9, 0.0129, 0.449, 0.001].map((value) => ledgerFigure(value, 121)), ['84.9', '0.01', '0.45', '<0.01']);
    assert.equal(ledgerFigure(0.0129, 1.2), '0.0129');
  });

  it('count the flaws, and the shorts that were and were not seen', () => {
    assert.equal(flawsFinding(summary), '1 bubble, 1 residue patch; 6 shorts seen, about 19 more expected.');
    assert.equal(flawsFinding({ ...summary, flaws: [], shorts: { seen: 0, expectedMissed: 0, crossedShare: 0.24 } }), 'No bubbles, residue or wrinkles; no shorts seen.');
  });

  it('say what the reference would carry, or why that is not known', () => {
    assert.equal(plainSpaces(glowFinding(summary)), 'At 4 V the reference (12 layers, 4.00 nm) would carry 6.3 nA/µm² (95 %: 0.90–40).');
    const { device: _device, ...without } = summary;
    const { biasV: _biasV, ...noBias } = summary.current!;
    assert.match(glowFinding({ ...without, current: noBias }), /not known without a scan bias\./);
    assert.match(glowFinding({ ...without, current: { ...summary.current!, unit: 'relative' } }), /no scale in amperes/);
    assert.match(plainSpaces(glowAssumption(summary, (path) => ({ 'barrier.tipAreaNm2': 17, 'barrier.heightEv': 2.5, 'barrier.massRatio': 0.5 })[path])), /contact of 17 nm², .*2\.50 eV.*0\.50/);
    assert.equal(glowAssumption(without, () => undefined), '');
  });

  it('say what a change returned or cost', () => {
    const steps = [{ recipe: emptyRecipe, label: '' }, { recipe: { ...emptyRecipe, flaws: { heightNm: 2 } }, label: 'x' }];
    const after = (usableUm2: number, changes: Readonly<Record<string, number>> = {}, history = steps) => {
      const { words, tone } = effectOf({ previous: { usableUm2: summary.usable.areaUm2, ledger: summary.ledger, flaws: [{ ...flaws[0]!, insideUm: [2, 7] }] }, history, at: 1 }, {
        usable: { ...summary.usable, areaUm2: usableUm2 }, ledger: summary.ledger.map((entry) => ({ ...entry, areaUm2: entry.areaUm2 + (changes[entry.cause] ?? 0) })),
      });
      return [plainSpaces(words), tone];
    };
    assert.deepEqual(after(41), ['This returned 0.300 µm².', 'gain']);
    assert.deepEqual(after(39.5), ['This cost 1.20 µm².', 'cost']);
    assert.deepEqual(after(40.7), ['This changed no usable area.', 'same']);
    assert.deepEqual(after(40.7, { bubble: -1.1, residue: 1.1 }), ['This changed no usable area: 1.10 µm² went from bubble to residue.', 'same']);
    assert.deepEqual(effectOf({ history: steps, at: 1 }, summary), { words: '', tone: 'same' });
    const dismissed = [{ recipe: emptyRecipe, label: '' }, { recipe: withCorrection(emptyRecipe, { kind: 'dismiss', xUm: 2, yUm: 7 }), label: 'flaw dismissed' }];
    assert.deepEqual(after(40.7, { bubble: -1.1, thick: 1.1 }, dismissed), ['No flaw any more; 1.10 µm² is now booked thick, because no current flows there.', 'same']);
    assert.deepEqual(after(41, { bubble: -1.1, usable: 0.3, thin: 0.8 }, dismissed), ['No flaw any more; this returned 0.300 µm²; 0.800 µm² is now booked thin, because too much current flows there.', 'gain']);
    assert.deepEqual(after(41.8, { bubble: -1.1, usable: 1.1 }, dismissed), ['This returned 1.10 µm².', 'gain']);
  });

  it('split the verdict’s sentence', () => {
    assert.deepEqual(verdictRest(summary.verdict), { what: 'of 100 µm² is even barrier, within a factor of 3 at 4 V', remarks: 'an upper bound, as a bare barrier was scanned' });
  });
});

describe('knobs', () => {
  it('exist as fields of the recipe, all of them, once', () => {
    const paths = (Object.keys(chapterKnobs) as ChapterName[]).flatMap((chapter) => chapterKnobs[chapter].map(({ path }) => path));
    assert.deepEqual(paths.filter((path) => !fieldAt(path)), []);
    assert.equal(new Set(paths).size, paths.length);
    assert.equal(knobsOf('flaws', facts.fields).length, chapterKnobs.flaws.length);
  });

  it('have their default on their slider', () => {
    for (const { path, slider } of Object.values(chapterKnobs).flat()) {
      const { fallback } = fieldAt(path);
      if (slider && typeof fallback === 'number') assert.isTrue(fallback >= slider.from && fallback <= slider.to, path);
    }
  });

  it('refuse with a sentence', () => {
    assert.match(plainSpaces(refusal(fieldAt('band.factor'), 0.5)), /Band factor is at least 1\./);
    assert.match(refusal(fieldAt('ground.order'), 1.5) ?? '', /whole number/);
    assert.match(refusal(fieldAt('band.factor'), Number.NaN) ?? '', /^Type a number for /);
    assert.isUndefined(refusal(fieldAt('band.factor'), 5));
  });

  it('name the step that they make', () => {
    assert.deepEqual([
      stepLabel(fieldAt('band.factor'), 5), stepLabel(fieldAt('flaws.heightNm'), 1.5), stepLabel(fieldAt('ground.wear'), false), stepLabel(fieldAt('barrier.model'), 'simmons'), stepLabel(fieldAt('stack.biasV'), undefined),
    ], ['band factor 5', 'height above ground 1.5 nm', 'tip wear off', 'model simmons', 'device bias back to default']);
  });

  it('are counted as changed only where they differ from the default', () => {
    assert.deepEqual(changedPaths('glow', facts.fields, recipe({ band: { factor: 3, minNaPerUm2: 1 }, stack: { biasV: 4 } })), ['stack.biasV', 'band.minNaPerUm2']);
    assert.equal(chapterOfChange(recipe({}), recipe({ flaws: { heightNm: 2 } })), 'flaws');
    assert.equal(chapterOfChange(recipe({ band: { shortMaxUm2: 1 } }), recipe({})), 'flaws');
    assert.isUndefined(chapterOfChange(recipe({}), recipe({ flaws: { heightNm: 2 }, ground: { order: 1 } })));
  });
});

describe('a knob', () => {
  afterEach(unmountAll);

  async function knob(path: string, more: Partial<Knob> = {}): Promise<{ element: Knob; changes: RecipeChange[] }> {
    const changes: RecipeChange[] = [];
    const element = Object.assign(new Knob(), { field: fieldAt(path), ...more });
    element.addEventListener('recipe-change', (event) => { changes.push((event as CustomEvent<RecipeChange>).detail); });
    return { element: await mount(element, 360), changes };
  }
  const enter = async (element: Knob, text: string): Promise<void> => {
    const input = element.renderRoot.querySelector<HTMLInputElement>('#control')!;
    input.value = text;
    input.dispatchEvent(new Event('change'));
    await element.updateComplete;
  };

  it('takes a typed number, refuses one out of range, and takes the default for nothing changed', async () => {
    const { element, changes } = await knob('band.factor');
    await enter(element, '0,2');
    assert.match(element.renderRoot.querySelector('[role="alert"]')?.textContent ?? '', /at least 1/);
    await enter(element, '5');
    await enter(element, '3');
    assert.deepEqual(changes, [{ path: 'band.factor', value: 5, label: 'band factor 5' }]);
  });

  it('shows a changed value with its reset', async () => {
    const { element, changes } = await knob('band.factor', { value: 5 });
    element.renderRoot.querySelector<HTMLElement>('.reset')!.click();
    assert.deepEqual(changes, [{ path: 'band.factor', value: undefined, label: 'band factor back to default' }]);
    assert.match(plainSpaces(element.renderRoot.querySelector('.hint')?.textContent), /Default: 3\./);
    element.value = undefined;
    await element.updateComplete;
    assert.isNull(element.renderRoot.querySelector('.reset'));
  });

  it('follows its slider while held and changes the recipe when it is let go', async () => {
    const { element, changes } = await knob('band.factor', { slider: { from: 1, to: 100, log: true } });
    const slider = element.renderRoot.querySelector<HTMLInputElement>('input[type="range"]')!;
    slider.value = '200';
    slider.dispatchEvent(new Event('input'));
    await element.updateComplete;
    assert.equal(element.renderRoot.querySelector<HTMLInputElement>('#control')?.value, '10');
    assert.deepEqual(changes, []);
    slider.dispatchEvent(new Event('change'));
    assert.deepEqual(changes.map(({ value }) => value), [10]);
  });

  it('tells a held handle’s places without committing them, and commits when it is let go', async () => {
    const { element, changes } = await knob('flaws.heightNm', { slider: { from: 0.1, to: 20, log: true } });
    element.live = true;
    element.meaning = (nm) => `means ${nm}`;
    const looks: unknown[] = [];
    element.addEventListener('recipe-preview', (event) => { looks.push((event as CustomEvent).detail); });
    const slider = element.renderRoot.querySelector<HTMLInputElement>('input[type="range"]')!;
    const slide = (type: string, to: number): void => {
      slider.value = String(to);
      slider.dispatchEvent(new Event(type));
    };
    slide('input', 200);
    slide('input', 300);
    await element.updateComplete;
    assert.deepEqual(looks, [{ path: 'flaws.heightNm', value: 1.4 }, { path: 'flaws.heightNm', value: 5.3 }]);
    assert.include(element.renderRoot.querySelector('.meaning')!.textContent!, 'means 5.3');
    assert.deepEqual(changes, []);
    slide('change', 300);
    assert.deepEqual(changes.map(({ value }) => value), [5.3]);
  });

  it('takes a key that is held for one movement, and says when the handle came back', async () => {
    const { element, changes } = await knob('flaws.heightNm', { slider: { from: 0.1, to: 20, log: true } });
    element.live = true;
    const looks: unknown[] = [];
    element.addEventListener('recipe-preview', (event) => { looks.push((event as CustomEvent<{ value: unknown }>).detail.value); });
    const slider = element.renderRoot.querySelector<HTMLInputElement>('input[type="range"]')!;
    const press = (to: number): void => {
      slider.dispatchEvent(new KeyboardEvent('keydown', { key: 'ArrowRight' }));
      slider.value = String(to);
      slider.dispatchEvent(new Event('input'));
      slider.dispatchEvent(new Event('change'));
    };
    press(200);
    press(201);
    assert.deepEqual(changes, []);
    slider.dispatchEvent(new KeyboardEvent('keyup', { key: 'ArrowRight' }));
    assert.equal(changes.length, 1);
    looks.length = 0;
    slider.value = '157';
    slider.dispatchEvent(new Event('input'));
    slider.dispatchEvent(new Event('change'));
    assert.deepEqual(looks, [0.8, undefined]);
    assert.equal(changes.length, 1);
  });

  it('switches and chooses', async () => {
    const flag = await knob('ground.wear');
    flag.element.renderRoot.querySelector<HTMLElement>('input')!.click();
    assert.deepEqual(flag.changes, [{ path: 'ground.wear', value: false, label: 'tip wear off' }]);
    const choice = await knob('barrier.model');
    await enter(choice.element, 'simmons');
    assert.deepEqual(choice.changes.map(({ value }) => value), ['simmons']);
  });
});

describe('the flaw table', () => {
  afterEach(unmountAll);

  it('sorts, with absent values last in both directions', () => {
    const order = (column: Parameters<typeof sortFlaws>[1], up: boolean) => sortFlaws(flaws, column, up).map(({ flaw }) => flaw);
    assert.deepEqual([order('areaUm2', false), order('peakNm', true), order('peakNm', false), order('cause', true)], [[2, 1, 3], [2, 1, 3], [1, 2, 3], [1, 2, 3]]);
  });

  it('lists reason and confidence of every flaw, and of an ambiguous one between what it is', async () => {
    const table = await mount(Object.assign(new FlawTable(), { flaws: [...flaws, { ...flaws[0]!, flaw: 4, confidence: 0.6, other: 'residue', areaUm2: 9 }] }), 400);
    const rows = [...table.renderRoot.querySelectorAll('tbody tr')].map((row) => plainSpaces(row.textContent));
    assert.match(rows[0]!, /^4 bubble or residueambiguous 0\.60 9\.00/);
    assert.deepEqual([rows[2], rows[3]].map((row) => row!.slice(0, 27)), ['2 residuelikely 0.75 0.9002', 'flat, rough edge: residue']);
    assert.equal(rows.length, 8);
  });

  it('shows the first 200, and all on demand or when a later one is selected', async () => {
    const many = Array.from({ length: 250 }, (_, i) => ({ ...flaws[0]!, flaw: i + 1, areaUm2: 250 - i }));
    const table = await mount(Object.assign(new FlawTable(), { flaws: many }), 400);
    const rows = () => table.renderRoot.querySelectorAll('tbody tr:not(.reason)').length;
    assert.equal(rows(), 200);
    table.selected = 240;
    await table.updateComplete;
    assert.equal(rows(), 250);
    table.selected = undefined;
    await table.updateComplete;
    table.renderRoot.querySelector<HTMLElement>('.more')!.click();
    await table.updateComplete;
    assert.equal(rows(), 250);
  });

  it('selects a row, says why it is what it is, and sorts by its heads', async () => {
    const table = await mount(Object.assign(new FlawTable(), { flaws }), 400);
    const heard: unknown[] = [];
    table.addEventListener('flaw-select', (event) => { heard.push((event as CustomEvent<{ flaw: number }>).detail.flaw); });
    table.renderRoot.querySelector<HTMLElement>('tbody td button')!.click();
    assert.deepEqual(heard, [2]);
    table.selected = 2;
    await table.updateComplete;
    assert.include(table.renderRoot.querySelector('.reason.whole')?.textContent ?? '', 'flat, rough edge');
    table.renderRoot.querySelector<HTMLElement>('th button')!.click();
    await table.updateComplete;
    assert.deepEqual([...table.renderRoot.querySelectorAll('tbody td button')].map((each) => each.textContent), ['1', '2', '3']);
    assert.equal(table.renderRoot.querySelector('th')?.getAttribute('aria-sort'), 'ascending');
  });
});
