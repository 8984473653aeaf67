/** Outlines as masks over the grid. */
import { maskMap, pixelCount } from '../grid/maps.ts';
import type { Grid, MaskMap } from '../grid/maps.ts';
import type { Outline, OutlineLayer } from './sample.ts';

/**
 * 1 where a pixel's centre lies inside any polygon of a layer (holes count as outside), 0 elsewhere; all 0
 * when the layer has no polygon. Inside is even-odd over a polygon's rings; a centre exactly on a left or lower
 * boundary is inside, on a right or upper one outside, so that polygons sharing a side never share a pixel.
 * Parts beyond the map are cut off.
 */
export function layerMask(grid: Grid, outlines: readonly Outline[], layer: OutlineLayer): MaskMap {
  const data = new Uint8Array(pixelCount(grid));
  for (const outline of outlines) if (outline.layer === layer) fillPolygon(grid, outline, data);
  return maskMap(grid, data);
}

/**
 * The emitting area that the outlines allow: injector ∩ barrier ∩ emitter − keep-outs, at pixel centres.
 * A layer without any polygon is everywhere; contacts do not limit it. All 1 without outlines.
 */
export function footprintOf(grid: Grid, outlines: readonly Outline[]): MaskMap {
  const data = new Uint8Array(pixelCount(grid)).fill(1);
  for (const layer of ['injector', 'barrier', 'emitter'] as const) {
    if (!outlines.some((outline) => outline.layer === layer)) continue;
    const inside = layerMask(grid, outlines, layer).data;
    for (let i = 0; i < data.length; i++) data[i] = data[i]! & inside[i]!;
  }
  if (outlines.some((outline) => outline.layer === 'keep-out')) {
    const kept = layerMask(grid, outlines, 'keep-out').data;
    for (let i = 0; i < data.length; i++) if (kept[i] !== 0) data[i] = 0;
  }
  return maskMap(grid, data);
}

/** Sets the pixels of one polygon (closed rings, even-odd) to 1, line by line between the crossings of its rings. */
export function fillPolygon(grid: Grid, outline: Pick<Outline, 'rings'>, data: Uint8Array): void {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const crossings: number[][] = Array.from({ length: rows }, () => []);
  for (const ring of outline.rings) {
    for (let k = 0; k + 1 < ring.length; k++) {
      const [x0, y0] = ring[k]!;
      const [x1, y1] = ring[k + 1]!;
      if (y0 === y1) continue;
      // Lines counted from the bottom, with centres at (line + ½)·pitch; an edge takes its lower end, not its upper.
      const from = Math.max(0, Math.ceil(Math.min(y0, y1) / pitchYM - 0.5));
      const to = Math.min(rows, Math.ceil(Math.max(y0, y1) / pitchYM - 0.5));
      for (let line = from; line < to; line++) {
        const y = (line + 0.5) * pitchYM;
        crossings[line]!.push(x0 + ((y - y0) / (y1 - y0)) * (x1 - x0));
      }
    }
  }
  for (let line = 0; line < rows; line++) {
    const at = crossings[line]!.sort((a, b) => a - b);
    // Row 0 is the picture's top, line 0 the map's bottom.
    const start = (rows - 1 - line) * columns;
    for (let k = 0; k + 1 < at.length; k += 2) {
      const from = Math.max(0, Math.ceil(at[k]! / pitchXM - 0.5));
      const to = Math.min(columns, Math.ceil(at[k + 1]! / pitchXM - 0.5));
      if (to > from) data.fill(1, start + from, start + to);
    }
  }
}
