import assert from 'node:assert/strict';
import { test } from 'node:test';
import { missedShorts } from '../../src/ledger/missed-shorts.ts';
import { poissonUpperBound } from '../../src/stats/poisson.ts';
import { assertClose } from '../fixtures/assert-close.ts';

const grid = (pitchNm: number) => ({ columns: 512, rows: 512, pitchXM: pitchNm * 1e-9, pitchYM: pitchNm * 1e-9 });
/** A contact of 17 nm² is 4.65 nm wide. */
const contactM2 = 17e-18;
const points = (onOneLine: number) => ({ onOneLine, onMoreLines: 0 });

test('outside: lines 19.5 nm apart cross 24 % of point shorts with a contact 4.6 nm wide [F, d/p]', () => {
  assertClose(missedShorts(points(0), 100e-12, grid(19.5), contactM2).crossedShare, 0.24, 1e-2);
});

test('outside: none seen on 100 µm², at most 0.126 /µm² [F, −ln 0.05 over the area crossed, one-sided 95 %]', () => {
  const { crossedShare } = missedShorts(points(0), 100e-12, grid(19.5), contactM2);
  assertClose(poissonUpperBound(0) / (100 * crossedShare), 0.126, 1e-2);
});

test('outside: the upper bound handed on when none is seen is that one-sided one [F]', () => {
  assertClose(missedShorts(points(0), 100e-12, grid(19.5), contactM2).high95PerM2 * 1e-12, 0.126, 1e-2);
});

test('seen three: expect 3·(p/d − 1) missed; density and its exact interval (0.61867–8.76727 [P]) over the area crossed', () => {
  const found = missedShorts(points(3), 100e-12, grid(19.5), contactM2);
  const share = found.crossedShare;
  assert.equal(found.seen, 3);
  assertClose(found.expectedMissed, 3 / share - 3, 1e-12);
  assertClose(found.densityPerM2, 3 / (share * 100e-12), 1e-12);
  assertClose(found.low95PerM2, 0.61867 / (share * 100e-12), 1e-4);
  assertClose(found.high95PerM2, 8.76727 / (share * 100e-12), 1e-4);
});

test('lines closer than the contact is wide miss none; the pitch across the lines counts', () => {
  const dense = missedShorts(points(2), 1e-12, grid(3), contactM2);
  assert.deepEqual([dense.crossedShare, dense.expectedMissed], [1, 0]);
  const unequal = missedShorts(points(2), 1e-12, { columns: 10, rows: 10, pitchXM: 1e-9, pitchYM: 19.5e-9 }, contactM2);
  assertClose(unequal.crossedShare, 0.2386, 1e-3);
});

test('no ground on which one could have been seen: no density, no infinity', () => {
  const none = missedShorts(points(0), 0, grid(20), contactM2);
  for (const value of Object.values(none)) assert.ok(Number.isFinite(value));
});

test('shorts met on several lines are no points: none of their kind is missed, and they do not scale the density', () => {
  const wide = missedShorts({ onOneLine: 0, onMoreLines: 6 }, 100e-12, grid(19.5), contactM2);
  assert.deepEqual([wide.seen, wide.expectedMissed], [6, 0]);
  assertClose(wide.densityPerM2 * 1e-12, 0.06, 1e-12);
  const mixed = missedShorts({ onOneLine: 1, onMoreLines: 2 }, 100e-12, grid(19.5), contactM2);
  assertClose(mixed.expectedMissed, 1 / mixed.crossedShare - 1, 1e-12);
  assertClose(mixed.densityPerM2 * 1e-12, (1 / mixed.crossedShare + 2) / 100, 1e-12);
  // 0.61867–8.76727 for three seen [P], scaled like the estimate.
  assertClose(mixed.high95PerM2 / mixed.densityPerM2, 8.76727 / 3, 1e-4);
});
