/** The outline of one flaw: a light line with a dark one around it, which shows on every colour of the map. */
import type { Area } from './picture-area.ts';

export const outlineColours = { inner: [255, 255, 255], outer: [13, 17, 23] } as const;

/** Draws around the flaw, not over it; both lines are one and a half screen pixels wide. A flaw smaller than a picture pixel still gets one. */
export function drawOutline(rgba: Uint8ClampedArray, labels: Uint32Array, columns: number, area: Area, flaw: number, pixelRatio: number): void {
  const { width, height } = area;
  const inside = flawMask(labels, columns, area, flaw);
  const line = Math.max(1, Math.round(1.5 * pixelRatio));
  const reach = 2 * line;
  // Chebyshev distance to the flaw, up to the lines' reach; 0 is far away.
  const ring = new Uint8Array(width * height);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      if (inside[y * width + x] === 0 || !isBorder(inside, width, height, x, y)) continue;
      for (let v = Math.max(0, y - reach); v <= Math.min(height - 1, y + reach); v++) {
        for (let u = Math.max(0, x - reach); u <= Math.min(width - 1, x + reach); u++) {
          const at = v * width + u;
          if (inside[at] === 1) continue;
          const distance = Math.max(Math.abs(u - x), Math.abs(v - y));
          if (ring[at] === 0 || distance < ring[at]!) ring[at] = distance;
        }
      }
    }
  }
  for (let at = 0; at < ring.length; at++) {
    if (ring[at] === 0) continue;
    const colour = ring[at]! <= line ? outlineColours.inner : outlineColours.outer;
    for (let k = 0; k < 3; k++) rgba[4 * at + k] = colour[k]!;
    rgba[4 * at + 3] = 255;
  }
}

function flawMask(labels: Uint32Array, columns: number, { width, height, across, down }: Area, flaw: number): Uint8Array {
  const mask = new Uint8Array(width * height);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      let found = false;
      for (let r = down.from[y]!, bottom = down.to[y]!; r < bottom && !found; r++) {
        for (let c = across.from[x]!, right = across.to[x]!; c < right && !found; c++) found = labels[r * columns + c] === flaw;
      }
      if (found) mask[y * width + x] = 1;
    }
  }
  return mask;
}

function isBorder(inside: Uint8Array, width: number, height: number, x: number, y: number): boolean {
  const at = y * width + x;
  return x === 0 || y === 0 || x === width - 1 || y === height - 1
    || inside[at - 1] === 0 || inside[at + 1] === 0 || inside[at - width] === 0 || inside[at + width] === 0;
}
