import assert from 'node:assert/strict';
import { spawnSync } from 'node:child_process';
import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, describe, it } from 'node:test';
import { fileURLToPath } from 'node:url';
import { demoFiles } from '../../src/demo/demo-samples.ts';
import { ComputeError } from '../../workers/api.ts';
import type { SampleSummary, SourceFile, StageProgress } from '../../workers/api.ts';
import { createCompute } from '../../workers/compute.ts';
import type { LocalCompute } from '../../workers/local-compute.ts';

const size = 96;
const name = 'quarry-07';
const launcher = fileURLToPath(new URL('../../src/cli/evenglow.mjs', import.meta.url));
const painted = demoFiles(name, size);

/** The painted files, as bytes or as Blobs. */
function sources(as: 'bytes' | 'blob' = 'bytes'): SourceFile[] {
  return painted.map(({ name, bytes }) => ({ name, content: as === 'blob' ? new Blob([bytes as Uint8Array<ArrayBuffer>]) : (bytes as Uint8Array<ArrayBuffer>) }));
}

async function opened(compute: LocalCompute, files = sources()): Promise<string> {
  const reply = await compute.open(files);
  assert.equal(reply.samples.length, 1);
  return reply.samples[0]!.id;
}

/** Rejects with a ComputeError of this code. */
async function refused(work: Promise<unknown>, code: string): Promise<ComputeError> {
  const error = await work.then(() => undefined, (reason: unknown) => reason);
  assert.ok(error instanceof ComputeError, `rejected with ${String(error)}`);
  assert.equal(error.code, code);
  return error;
}

describe('opening files', () => {
  it('groups them and says what it cannot use, without reading any map', async () => {
    let reads = 0;
    const watched = sources('blob').map((file) => {
      const blob = file.content as Blob;
      blob.arrayBuffer = () => { reads++; return Blob.prototype.arrayBuffer.call(blob); };
      return file;
    });
    const compute = createCompute();
    const reply = await compute.open([...watched, watched[0]!, { name: 'notes.pdf', content: new Uint8Array(3) }]);
    assert.deepEqual(reply.samples.map((sample) => [sample.name, [...sample.files].sort()]), [[name, painted.map((file) => file.name).sort()]]);
    assert.deepEqual(reply.skipped, [
      { name: 'notes.pdf', reason: 'not a format Evenglow reads' },
      { name: watched[0]!.name, reason: 'another file of the same name was given with it' },
    ]);
    assert.deepEqual(reply.failed, []);
    assert.equal(reads, 0);
    await compute.appraise(1, reply.samples[0]!.id, {});
    assert.equal(reads, painted.length);
    await compute.appraise(2, reply.samples[0]!.id, { band: { factor: 2 } });
    assert.equal(reads, painted.length, 'a sample is read once for all recipes with the same scan section');
    await compute.appraise(3, reply.samples[0]!.id, { scan: { flipX: true } });
    assert.equal(reads, 2 * painted.length);
  });

  it('gives the same files opened twice ids of their own', async () => {
    const compute = createCompute();
    assert.notEqual(await opened(compute), await opened(compute));
  });

  it('offers the invented samples without painting them', async () => {
    const compute = createCompute();
    const { samples } = await compute.openDemo();
    const sample = samples.find((candidate) => candidate.name === name)!;
    assert.deepEqual([...sample.files].sort(), painted.map((file) => file.name).sort());
    assert.equal(new Set(samples.map(({ id }) => id)).size, samples.length);
  });
});

