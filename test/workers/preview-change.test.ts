import assert from 'node:assert/strict';
import { test } from 'node:test';
import type { Flaw } from '../../src/flaws/flaws.ts';
import { causes } from '../../src/ledger/ledger.ts';
import { movedCounts, movedLedger } from '../../workers/preview-change.ts';
import type { Look } from '../../workers/preview-change.ts';

const none = { bubble: 0, residue: 0, wrinkle: 0, short: 0, open: 0 };
const look = (of: Readonly<Record<string, number>>, counts: Partial<typeof none> = {}): Look => ({ shares: causes.slice(1).map((cause) => of[cause] ?? 0), counts: { ...none, ...counts } });
const ledger = (of: Readonly<Record<string, number>>) => ({
  footprintM2: 100e-12, footprintPixels: 10_000,
  rows: causes.slice(1).map((cause, k) => ({ code: k + 1, cause, share: of[cause] ?? 0, areaM2: (of[cause] ?? 0) * 100e-12, pixels: Math.round((of[cause] ?? 0) * 10_000), assessed: true })),
});
const areas = (of: Readonly<Record<string, number>>, before: Look, now: Look): Record<string, number> =>
  Object.fromEntries(movedLedger(ledger(of), before, now).filter(({ areaUm2 }) => areaUm2 > 0).map(({ cause, areaUm2 }) => [cause, Number(areaUm2.toFixed(9))]));

test('what the look gets wrong by itself cancels: at the value in force the result on show is unchanged', () => {
  const wrong = look({ usable: 0.5, bubble: 0.3, thin: 0.2 });
  assert.deepEqual(areas({ usable: 0.62, bubble: 0.25, thin: 0.13 }, wrong, wrong), { usable: 62, bubble: 25, thin: 13 });
});

test('only the change is taken over', () => {
  assert.deepEqual(areas({ usable: 0.62, bubble: 0.25, thin: 0.13 }, look({ usable: 0.5, bubble: 0.3, thin: 0.2 }), look({ usable: 0.6, bubble: 0.2, thin: 0.2 })), { usable: 72, bubble: 15, thin: 13 });
});

test('no cause goes below nothing, and the areas still add up to the footprint', () => {
  // The look loses 0.3 of bubble where the full map has 0.1; what is lost goes to usable and thin as 2 to 1.
  const moved = areas({ usable: 0.9, bubble: 0.1 }, look({ usable: 0.7, bubble: 0.3 }), look({ usable: 0.9, thin: 0.1 }));
  assert.deepEqual(moved, { usable: 96.666666667, thin: 3.333333333 });
});

test('a footprint without pixels stays empty', () => {
  assert.deepEqual(areas({}, look({}), look({})), {});
});

test('numbers of flaws move by as many as the looks differ, never below none', () => {
  const flaw = (cause: Flaw['cause']): Flaw => ({ cause }) as Flaw;
  assert.deepEqual(movedCounts([flaw('bubble'), flaw('bubble'), flaw('short')], look({}, { bubble: 5, short: 3 }), look({}, { bubble: 4, short: 0, residue: 2 })), { ...none, bubble: 1, residue: 2 });
});
