/** Islands of residue whose current happens to lie near a rung of the ladder: by their height they are no terraces. */
import { labelComponents } from '../grid/label-components.ts';
import { medianInPlace } from '../stats/median.ts';

/** Ground on planes further apart than this has no common step of one layer, in layers. */
const besideLayers = 1.5;
/** A true terrace's height lies this near to what its current says, metres, beside two standard errors: what undulation leaves (our judgement). */
const undulationM = 0.12e-9;
const standardErrors = 2;
/** Standard error of a median over that of a mean. */
const medianError = 1.2533;
/** Planes nearer than this are one, metres. */
export const samePlaneM = 0.1e-9;
/** Ground along a smaller share of an island's border only meets a corner of it. */
const leastBorder = 0.1;
/** An island of equal current this many times as large as a film may be is a terrace, however little of it lies on its plane. */
const mostPatch = 4;
/** Of large ground every so many-th pixel is enough for a mean. */
const sampleEvery = 31;
/** Heights that are enough for an island's median. */
const enough = 1000;

export interface IslandInput {
  readonly columns: number;
  readonly rows: number;
  /** Levelled height, metres, NaN missing; `zero` is its most common value over the planes. */
  readonly heights: Float32Array;
  readonly zero: number;
  readonly plane: Float32Array;
  /** Planes by the current alone, as far as it tells; where absent or NaN `plane` stands for them. */
  readonly told?: Float32Array | undefined;
  /** 1 well inside ground on a plane. */
  readonly core: Uint8Array;
  /** For every pixel a nearest one of the core, −1 without any. */
  readonly nearest: Int32Array;
  readonly onPlane: Uint8Array;
  readonly layerM: number;
  readonly noiseM: number;
  /** Larger islands are terraces, pixels. */
  readonly filmMaxPixels: number;
}

/** A small island: pieces of the core on one patch of equal current. */
interface Island {
  readonly pieces: number[];
  /** Of a first pixel, metres. */
  readonly planeM: number;
  /** Heights over what the current tells, all over the patch, metres. */
  readonly offs: number[];
}

/**
 * Takes small islands out of `core` that are no terraces. An island is ground on a plane with what lies nearer to it than to other such ground; pieces on one patch
 * of equal current are one island. Its neighbours are those along a tenth of its border or more. It is no terrace where
 *
 * - less of it than `filmMaxPixels` lies on its plane,
 * - it stands higher by 1.5 layers or more than every neighbour that holds, which means that is large, or has the height that its current says and
 *   is linked to what is large by such islands in steps of one layer, and
 * - its height over the largest neighbour is another than the current says, by more than 0.12 nm and two standard errors. This is the median over all of the patch of equal
 *   current: what of it lies on the plane has been chosen by its height and would agree too well.
 *
 * A true island of two or three layers has the height that its current says; one of one layer is left as it is. Where no ground is large nothing is taken.
 *
 * @returns whether anything was taken.
 */
export function dropFilmIslands(input: IslandInput): boolean {
  const { core, columns, rows, filmMaxPixels, layerM } = input;
  const { labels, count, pixels } = labelComponents(core, columns, rows, 4);
  const small = pixels.map((area, label) => (label > 0 && area < filmMaxPixels ? 1 : 0));
  if (!small.includes(1) || count < 2 || !small.includes(0, 1)) return false;
  const tells = input.told ?? input.plane;
  const starts = startsOf(labels, small, count, tells);
  const islands = islandsOf(labels, small, starts, tells, input);
  if (islands.length === 0) return false;
  const stepM = besideLayers * layerM;
  const islandAt = new Int32Array(count + 1).fill(-1);
  islands.forEach(({ pieces }, k) => { for (const label of pieces) islandAt[label] = k; });
  const ground = largeMeans(labels, small, count, tells, input);
  const looks = lookAround(islands, islandAt, labels, starts, input);
  // The area on its plane tells a small terrace from a large one whose core is small.
  const large = looks.map(({ area }) => area >= filmMaxPixels);
  const planeOf = (other: number): number => (other < 0 ? ground.planeM[-other]! : islands[other]!.planeM);
  const agrees = islands.map(({ offs }, k) => {
    if (large[k] || offs.length === 0) return true;
    const beside = looks[k]!.beside.find((other) => other < 0);
    const offBy = medianInPlace(Float64Array.from(offs), offs.length) - (beside === undefined ? input.zero : ground.offM[-beside]!);
    return Math.abs(offBy) < undulationM + (standardErrors * medianError * input.noiseM) / Math.sqrt(offs.length);
  });
  const holds = [...large];
  const holding = (k: number): number[] => looks[k]!.beside.filter((other) => other < 0 || holds[other]);
  const linked = (k: number): boolean => holding(k).some((other) => Math.abs(islands[k]!.planeM - planeOf(other)) < stepM);
  for (let more = true; more;) {
    more = false;
    for (let k = 0; k < islands.length; k++) if (!holds[k] && agrees[k] && linked(k)) more = holds[k] = true;
  }
  let taken = false;
  islands.forEach(({ planeM }, k) => {
    const beside = agrees[k] ? [] : holding(k);
    if (beside.length === 0 || !beside.every((other) => planeM - planeOf(other) >= stepM)) return;
    take(core, looks[k]!.pixels);
    taken = true;
  });
  return taken;
}

