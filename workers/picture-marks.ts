/** Marked pixels over a map, such as those that were repaired. */
import type { Area } from './picture-area.ts';

/** On no scale and no cause's colour; a light pink shows on both ends of the map's colours. */
export const markColour = [255, 120, 200] as const;

/** Colours each picture pixel under which at least one marked pixel lies, so that a line one pixel wide is seen on a reduced map. */
export function drawMarks(rgba: Uint8ClampedArray, masks: readonly Uint8Array[], columns: number, { width, height, across, down }: Area): void {
  for (let y = 0, at = 0; y < height; y++) {
    for (let x = 0; x < width; x++, at += 4) {
      if (rgba[at + 3] === 0 || !masks.some((mask) => isMarked(mask, columns, across.from[x]!, across.to[x]!, down.from[y]!, down.to[y]!))) continue;
      for (let k = 0; k < 3; k++) rgba[at + k] = markColour[k]!;
    }
  }
}

function isMarked(mask: Uint8Array, columns: number, left: number, right: number, top: number, bottom: number): boolean {
  for (let r = top; r < bottom; r++) for (let c = left; c < right; c++) if (mask[r * columns + c] === 1) return true;
  return false;
}
