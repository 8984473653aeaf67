/** Which plane each segment of flat ground lies on, from the steps at their common borders. */
import type { Grid } from '../grid/maps.ts';
import { medianInPlace } from '../stats/median.ts';
import { fewer, flatSegments } from './flat-segments.ts';

export interface LevelledSegments {
  /** Number of the segment per pixel from 1; 0 between segments, on features and on segments too small to tell. */
  readonly segment: Uint16Array;
  /** Height of each segment's plane over what the current told (over the common plane where it told nothing), metres; NaN where no border links it to the others. Index 0 is 0. */
  readonly levelM: Float64Array;
  /** 1 for segments that are terraces by all that is known; 0 for small ones that may as well be films: their height is no whole number of layers, or says another number than their current. */
  readonly terrace: Uint8Array;
}

/** A segment of flat ground with a smaller share of the map gets no plane of its own. */
const leastSegment = 0.0005;
/** Nor do more segments than this. */
const mostSegments = 80;
/** Places compared across a border are this far apart, pixels: wider than the band that parts two segments, nearer than the ground undulates. */
const apartPx = 10;
/** And at least so many of the columns that are there. */
const leastApartColumns = 3;
/** Fewer places say nothing about a border. */
const leastPairs = 24;
/** Enough for a median. */
const mostPairs = 3000;
/** A step this near to whole layers, in layers, is taken to be whole. */
const wholePart = 0.3;
/** Segments larger than this are terraces whatever their step: films of adsorbed matter are patches, m² (our judgement). */
export const filmMaxM2 = 0.6e-12;
/** A small segment whose current is censored or on no rung is a terrace only up to this many layers above the ground beside it. */
const mostLayers = 2.5;

/**
 * Segments flat ground and links the segments' planes by their steps: pairs of places on both sides of a common border, on one line or in one column, so
 * that undulation of the ground does not come in, as it would in a fit over the whole map. Steps near to whole layers are whole. The largest
 * segment whose plane the current tells, or else the largest, is the one that the others are measured against.
 *
 * @param rest metres over form, lines and known planes; NaN missing. @param planes the current's planes, NaN where it tells none.
 * @param every the columns are every so many-th of a map.
 */
export function levelSegments(rest: Float32Array, grid: Grid, layerM: number, planes: Float32Array | undefined, every = 1): LevelledSegments {
  const { columns, rows } = grid;
  const { segment, count, known, pixels, rung } = numberSegments(rest, columns, rows, layerM, planes, every);
  const steps = stepsBetween(rest, segment, count, columns, rows, Math.max(leastApartColumns, fewer(apartPx, every)));
  const levelM = new Float64Array(count + 1).fill(Number.NaN);
  levelM[0] = 0;
  const terrace = new Uint8Array(count + 1).fill(1);
  const first = known.indexOf(1);
  if (count > 0) levelM[first > 0 ? first : 1] = 0;
  for (;;) {
    let best = 0;
    let most = 0;
    let level = 0;
    let beside = 0;
    for (let k = 1; k <= count; k++) {
      if (levelM[k] === levelM[k]) continue;
      let weight = 0;
      let sum = 0;
      let nearest = 0;
      for (let j = 1; j <= count; j++) {
        const step = steps[j * (count + 1) + k];
        if (!step || levelM[j] !== levelM[j]) continue;
        if (nearest === 0 || step.pairs > steps[nearest * (count + 1) + k]!.pairs) nearest = j;
        weight += step.pairs;
        sum += step.pairs * (levelM[j]! + step.upM);
      }
      if (weight > most) {
        best = k;
        most = weight;
        level = sum / weight;
        beside = nearest;
      }
    }
    if (best === 0) break;
    const layers = Math.round(level / layerM);
    const whole = Math.abs(level / layerM - layers) < wholePart;
    levelM[best] = whole ? layers * layerM : level;
    const rises = level + rung[best]! > levelM[beside]! + rung[beside]! + layerM / 2;
    if (rises && pixels[best]! * grid.pitchXM * grid.pitchYM < filmMaxM2) {
      // Where the current tells: a step of the barrier agrees with it, a step of the conductor leaves it as it is beside.
      const agrees = whole && (known[best] === 1
        ? layers === 0 || (known[beside] === 1 && Math.abs(rung[best]! - rung[beside]!) < layerM / 2)
        : level - levelM[beside]! - rung[beside]! < mostLayers * layerM);
      if (!agrees) terrace[best] = 0;
    }
  }
  dropUnlinked(rest, segment, levelM, terrace, { known, pixels }, grid, layerM);
  return { segment, levelM, terrace };
}

/**
 * Small segments that no border links to the rest: where no current tells their plane nothing is known of them, and where it does their height must agree with
 * it, measured against the largest segment. Changes `terrace`.
 */
function dropUnlinked(
  rest: Float32Array, segment: Uint16Array, levelM: Float64Array, terrace: Uint8Array, { known, pixels }: { known: Uint8Array; pixels: Uint32Array }, grid: Grid, layerM: number,
): void {
  const small = (k: number): boolean => levelM[k] !== levelM[k] && pixels[k]! * grid.pitchXM * grid.pitchYM < filmMaxM2;
  if (!levelM.some((_, k) => k > 0 && small(k))) return;
  const lists: number[][] = Array.from(levelM, () => []);
  const every = Uint32Array.from(pixels, (n) => Math.max(1, Math.floor(n / 500)));
  const seen = new Uint32Array(levelM.length);
  for (let i = 0; i < segment.length; i++) {
    const k = segment[i]!;
    if (k > 0 && seen[k]!++ % every[k]! === 0 && rest[i] === rest[i]) lists[k]!.push(rest[i]!);
  }
  const height = (k: number): number => medianInPlace(Float64Array.from(lists[k]!), lists[k]!.length);
  const first = known.indexOf(1);
  const zero = height(first > 0 ? first : 1);
  for (let k = 1; k < levelM.length; k++) if (small(k) && (known[k] === 0 || Math.abs(height(k) - zero) > layerM / 2)) terrace[k] = 0;
}

