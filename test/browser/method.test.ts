/** The method page: what it says, how one comes there and back. */
import { assert } from 'chai';
import { App } from '../../web/app/app.ts';
import { MethodPlace, topicIds } from '../../web/method/method-place.ts';
import { chapterKnobs } from '../../web/sample/knobs.ts';
import { groundFacts } from '../../web/sample/ground-facts.ts';
import { openFiles } from '../../web/session/actions/open-files.ts';
import { go } from '../../web/session/actions/settings.ts';
import { restore, serialise } from '../../web/session/document.ts';
import { Session } from '../../web/session/session.ts';
import { FakeCompute, createSummary, settle } from './fake-compute.ts';
import { facts, mount, settled, summary, unmountAll } from './fake-sample.ts';

describe('the method page', () => {
  afterEach(unmountAll);

  it('explains every topic that a knob or a fact names, with limits', async () => {
    const named = [...Object.values(chapterKnobs).flat().flatMap(({ topic }) => (topic === undefined ? [] : [topic])), ...groundFacts(summary).map(({ topic }) => topic)];
    for (const topic of named) assert.include(topicIds, topic);
    assert.equal(new Set(topicIds).size, topicIds.length);
    const page = await mount(Object.assign(new MethodPlace(), { topic: 'wear', fields: facts.fields }), 1200, 800);
    const sections = [...page.renderRoot.querySelectorAll('section')];
    assert.deepEqual(sections.map(({ id }) => id), [...topicIds]);
    for (const section of sections) assert.match(section.textContent, /Limits\. \S/);
  });

  it('gives settings with the defaults of the recipe itself', async () => {
    const page = await mount(Object.assign(new MethodPlace(), { topic: 'thresholds', fields: facts.fields }), 1200, 800);
    const text = page.renderRoot.querySelector('#thresholds')!.textContent.replace(/\s+/g, ' ');
    for (const path of ['flaws.heightNm', 'flaws.heightNoise', 'flaws.dropDecades']) {
      const { title, fallback } = facts.fields.find((field) => field.path === path)!;
      assert.include(text, `${title}: ${String(fallback)}`);
    }
  });

  it('lists the products of the form up to order 5', async () => {
    const page = await mount(Object.assign(new MethodPlace(), { topic: 'form', fields: facts.fields }), 1200, 800);
    const rows = [...page.renderRoot.querySelectorAll('#form tbody tr')].map((row) => [...row.querySelectorAll('td')].map((cell) => cell.textContent));
    rows.forEach(([order, terms, count], n) => {
      assert.equal(order, String(n));
      assert.equal(terms!.split(',').length, n + 1);
      assert.equal(count, String(((n + 1) * (n + 2)) / 2));
    });
    assert.equal(rows.length, 6);
  });

  it('opens at the topic asked for with the keyboard there, and leads back', async () => {
    const page = await mount(Object.assign(new MethodPlace(), { topic: 'lag', fields: facts.fields }), 1200, 800);
    assert.equal((page.renderRoot as ShadowRoot).activeElement?.id, 'lag');
    [...page.renderRoot.querySelectorAll<HTMLElement>('nav li button')].find((button) => button.textContent.includes('Wear'))!.click();
    await settled();
    assert.equal((page.renderRoot as ShadowRoot).activeElement?.id, 'wear');
    let heard = 0;
    page.addEventListener('back', () => { heard++; });
    page.renderRoot.querySelector<HTMLElement>('nav button')!.click();
    assert.equal(heard, 1);
  });

  it('is a place over the sample, which stays as it was left; a saved session comes back to the sample', async () => {
    const compute = new FakeCompute();
    compute.reply = { samples: [{ id: 's', name: 's', files: ['s.tif'] }], skipped: [], failed: [] };
    const session = new Session(compute);
    void session.do(openFiles, [new File([''], 's.tif')]);
    await settle();
    compute.last('s').answer({ ...createSummary('s') });
    await settle();
    session.do(go, { name: 'sample', id: 's' });
    const app = new App();
    app.session = session;
    await mount(app, 1200, 800);
    const sample = (): HTMLElement => app.renderRoot.querySelector<HTMLElement>('eg-sample-place')!;
    const first = sample();
    first.dispatchEvent(new CustomEvent('how', { detail: { topic: 'form' }, bubbles: true, composed: true }));
    for (let i = 0; i < 50 && !app.renderRoot.querySelector('eg-method-place'); i++) await settled();
    assert.isTrue(sample() === first && first.hidden);
    assert.deepEqual(restore(serialise(session.state)).place, { name: 'sample', id: 'saved s' });
    app.renderRoot.querySelector('eg-method-place')!.dispatchEvent(new CustomEvent('back', { bubbles: true, composed: true }));
    await settled();
    assert.isTrue(sample() === first && !first.hidden);
    assert.isNull(app.renderRoot.querySelector('eg-method-place'));
  });
});
