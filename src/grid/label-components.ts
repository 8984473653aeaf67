/** Connected regions of a mask. */
import { labelRuns } from '../kernels/label-runs.ts';

export interface Components {
  /** Region of each pixel, 1…count in the order in which a raster scan meets them, 0 where the mask is 0. */
  readonly labels: Uint32Array;
  readonly count: number;
  /** Pixels of each region by its number; entry 0 counts the pixels of none. */
  readonly pixels: Uint32Array;
}

/**
 * Numbers the connected regions of the non-zero pixels of a row-major mask, joined by edges (4) or
 * by edges and corners (8). Two passes with union–find (Rosenfeld & Pfaltz, J. ACM 13, 471, 1966;
 * the smaller provisional number is always the root, so numbers come out in raster order). Throws a
 * RangeError when the mask is not columns × rows. Computed by the kernel where one is installed, with the same result.
 */
export function labelComponents(mask: Uint8Array, columns: number, rows: number, connectivity: 4 | 8): Components {
  if (mask.length !== columns * rows) throw new RangeError(`a mask of ${columns} × ${rows} pixels needs ${columns * rows} values, got ${mask.length}`);
  return labelRuns(mask, columns, rows, connectivity) ?? labelPlainly(mask, columns, rows, connectivity);
}

/** The same in plain TypeScript. */
function labelPlainly(mask: Uint8Array, columns: number, rows: number, connectivity: 4 | 8): Components {
  const labels = new Uint32Array(mask.length);
  // A new number needs a pixel with nothing before it; two such pixels are never neighbours.
  const parents = new Uint32Array((mask.length >>> 1) + 2 + rows);
  let last = 0;

  const diagonal = connectivity === 8;
  for (let row = 0; row < rows; row++) {
    const start = row * columns;
    for (let column = 0; column < columns; column++) {
      const here = start + column;
      if (mask[here] === 0) continue;
      const west = column > 0 ? labels[here - 1]! : 0;
      let north = 0;
      let northWest = 0;
      let northEast = 0;
      if (row > 0) {
        north = labels[here - columns]!;
        if (diagonal && north === 0) {
          if (column > 0) northWest = labels[here - columns - 1]!;
          if (column + 1 < columns) northEast = labels[here - columns + 1]!;
        }
      }
      // North already touches the three others of 8-connectivity; the corners matter only without it.
      let label = north;
      if (label === 0) label = west !== 0 ? west : northWest;
      else if (west !== 0 && west !== label) label = join(parents, label, west);
      if (northEast !== 0) label = label === 0 ? northEast : label === northEast ? label : join(parents, label, northEast);
      if (label === 0) {
        last += 1;
        parents[last] = last;
        label = last;
      }
      labels[here] = label;
    }
  }

  // Roots are smaller than their members, so one rising sweep numbers them all.
  let count = 0;
  for (let label = 1; label <= last; label++) {
    const parent = parents[label]!;
    parents[label] = parent === label ? ++count : parents[parent]!;
  }
  const pixels = new Uint32Array(count + 1);
  for (let k = 0; k < labels.length; k++) {
    const label = parents[labels[k]!]!;
    labels[k] = label;
    pixels[label] = pixels[label]! + 1;
  }
  return { labels, count, pixels };
}

/** Root of a provisional number; the path is halved on the way. */
function rootOf(parents: Uint32Array, label: number): number {
  let at = label;
  while (parents[at] !== at) {
    parents[at] = parents[parents[at]!]!;
    at = parents[at]!;
  }
  return at;
}

function join(parents: Uint32Array, a: number, b: number): number {
  const rootA = rootOf(parents, a);
  const rootB = rootOf(parents, b);
  if (rootA === rootB) return rootA;
  if (rootA < rootB) {
    parents[rootB] = rootA;
    return rootA;
  }
  parents[rootA] = rootB;
  return rootB;
}
