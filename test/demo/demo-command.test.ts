import assert from 'node:assert/strict';
import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, test } from 'node:test';
import { main } from '../../src/cli/main.ts';
import { demoFiles, demoSamples } from '../../src/demo/demo-samples.ts';

let folder = '';
before(async () => {
  folder = await mkdtemp(join(tmpdir(), 'evenglow-demo-'));
});
after(() => rm(folder, { recursive: true, force: true }));

async function run(...argv: string[]): Promise<{ code: number; out: string; err: string }> {
  let out = '';
  let err = '';
  const code = await main(argv, { out: (text) => void (out += text), err: (text) => void (err += text), terminal: false });
  return { code, out, err };
}

test('demo writes every file of every sample, says that they are invented, keeps what is the same, refuses what differs, replaces with --force', async () => {
  const directory = join(folder, 'new', 'demo');
  const first = await run('demo', directory);
  assert.equal(first.code, 0);
  assert.match(first.out, /invented/);
  const expected = demoSamples.flatMap(({ name }) => demoFiles(name));
  assert.deepEqual((await readdir(directory)).sort(), expected.map(({ name }) => name).sort());
  for (const { name, bytes } of expected) assert.equal(Buffer.compare(await readFile(join(directory, name)), bytes), 0, name);
  for (const { name } of demoSamples) assert.ok(first.out.includes(name));

  const second = await run('demo', directory);
  assert.equal(second.code, 0);
  assert.match(second.out, /0 files written, 3 there already/);

  const changed = join(directory, expected[0]!.name);
  await writeFile(changed, 'mine');
  await rm(join(directory, expected[1]!.name));
  const refused = await run('demo', directory);
  assert.equal(refused.code, 2);
  assert.equal(refused.out, '');
  const said = refused.err.split('\n').filter((line) => line.startsWith('evenglow: '));
  assert.equal(said.length, 1);
  assert.ok(said[0]!.includes(changed) && said[0]!.includes('--force'), said[0]);
  assert.equal(await readFile(changed, 'utf8'), 'mine');
  assert.ok(!(await readdir(directory)).includes(expected[1]!.name));

  const forced = await run('demo', directory, '--force');
  assert.equal(forced.code, 0);
  assert.equal(Buffer.compare(await readFile(changed), expected[0]!.bytes), 0);
});

test('demo without a folder, with two, or with one that cannot be made, ends with a sentence and code 2', async () => {
  const none = await run('demo');
  assert.equal(none.code, 2);
  assert.match(none.err, /demo needs a folder/);
  const two = await run('demo', 'a', 'b');
  assert.equal(two.code, 2);
  assert.match(two.err, /takes no argument "b"/);
  const file = join(folder, 'file');
  await writeFile(file, '');
  const blocked = await run('demo', join(file, 'demo'));
  assert.equal(blocked.code, 2);
  assert.match(blocked.err, /cannot be written .*choose another folder/);
});
