/** One layer count for each stretch of a terrace: its current varies with the contact, its layers do not. */
import { nearestAdmitted } from '../flaws/local-ground.ts';
import { labelComponents } from '../grid/label-components.ts';
import { thin, thinGrid } from '../ground/thin.ts';
import { boxMean, terraceSegments } from '../ground/flat-segments.ts';
import { medianInPlace } from '../stats/median.ts';
import { quantile } from '../stats/quantile.ts';

export interface SettleInput {
  /** Metres, NaN missing. */
  readonly levelled: Float32Array;
  readonly log10: Float32Array;
  readonly columns: number;
  /** 1 on flawless ground whose current is measured, neither saturated nor at the floor. */
  readonly measured: Uint8Array;
  readonly layerM: number;
  readonly stepDecades: number;
  /** Nearest rung to a log current. */
  readonly place: (log10: number) => number;
}

/** Pixels a side that are enough to find stretches by. */
const enoughSide = 480;
/** Stretches of fewer pixels are no better known than their pixels. */
const leastPixels = 60;
/** Of each stretch about so many decide. */
const sampled = 2000;
/** Fewer pixels together that stand off their stretch are scatter. */
const leastOdd = 4;
/** But not by more than this, in steps. */
const mostScatter = 1.5;
/** Half-width of the square over which a stretch's current is averaged, pixels. */
const aroundPx = 2;
/** A pixel further than this part of the step from its stretch's median is not of the same terrace, whatever leaks between them. */
const withinPart = 0.75;
/** Nine tenths of one terrace's currents lie within this part of the step: scatter of the contact, where two terraces would differ by all of it. */
const oneTerrace = 0.95;

/**
 * Rung of every measured pixel. Stretches of ground on which neither height nor current shows a border take the rung of their median current. Between
 * stretches, on borders, a pixel is counted from the nearest stretch by its own current against the current there, because the contact varies
 * slowly. Without any stretch a pixel takes the rung nearest to its own current.
 */
export function settleTerraces(input: SettleInput): Int16Array {
  const { log10, columns, measured, stepDecades, place } = input;
  const rows = log10.length / columns;
  // Stretches of large maps are sought on every n-th pixel: a terrace is no less sure by fewer of them.
  const every = Math.max(1, Math.floor(Math.min(columns, rows) / enoughSide));
  const grid = { columns, rows, pitchXM: 1, pitchYM: 1 };
  const coarse = thinGrid(grid, every);
  const columnAt = Uint32Array.from({ length: columns }, (_, c) => Math.min(coarse.columns - 1, Math.floor(c / every)));
  const rowStart = (r: number): number => Math.min(coarse.rows - 1, Math.floor(r / every)) * coarse.columns;
  const thinLog = thin(log10, grid, every);
  const { labels, medians, rungs } = stretches({ ...input, levelled: thin(input.levelled, grid, every), log10: thinLog, measured: thin(measured, grid, every), columns: coarse.columns });

  const reach = withinPart * stepDecades;
  const settled = new Uint8Array(labels.length);
  const settledLog = new Float32Array(labels.length).fill(Number.NaN);
  for (let k = 0; k < labels.length; k++) {
    if (!(Math.abs(thinLog[k]! - medians[labels[k]!]!) < reach)) continue;
    settled[k] = 1;
    settledLog[k] = thinLog[k]!;
  }
  const nearest = nearestAdmitted(settled, coarse.columns, coarse.rows);
  // The contact's scatter from pixel to pixel stays out of what the others are measured against.
  const around = boxMean(settledLog, coarse.columns, coarse.rows, aroundPx);
  // A few odd pixels inside a stretch are scatter too.
  const odd = new Uint8Array(log10.length);
  // NaN where the pixel beside is settled on no stretch, so that the comparison fails.
  const levels = new Float64Array(labels.length);
  for (let k = 0; k < levels.length; k++) levels[k] = settled[k] === 1 ? medians[labels[k]!]! : Number.NaN;
  for (let r = 0; r < rows; r++) markOdd(log10, measured, r * columns, levels, rowStart(r), columnAt, reach, odd);
  const patches = labelComponents(odd, columns, rows, 8);
  const out = new Int16Array(log10.length);
  // Most pixels are not odd: they take the rung of the nearest stretch, whose pixel lies beside them.
  const rungAt = new Int16Array(labels.length);
  for (let k = 0; k < rungAt.length; k++) rungAt[k] = nearest[k]! < 0 ? 0 : rungs[labels[nearest[k]!]!]!;
  for (let r = 0; r < rows; r++) takeRungs(rungAt, rowStart(r), columnAt, measured, r * columns, out);
  for (let i = odd.indexOf(1); i >= 0; i = odd.indexOf(1, i + 1)) {
    const from = nearest[rowStart(Math.floor(i / columns)) + columnAt[i % columns]!]!;
    if (from < 0) {
      out[i] = place(log10[i]!);
      continue;
    }
    const off = (around[from]! - log10[i]!) / stepDecades;
    const scatter = patches.pixels[patches.labels[i]!]! < leastOdd && Math.abs(off) < mostScatter;
    if (!scatter) out[i]! += Math.round(off);
  }
  return out;
}

/** Marks the measured pixels of a row that lie off the level of the stretch that the pixel beside them, of the coarser map, belongs to. */
function markOdd(log10: Float32Array, measured: Uint8Array, start: number, levels: Float64Array, coarse: number, columnAt: Uint32Array, reach: number, odd: Uint8Array): void {
  for (let c = 0; c < columnAt.length; c++) {
    const i = start + c;
    if (measured[i] !== 0 && !(Math.abs(log10[i]! - levels[coarse + columnAt[c]!]!) < reach)) odd[i] = 1;
  }
}

function takeRungs(rungAt: Int16Array, coarse: number, columnAt: Uint32Array, measured: Uint8Array, start: number, out: Int16Array): void {
  for (let c = 0; c < columnAt.length; c++) if (measured[start + c] !== 0) out[start + c] = rungAt[coarse + columnAt[c]!]!;
}

/** Stretches of terrace with their median log current (NaN for those that tell nothing) and rung. */
function stretches({ levelled, log10, columns, measured, layerM, stepDecades, place }: SettleInput): { labels: Uint32Array; medians: number[]; rungs: number[] } {
  const { labels, count, pixels } = terraceSegments(levelled, log10, measured, columns, log10.length / columns, layerM, stepDecades);
  const lists = Array.from({ length: count + 1 }, (_, label) => new Float64Array(label === 0 || pixels[label]! < leastPixels ? 0 : Math.ceil(pixels[label]! / Math.ceil(pixels[label]! / sampled))));
  const seen = new Uint32Array(count + 1);
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    const list = lists[label]!;
    if (list.length === 0) continue;
    const every = Math.ceil(pixels[label]! / sampled);
    if (seen[label]! % every === 0) list[seen[label]! / every] = log10[i]!;
    seen[label]!++;
  }
  const medians = lists.map((list) => {
    const [low, high] = [0.05, 0.95].map((share) => quantile(list, share)) as [number, number];
    // Two terraces that leak into each other are no stretch.
    return list.length > 0 && high - low < oneTerrace * stepDecades ? medianInPlace(list, list.length) : Number.NaN;
  });
  return { labels, medians, rungs: medians.map((median) => (Number.isNaN(median) ? 0 : place(median))) };
}
