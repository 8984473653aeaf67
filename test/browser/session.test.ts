/** The session with a computation that answers when told to: histories, late answers, questions, lost workers, the document. */
import { assert } from 'chai';
import { recipeSchema } from '../../src/recipe/recipe.ts';
import { settleStatements } from '../../src/read/settle-statements.ts';
import { scanSection } from '../../src/read/recipe.ts';
import { Problem } from '../../src/problems/problem.ts';
import { questionsOf } from '../../web/import/questions.ts';
import { answer } from '../../web/session/actions/answer.ts';
import { answerPages } from '../../web/session/actions/answer-pages.ts';
import { cancel } from '../../web/session/actions/cancel.ts';
import { changeRecipe } from '../../web/session/actions/change-recipe.ts';
import { clearDemo } from '../../web/session/actions/clear-demo.ts';
import { redo, undo } from '../../web/session/actions/move-in-history.ts';
import { openDemo } from '../../web/session/actions/open-demo.ts';
import { openFiles } from '../../web/session/actions/open-files.ts';
import { retry } from '../../web/session/actions/retry.ts';
import { go, setRequired } from '../../web/session/actions/settings.ts';
import { restore, serialise } from '../../web/session/document.ts';
import { emptyRecipe, recipeOf, withValue } from '../../web/session/recipe.ts';
import { Session } from '../../web/session/session.ts';
import { FakeCompute, createSummary, settle } from './fake-compute.ts';

const offer = (...ids: string[]) => ({ samples: ids.map((id) => ({ id, name: id, files: [`${id}.tif`] })), skipped: [], failed: [] });
const file = (name: string): File => new File(['x'], name);

let compute: FakeCompute;
let session: Session;

beforeEach(() => {
  compute = new FakeCompute();
  session = new Session(compute);
});

/** A session with one appraised sample `a`. */
async function withReady(): Promise<void> {
  compute.reply = offer('a');
  void session.do(openFiles, [file('a.tif')]);
  await settle();
  compute.last('a').answer(createSummary('a'));
  await settle();
}

const sampleA = () => session.sample('a')!;

describe('a recipe in the session', () => {
  it('is one that the computation accepts, with values and without', () => {
    assert.equal(recipeSchema.parse(emptyRecipe).band.factor, 3);
    assert.equal(recipeSchema.parse(withValue(emptyRecipe, 'band.factor', 5)).band.factor, 5);
  });

  it('holds only what was set', () => {
    const set = withValue(withValue(emptyRecipe, 'band.factor', 5), 'band.rimUm', 1);
    assert.deepEqual(set, { ...emptyRecipe, band: { factor: 5, rimUm: 1 } });
    assert.deepEqual(withValue(withValue(set, 'band.factor', undefined), 'band.rimUm', undefined), emptyRecipe);
    assert.throws(() => withValue(emptyRecipe, 'band', 1), RangeError);
  });
});

