import assert from 'node:assert/strict';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { after, before, test } from 'node:test';
import { main } from '../../src/cli/main.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { assertClose } from '../fixtures/assert-close.ts';
import { measureCurve } from '../iv/measure-curve.ts';

let folder = '';
const path = (name: string) => join(folder, name);
const barrier = { heightEv: 2.5, massRatio: 0.5, thicknessM: 4e-9 };

before(async () => {
  folder = await mkdtemp(join(tmpdir(), 'evenglow-iv-'));
  const random = seededRandom('command');
  for (const temperatureK of [77, 300]) {
    const { biasV, currentA } = measureCurve(random, { barrier, areaNm2: 20, toV: 6, points: 121, noiseA: 1e-13, share: 0.02 });
    const rows = Array.from(biasV, (bias, k) => `${bias.toFixed(3)},${(currentA[k]! * 1e9).toExponential(6)},${temperatureK}`);
    await writeFile(path(`pad-${temperatureK}.csv`), ['bias_V,current_nA,temperature_K', ...rows].join('\n'));
  }
  await writeFile(path('bad.csv'), 'bias_V,current_nA\n1,2\n2,oops\n');
});
after(() => rm(folder, { recursive: true, force: true }));

async function run(...argv: string[]): Promise<{ code: number; out: string; err: string }> {
  let out = '';
  let err = '';
  const code = await main(['iv', ...argv], { out: (text) => void (out += text), err: (text) => void (err += text), terminal: false });
  return { code, out, err };
}

interface Printed {
  readonly curves: readonly Record<string, unknown>[];
  readonly temperature?: Record<string, unknown>;
  readonly warnings: readonly { code: string; message: string }[];
  readonly failed?: readonly { name: string; message: string }[];
}

test('--json: the agreed keys, numbers only, nothing on standard error', async () => {
  const { code, out, err } = await run(path('pad-77.csv'), path('pad-300.csv'), '--thickness-nm', '4', '--area-nm2', '20', '--json');
  assert.equal(code, 0);
  assert.equal(err, '');
  assert.doesNotMatch(out, /null/);
  const printed = JSON.parse(out) as Printed;
  assert.deepEqual(printed.curves.map((curve) => [curve['name'], curve['points'], curve['temperatureK']]), [['pad-77', 121, 77], ['pad-300', 121, 300]]);
  for (const curve of printed.curves) {
    for (const key of ['slopeV', 'slopeSe', 'intercept', 'interceptSe', 'barrierEv', 'barrierSe', 'thicknessNm', 'onsetV']) assert.equal(typeof curve[key], 'number', key);
    assert.equal((curve['used'] as number[]).length, 2);
    assertClose(curve['slopeV'] as number, -76.37, 0.03);
  }
  assert.equal(printed.temperature?.['verdict'], 'tunnelling');
  assert.equal(typeof printed.temperature?.['spreadShare'], 'number');
  assert.ok(printed.warnings.some((warning) => warning.code === 'iv-breakdown'));
});

test('the area in µm² and in nm² is the same area; for people there are lines, notes and the caution', async () => {
  const inNm2 = await run(path('pad-300.csv'), '--area-nm2', '5e6', '--json');
  const inUm2 = await run(path('pad-300.csv'), '--area-um2', '5', '--json');
  assert.equal(inNm2.out, inUm2.out);
  assert.match(inUm2.out, /iv-area/);
  const words = await run(path('pad-300.csv'));
  assert.equal(words.code, 0);
  assert.match(words.out, /^pad-300\n {2}points {6}121 at 300 K\n {2}line .* V\/nm\n {2}slope .* ± .* of ln\(I\/V²\) over 1\/V\n {2}thickness .* ± .* nm at 2\.5 eV/);
  assert.match(words.out, /Caution: .*breaks down near 1\.2 V\/nm/);
  assert.match(words.err, /note: pad-300: .*breakdown of hBN/);
});

test('a bad file is one sentence with file, line and value; the others are complete; code 3', async () => {
  const { code, out, err } = await run(path('bad.csv'), path('pad-300.csv'), path('absent.csv'), '--json');
  assert.equal(code, 3);
  assert.deepEqual(err.trim().split('\n').length, 2);
  assert.match(err, /bad\.csv, line 3, current: "oops" is not a number; write the number/);
  assert.match(err, /absent\.csv: there is no such file/);
  const printed = JSON.parse(out) as Printed;
  assert.equal(printed.curves.length, 1);
  assert.deepEqual(printed.failed?.map((one) => one.name), ['bad.csv', 'absent.csv']);
  const alone = await run(path('bad.csv'));
  assert.deepEqual([alone.code, alone.out], [3, '']);
});

test('a wrong command line is one sentence and code 2, before any file is read', async () => {
  const cases: [string[], RegExp][] = [
    [[], /iv needs one or more I–V files/],
    [[path('absent.csv'), '--thickness-nm', '-4'], /--thickness-nm: -4 must be a number from/],
    [[path('absent.csv'), '--thickness-nm', 'four'], /--thickness-nm: "four" is not a number/],
    [[path('absent.csv'), '--area-um2', '1', '--area-nm2', '2'], /--area-um2 and --area-nm2 exclude each other/],
    [[path('absent.csv'), '--area-um2', '0'], /--area-um2: 0 must be/],
    [[path('absent.csv'), '--thickness-nm', '4', '--height-ev', '2'], /--thickness-nm and --height-ev exclude each other/],
    [[path('absent.csv'), '--bias'], /evenglow iv: Unknown option/],
  ];
  for (const [argv, message] of cases) {
    const { code, out, err } = await run(...argv);
    assert.equal(code, 2, argv.join(' '));
    assert.equal(out, '');
    assert.match(err, message);
    assert.equal(err.trim().split('\n').length, 1);
  }
});

test('--help names every option, the file format and the caution', async () => {
  const { code, out } = await run('--help');
  assert.equal(code, 0);
  for (const text of ['--thickness-nm', '--area-um2', '--area-nm2', '--height-ev', '--mass', '--json', 'bias_V,current_nA', 'temperature_K', '1.2 V/nm']) assert.ok(out.includes(text), text);
});
