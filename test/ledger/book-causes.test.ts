import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { FlawCause } from '../../src/flaws/flaws.ts';
import type { BookingInput } from '../../src/ledger/book-causes.ts';
import { bookCauses, codeOf } from '../../src/ledger/book-causes.ts';
import { causes, orderOfTest } from '../../src/ledger/ledger.ts';
import { seededRandom } from '../../src/stats/random.ts';

const um = 1e-6;

/**
 * Books a map drawn in letters: `.` in band, `+` above and `-` below the band, `?` unmeasured, ` ` outside; a capital is a flaw:
 * B bubble, R residue, W wrinkle, S short, O open (their density is in band). Pitch 0.1 µm unless said.
 */
function book(drawing: readonly string[], more: Partial<BookingInput> & { pitchXUm?: number; pitchYUm?: number } = {}): string[] {
  const columns = drawing[0]!.length;
  const rows = drawing.length;
  const letters = [...drawing.join('')];
  assert.equal(letters.length, columns * rows);
  const flaws: Record<string, FlawCause> = { B: 'bubble', R: 'residue', W: 'wrinkle', S: 'short', O: 'open' };
  const flawCauses: (FlawCause | undefined)[] = [undefined, ...Object.values(flaws)];
  const levels: Record<string, number> = { '.': 0, '+': 0.6, '-': -0.6, '?': Number.NaN };
  const { pitchXUm = 0.1, pitchYUm = 0.1, ...input } = more;
  const codes = bookCauses({
    grid: { columns, rows, pitchXM: pitchXUm * um, pitchYM: pitchYUm * um },
    footprint: Uint8Array.from(letters, (letter) => (letter === ' ' ? 0 : 1)),
    flawLabels: Uint32Array.from(letters, (letter) => (flaws[letter] ? Object.keys(flaws).indexOf(letter) + 1 : 0)),
    flawCauses,
    unmeasured: Uint8Array.from(letters, (letter) => (letter === '?' ? 1 : 0)),
    log10Relative: Float32Array.from(letters, (letter) => levels[letter] ?? 0),
    bandFactor: 3, rimM: 0, shortRimM: 0, strayMinM2: 0,
    ...input,
  });
  const marks = [' ', '.', '?', 'B', 'R', 'W', 'S', 'O', '+', '-', 's', 'r', 'y'];
  return Array.from({ length: rows }, (_, r) => [...codes.subarray(r * columns, (r + 1) * columns)].map((code) => marks[code]).join(''));
}

test('codes are those of the design, in its order', () => {
  assert.deepEqual(causes.map((cause) => codeOf(cause)), [0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12]);
  assert.deepEqual(['usable', 'unmeasured', 'bubble', 'residue', 'wrinkle', 'short', 'open', 'thin', 'thick', 'starved', 'rim', 'stray'].map((cause) => causes.indexOf(cause as 'usable')), [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12]);
  assert.deepEqual([...orderOfTest], ['short', 'bubble', 'residue', 'wrinkle', 'unmeasured', 'open', 'thin', 'thick', 'starved', 'rim', 'stray']);
});

test('each letter to its cause; outside the footprint nothing is booked', () => {
  assert.deepEqual(book(['.BRWSO', '+-?.  ']), ['.BRWSO', '+-?.  ']);
});

test('order of test: a flaw in height before unmeasured, unmeasured before open, open before thin, density before starved', () => {
  const unmeasured = Uint8Array.from([1, 1, 1, 1, 1, 0, 0, 0]);
  const log10Relative = Float32Array.from([0, 0, 0, 0, 0, 2, 2, -2]);
  const starved = new Uint8Array(8).fill(1);
  assert.deepEqual(book(['SBRWOO..'], { unmeasured, log10Relative, starved }), ['SBRW?O+-']);
  assert.deepEqual(book(['SBRWO.+-'], { starved }), ['SBRWOs+-']);
});

test('order of test: thin, thick and starved before rim, rim before stray', () => {
  const starved = Uint8Array.from([0, 0, 0, 1, 0, 0]);
  assert.deepEqual(book(['B+-...'], { starved, rimM: 10 * um, strayMinM2: 1 * um * um }), ['B+-srr']);
  assert.deepEqual(book(['B+-...'], { unconnected: Uint8Array.from([1, 1, 1, 1, 1, 0]), starved }), ['B+-sy.']);
});

