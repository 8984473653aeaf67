/** What the scan does to the surface and the current: tilt, bow, line offsets, broken runs, lag, noise, missing values. */
import type { Random } from '../../src/stats/random.ts';
import { leastA, saturationA } from './paint-current.ts';
import type { Kind } from './paint-kinds.ts';

export interface ScanErrors {
  /** Height added by tilt, bow, line offsets and broken runs, nm. */
  readonly addedNm: Float64Array;
  /** 1 where a broken run loses the current too. */
  readonly dark: Uint8Array;
  readonly missingHeight: Uint8Array;
  readonly missingCurrent: Uint8Array;
}

export function scanErrors(random: Random, { columns, rows, lineNm }: Kind): ScanErrors {
  const addedNm = form(random, columns, rows);
  for (let r = 0; r < rows; r++) {
    const offset = lineNm * random.normal();
    for (let c = 0; c < columns; c++) addedNm[r * columns + c]! += offset;
  }
  const dark = new Uint8Array(columns * rows);
  const runs = Math.round((4 + random.integer(9)) * (rows / 512));
  for (let k = 0; k < runs; k++) breakRun(random, columns, rows, addedNm, dark);
  const pixels = columns * rows;
  return { addedNm, dark, missingHeight: scattered(random, pixels, 24), missingCurrent: scattered(random, pixels, 8) };
}

/** Tilt and bow of some ten nanometres over the map. */
function form(random: Random, columns: number, rows: number): Float64Array {
  const signed = (low: number, high: number): number => (random.uniform() < 0.5 ? -1 : 1) * (low + (high - low) * random.uniform());
  const [tiltX, tiltY, bowX, bowY, twist] = [signed(8, 27), signed(8, 27), signed(3, 14), signed(3, 14), signed(0, 4)];
  const out = new Float64Array(columns * rows);
  for (let r = 0, i = 0; r < rows; r++) {
    const v = (2 * (r + 0.5)) / rows - 1;
    for (let c = 0; c < columns; c++, i++) {
      const u = (2 * (c + 0.5)) / columns - 1;
      out[i] = tiltX * u + tiltY * v + bowX * u * u + twist * u * v + bowY * v * v;
    }
  }
  return out;
}

/** One or two lines jump by 3 to 12 nm over some tenths of their length; half of the runs lose the current as well. */
function breakRun(random: Random, columns: number, rows: number, addedNm: Float64Array, dark: Uint8Array): void {
  const lines = random.uniform() < 0.25 ? 2 : 1;
  const length = Math.round((0.06 + 0.3 * random.uniform()) * columns);
  const from = random.integer(columns - length + 1);
  const first = random.integer(rows - lines + 1);
  const jump = (random.uniform() < 0.5 ? -1 : 1) * (3 + 9 * random.uniform());
  const loses = random.uniform() < 0.5;
  for (let r = first; r < first + lines; r++) {
    for (let c = from; c < from + length; c++) {
      addedNm[r * columns + c]! += jump;
      if (loses) dark[r * columns + c] = 1;
    }
  }
}

/** Single pixels, so many on 512 × 512. */
function scattered(random: Random, pixels: number, per512: number): Uint8Array {
  const mask = new Uint8Array(pixels);
  for (let k = Math.round((per512 * pixels) / (512 * 512)); k > 0; k--) mask[random.integer(pixels)] = 1;
  return mask;
}

/** The file's current: lag (one pole, left to right, before the amplifier limits), floor, noise, saturation. `trueA` is changed. */
export function amplified(random: Random, trueA: Float64Array, columns: number, lagPx: number, floorNoiseA: number): Float32Array {
  if (lagPx > 0) {
    const keep = Math.exp(-1 / lagPx);
    for (let i = 0; i < trueA.length; i++) if (i % columns !== 0) trueA[i] = keep * trueA[i - 1]! + (1 - keep) * trueA[i]!;
  }
  return Float32Array.from(trueA, (value) => Math.min(saturationA, Math.max(leastA, value) + floorNoiseA * random.normal()));
}
