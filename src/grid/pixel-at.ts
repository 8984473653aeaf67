/** Which pixel a place on the map lies in. */
import type { Grid } from './maps.ts';

/** Index of the pixel that holds a point (metres, x right, y up, origin at the map's lower-left corner), undefined beside the map. A point on the map's far edge still belongs to the last pixel. */
export function pixelAt({ columns, rows, pitchXM, pitchYM }: Grid, [xM, yM]: readonly [xM: number, yM: number]): number | undefined {
  const [u, v] = [xM / pitchXM, yM / pitchYM];
  if (!(u >= 0 && u <= columns && v >= 0 && v <= rows)) return undefined;
  return (rows - 1 - Math.min(rows - 1, Math.floor(v))) * columns + Math.min(columns - 1, Math.floor(u));
}