/** By piece a pixel at which its current tells a plane, for small ones only; −1 without any. */
function startsOf(labels: Uint32Array, small: Uint32Array, count: number, tells: Float32Array): Int32Array {
  const starts = new Int32Array(count + 1).fill(-1);
  // Looked at where the label changes along a line, which is seldom.
  let before = 0;
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label === before) continue;
    before = label;
    if (label !== 0 && small[label] === 1 && starts[label]! < 0 && tells[i] === tells[i]) starts[label] = i;
  }
  return starts;
}

/** Groups small pieces by the patches of equal current that they lie on. What shares a patch with large ground, or lies on a patch too large for a film, is left out. */
function islandsOf(labels: Uint32Array, small: Uint32Array, starts: Int32Array, tells: Float32Array, { columns, rows, heights, plane, filmMaxPixels }: IslandInput): Island[] {
  const islands: Island[] = [];
  const state = new Uint8Array(labels.length);
  const queue = new Int32Array(Math.ceil(mostPatch * filmMaxPixels));
  for (let label = 1; label < starts.length; label++) {
    const start = starts[label]!;
    if (start < 0 || state[start] !== 0) continue;
    const found = spread(start, tells, labels, small, columns, columns * rows, state, queue);
    if (found <= 0) {
      close(state, queue, -found);
      continue;
    }
    const patch = queue.subarray(0, found);
    islands.push({ pieces: piecesOn(patch, labels), planeM: plane[start]!, offs: offsOf(patch, heights, tells) });
  }
  return islands;
}

/** A pixel's state: not looked at yet is 0; on a patch that is or was gone over; on one that was given up, with all that joins it. */
const given = 1;
const closed = 2;

/** Puts pixels of equal plane joined to a first one by edges into `queue`. Gives their number, negative where it was given up: too many, or large ground among them. */
function spread(start: number, tells: Float32Array, labels: Uint32Array, small: Uint32Array, columns: number, count: number, state: Uint8Array, queue: Int32Array): number {
  const level = tells[start]!;
  queue[0] = start;
  state[start] = given;
  let found = 1;
  for (let n = 0; n < found; n++) {
    const i = queue[n]!;
    if (labels[i] !== 0 && small[labels[i]!] === 0) return -found;
    const c = i % columns;
    for (let side = 0; side < 4; side++) {
      const j = side === 0 ? (c > 0 ? i - 1 : -1) : side === 1 ? (c + 1 < columns ? i + 1 : -1) : side === 2 ? i - columns : i + columns;
      if (j < 0 || j >= count || state[j] === given || !(Math.abs(tells[j]! - level) < samePlaneM)) continue;
      if (state[j] === closed || found >= queue.length) return -found;
      state[j] = given;
      queue[found++] = j;
    }
  }
  return found;
}

function close(state: Uint8Array, queue: Int32Array, count: number): void {
  for (let n = 0; n < count; n++) state[queue[n]!] = closed;
}

function piecesOn(patch: Int32Array, labels: Uint32Array): number[] {
  const pieces = new Set<number>();
  for (let n = 0; n < patch.length; n++) if (labels[patch[n]!] !== 0) pieces.add(labels[patch[n]!]!);
  return [...pieces];
}

