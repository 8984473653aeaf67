/** The sheet an invented flake is drawn on. Lengths in nanometres, x to the right, y down from the picture's top. */
import type { Random } from '../stats/random.ts';

/** Something drawn, by the disc it keeps to itself. */
export interface Placed {
  readonly kind: 'bubble' | 'particle' | 'film' | 'pinhole';
  readonly xNm: number;
  readonly yNm: number;
  readonly radiusNm: number;
}

export interface Canvas {
  readonly columns: number;
  readonly rows: number;
  readonly widthNm: number;
  readonly heightNm: number;
  /** Whole layers of the barrier; 0 beyond the flake's edge. */
  readonly layers: Float64Array;
  /** Height of features above the terrace. */
  readonly reliefNm: Float64Array;
  /** Decades of current lost to features. */
  readonly lossDecades: Float64Array;
  /** 1 where probe and injector touch: pinholes, and beyond the flake's edge. */
  readonly shorted: Uint8Array;
  readonly placed: Placed[];
}

export function createCanvas(columns: number, rows: number, widthUm: number, heightUm: number, layers: number): Canvas {
  const count = columns * rows;
  return {
    columns, rows, widthNm: widthUm * 1000, heightNm: heightUm * 1000,
    layers: new Float64Array(count).fill(layers), reliefNm: new Float64Array(count), lossDecades: new Float64Array(count), shorted: new Uint8Array(count), placed: [],
  };
}

/** Ways to find room before a crowded canvas takes an overlap. */
const tries = 60;

/** A centre on the flake whose disc overlaps nothing placed before, where the canvas still has such a place. */
export function somewhere(canvas: Canvas, random: Random, radiusNm: number): [number, number] {
  let place: [number, number] = [0, 0];
  for (let k = 0; k < tries; k++) {
    place = [canvas.widthNm * random.uniform(), canvas.heightNm * random.uniform()];
    const free = canvas.placed.every((other) => Math.hypot(other.xNm - place[0], other.yNm - place[1]) > other.radiusNm + radiusNm);
    if (free && isOnFlake(canvas, place, radiusNm)) break;
  }
  return place;
}

/** Whether a disc stays clear of the bare injector, judged at its centre and eight points of its rim; beyond the map counts as flake. */
function isOnFlake(canvas: Canvas, [x, y]: readonly [number, number], radiusNm: number): boolean {
  for (let k = 0; k <= 8; k++) {
    const reach = k === 8 ? 0 : radiusNm;
    const c = Math.floor(((x + reach * Math.cos((k * Math.PI) / 4)) / canvas.widthNm) * canvas.columns);
    const r = Math.floor(((y + reach * Math.sin((k * Math.PI) / 4)) / canvas.heightNm) * canvas.rows);
    if (c >= 0 && c < canvas.columns && r >= 0 && r < canvas.rows && canvas.layers[r * canvas.columns + c] === 0) return false;
  }
  return true;
}

/** Calls `paint` with index and centre of every pixel, or of those in the square around a disc. */
export function eachPixel(canvas: Canvas, disc: { cx: number; cy: number; radius: number } | undefined, paint: (index: number, xNm: number, yNm: number) => void): void {
  const px = canvas.widthNm / canvas.columns;
  const py = canvas.heightNm / canvas.rows;
  const left = disc ? Math.max(0, Math.floor((disc.cx - disc.radius) / px)) : 0;
  const right = disc ? Math.min(canvas.columns - 1, Math.ceil((disc.cx + disc.radius) / px)) : canvas.columns - 1;
  const top = disc ? Math.max(0, Math.floor((disc.cy - disc.radius) / py)) : 0;
  const bottom = disc ? Math.min(canvas.rows - 1, Math.ceil((disc.cy + disc.radius) / py)) : canvas.rows - 1;
  for (let r = top; r <= bottom; r++) for (let c = left; c <= right; c++) paint(r * canvas.columns + c, (c + 0.5) * px, (r + 0.5) * py);
}
