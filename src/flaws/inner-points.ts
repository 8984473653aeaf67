import { squaredDistance } from '../grid/distance.ts';
import { pixelCentre } from '../grid/maps.ts';
import type { Grid } from '../grid/maps.ts';
import type { Flaws } from './flaws.ts';

export interface InnerPoint {
  readonly xM: number;
  readonly yM: number;
}

/**
 * For each flaw of the list the centre of its pixel deepest inside, by which a correction can name it: it stays on the flaw when thresholds or the
 * levelling move its outline, which the centre of area of a bent flaw need not be on at all. Depth counts to the nearest pixel that
 * touches something else by an edge; the map's border is no outside. Among equally deep pixels the one nearest to the centre of area wins, then the first in raster order.
 */
export function innerPoints({ labels: { data: labels }, list }: Flaws, grid: Grid): InnerPoint[] {
  const { columns, rows, pitchXM, pitchYM } = grid;
  if (list.length === 0) return [];
  const inside = new Uint8Array(labels.length);
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      const label = labels[i]!;
      if (label === 0) continue;
      const same = (c === 0 || labels[i - 1] === label) && (c === columns - 1 || labels[i + 1] === label) && (r === 0 || labels[i - columns] === label) && (r === rows - 1 || labels[i + columns] === label);
      if (same) inside[i] = 1;
    }
  }
  const depth2 = squaredDistance(inside, columns, rows, { pitchX: pitchXM, pitchY: pitchYM });
  const best = list.map(() => ({ index: -1, depth2: -1, away2: Number.POSITIVE_INFINITY }));
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      const label = labels[i]!;
      if (label === 0) continue;
      const [flaw, found] = [list[label - 1]!, best[label - 1]!];
      if (depth2[i]! < found.depth2) continue;
      const away2 = ((c + 0.5) * pitchXM - flaw.xM) ** 2 + ((rows - r - 0.5) * pitchYM - flaw.yM) ** 2;
      if (depth2[i]! > found.depth2 || away2 < found.away2) best[label - 1] = { index: i, depth2: depth2[i]!, away2 };
    }
  }
  return best.map(({ index }) => pixelCentre(grid, Math.floor(index / columns), index % columns));
}