describe('the session', () => {
  it('appraises all samples at once and fills them in as they finish', async () => {
    compute.reply = offer('a', 'b');
    void session.do(openFiles, [file('a.tif'), file('b.tif')]);
    await settle();
    assert.deepEqual(compute.asked.map(({ id }) => id), ['a', 'b']);
    assert.deepEqual(session.state.samples.map(({ status }) => status), ['waiting', 'waiting']);
    compute.last('b').onStage?.({ stage: 'flaws', done: 2, total: 5 });
    assert.deepEqual(session.sample('b')?.progress, { stage: 'flaws', done: 2, total: 5 });
    compute.last('b').answer(createSummary('b'));
    await settle();
    assert.deepEqual(session.state.samples.map(({ status }) => status), ['waiting', 'ready']);
    assert.isUndefined(session.sample('b')?.progress);
  });

  it('says what could not be used and goes on with the rest', async () => {
    compute.reply = { ...offer('a'), failed: [{ name: 'b.doc', message: 'b.doc is no map.' }], skipped: [{ name: 'c.txt', reason: 'no map' }] };
    void session.do(openFiles, [file('a.tif')]);
    await settle();
    assert.deepEqual(session.state.notices.map(({ message }) => message), ['b.doc is no map.', 'c.txt was left out: no map.']);
    assert.equal(session.state.samples.length, 1);
  });

  it('undoes and redoes recipes, and cuts what was undone at the next change', async () => {
    await withReady();
    void session.do(changeRecipe, 'a', 'band.factor', 5, 'band factor 5');
    void session.do(changeRecipe, 'a', 'band.factor', 7, 'band factor 7');
    void session.do(undo, 'a');
    await settle();
    assert.deepEqual(recipeOf(sampleA()), { ...emptyRecipe, band: { factor: 5 } });
    void session.do(redo, 'a');
    assert.deepEqual(recipeOf(sampleA()), { ...emptyRecipe, band: { factor: 7 } });
    void session.do(undo, 'a');
    void session.do(undo, 'a');
    void session.do(undo, 'a');
    assert.equal(sampleA().at, 0);
    void session.do(changeRecipe, 'a', 'flaws.noSuch', 1, 'another');
    assert.deepEqual(sampleA().history.map(({ label }) => label), ['', 'another']);
    assert.deepEqual(compute.last('a').recipe, { ...emptyRecipe, flaws: { noSuch: 1 } });
  });

  it('remembers the usable area before a change, and keeps the result on show meanwhile', async () => {
    await withReady();
    void session.do(changeRecipe, 'a', 'band.factor', 5, 'band factor 5');
    assert.equal(sampleA().previous?.usableUm2, 40);
    assert.equal(sampleA().summary?.usable.areaUm2, 40);
    assert.equal(sampleA().status, 'working');
  });

  it('does nothing for a change without a difference', async () => {
    await withReady();
    await session.do(changeRecipe, 'a', 'band.factor', undefined, 'band factor as it was');
    assert.equal(sampleA().history.length, 1);
    assert.equal(compute.asked.length, 1);
  });

  it('aborts a run that is overtaken and drops its late answer, progress and failure', async () => {
    await withReady();
    void session.do(changeRecipe, 'a', 'band.factor', 5, '5');
    const late = compute.last('a');
    void session.do(changeRecipe, 'a', 'band.factor', 7, '7');
    const newest = compute.last('a');
    assert.deepEqual(compute.aborted, [late.run]);
    newest.answer(createSummary('a', { areaUm2: 7 }));
    await settle();
    late.onStage?.({ stage: 'late', done: 1, total: 2 });
    late.answer(createSummary('a', { areaUm2: 5 }));
    await settle();
    assert.equal(sampleA().summary?.usable.areaUm2, 7);
    assert.equal(sampleA().status, 'ready');
    assert.isUndefined(sampleA().progress);
  });

  it('cancels at once, drops the answer that comes all the same, and can be started again', async () => {
    compute.reply = offer('a');
    void session.do(openFiles, [file('a.tif')]);
    await settle();
    const { run, answer: answerIt } = compute.last('a');
    session.do(cancel, 'a');
    assert.equal(sampleA().status, 'cancelled');
    assert.deepEqual(compute.aborted, [run]);
    answerIt(createSummary('a'));
    await settle();
    assert.equal(sampleA().status, 'cancelled');
    void session.do(retry, 'a');
    compute.last('a').answer(createSummary('a'));
    await settle();
    assert.equal(sampleA().status, 'ready');
  });

  it('fails with the sentence, and keeps the others', async () => {
    compute.reply = offer('a', 'b');
    void session.do(openFiles, [file('a.tif')]);
    await settle();
    compute.last('a').fail('tiff-damaged');
    compute.last('b').answer(createSummary('b'));
    await settle();
    assert.equal(sampleA().status, 'failed');
    assert.equal(sampleA().error?.message, 'it failed with tiff-damaged.');
    assert.equal(session.sample('b')?.status, 'ready');
  });

  it('repeats a run once when its worker was lost, and says so', async () => {
    compute.reply = offer('a');
    void session.do(openFiles, [file('a.tif')]);
    await settle();
    compute.last('a').fail('worker-lost');
    await settle();
    assert.equal(compute.asked.length, 2);
    assert.equal(session.state.notices.length, 1);
    compute.last('a').fail('worker-lost');
    await settle();
    assert.equal(compute.asked.length, 2);
    assert.equal(sampleA().status, 'failed');
  });

  it('takes the invented samples out with one action and leaves the others', async () => {
    await withReady();
    compute.reply = offer('d1', 'd2');
    void session.do(openDemo);
    await settle();
    session.do(go, { name: 'sample', id: 'd1' });
    session.do(clearDemo);
    assert.deepEqual(session.state.samples.map(({ id }) => id), ['a']);
    assert.deepEqual(compute.closed, ['d1', 'd2']);
    assert.deepEqual(session.state.place, { name: 'tray' });
  });

  it('judges by no area that is not above 0', () => {
    session.do(setRequired, 12);
    assert.equal(session.state.requiredUm2, 12);
    session.do(setRequired, 0);
    assert.isUndefined(session.state.requiredUm2);
  });
});

