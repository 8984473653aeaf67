import { wkbModel } from '../barrier/model/wkb.ts';
import type { Random } from '../stats/random.ts';
import { seededRandom } from '../stats/random.ts';
import { drawCanvas } from './draw-canvas.ts';
import type { PaintedScan, SceneOptions } from './scene.ts';
import { smoothField } from './smooth-field.ts';

/** Stated constants of the invented instrument and material; the barrier's are the recipe's defaults. */
export const layerNm = 0.333;
const heightEv = 2.5;
const massRatio = 0.5;
const heightNoiseNm = 0.08;
const roughnessNm = 0.08;
/** Scatter of the contact: from place to place over about a micrometre, and from pixel to pixel. */
const contactScatterDecades = 0.05;
const contactNoiseDecades = 0.03;
const amplifierNoiseA = 3e-14;
const amplifierOffsetA = 1.5e-13;
const saturationA = 1e-8;

/**
 * Paints a seeded scan: terraces of whole layers whose current follows the WKB model at the scan's bias, the scatter of the contact, and
 * the flake's bubbles, residue, wrinkles and pinholes; then what scanning adds: tilt and bow, line offsets and drift, broken runs, tip wear, an
 * amplifier with offset, noise and saturation, missing pixels. The same options give the same scan.
 */
export function paintScene(options: SceneOptions): PaintedScan {
  const canvas = drawCanvas(options);
  const random = seededRandom(`${options.seed}: scan`);
  const { columns, rows } = options;
  const count = columns * rows;
  const rough = smoothField(random, columns, rows, 24);
  const scatter = smoothField(random, columns, rows, 12);
  const height = new Float64Array(count);
  const current = new Float64Array(count);
  const idealLog10 = currentByLayers(options);
  for (let r = 0, i = 0; r < rows; r++) {
    const worn = options.wearDecades * wornShare(r / Math.max(1, rows - 1));
    for (let c = 0; c < columns; c++, i++) {
      height[i] = canvas.layers[i]! * layerNm + canvas.reliefNm[i]! + roughnessNm * rough[i]!;
      if (canvas.shorted[i] === 1) {
        current[i] = 10 * saturationA;
        continue;
      }
      const log10 = idealLog10(canvas.layers[i]!) + contactScatterDecades * scatter[i]! + contactNoiseDecades * random.normal() - canvas.lossDecades[i]! - worn;
      current[i] = 10 ** log10;
    }
  }
  scanHeight(height, columns, rows, random);
  breakRuns(height, current, columns, rows, random, options.brokenRuns);
  const exported = { height: new Float32Array(count), current: new Float32Array(count) };
  for (let i = 0; i < count; i++) {
    exported.height[i] = 1e-9 * (height[i]! + heightNoiseNm * random.normal());
    exported.current[i] = Math.min(saturationA, current[i]! + amplifierOffsetA + amplifierNoiseA * random.normal());
  }
  for (let k = 0; k < 12; k++) exported.height[random.integer(count)] = Number.NaN;
  for (let k = 0; k < 6; k++) exported.current[random.integer(count)] = Number.NaN;
  return exported;
}

/** A fresh tip wears faster than a blunt one: 0 at the first line, 1 at the last. */
function wornShare(t: number): number {
  return (1 - Math.exp(-t)) / (1 - Math.exp(-1));
}

function currentByLayers(options: SceneOptions): (layers: number) => number {
  const cache = new Map<number, number>();
  return (layers) => {
    let log10 = cache.get(layers);
    if (log10 === undefined) {
      log10 = wkbModel.lnDensity({ thicknessM: layers * layerNm * 1e-9, heightEv, massRatio }, options.scanBiasV) / Math.LN10 + Math.log10(options.tipAreaNm2 * 1e-18);
      cache.set(layers, log10);
    }
    return log10;
  };
}

/** Where the scanner stood, tilt, bow, a slow drift and an offset of its own for every line, in nm. */
function scanHeight(height: Float64Array, columns: number, rows: number, random: Random): void {
  const [tiltX, tiltY, bow] = [30 * (random.uniform() - 0.5), 30 * (random.uniform() - 0.5), 8 * (random.uniform() - 0.5)];
  let drift = 200 + 400 * random.uniform();
  // A random walk over all lines spreads alike whatever their number.
  const walk = 1 / Math.sqrt(rows);
  for (let r = 0; r < rows; r++) {
    drift += walk * random.normal();
    const line = drift + 0.3 * random.normal();
    const v = (2 * r) / rows - 1;
    for (let c = 0; c < columns; c++) {
      const u = (2 * c) / columns - 1;
      height[r * columns + c]! += tiltX * u + tiltY * v + bow * (u * u + 0.6 * v * v) + line;
    }
  }
}

/** Stretches of one or two lines where the probe lost contact; every second one loses the current too. */
function breakRuns(height: Float64Array, current: Float64Array, columns: number, rows: number, random: Random, runs: number): void {
  for (let k = 0; k < runs; k++) {
    const lines = 1 + random.integer(2);
    const row = 3 + random.integer(Math.max(1, rows - 8));
    const start = random.integer(Math.max(1, columns - 10));
    const end = Math.min(columns, start + Math.round(columns * (0.1 + 0.3 * random.uniform())));
    const jump = (random.uniform() < 0.5 ? -1 : 1) * (4 + 8 * random.uniform());
    for (let line = row; line < Math.min(rows, row + lines); line++) {
      for (let c = start; c < end; c++) {
        height[line * columns + c]! += jump;
        if (k % 2 === 0) current[line * columns + c] = 0;
      }
    }
  }
}