describe('an appraisal', () => {
  const compute = createCompute();
  let id = '';
  let summary: SampleSummary;
  const stages: StageProgress[] = [];
  before(async () => {
    id = await opened(compute);
    summary = await compute.appraise(1, id, {}, (progress) => stages.push(progress));
  });

  it('tells of every stage as it begins', () => {
    assert.deepEqual(stages, ['read', 'ground', 'flaws', 'barrier', 'sheet', 'ledger'].map((stage, done) => ({ stage, done, total: 6 })));
  });

  it('sums to the footprint', () => {
    const pixels = summary.ledger.reduce((sum, row) => sum + row.pixels, 0);
    const areaUm2 = summary.ledger.reduce((sum, row) => sum + row.areaUm2, 0);
    const share = summary.ledger.reduce((sum, row) => sum + row.share, 0);
    assert.ok(pixels > 0 && pixels <= size * size);
    assert.ok(Math.abs(areaUm2 - summary.footprintUm2) < 1e-9 * summary.footprintUm2);
    assert.ok(Math.abs(share - 1) < 1e-9);
    assert.equal(summary.ledger[0]!.areaUm2, summary.usable.areaUm2);
  });

  it('is plain data that survives a wire', () => {
    assert.deepEqual(structuredClone(summary), summary);
  });

  it('is made anew by another recipe, and the same again by the first', async () => {
    const wide = await compute.appraise(2, id, { band: { factor: 100 } });
    assert.ok(wide.usable.areaUm2 > summary.usable.areaUm2);
    assert.equal((wide.recipe['band'] as { factor: number }).factor, 100);
    const firstLine = new TextDecoder().decode(await compute.resultFile(id, 'ledger.csv')).split('\n')[1];
    assert.equal(firstLine?.split(',')[3], String(wide.ledger[0]!.pixels));
    const again = await compute.appraise(3, id, {});
    assert.deepEqual({ ...again, timings: {} }, { ...summary, timings: {} });
  });

  it('counts every value that a histogram spans', async () => {
    for (const info of summary.maps) {
      const low = info.log ? Math.max(info.least, 1e-30) : info.least;
      const counts = await compute.histogram({ id, map: info.name, low, high: info.most, log: info.log, bins: 40 });
      const { tail, total } = await countOf(info.name, low);
      assert.equal(counts.reduce((sum, count) => sum + count, 0), total - tail, info.name);
    }
  });

  /** Values present, and those below a limit, read point by point. */
  async function countOf(map: SampleSummary['maps'][number]['name'], low: number): Promise<{ tail: number; total: number }> {
    let tail = 0;
    let total = 0;
    for (let row = 0; row < size; row++) {
      const yUm = ((row + 0.5) * summary.heightUm) / size;
      const half = summary.widthUm / size / 2;
      for (const value of await compute.cut({ id, map, fromUm: [half, yUm], toUm: [summary.widthUm - half, yUm], points: size })) {
        if (Number.isNaN(value)) continue;
        total++;
        if (value < Math.fround(low)) tail++;
      }
    }
    return { tail, total };
  }

  it('reads the same value under a point and on a cut', async () => {
    const [xUm, yUm] = [summary.widthUm * 0.4, summary.heightUm * 0.7];
    const point = await compute.point(id, xUm, yUm);
    assert.equal(point.column, Math.floor(0.4 * size));
    assert.equal(point.row, size - 1 - Math.floor(0.7 * size));
    for (const { name: map } of summary.maps) {
      const [first, last] = await compute.cut({ id, map, fromUm: [xUm, yUm], toUm: [2 * summary.widthUm, yUm], points: 2 });
      assert.equal(first, Math.fround(point.values[map] ?? Number.NaN), map);
      assert.ok(Number.isNaN(last!), 'beside the map there is nothing');
    }
  });

  it('names a flaw at the centre of its bubble', async () => {
    const flaw = summary.flaws.find(({ cause }) => cause === 'bubble')!;
    const point = await compute.point(id, flaw.xUm, flaw.yUm);
    const { insideUm, ...listed } = flaw;
    assert.deepEqual(point.flaw, listed);
    assert.equal(point.cause, 'bubble');
    assert.equal((await compute.point(id, ...insideUm!)).flaw?.flaw, flaw.flaw, 'the point inside it lies on it');
  });

  it('corrects flaws by the recipe, says so in words, and gives the former result without', async () => {
    const flaw = summary.flaws.find(({ cause }) => cause === 'bubble')!;
    const [xUm, yUm] = flaw.insideUm!;
    const corrected = await compute.appraise(90, id, { ...summary.recipe, corrections: [{ kind: 'reclassify', xUm, yUm, cause: 'residue' }] });
    const { insideUm: _inside, ...now } = corrected.flaws.find((entry) => entry.flaw === flaw.flaw)!;
    const { insideUm: _was, other: _other, ...before } = flaw;
    assert.deepEqual(now, { ...before, cause: 'residue', confidence: 1, reason: 'set by hand: residue', byHand: true });
    assert.deepEqual(corrected.corrections, [`flaw at x ${xUm.toFixed(2)}, y ${yUm.toFixed(2)} µm set to residue`]);
    assert.equal((await compute.point(id, xUm, yUm)).cause, 'residue');
    const refused = await compute.appraise(91, id, { ...summary.recipe, corrections: [{ kind: 'reclassify', xUm, yUm }] }).catch((error: unknown) => error);
    assert.match(String(refused), /recipe\.corrections\.0\.cause: nothing is not one of bubble/);
    assert.deepEqual((await compute.appraise(92, id, summary.recipe)).ledger, summary.ledger);
  });
});

describe('what goes wrong', () => {
  it('keeps code and detail', async () => {
    const compute = createCompute();
    const id = await opened(compute);
    const wrong = await refused(compute.appraise(1, id, { band: { factor: 0 } }), 'recipe-value');
    assert.deepEqual([wrong.message, (wrong.detail as { path: string }).path], ['recipe.band.factor: 0 is below 1.', 'recipe.band.factor']);
    assert.equal((await refused(compute.appraise(1, id, { version: 99 }), 'recipe-newer')).detail instanceof Object, true);
    await refused(compute.point(id, 1, 1), 'sample-not-appraised');
    await refused(compute.point('sample-77', 1, 1), 'sample-unknown');
    await compute.appraise(1, id, {});
    await refused(compute.resultFile(id, 'other.tif'), 'result-unknown');
    await refused(compute.histogram({ id, map: 'current', low: 0, high: 1, log: true, bins: 4 }), 'request-value');
    await refused(compute.point(id, Number.NaN, 1), 'request-value');
    await compute.close(id);
    await refused(compute.resultNames(id), 'sample-unknown');
  });

  it('says which sample states no size', async () => {
    const compute = createCompute();
    const id = await opened(compute, [{ name: 'bare.height.csv', content: new TextEncoder().encode(Array.from({ length: 16 }, (_, r) => Array.from({ length: 16 }, (_, c) => (r * c) % 7)).map((row) => row.join(',')).join('\n')) }]);
    assert.match((await refused(compute.appraise(1, id, {}), 'statements-missing')).message, /^bare: .*scan\.widthUm/);
  });

  it('keeps the last good result', async () => {
    const compute = createCompute();
    const id = await opened(compute);
    const good = await compute.appraise(1, id, {});
    await refused(compute.appraise(2, id, { scan: { heightUnit: 'pA' } }), 'recipe-value');
    assert.equal(JSON.parse(new TextDecoder().decode(await compute.resultFile(id, 'verdict.json'))).usable.areaUm2, good.usable.areaUm2);
  });
});