describe('files that do not state something', () => {
  const detail = { sample: 'a', what: 'the size of the map', options: '--set scan.widthUm=10' };

  it('ask, are answered for all that ask, and are appraised', async () => {
    compute.reply = offer('a', 'b');
    void session.do(openFiles, [file('a.tif')]);
    await settle();
    compute.last('a').fail('statements-missing', detail);
    compute.last('b').fail('statements-missing', detail);
    await settle();
    assert.deepEqual(session.state.samples.map(({ status }) => status), ['asking', 'asking']);
    void session.do(answer, ['a', 'b'], { 'scan.widthUm': 10, 'scan.biasV': 5 }, 'stated width 10 µm');
    assert.deepEqual(compute.last('b').recipe, { ...emptyRecipe, scan: { widthUm: 10, biasV: 5 } });
    assert.deepEqual(sampleA().history.map(({ label }) => label), ['', 'stated width 10 µm']);
    compute.last('a').answer(createSummary('a'));
    await settle();
    assert.equal(sampleA().status, 'ready');
    assert.isUndefined(sampleA().error);
  });

  it('are asked exactly what the reader finds missing', () => {
    const decoded = { label: '', columns: 4, rows: 4, pitches: [] };
    const map = { file: 'a.npy', source: 'a.npy', named: { file: 'a.npy' }, decoded, pages: 1, direction: 'forward' };
    assert.deepEqual(askedFor([map]), ['scan.channel', 'scan.heightUnit', 'scan.currentUnit', 'scan.widthUm', 'scan.heightUm', 'scan.biasV']);
    const sized = { ...decoded, pitches: [{ by: 'tag', xM: 1e-8, yM: 1e-8 }] };
    assert.deepEqual(askedFor([{ ...map, quantity: 'height', decoded: sized }]), ['scan.heightUnit', 'scan.biasV']);
  });

  it('are asked for the unit of a flat height and which of two sizes is right, not for what the recipe already says', () => {
    assert.deepEqual(questionsOf({ code: 'map-flat' }).length, 1);
    assert.deepEqual(questionsOf({ code: 'size-disagreement', detail: { way: 'correct the wrong one, or decide with --set scan.widthUm' } }).length, 2);
    assert.deepEqual(questionsOf({ code: 'size-disagreement', detail: { way: 'leave out scan.widthUm, or correct the file' } }), []);
    assert.deepEqual(questionsOf({ code: 'unit-disagreement', detail: { by: 'scan.heightUnit', asked: 'nm' } }), []);
    assert.deepEqual(questionsOf({ code: 'tiff-damaged' }), []);
  });

  it('are opened again with a sidecar where several maps do not say what they are', async () => {
    compute.reply = offer('a');
    void session.do(openFiles, [file('a.tif')]);
    await settle();
    compute.last('a').fail('role-unknown-pages', { file: 'a.tif', pages: 2, example: 'a.tif' });
    await settle();
    assert.equal(sampleA().status, 'asking');
    compute.reply = { samples: [{ id: 'a2', name: 'a', files: ['a.tif', 'a.json'] }], skipped: [], failed: [] };
    void session.do(answerPages, 'a', 'a.tif', { height: 1, current: 2 });
    await settle();
    assert.deepEqual(compute.opened.at(-1), ['a.tif', 'a.json']);
    const sidecar = session.handles.get('a2')?.find(({ name }) => name === 'a.json')?.content;
    assert.deepEqual(JSON.parse(await (sidecar as Blob).text()), { height: 'a.tif#1', current: 'a.tif#2' });
    compute.last('a2').answer(createSummary('a2'));
    await settle();
    assert.deepEqual(session.state.samples.map(({ id, status }) => [id, status]), [['a2', 'ready']]);
    assert.deepEqual(compute.closed, ['a']);
  });
});

describe('the session as a document', () => {
  it('holds recipes and names, nothing that is computed', async () => {
    await withReady();
    const text = serialise(session.state);
    assert.notInclude(text, 'ledger');
    assert.deepEqual(Object.keys(JSON.parse(text).samples[0]).sort(), ['at', 'files', 'history', 'id', 'name']);
  });

  it('gives its recipes back when the same files are opened', async () => {
    await withReady();
    void session.do(changeRecipe, 'a', 'band.factor', 5, 'band factor 5');
    session.do(setRequired, 12);
    const state = restore(serialise(session.state));
    assert.equal(state.requiredUm2, 12);
    assert.equal(state.samples[0]?.status, 'failed');
    assert.equal(serialise(restore(serialise(state))), serialise(state));
    const other = new FakeCompute();
    const again = new Session(other, state);
    other.reply = offer('a');
    void again.do(openFiles, [file('a.tif')]);
    await settle();
    assert.equal(again.state.samples.length, 1);
    assert.deepEqual(other.last('a').recipe, { ...emptyRecipe, band: { factor: 5 } });
    void again.do(undo, 'a');
    assert.deepEqual(other.last('a').recipe, emptyRecipe);
  });

  it('refuses what is no session, newer, or damaged', () => {
    assert.throws(() => restore('{'), /not valid JSON/);
    assert.throws(() => restore('{"format":"other"}'), /not a saved session/);
    assert.throws(() => restore('{"format":"evenglow-session","version":2}'), /version 2/);
    assert.throws(() => restore('{"format":"evenglow-session","version":1,"samples":[{}]}'), /sample 1 has no name/);
  });
});

function askedFor(maps: readonly object[]): string[] {
  try {
    settleStatements('a', maps as unknown as Parameters<typeof settleStatements>[1], { stated: {}, by: 'nobody' }, scanSection.parse({}));
  } catch (error) {
    if (error instanceof Problem) return questionsOf(error).map((question) => (question.kind === 'field' ? question.path : question.file));
    throw error;
  }
  throw new Error('nothing is missing');
}
