/** Paints a scene: a sample as the read stage hands it on, and the truth about it. */
import type { Grid } from '../../src/grid/maps.ts';
import type { Sample } from '../../src/read/sample.ts';
import type { Random } from '../../src/stats/random.ts';
import { seededRandom } from '../../src/stats/random.ts';
import { median } from '../../src/stats/median.ts';
import { createSample } from '../fixtures/create-sample.ts';
import { layerCurrents, pinholeA, saturationA } from './paint-current.ts';
import { waveField } from './paint-field.ts';
import type { Kind } from './paint-kinds.ts';
import { layouts, paintLayers } from './paint-layers.ts';
import { drawObject } from './paint-objects.ts';
import type { PaintedObject } from './paint-objects.ts';
import { populate } from './paint-populate.ts';
import { amplified, scanErrors } from './paint-scan.ts';
import { claim, roundsOf, truthCodes } from './paint-truth.ts';
import type { Truth } from './paint-truth.ts';

const layerNm = 0.333;
const bandFactor = 3;
/** Smooth variation of the log current, on two scales of equal weight, and of the surface: standard deviation and length in nm. */
const variation = { decades: 0.12, lengthsNm: [450, 1400] } as const;
const roughness = { nm: 0.1, lengthNm: 450 } as const;
/** Scatter from pixel to pixel, decades. */
const pixelDecades = 0.01;
/** The second most common terrace has at most this share of the most common one's area. */
const clearLead = 0.85;
/** Different counts of layers on a map, at least. */
const leastTerraces = 4;

export interface PaintedScene {
  readonly sample: Sample;
  readonly truth: Truth;
  readonly objects: readonly PaintedObject[];
}

/** The same kind and seed give the same scene to the bit. Every part has a random stream of its own, so that more bubbles do not move the noise. */
export function paintScene(kind: Kind, seed: string): PaintedScene {
  const stream = (part: string) => seededRandom(`${kind.name} ${seed} ${part}`);
  const { columns, rows } = kind;
  const count = columns * rows;
  const currents = layerCurrents(stream('currents'), kind);
  const objects = populate(stream('objects'), kind, kind.population, `${kind.name} ${seed}`);
  const drawn = drawAll(kind, objects);
  const layers = clearLayers(stream('layers'), kind, currents.reference, drawn.things);
  const mostCommon = currents.reference;
  const errors = scanErrors(stream('scan'), kind);

  const rough = waveField(stream('roughness'), kind, roughness.lengthNm, roughness.nm);
  const [fine, coarse] = variation.lengthsNm.map((lengthNm) => waveField(stream(`variation ${lengthNm}`), kind, lengthNm, variation.decades * Math.SQRT1_2));
  const vary = fine!.map((value, i) => value + coarse![i]!);
  const [wearDecades, wearPower] = wearOf(kind, stream('wear').uniform(), stream('wear power').uniform());
  const lagPx = kind.lagPx ? kind.lagPx[0] + (kind.lagPx[1] - kind.lagPx[0]) * stream('lag').uniform() : 0;

  // The reference is the terrace's median, which the slow part of the variation moves.
  const middle = median(vary.filter((_, i) => layers[i] === mostCommon && drawn.things[i] === 0));
  const heightNoise = stream('height noise');
  const pixelNoise = stream('pixel noise');
  const cleanNm = new Float64Array(count);
  const heightM = new Float32Array(count);
  const trueA = new Float64Array(count);
  const relative = new Float64Array(count);
  const saturatedGround = new Uint8Array(count);
  for (let r = 0, i = 0; r < rows; r++) {
    const worn = wearDecades * (rows > 1 ? r / (rows - 1) : 0) ** wearPower;
    for (let c = 0; c < columns; c++, i++) {
      const n = layers[i]!;
      cleanNm[i] = (n - mostCommon) * layerNm + rough[i]! + drawn.riseNm[i]!;
      heightM[i] = errors.missingHeight[i] === 1 ? Number.NaN : (cleanNm[i]! + errors.addedNm[i]! + kind.whiteNm * heightNoise.normal()) * 1e-9;
      const ground = currents.probe(n) + vary[i]! + pixelDecades * pixelNoise.normal() - worn;
      saturatedGround[i] = 10 ** ground >= saturationA ? 1 : 0;
      const shorted = drawn.shorted[i] === 1;
      trueA[i] = errors.dark[i] === 1 ? 0 : shorted ? pinholeA : 10 ** (ground - drawn.lostDecades[i]!);
      relative[i] = currents.device(n) - currents.device(mostCommon) + (currents.variationCounts ? vary[i]! - middle : 0);
    }
  }
  const currentA = amplified(stream('floor noise'), trueA, columns, lagPx, kind.floorNoiseA).map((value, i) => (errors.missingCurrent[i] === 1 ? Number.NaN : value));
  const grid: Grid = { columns, rows, pitchXM: (kind.widthNm / columns) * 1e-9, pitchYM: (kind.heightNm / rows) * 1e-9 };
  const sample = createSample({ ...grid, heightM, currentA, biasV: kind.biasV });
  const codes = truthCodes({ things: drawn.things, missing: errors.missingCurrent, relative, bandFactor });
  return {
    sample: { ...sample, name: `${kind.name} ${seed}` },
    truth: { grid, codes, rounds: roundsOf(objects), cleanNm, layers, whiteNm: kind.whiteNm, wearDecades, lagPx, saturatedGround },
    objects,
  };
}

/** Terraces of which one is clearly the most common on unflawed ground: with two alike, which is the reference would be a matter of chance. */
function clearLayers(random: Random, kind: Kind, mostCommon: number, things: Uint8Array): Uint8Array {
  for (;;) {
    const layers = paintLayers(random, kind, layouts[random.integer(layouts.length)]!, mostCommon);
    const pixels = new Map<number, number>();
    for (let i = 0; i < layers.length; i++) if (things[i] === 0) pixels.set(layers[i]!, (pixels.get(layers[i]!) ?? 0) + 1);
    const runnerUp = Math.max(0, ...[...pixels].filter(([n]) => n !== mostCommon).map(([, total]) => total));
    if (pixels.size >= leastTerraces && runnerUp < clearLead * (pixels.get(mostCommon) ?? 0)) return layers;
  }
}

function wearOf({ wearDecades }: Kind, at: number, bend: number): [decades: number, power: number] {
  return wearDecades ? [wearDecades[0] + (wearDecades[1] - wearDecades[0]) * at, 0.8 + 0.8 * bend] : [0, 1];
}

/** Bumps add up, except that bubbles which run into each other share one skin: the higher counts. */
function drawAll(kind: Kind, objects: readonly PaintedObject[]) {
  const count = kind.columns * kind.rows;
  const riseNm = new Float64Array(count);
  const domesNm = new Float64Array(count);
  const lostDecades = new Float64Array(count);
  const shorted = new Uint8Array(count);
  const things = new Uint8Array(count);
  for (const object of objects) {
    drawObject(kind, object, (i, rise, lost) => {
      if (object.kind === 'bubble') domesNm[i] = Math.max(domesNm[i]!, rise);
      else riseNm[i]! += rise;
      lostDecades[i] = Math.max(lostDecades[i]!, lost);
      if (object.kind === 'pinhole') shorted[i] = 1;
      if (lost > 0 || object.kind === 'pinhole') claim(things, i, object.kind);
    });
  }
  for (let i = 0; i < count; i++) riseNm[i]! += domesNm[i]!;
  return { riseNm, lostDecades, shorted, things };
}