describe('an abort', () => {
  it('stops between stages, and later calls work', async () => {
    const compute = createCompute();
    const id = await opened(compute);
    const seen: string[] = [];
    await refused(compute.appraise(1, id, {}, ({ stage }) => {
      seen.push(stage);
      if (stage === 'flaws') void compute.abort(1);
    }), 'aborted');
    assert.deepEqual(seen, ['read', 'ground', 'flaws']);
    await refused(compute.point(id, 1, 1), 'sample-not-appraised');
    assert.ok((await compute.appraise(2, id, {})).usable.areaUm2 > 0);
  });

  it('is heard when it arrives as an event while the chain is at work', async () => {
    const compute = createCompute();
    const id = await opened(compute, demoFiles(name, 256).map(({ name, bytes }) => ({ name, content: bytes as Uint8Array<ArrayBuffer> })));
    let begun = 0;
    await refused(compute.appraise(1, id, {}, () => {
      if (++begun === 2) setTimeout(() => void compute.abort(1), 0);
    }), 'aborted');
    assert.ok(begun < 6, `only heard after ${begun} of 6 stages`);
  });

  it('of another run, or of one that has ended, does nothing', async () => {
    const compute = createCompute();
    const id = await opened(compute);
    await compute.abort(5);
    await compute.appraise(5, id, {});
    await compute.abort(5);
    assert.ok((await compute.point(id, 1, 1)).cause.length > 0);
  });
});

describe('memory', () => {
  it('makes an appraisal again that had to make room, and shows the newest run', async () => {
    const compute = createCompute({ cacheBytes: 1000 });
    const [first, second] = [await opened(compute), await opened(compute)];
    const a = await compute.appraise(1, first, { band: { factor: 2 } });
    const causes = await compute.resultFile(first, 'causes.tif');
    await compute.appraise(2, second, { scan: { flipY: true } });
    assert.deepEqual(await compute.resultFile(first, 'causes.tif'), causes);
    assert.equal(JSON.parse(new TextDecoder().decode(await compute.resultFile(first, 'verdict.json'))).usable.areaUm2, a.usable.areaUm2);
  });

  it('brings a sample back by the recipe it had elsewhere', async () => {
    const compute = createCompute();
    const offer = (await compute.group(sources('blob'))).samples[0]!;
    await compute.adopt('elsewhere', offer, { band: { factor: 2 } });
    const id = await opened(compute);
    await compute.appraise(1, id, { band: { factor: 2 } });
    assert.deepEqual(await compute.resultFile('elsewhere', 'causes.tif'), await compute.resultFile(id, 'causes.tif'));
  });
});

describe('the command line', () => {
  let directory = '';
  before(async () => { directory = await mkdtemp(join(tmpdir(), 'evenglow-')); });
  after(() => rm(directory, { recursive: true, force: true }));

  it('writes the very files that the computation gives', async () => {
    for (const file of painted) await writeFile(join(directory, file.name), file.bytes);
    const done = spawnSync(process.execPath, [launcher, 'appraise', directory, '--out', join(directory, 'out'), '--set', 'band.factor=2'], { encoding: 'utf8' });
    assert.equal(done.status, 0, done.stderr);
    const compute = createCompute();
    const id = await opened(compute);
    await compute.appraise(1, id, { band: { factor: 2 } });
    const names = await compute.resultNames(id);
    assert.deepEqual((await readdir(join(directory, 'out', name))).sort(), [...names].sort());
    for (const file of names.filter((candidate) => candidate !== 'verdict.json')) {
      assert.ok(Buffer.compare(await readFile(join(directory, 'out', name, file)), await compute.resultFile(id, file)) === 0, `${file} differs`);
    }
    const [written, given] = [await readFile(join(directory, 'out', name, 'verdict.json'), 'utf8'), new TextDecoder().decode(await compute.resultFile(id, 'verdict.json'))].map((text) => JSON.parse(text) as { timings: object });
    assert.deepEqual(Object.keys(written!.timings), Object.keys(given!.timings));
    assert.deepEqual({ ...written, timings: {} }, { ...given, timings: {} });
  });
});
