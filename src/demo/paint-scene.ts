import { wkbModel } from '../barrier/model/wkb.ts';
import type { Random } from '../stats/random.ts';
import { seededRandom } from '../stats/random.ts';
import { addBorders, addBubbles, addParticles, addPinholes, addWrinkles } from './features.ts';
import type { Canvas } from './features.ts';
import { smoothField } from './smooth-field.ts';
import type { PaintedScan, SceneOptions } from './scene.ts';

/** Stated constants of the invented instrument and material; the barrier's are the recipe's defaults. */
const layerNm = 0.333;
const heightEv = 2.5;
const massRatio = 0.5;
const heightNoiseNm = 0.08;
const roughnessNm = 0.08;
const contactScatterDecades = 0.05;
const amplifierNoiseA = 3e-14;
const amplifierOffsetA = 1.5e-13;
const saturationA = 1e-8;

/**
 * Paints a seeded scan: terraces of whole layers whose current follows the WKB model at the scan's bias, a smooth scatter of the contact, bubbles
 * (paraboloids), particles, films, wrinkles and pinholes; then what scanning adds: tilt and bow, line offsets, broken runs, tip wear, an amplifier
 * with offset, noise and saturation, missing pixels. The same options give the same scan.
 */
export function paintScene(options: SceneOptions): PaintedScan {
  const random = seededRandom(options.seed);
  const { columns, rows } = options;
  const count = columns * rows;
  const canvas: Canvas = {
    columns, rows, widthNm: options.widthUm * 1000, heightNm: options.heightUm * 1000,
    layers: new Float64Array(count).fill(options.baseLayers), reliefNm: new Float64Array(count), lossDecades: new Float64Array(count), shorted: new Uint8Array(count),
  };
  addBorders(canvas, random, options.borders);
  addWrinkles(canvas, random, options.wrinkles);
  addParticles(canvas, random, options.particles, options.films);
  addBubbles(canvas, random, options.bubbles, options.bubbleRadiusNm, options.bubbleAspect);
  addPinholes(canvas, random, options.pinholes);

  const rough = smoothField(random, columns, rows, 24);
  const scatter = smoothField(random, columns, rows, 12);
  const height = new Float32Array(count);
  const current = new Float32Array(count);
  const idealLog10 = currentByLayers(options);
  for (let i = 0; i < count; i++) {
    height[i] = canvas.layers[i]! * layerNm + canvas.reliefNm[i]! + roughnessNm * rough[i]!;
    const row = (i / columns) | 0;
    const worn = (options.wearDecades * row) / Math.max(1, rows - 1);
    const log10 = idealLog10(canvas.layers[i]!) + contactScatterDecades * scatter[i]! - canvas.lossDecades[i]! - worn;
    current[i] = canvas.shorted[i] === 1 ? 10 * saturationA : 10 ** log10;
  }
  scanHeight(height, columns, rows, random);
  breakRuns(height, current, columns, rows, random, options.brokenRuns);
  for (let i = 0; i < count; i++) {
    height[i] = 1e-9 * (height[i]! + heightNoiseNm * random.normal());
    current[i] = Math.min(saturationA, current[i]! + amplifierOffsetA + amplifierNoiseA * random.normal());
  }
  for (let k = 0; k < 12; k++) height[random.integer(count)] = Number.NaN;
  for (let k = 0; k < 6; k++) current[random.integer(count)] = Number.NaN;
  return { height, current };
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

/** Tilt, bow and an offset of its own for every line, in nm. */
function scanHeight(height: Float32Array, columns: number, rows: number, random: Random): void {
  const [tiltX, tiltY, bow] = [30 * (random.uniform() - 0.5), 30 * (random.uniform() - 0.5), 8 * (random.uniform() - 0.5)];
  for (let r = 0; r < rows; r++) {
    const line = 0.4 * random.normal();
    const v = (2 * r) / rows - 1;
    for (let c = 0; c < columns; c++) {
      const u = (2 * c) / columns - 1;
      height[r * columns + c]! += tiltX * u + tiltY * v + bow * (u * u + 0.6 * v * v) + line;
    }
  }
}

/** Stretches of one or two lines where the probe lost contact; every second one loses the current too. */
function breakRuns(height: Float32Array, current: Float32Array, columns: number, rows: number, random: Random, runs: number): void {
  for (let k = 0; k < runs; k++) {
    const lines = 1 + random.integer(2);
    const row = 3 + random.integer(Math.max(1, rows - 8));
    const start = random.integer(Math.max(1, columns - 10));
    const end = Math.min(columns, start + Math.round(columns * (0.1 + 0.3 * random.uniform())));
    const jump = (random.uniform() < 0.5 ? -1 : 1) * (4 + 8 * random.uniform());
    for (let line = row; line < row + lines; line++) {
      for (let c = start; c < end; c++) {
        height[line * columns + c]! += jump;
        if (k % 2 === 0) current[line * columns + c] = 0;
      }
    }
  }
}
