/** The computation behind real workers: the same results, and a page that goes on whatever happens to them. */
import { assert } from 'chai';
import { demoFiles } from '../../src/demo/demo-samples.ts';
import { ComputeError } from '../../workers/api.ts';
import type { SourceFile } from '../../workers/api.ts';
import type { ComputePool, Lost } from '../../workers/client.ts';
import { createPool } from '../../workers/client.ts';
import { createCompute } from '../../workers/compute.ts';

const script = new URL('../../workers/compute.worker.ts', import.meta.url).href;

function painted(name: string, size: number): SourceFile[] {
  return demoFiles(name, size).map((file) => ({ name: file.name, content: file.bytes as Uint8Array<ArrayBuffer> }));
}

/** The program's worker with two orders more: `crash` throws outside any call, `hang` never returns. */
function fragileWorker(): Worker {
  const text = `import ${JSON.stringify(script)};
    addEventListener('message', ({ data }) => {
      if (data === 'crash') throw new Error('crash of the test');
      if (data === 'hang') for (;;);
    });`;
  return new Worker(URL.createObjectURL(new Blob([text], { type: 'text/javascript' })), { type: 'module' });
}

async function refusal(work: Promise<unknown>): Promise<ComputeError> {
  const error = await work.then(() => undefined, (reason: unknown) => reason);
  assert.instanceOf(error, ComputeError);
  return error as ComputeError;
}