/** Heights over what the current tells, about `enough` of them, from all over a patch. */
function offsOf(patch: Int32Array, heights: Float32Array, tells: Float32Array): number[] {
  const offs: number[] = [];
  for (let n = 0; n < patch.length; n += Math.ceil(patch.length / enough)) if (heights[patch[n]!] === heights[patch[n]!]) offs.push(heights[patch[n]!]! - tells[patch[n]!]!);
  return offs;
}

/** By large piece the mean plane and the mean height over what the current tells, metres. */
function largeMeans(labels: Uint32Array, small: Uint32Array, count: number, tells: Float32Array, { heights, plane }: IslandInput): { planeM: Float64Array; offM: Float64Array } {
  const [planeM, offM, pixels] = [new Float64Array(count + 1), new Float64Array(count + 1), new Uint32Array(count + 1)];
  for (let i = 0; i < labels.length; i += sampleEvery) {
    const label = labels[i]!;
    if (label === 0 || small[label] === 1 || heights[i] !== heights[i]) continue;
    pixels[label]!++;
    planeM[label]! += plane[i]!;
    offM[label]! += heights[i]! - (tells[i] === tells[i] ? tells[i]! : plane[i]!);
  }
  for (let label = 1; label <= count; label++) {
    planeM[label]! /= pixels[label]!;
    offM[label]! /= pixels[label]!;
  }
  return { planeM, offM };
}

interface Look {
  /** Pixels nearest to the island. */
  readonly pixels: Int32Array;
  /** Those of them that lie on a plane. */
  readonly area: number;
  /** Neighbours, those with the longest common border first: numbers of islands, or the negative label of other ground. */
  readonly beside: number[];
}

/** Goes over what lies nearest to islands, each of which has pixels of its own, and notes what it meets. */
function lookAround(islands: readonly Island[], islandAt: Int32Array, labels: Uint32Array, starts: Int32Array, { columns, rows, nearest, onPlane }: IslandInput): Look[] {
  const seen = new Uint8Array(labels.length);
  // Room that is never written to costs nothing.
  const queue = new Int32Array(labels.length);
  return islands.map(({ pieces }, own) => {
    let found = 0;
    for (const label of pieces) {
      const start = starts[label]!;
      if (start < 0 || seen[start] === 1) continue;
      seen[start] = 1;
      queue[found++] = start;
    }
    const met: number[] = [];
    found = gather(own, found, queue, seen, nearest, labels, islandAt, columns, columns * rows, met);
    const borders = new Map<number, number>();
    for (const name of met) borders.set(name, (borders.get(name) ?? 0) + 1);
    const pixels = queue.slice(0, found);
    return {
      pixels,
      area: areaOf(pixels, onPlane),
      beside: [...borders].filter(([, length]) => length >= leastBorder * met.length).sort((a, b) => b[1] - a[1]).map(([name]) => name),
    };
  });
}

/** Adds to the first `found` pixels of `queue` all that are nearest to their island, and to `met` the names of what lies beside, once for each side of a pixel. */
function gather(
  own: number, found: number, queue: Int32Array, seen: Uint8Array, nearest: Int32Array, labels: Uint32Array, islandAt: Int32Array, columns: number, count: number, met: number[],
): number {
  for (let n = 0; n < found; n++) {
    const i = queue[n]!;
    const c = i % columns;
    for (let side = 0; side < 4; side++) {
      const j = side === 0 ? (c > 0 ? i - 1 : -1) : side === 1 ? (c + 1 < columns ? i + 1 : -1) : side === 2 ? i - columns : i + columns;
      if (j < 0 || j >= count || seen[j] === 1 || nearest[j]! < 0) continue;
      const label = labels[nearest[j]!]!;
      if (islandAt[label] === own) {
        seen[j] = 1;
        queue[found++] = j;
      } else if (label > 0) met.push(islandAt[label]! < 0 ? -label : islandAt[label]!);
    }
  }
  return found;
}

function areaOf(pixels: Int32Array, onPlane: Uint8Array): number {
  let area = 0;
  for (let n = 0; n < pixels.length; n++) area += onPlane[pixels[n]!]!;
  return area;
}

function take(core: Uint8Array, pixels: Int32Array): void {
  for (let n = 0; n < pixels.length; n++) core[pixels[n]!] = 0;
}
