/** Terraces: borders drawn in nm, each a step of whole layers. */
import { labelComponents } from '../../src/grid/label-components.ts';
import type { Random } from '../../src/stats/random.ts';
import type { PaintGrid } from './paint-grid.ts';
import { pitchXNm, pitchYNm } from './paint-grid.ts';

/** The recipe's smallest terrace, 0.25 µm², with some room. */
const leastTerraceNm2 = 0.28e6;

export const layouts = ['stripes', 'blobs', 'wedges'] as const;
export type Layout = (typeof layouts)[number];

/** Adds its step where a point lies on its far side. */
interface Border {
  readonly step: number;
  readonly beyond: (xNm: number, yNm: number) => boolean;
}

/** A map of whole layers, 9 to 15, whose most common value is `mostCommon`; what would lie beyond is cut to them. */
export function paintLayers(random: Random, grid: PaintGrid, layout: Layout, mostCommon: number): Uint8Array {
  const borders = bordersOf(random, grid, layout);
  const { columns, rows } = grid;
  const steps = new Int8Array(columns * rows);
  const [px, py] = [pitchXNm(grid), pitchYNm(grid)];
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      let sum = 0;
      for (const border of borders) if (border.beyond((c + 0.5) * px, (r + 0.5) * py)) sum += border.step;
      steps[i] = sum;
    }
  }
  const base = mostCommon - commonest(steps);
  return withoutSlivers(Uint8Array.from(steps, (step) => Math.min(15, Math.max(9, base + step))), grid);
}

/**
 * Where borders nearly meet they cut off slivers. By the ledger's rules a bright sliver is a short and a dead one an open spot, not a terrace:
 * patches (4-connected) smaller than the smallest terrace take the layers of most of their neighbours.
 */
function withoutSlivers(layers: Uint8Array, grid: PaintGrid): Uint8Array {
  const { columns, rows } = grid;
  const least = leastTerraceNm2 / (pitchXNm(grid) * pitchYNm(grid));
  for (let pass = 0; pass < 8; pass++) {
    let small = 0;
    for (const n of new Set(layers)) {
      const patches = labelComponents(layers.map((value) => (value === n ? 1 : 0)), columns, rows, 4);
      const votes = new Map<number, Uint32Array>();
      for (let i = 0; i < layers.length; i++) {
        const patch = patches.labels[i]!;
        if (patch === 0 || patches.pixels[patch]! >= least) continue;
        const tally = votes.get(patch) ?? new Uint32Array(16);
        votes.set(patch, tally);
        for (const k of neighbours(i, columns, rows)) if (layers[k] !== n) tally[layers[k]!]!++;
      }
      small += votes.size;
      const winners = new Map([...votes].map(([patch, tally]) => [patch, tally.indexOf(Math.max(...tally))]));
      layers.forEach((_, i) => {
        const winner = winners.get(patches.labels[i]!);
        if (winner) layers[i] = winner;
      });
    }
    if (small === 0) break;
  }
  return layers;
}

function neighbours(i: number, columns: number, rows: number): number[] {
  const c = i % columns;
  return [...(c > 0 ? [i - 1] : []), ...(c < columns - 1 ? [i + 1] : []), ...(i >= columns ? [i - columns] : []), ...(i < columns * (rows - 1) ? [i + columns] : [])];
}

function commonest(steps: Int8Array): number {
  const pixels = new Map<number, number>();
  for (const step of steps) pixels.set(step, (pixels.get(step) ?? 0) + 1);
  return [...pixels].sort((a, b) => b[1] - a[1] || a[0] - b[0])[0]![0];
}

function bordersOf(random: Random, grid: PaintGrid, layout: Layout): Border[] {
  const { widthNm, heightNm } = grid;
  const side = Math.min(widthNm, heightNm);
  const between = (low: number, high: number): number => low + (high - low) * random.uniform();
  const sign = (): number => (random.uniform() < 0.5 ? -1 : 1);
  const borders: Border[] = [];
  switch (layout) {
    case 'stripes': {
      const angle = Math.PI * random.uniform();
      const count = 3 + random.integer(4);
      // Half of them rise all the way, the others to the middle and then fall, or the other way round.
      const turn = random.uniform() < 0.5 ? count : count / 2;
      const first = sign();
      const span = Math.abs(widthNm * Math.cos(angle)) + Math.abs(heightNm * Math.sin(angle));
      for (let k = 0; k < count; k++) {
        const along = ((k + between(0.25, 0.75)) / count - 0.5) * span;
        borders.push(wavyLine(random, angle + 0.1 * random.normal(), widthNm / 2 + along * Math.cos(angle), heightNm / 2 + along * Math.sin(angle), k < turn ? first : -first));
      }
      break;
    }
    case 'wedges': {
      const count = 4 + random.integer(3);
      for (let k = 0; k < count; k++) borders.push(wavyLine(random, 2 * Math.PI * random.uniform(), between(0.15, 0.85) * widthNm, between(0.15, 0.85) * heightNm, 1));
      break;
    }
    case 'blobs': {
      const count = 4 + random.integer(5);
      for (let k = 0; k < count; k++) borders.push(blob(random, widthNm * random.uniform(), heightNm * random.uniform(), between(0.1, 0.27) * side, sign()));
    }
  }
  // Half of the stripes and blobs are crossed by a border of another direction.
  if (layout !== 'wedges' && random.uniform() < 0.5) borders.push(wavyLine(random, 2 * Math.PI * random.uniform(), between(0.3, 0.7) * widthNm, between(0.3, 0.7) * heightNm, 1));
  const small = random.integer(3);
  for (let k = 0; k < small; k++) borders.push(blob(random, widthNm * random.uniform(), heightNm * random.uniform(), between(450, 900), sign()));
  return borders;
}

/** A border through a point, its normal at `angle`, meandering by some hundred nanometres. */
function wavyLine(random: Random, angle: number, xNm: number, yNm: number, step: number): Border {
  const [nx, ny] = [Math.cos(angle), Math.sin(angle)];
  const waves = [[4500, 260], [1700, 90], [640, 25]].map(([length, size]) => ({
    turn: (2 * Math.PI) / (length! * (0.7 + 0.6 * random.uniform())), size: size! * (0.5 + random.uniform()), phase: 2 * Math.PI * random.uniform(),
  }));
  return {
    step,
    beyond: (x, y) => {
      const along = -ny * (x - xNm) + nx * (y - yNm);
      let across = nx * (x - xNm) + ny * (y - yNm);
      for (const wave of waves) across -= wave.size * Math.sin(wave.turn * along + wave.phase);
      return across > 0;
    },
  };
}

function blob(random: Random, xNm: number, yNm: number, radiusNm: number, step: number): Border {
  const outline = starOutline(random, 0.3);
  return { step, beyond: (x, y) => {
    const distance = Math.hypot(x - xNm, y - yNm);
    return distance < 2 * radiusNm && distance < radiusNm * outline(Math.atan2(y - yNm, x - xNm));
  } };
}

/** Relative radius over the angle: a circle with a few harmonics, never below 0.4. */
export function starOutline(random: Random, roughness: number): (angle: number) => number {
  const harmonics = [2, 3, 4, 5, 6].map((order) => ({ order, size: (roughness * random.normal()) / order, phase: 2 * Math.PI * random.uniform() }));
  return (angle) => {
    let radius = 1;
    for (const { order, size, phase } of harmonics) radius += size * Math.cos(order * angle + phase);
    return Math.min(1.7, Math.max(0.4, radius));
  };
}
