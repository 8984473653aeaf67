/** Parts a flaw along a line drawn across it. */
import type { Components } from '../grid/label-components.ts';
import type { Draft } from './correction-draft.ts';
import { piecesOf, standApart } from './correction-draft.ts';
import type { Path, Point } from './correction-shapes.ts';
import { pixelAt } from '../grid/pixel-at.ts';
import { alongPath, crosses, prolonged, strokePixels } from './correction-shapes.ts';

/** A flaw that has outgrown the line (at other thresholds) is still parted when the line, longer by this share at both ends, does it. */
const prolongedBy = 0.25;

/**
 * Parts the flaw that most of the line lies on, among those that it parts: pixels go to the side of their centre, so none is lost. Pixels are
 * connected by edges or corners wherever the line does not pass between their centres.
 *
 * @returns the numbers of the parts, the flaw's own first; undefined when the line parts nothing.
 */
export function splitAlong(draft: Draft, path: Path): number[] | undefined {
  const along = new Map<number, number>();
  for (const point of alongPath(draft.grid, path)) {
    const label = draft.labels[pixelAt(draft.grid, point) ?? -1] ?? 0;
    if (label !== 0) along.set(label, (along.get(label) ?? 0) + 1);
  }
  const candidates = [...along].sort((a, b) => b[1] - a[1] || a[0] - b[0]).map(([label]) => label);
  for (const line of [path, prolonged(path, prolongedBy)]) {
    for (const label of candidates) {
      const before = piecesOf(draft, label);
      const after = partsOf(draft, label, line);
      if (after.count > before.count) return [label, ...standApart(draft, label, before, after)];
    }
  }
  return undefined;
}

/** Pieces of a flaw within its box, numbered in raster order, where links that the line crosses do not count. */
function partsOf({ grid, labels, flaws }: Draft, label: number, path: Path): Components {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const { left, right, top, bottom } = flaws[label]!.box;
  const width = right - left + 1;
  const parts = new Uint32Array(width * (bottom - top + 1));
  const pixels: number[] = [0];
  // Only beside the line can it pass between two neighbours.
  const near = new Set(strokePixels(grid, path, 3 * Math.hypot(pitchXM, pitchYM)));
  const centre = (c: number, r: number): Point => [(c + 0.5) * pitchXM, (rows - r - 0.5) * pitchYM];
  for (let start = 0; start < parts.length; start++) {
    if (parts[start] !== 0 || labels[(top + Math.floor(start / width)) * columns + left + (start % width)] !== label) continue;
    const part = pixels.push(0) - 1;
    const open = [start];
    parts[start] = part;
    for (let at = open.pop(); at !== undefined; at = open.pop()) {
      pixels[part]!++;
      const [c, r] = [left + (at % width), top + Math.floor(at / width)];
      const beside = near.has(r * columns + c);
      for (let row = Math.max(top, r - 1); row <= Math.min(bottom, r + 1); row++) {
        for (let column = Math.max(left, c - 1); column <= Math.min(right, c + 1); column++) {
          const next = (row - top) * width + column - left;
          if (parts[next] !== 0 || labels[row * columns + column] !== label) continue;
          if (beside && crosses(path, centre(c, r), centre(column, row))) continue;
          parts[next] = part;
          open.push(next);
        }
      }
    }
  }
  return { labels: parts, count: pixels.length - 1, pixels: Uint32Array.from(pixels) };
}