describe('a pool of workers', () => {
  let pool: ComputePool;
  let workers: Worker[];

  beforeEach(() => { workers = []; });
  afterEach(() => { pool.dispose(); });

  function start(size: number, patienceMs = 5000): void {
    pool = createPool({
      size, patienceMs,
      worker: () => {
        const worker = fragileWorker();
        workers.push(worker);
        return worker;
      },
    });
  }

  it('gives the bytes that the computation gives without a worker', async () => {
    pool = createPool();
    const files = painted('quarry-07', 128);
    const local = createCompute();
    const [there, here] = [(await pool.open(files)).samples[0]!, (await local.open(files)).samples[0]!];
    const stages: string[] = [];
    const [summary, expected] = [await pool.appraise(1, there.id, {}, ({ stage }) => stages.push(stage)), await local.appraise(1, here.id, {})];
    assert.deepEqual({ ...summary, id: '', timings: {} }, { ...expected, id: '', timings: {} });
    assert.deepEqual(stages, ['read', 'ground', 'flaws', 'barrier', 'sheet', 'ledger']);
    for (const name of (await pool.resultNames(there.id)).filter((candidate) => candidate !== 'verdict.json')) {
      assert.deepEqual(await pool.resultFile(there.id, name), await local.resultFile(here.id, name), name);
    }
    const request = { map: 'height', left: 0, top: 0, columns: 128, rows: 128, width: 300, height: 300, low: 0, high: 10, log: false, causes: 'all', pixelRatio: 1 } as const;
    assert.deepEqual(await pool.picture({ ...request, id: there.id }), await local.picture({ ...request, id: here.id }));
    const cut = { map: 'current', fromUm: [0, 0], toUm: [5, 5], points: 100 } as const;
    assert.deepEqual(await pool.cut({ ...cut, id: there.id }), await local.cut({ ...cut, id: here.id }));
    assert.deepEqual(await pool.point(there.id, 3, 4), await local.point(here.id, 3, 4));
    // Kernels are loaded in the worker, and when is its own affair.
    assert.deepEqual({ ...await pool.facts(), kernels: false }, await local.facts());
  });

  it('leaves the bytes it is given as they are', async () => {
    start(1);
    const files = painted('quarry-07', 64);
    const { samples } = await pool.open(files);
    await pool.appraise(1, samples[0]!.id, {});
    assert.isAbove((files[0]!.content as Uint8Array).byteLength, 64 * 64 * 4);
  });

  it('keeps code, message and detail of a problem', async () => {
    start(1);
    const { samples } = await pool.open(painted('quarry-07', 64));
    const error = await refusal(pool.appraise(1, samples[0]!.id, { band: { factor: 0 } }));
    assert.deepEqual([error.code, error.message, error.detail], ['recipe-value', 'recipe.band.factor: 0 is below 1.', { path: 'recipe.band.factor', reason: '0 is below 1' }]);
    assert.equal((await refusal(pool.point('sample-99', 0, 0))).code, 'sample-unknown');
    assert.equal((await refusal(pool.point(samples[0]!.id, 0, 0))).code, 'sample-not-appraised');
  });

  it('spreads samples over its workers and starts no more than it needs', async () => {
    start(2);
    const ids: string[] = [];
    for (const name of ['quarry-03', 'quarry-07', 'quarry-11']) ids.push((await pool.open(painted(name, 64))).samples[0]!.id);
    assert.equal(new Set(ids).size, 3);
    const summaries = await Promise.all(ids.map((id, run) => pool.appraise(run, id, {})));
    assert.deepEqual(summaries.map(({ id, name }) => [id, name]), [[ids[0], 'quarry-03'], [ids[1], 'quarry-07'], [ids[2], 'quarry-11']]);
    assert.equal(workers.length, 2);
    await pool.close(ids[1]!);
    assert.equal((await refusal(pool.resultNames(ids[1]!))).code, 'sample-unknown');
  });

  it('opens the invented samples', async () => {
    start(2);
    const { samples } = await pool.openDemo();
    assert.isAbove(samples.length, 2);
    const summary = await pool.appraise(1, samples[1]!.id, {});
    assert.deepEqual(summary.sources.map(({ name }) => name).sort(), [...samples[1]!.files].sort());
  });

  it('rejects at once when it is told to stop, and goes on', async () => {
    start(1);
    const { samples } = await pool.open(painted('quarry-07', 256));
    const id = samples[0]!.id;
    const stages: string[] = [];
    const begun = new Promise<void>((resolve) => {
      void pool.appraise(1, id, {}, ({ stage }) => {
        stages.push(stage);
        resolve();
      }).then(() => assert.fail('it should have stopped'), (error: ComputeError) => stages.push(error.code));
    });
    await begun;
    await pool.abort(1);
    await Promise.resolve();
    assert.equal(stages.at(-1), 'aborted');
    assert.isAbove((await pool.appraise(2, id, {})).usable.areaUm2, 0);
    assert.equal(stages.at(-1), 'aborted', 'nothing is told of a run that was stopped');
    assert.equal(workers.length, 1);
  });

  it('replaces a worker that does not hear, and lets the others’ calls go on', async () => {
    start(1, 200);
    const [first, second] = [(await pool.open(painted('quarry-07', 64))).samples[0]!.id, (await pool.open(painted('quarry-11', 64))).samples[0]!.id];
    const before = await pool.appraise(1, first, { band: { factor: 2 } });
    workers[0]!.postMessage('hang');
    const stopped = refusal(pool.appraise(2, first, {}));
    const waiting = pool.appraise(3, second, {});
    await pool.abort(2);
    assert.equal((await stopped).code, 'aborted');
    assert.equal((await waiting).name, 'quarry-11');
    assert.equal(workers.length, 2);
    // The sample of the aborted run is as it was before it.
    const verdict = JSON.parse(new TextDecoder().decode(await pool.resultFile(first, 'verdict.json'))) as { usable: { areaUm2: number }; recipe: { band: { factor: number } } };
    assert.deepEqual([verdict.usable.areaUm2, verdict.recipe.band.factor], [before.usable.areaUm2, 2]);
  });

  it('survives the crash of a worker', async () => {
    start(1);
    const lost: Lost[] = [];
    pool.onLost((event) => lost.push(event));
    const id = (await pool.open(painted('quarry-07', 128))).samples[0]!.id;
    const good = await pool.appraise(1, id, {});
    const causes = await pool.resultFile(id, 'causes.tif');
    const killed = refusal(pool.appraise(2, id, { scan: { flipX: true } }, ({ stage }) => {
      if (stage === 'ground') workers[0]!.postMessage('crash');
    }));
    const error = await killed;
    assert.equal(error.code, 'worker-lost');
    assert.match(error.message, /crash of the test/);
    assert.deepEqual(lost.map(({ samples }) => samples), [[id]]);
    assert.deepEqual(await pool.resultFile(id, 'causes.tif'), causes, 'what was on show is made again');
    const again = await pool.appraise(3, id, {});
    assert.deepEqual({ ...again, timings: {} }, { ...good, timings: {} });
    assert.equal(workers.length, 2);
  });

  it('rejects what waits when a worker’s script does not load, and does not start it over and over', async () => {
    let started = 0;
    pool = createPool({ size: 1, worker: () => { started++; return new Worker(URL.createObjectURL(new Blob(['no script'], { type: 'text/javascript' })), { type: 'module' }); } });
    assert.equal((await refusal(pool.facts())).code, 'worker-lost');
    await new Promise((resolve) => setTimeout(resolve, 100));
    assert.equal(started, 1);
  });

  it('rejects everything once it is disposed of', async () => {
    start(1);
    const id = (await pool.open(painted('quarry-07', 64))).samples[0]!.id;
    const waiting = refusal(pool.appraise(1, id, {}));
    pool.dispose();
    assert.equal((await waiting).code, 'worker-lost');
    assert.equal((await refusal(pool.appraise(2, id, {}))).code, 'worker-lost');
  });
});
