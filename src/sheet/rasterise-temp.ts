import { maskMap } from '../grid/maps.ts';
import type { Grid, MaskMap } from '../grid/maps.ts';
import type { Outline } from '../read/sample.ts';
export function rasterise(grid: Grid, outlines: readonly Outline[]): MaskMap {
  const m = maskMap(grid);
  for (const o of outlines) for (let r = 0; r < grid.rows; r++) for (let c = 0; c < grid.columns; c++) {
    const x = (c + 0.5) * grid.pitchXM, y = (grid.rows - r - 0.5) * grid.pitchYM;
    let inside = false;
    for (const ring of o.rings) for (let k = 0, j = ring.length - 1; k < ring.length; j = k++) {
      const [xa, ya] = ring[k]!, [xb, yb] = ring[j]!;
      if ((ya > y) !== (yb > y) && x < xa + ((y - ya) / (yb - ya)) * (xb - xa)) inside = !inside;
    }
    if (inside) m.data[r * grid.columns + c] = 1;
  }
  return m;
}
