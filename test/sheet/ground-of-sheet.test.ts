import assert from 'node:assert/strict';
import test from 'node:test';
import { groundOfSheet } from '../../src/sheet/ground-of-sheet.ts';
import { createGrid, createMask } from './device.ts';

/** A ringed mask without its ring, as a picture. */
function picture(mask: Uint8Array, columns: number, rows: number): string[] {
  return Array.from({ length: rows }, (_, r) => Array.from(mask.subarray((r + 1) * (columns + 2) + 1, (r + 2) * (columns + 2) - 1), (v) => (v === 1 ? '#' : '.')).join(''));
}

test('ground is reached through sides, not corners', () => {
  const grid = createGrid(6, 4);
  const sheet = ['###...', '#.#...', '#..#..', '##..##'];
  const metal = ['#.....', '......', '......', '......'];
  const { reached, drawn } = groundOfSheet(grid, createMask(sheet), createMask(metal));
  assert.equal(drawn, true);
  assert.deepEqual(picture(reached, 6, 4), ['###...', '#.#...', '#.....', '##....']);
});

test('without metal the outside is the terminal: bays yes, holes no, holes with an island yes', () => {
  const grid = createGrid(12, 5);
  const sheet = ['####.#######', '#..#.#.....#', '#..#.#.###.#', '#..###.....#', '############'];
  const { terminal, reached } = groundOfSheet(grid, createMask(sheet), undefined);
  assert.deepEqual(picture(terminal, 12, 5), ['....#.......', '....#.#####.', '....#.#...#.', '......#####.', '............']);
  assert.deepEqual(picture(reached, 12, 5), sheet);
});

test('metal off the sheet and not beside it reaches nothing', () => {
  const { reached } = groundOfSheet(createGrid(4, 2), createMask(['##..', '##..']), createMask(['...#', '...#']));
  assert.ok(!reached.includes(1));
});