/** Numbers flat segments from 1 by size; a segment with and without known planes counts as two, so that what is known is not moved by what is not. */
function numberSegments(
  rest: Float32Array, columns: number, rows: number, layerM: number, planes: Float32Array | undefined, every: number,
): { segment: Uint16Array; count: number; known: Uint8Array; pixels: Uint32Array; rung: Float64Array } {
  const { labels, count } = flatSegments(rest, columns, rows, layerM, every);
  const pixels = new Uint32Array(2 * count + 2);
  partByKnown(labels, planes, pixels);
  const bySize = [...pixels.keys()].filter((label) => label > 1 && pixels[label]! >= leastSegment * labels.length).sort((a, b) => pixels[b]! - pixels[a]!).slice(0, mostSegments);
  const numbers = new Uint16Array(pixels.length);
  bySize.forEach((label, k) => { numbers[label] = k + 1; });
  const segment = new Uint16Array(labels.length);
  for (let i = 0; i < labels.length; i++) segment[i] = numbers[labels[i]!]!;
  // Height by the current: of a segment over several rungs any of its pixels will do, as a border would have parted it.
  const rung = new Float64Array(bySize.length + 1);
  if (planes) noteRungs(segment, planes, rung);
  return {
    segment, count: bySize.length, known: Uint8Array.from([0, ...bySize.map((label) => label % 2)]),
    pixels: Uint32Array.from([0, ...bySize.map((label) => pixels[label]!)]), rung,
  };
}

/** Doubles all labels, makes those of pixels with known planes odd, and counts the pixels of each. */
function partByKnown(labels: Uint32Array, planes: Float32Array | undefined, pixels: Uint32Array): void {
  const known = planes ?? new Float32Array(labels.length).fill(Number.NaN);
  for (let i = 0; i < labels.length; i++) {
    if (labels[i] === 0) continue;
    const label = 2 * labels[i]! + (known[i] === known[i] ? 1 : 0);
    labels[i] = label;
    pixels[label]!++;
  }
}

function noteRungs(segment: Uint16Array, planes: Float32Array, rung: Float64Array): void {
  for (let i = 0; i < segment.length; i++) if (planes[i] === planes[i]) rung[segment[i]!] = planes[i]!;
}

interface Step {
  readonly upM: number;
  readonly pairs: number;
}

/** By `from * (count + 1) + to`: the median rise from one segment to another. */
function stepsBetween(rest: Float32Array, segment: Uint16Array, count: number, columns: number, rows: number, apartColumns: number): (Step | undefined)[] {
  const size = count + 1;
  const lists: (number[] | undefined)[] = Array.from({ length: size * size });
  for (let r = 0; r < rows; r++) {
    const start = r * columns;
    const lastAlong = start + columns - apartColumns;
    const lastDown = r + apartPx < rows ? start + columns : start;
    for (let i = nextPair(segment, start, lastAlong, lastDown, columns, start + columns); i < start + columns; i = nextPair(segment, i + 1, lastAlong, lastDown, columns, start + columns)) {
      if (i < lastAlong) addStep(lists, size, rest, segment, i, i + apartColumns);
      if (i < lastDown) addStep(lists, size, rest, segment, i, i + apartPx * columns);
    }
  }
  const steps: (Step | undefined)[] = Array.from({ length: size * size });
  lists.forEach((list, at) => {
    if (!list || list.length < leastPairs) return;
    const upM = medianInPlace(Float64Array.from(list), list.length);
    steps[at] = { upM, pairs: list.length };
    steps[(at % size) * size + Math.floor(at / size)] = { upM: -upM, pairs: list.length };
  });
  return steps;
}

/** The next pixel from `i` on that lies in another segment than one of its partners along the line and down the column; `end` without any. */
function nextPair(segment: Uint16Array, i: number, lastAlong: number, lastDown: number, columns: number, end: number): number {
  const apartColumns = end - lastAlong;
  for (; i < end; i++) {
    const own = segment[i]!;
    if (own === 0) continue;
    if (i < lastAlong && segment[i + apartColumns] !== own && segment[i + apartColumns] !== 0) return i;
    if (i < lastDown && segment[i + apartPx * columns] !== own && segment[i + apartPx * columns] !== 0) return i;
  }
  return end;
}

/** Notes the rise from one pixel to another, where they lie in two segments, under the lower number first. */
function addStep(lists: (number[] | undefined)[], size: number, rest: Float32Array, segment: Uint16Array, i: number, j: number): void {
  const a = segment[i]!;
  const b = segment[j]!;
  if (a === b || a === 0 || b === 0) return;
  const up = a < b ? rest[j]! - rest[i]! : rest[i]! - rest[j]!;
  if (up !== up) return;
  const list = (lists[Math.min(a, b) * size + Math.max(a, b)] ??= []);
  if (list.length < mostPairs) list.push(up);
}