test('the band’s edges are in band, a hair beyond is not', () => {
  const edge = Math.log10(3);
  const log10Relative = Float32Array.from([edge, -edge, edge + 1e-4, -edge - 1e-4]);
  assert.deepEqual(book(['....'], { log10Relative }), ['..+-']);
  assert.deepEqual(book(['....'], { log10Relative, bandFactor: 3.1 }), ['....']);
  assert.deepEqual(book(['.+-?'], { bandFactor: 1e6 }), ['...?']);
});

test('without a density everything flawless is usable, but what is unmeasured', () => {
  const codes = bookCauses({
    grid: { columns: 3, rows: 1, pitchXM: um, pitchYM: um }, footprint: Uint8Array.from([1, 1, 1]), flawLabels: Uint32Array.from([0, 1, 0]), flawCauses: [undefined, 'bubble'],
    unmeasured: Uint8Array.from([0, 0, 1]), bandFactor: 3, rimM: 0, shortRimM: 0, strayMinM2: 0,
  });
  assert.deepEqual([...codes], [1, 3, 2]);
});

test('rim at the map’s border: pixels whose centre is closer than the distance', () => {
  // Centres lie at 0.05, 0.15 and 0.25 µm from the border.
  assert.deepEqual(book(['.....', '.....', '.....', '.....', '.....'], { rimM: 0.2 * um }), ['rrrrr', 'rrrrr', 'rr.rr', 'rrrrr', 'rrrrr']);
  assert.deepEqual(book(['.....', '.....', '.....', '.....', '.....'], { rimM: 0.14 * um }), ['rrrrr', 'r...r', 'r...r', 'r...r', 'rrrrr']);
  assert.deepEqual(book(['.....', '.....', '.....', '.....', '.....'], { rimM: 0.04 * um }), ['.....', '.....', '.....', '.....', '.....']);
});

test('rim at the footprint’s edge inside the map, and at a hole in it', () => {
  assert.deepEqual(book(['...   ....', '..........'], { rimM: 0.06 * um }), ['rrr   rrrr', 'rrrrrrrrrr']);
  const wide = ['.......', '.......', '.......', '... ...', '.......', '.......', '.......'];
  assert.deepEqual(book(wide, { rimM: 0.06 * um }), ['rrrrrrr', 'r.....r', 'r..r..r', 'r.r r.r', 'r..r..r', 'r.....r', 'rrrrrrr']);
});

test('rim at a short, distance exact in µm', () => {
  const row = ['........S........'];
  for (const [distanceUm, each] of [[0.04, 0], [0.06, 1], [0.149, 1], [0.151, 2], [0.349, 3], [0.351, 4]] as const) {
    const [found] = book(row, { shortRimM: distanceUm * um });
    assert.equal([...found!].filter((mark) => mark === 'r').length, 2 * each, `${distanceUm} µm: ${found}`);
    assert.match(found!, /^\.*r*Sr*\.*$/);
  }
  // The same on a coarser map: the distance is in µm, not in pixels.
  assert.deepEqual(book(row, { shortRimM: 0.6 * um, pitchXUm: 0.5, pitchYUm: 0.5 }), ['.......rSr.......']);
  assert.deepEqual(book(row, { shortRimM: 0.8 * um, pitchXUm: 0.5, pitchYUm: 0.5 }), ['......rrSrr......']);
});

test('a short outside the footprint has no rim, other flaws have none either', () => {
  assert.deepEqual(book(['.B.R.W.O.'], { shortRimM: 0.3 * um }), ['.B.R.W.O.']);
});

test('rim with unequal pitches: each direction in its own µm', () => {
  const block = ['.......', '.......', '.......', '.......', '.......', '.......', '.......'];
  // Centres lie 0.05, 0.15 … µm from the left and right border, 0.2, 0.6 … µm from the top and bottom one.
  assert.deepEqual(book(block, { rimM: 0.12 * um, pitchXUm: 0.1, pitchYUm: 0.4 }), block.map(() => 'r.....r'));
  assert.deepEqual(book(block, { rimM: 0.12 * um, pitchXUm: 0.4, pitchYUm: 0.1 }), ['rrrrrrr', '.......', '.......', '.......', '.......', '.......', 'rrrrrrr']);
  assert.deepEqual(
    book(block, { rimM: 0.22 * um, pitchXUm: 0.1, pitchYUm: 0.4 }),
    ['rrrrrrr', 'rr...rr', 'rr...rr', 'rr...rr', 'rr...rr', 'rr...rr', 'rrrrrrr'],
    'top and bottom pixels lie 0.2 µm from the border',
  );
});

