/** A map of log current as patches of terrace, thinned to what a fit of its drift needs. */
import { medianInPlace } from '../stats/median.ts';
import { madScale } from '../stats/mad.ts';

/** Mean of one patch over one block of the map. */
export interface PatchMean {
  /** Place in units of the map's longer side, y downwards from the first row. */
  readonly x: number;
  readonly y: number;
  readonly log10: number;
  /** Which patch, 0 … patches − 1. */
  readonly patch: number;
}

export interface Patches {
  readonly means: readonly PatchMean[];
  readonly patches: number;
}

/** Tiles a side: small enough that most lie on one terrace, few enough that their number costs nothing. */
const tilesPerSide = 64;
/** Blocks a side over which the tiles of one patch are averaged. */
const blocksPerSide = 12;
/** Pixels read in a tile at most, and at least. */
const readings = { most: 36, least: 8 } as const;
/** A tile whose readings scatter more than this is crossed by a border, decades. */
const mixedDecades = 0.12;
/** Limits of the jump between neighbouring tiles that is a border: the lower is above the slow variation of one terrace, the upper below a layer of any likely barrier, decades. */
const border = { least: 0.15, most: 0.4 } as const;
/** A patch of fewer tiles says nothing of a drift. */
const leastTiles = 12;

/**
 * Cuts a map of log current into patches inside which it varies slowly, by tiles: neighbouring tiles whose medians differ by less than a border's jump are of one
 * patch. A patch may be a part of a terrace; that two patches are the same terrace is never assumed. Tiles with too few admitted pixels or with a
 * border in them are left out, so borders may lie at any angle, along the fast axis too.
 *
 * @param log10 NaN missing; @param use admits uncensored ground; @param height over width of the map in metres.
 */
export function patchesOf(log10: Float32Array, columns: number, rows: number, use: (index: number) => boolean, aspect: number): Patches {
  const [across, down] = [Math.min(tilesPerSide, Math.max(1, columns >> 2)), Math.min(tilesPerSide, Math.max(1, rows >> 2))];
  const level = tileMedians(log10, columns, rows, across, down, use);
  const label = joinTiles(level, across, down, jumpLimit(level, across, down));
  return blockMeans(level, label, across, down, aspect);
}

function tileMedians(log10: Float32Array, columns: number, rows: number, across: number, down: number, use: (index: number) => boolean): Float64Array {
  const level = new Float64Array(across * down).fill(Number.NaN);
  const buffer = new Float64Array(readings.most);
  for (let v = 0; v < down; v++) {
    const [top, bottom] = [Math.floor((v * rows) / down), Math.floor(((v + 1) * rows) / down)];
    for (let u = 0; u < across; u++) {
      const [left, right] = [Math.floor((u * columns) / across), Math.floor(((u + 1) * columns) / across)];
      const step = Math.max(1, Math.ceil(Math.sqrt(((right - left) * (bottom - top)) / readings.most)));
      let count = 0;
      for (let r = top + ((bottom - top - 1) % step >> 1); r < bottom; r += step) {
        for (let c = left; c < right && count < readings.most; c += step) {
          const i = r * columns + c;
          if (!Number.isNaN(log10[i]!) && use(i)) buffer[count++] = log10[i]!;
        }
      }
      if (count < readings.least) continue;
      const middle = medianInPlace(buffer, count);
      for (let k = 0; k < count; k++) buffer[k] = Math.abs(buffer[k]! - middle);
      if (madScale * medianInPlace(buffer, count) <= mixedDecades) level[v * across + u] = middle;
    }
  }
  return level;
}

/** Four standard deviations of the differences between neighbouring tiles of one terrace, within the limits. */
function jumpLimit(level: Float64Array, across: number, down: number): number {
  const differences: number[] = [];
  for (let t = 0; t + across < across * down; t++) {
    const d = Math.abs(level[t + across]! - level[t]!);
    if (!Number.isNaN(d)) differences.push(d);
  }
  const scatter = madScale * medianInPlace(Float64Array.from(differences));
  return Math.min(border.most, Math.max(border.least, 4 * (scatter || 0)));
}

/** Patch number of every tile from 1, 0 for tiles without a level. */
function joinTiles(level: Float64Array, across: number, down: number, limit: number): Uint32Array {
  const label = new Uint32Array(level.length);
  const stack: number[] = [];
  let count = 0;
  for (let start = 0; start < level.length; start++) {
    if (label[start] !== 0 || Number.isNaN(level[start]!)) continue;
    label[start] = ++count;
    stack.push(start);
    for (let t = stack.pop(); t !== undefined; t = stack.pop()) {
      const u = t % across;
      for (const [there, inside] of [[t - 1, u > 0], [t + 1, u + 1 < across], [t - across, t >= across], [t + across, t < across * (down - 1)]] as const) {
        if (!inside || label[there] !== 0 || !(Math.abs(level[there]! - level[t]!) <= limit)) continue;
        label[there] = count;
        stack.push(there);
      }
    }
  }
  return label;
}

function blockMeans(level: Float64Array, label: Uint32Array, across: number, down: number, aspect: number): Patches {
  const sizes = new Map<number, number>();
  for (const name of label) if (name > 0) sizes.set(name, (sizes.get(name) ?? 0) + 1);
  const kept = new Map([...sizes].filter(([, tiles]) => tiles >= leastTiles).map(([name], k) => [name, k]));
  const sums = new Map<number, { x: number; y: number; log10: number; tiles: number; patch: number }>();
  for (let t = 0; t < level.length; t++) {
    const patch = kept.get(label[t]!);
    if (patch === undefined) continue;
    const [u, v] = [t % across, Math.floor(t / across)];
    const block = Math.floor((v * blocksPerSide) / down) * blocksPerSide + Math.floor((u * blocksPerSide) / across);
    const key = patch * blocksPerSide * blocksPerSide + block;
    const sum = sums.get(key) ?? { x: 0, y: 0, log10: 0, tiles: 0, patch };
    sums.set(key, sum);
    sum.x += u + 0.5;
    sum.y += v + 0.5;
    sum.log10 += level[t]!;
    sum.tiles++;
  }
  const [width, height] = aspect > 1 ? [1 / aspect, 1] : [1, aspect];
  const means = [...sums.values()].filter(({ tiles }) => tiles >= 3).map(({ x, y, log10, tiles, patch }) => (
    { x: (width * x) / (tiles * across), y: (height * y) / (tiles * down), log10: log10 / tiles, patch }));
  return { means, patches: kept.size };
}