test('stray: patches joined by edges only, below the limit and not at it', () => {
  const map = ['..--.-', '..---.', '----..'];
  // Patches of 4, 1 and 3 pixels of 0.01 µm²; the corner at the right does not join.
  assert.deepEqual(book(map, { strayMinM2: 0.035 * um * um }), ['..--y-', '..---y', '----yy']);
  assert.deepEqual(book(map, { strayMinM2: 0.025 * um * um }), ['..--y-', '..---.', '----..']);
  assert.deepEqual(book(map, { strayMinM2: 0 }), map);
  assert.deepEqual(book(map, { strayMinM2: 1 * um * um }), ['yy--y-', 'yy---y', '----yy']);
});

test('stray is judged on what the rim leaves', () => {
  assert.deepEqual(book(['.....', '.....', '.....'], { rimM: 0.06 * um, strayMinM2: 0.035 * um * um }), ['rrrrr', 'ryyyr', 'rrrrr']);
});

test('unconnected ground in band is stray, other ground keeps its cause', () => {
  assert.deepEqual(book(['.+-B?S.'], { unconnected: new Uint8Array(7).fill(1) }), ['y+-B?Sy']);
});

test('rim on random footprints and pitches is that of the distance from each centre to each pixel’s edges', () => {
  const random = seededRandom('rim');
  for (const [pitchXUm, pitchYUm] of [[0.1, 0.1], [0.1, 0.37], [0.23, 0.05]] as const) {
    const [columns, rows] = [19, 23];
    for (const rimUm of [0.12, 0.31, 0.6]) {
      const ground = Array.from({ length: columns * rows }, () => (random.uniform() < 0.03 ? ' ' : random.uniform() < 0.02 ? 'S' : '.'));
      const drawing = Array.from({ length: rows }, (_, r) => ground.slice(r * columns, (r + 1) * columns).join(''));
      const near = (c: number, r: number, other: string): boolean => ground.some((mark, k) => mark === other && Math.hypot(
        Math.max(0, Math.abs(c - (k % columns)) - 0.5) * pitchXUm, Math.max(0, Math.abs(r - Math.floor(k / columns)) - 0.5) * pitchYUm) < rimUm);
      const atBorder = (c: number, r: number): boolean => (Math.min(c, columns - 1 - c) + 0.5) * pitchXUm < rimUm || (Math.min(r, rows - 1 - r) + 0.5) * pitchYUm < rimUm;
      const expected = (other: string, border: boolean) => drawing.map((line, r) => [...line].map((mark, c) => (mark === '.' && (near(c, r, other) || (border && atBorder(c, r))) ? 'r' : mark)).join(''));
      assert.deepEqual(book(drawing, { rimM: rimUm * um, pitchXUm, pitchYUm }), expected(' ', true));
      assert.deepEqual(book(drawing, { shortRimM: rimUm * um, pitchXUm, pitchYUm }), expected('S', false));
    }
  }
});

test('a wide rim costs about what a narrow one does', () => {
  const side = 640;
  const count = side * side;
  const footprint = new Uint8Array(count).fill(1);
  footprint.fill(0, 0, side * 3 + 40);
  const ms = (rimM: number): number => Math.min(...[1, 2, 3].map(() => {
    const start = performance.now();
    bookCauses({
      grid: { columns: side, rows: side, pitchXM: 5e-9, pitchYM: 5e-9 }, footprint, flawLabels: new Uint32Array(count), flawCauses: [undefined], unmeasured: new Uint8Array(count),
      log10Relative: new Float32Array(count), bandFactor: 3, rimM, shortRimM: 0, strayMinM2: 0,
    });
    return performance.now() - start;
  }));
  const narrow = ms(10e-9);
  const wide = ms(0.5e-6);
  assert.ok(wide < 4 * narrow, `${wide} ms for ${narrow} ms`);
});
