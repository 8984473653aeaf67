/** The smear of a slow amplifier along the fast axis. */
import { madScale } from '../stats/mad.ts';

/** A one-pole amplifier: every reading keeps the share `kept` of the reading before and takes the rest of the current at hand. */
export interface Lag {
  /** Time constant in pixels: kept = exp(−1/px). */
  readonly px: number;
  readonly sePx: number;
  readonly kept: number;
  /** Robust scatter of the kept share from tail to tail: how far the amplifier is from one pole. */
  readonly keptScatter: number;
  /** 1: earlier pixels lie to the left; −1: to the right. */
  readonly direction: 1 | -1;
}

/** Reading at zero current and its standard deviation. */
export interface Zero {
  readonly offset: number;
  readonly noise: number;
}

/** Time constants that are sought, pixels. A faster amplifier does no harm; a slower one leaves too little of the map to restore. */
const searched = { least: 0.4, most: 8 } as const;
/** Readings of a tail stand this many times above the noise. */
const tailSigmas = 100;
/** Steps of a tail agree to this, plus what the noise does to them. */
const steady = 0.02;
/** Tails of the same kept share are counted within this. */
const window = 0.03;
/** Lines looked at, at most. */
const mostLines = 512;
/** Steps of tails that must be seen at least, on so many lines. */
const least = { steps: 40, lines: 8 } as const;
/** At most this share of the tails may run the other way, and at most this many falls per step of a tail may be faster than the amplifier. */
const most = { backward: 0.2, faster: 0.1 } as const;
const bins = 100;

/** The kept share of a time constant in pixels. */
export const keptOf = (px: number): number => (px > 0 ? Math.exp(-1 / px) : 0);

/**
 * Finds the amplifier's time constant from the tails that it draws behind every sudden fall: there each reading is the same share of the one
 * before. Three things tell an amplifier from a blunt edge: the share is the same in all tails; they run one way along the lines only; and
 * nothing falls faster, while a map without lag falls by any factor within a pixel.
 *
 * @param values current, row-major, NaN missing; @param zero offset and standard deviation of a reading; @param limit where the amplifier clips, as read.
 * @returns undefined where no lag is told (which includes a map without sharp edges).
 */
export function findLag(values: Float32Array, columns: number, rows: number, zero: Zero, limit = Number.POSITIVE_INFINITY): Lag | undefined {
  const step = Math.max(1, Math.ceil(rows / mostLines));
  const lines = new Float32Array(columns * Math.ceil(rows / step));
  for (let r = 0, at = 0; r < rows; r += step, at += columns) for (let c = 0; c < columns; c++) lines[at + c] = values[r * columns + c]! - zero.offset;
  return lagOfLines(lines, columns, zero.noise, limit - zero.offset);
}

function lagOfLines(values: Float32Array, columns: number, noise: number, limit: number): Lag | undefined {
  const above = Math.max(tailSigmas * noise, Number.MIN_VALUE);
  const rightward = tailsOf(values, columns, above, limit, noise, 1);
  const leftward = tailsOf(values, columns, above, limit, noise, -1);
  const peaks = [excessOf(rightward, leftward), excessOf(leftward, rightward)] as const;
  const [own, other, peak] = peaks[0].steps >= peaks[1].steps ? [rightward, leftward, peaks[0]] : [leftward, rightward, peaks[1]];
  if (peak.steps < least.steps) return undefined;
  const { kept, scatter, count, lines } = refined(own, peak.share);
  if (count < least.steps || lines < least.lines) return undefined;
  if (other.shares.filter((share) => Math.abs(share - kept) < window).length > most.backward * count) return undefined;
  if (fasterFalls(values, columns, own.direction, above, limit, kept) > most.faster * count) return undefined;
  const px = -1 / Math.log(kept);
  // Steps on one line share its tails; lines are taken as the independent readings. d px / d kept = px²/kept.
  const keptSe = (1.2533 * scatter) / Math.sqrt(lines);
  return { px, sePx: (px ** 2 / kept) * keptSe, kept, keptScatter: scatter, direction: own.direction };
}

interface Tails {
  readonly direction: 1 | -1;
  /** Share kept from one reading to the next, by steps of tails, and the lines they are on. */
  readonly shares: readonly number[];
  readonly lines: readonly number[];
  /** How many steps have a share between k and k + 1 hundredths. */
  readonly counts: Uint32Array;
}

function tailsOf(values: Float32Array, columns: number, above: number, limit: number, noise: number, direction: 1 | -1): Tails {
  const shares: number[] = [];
  const lines: number[] = [];
  const counts = new Uint32Array(bins + 1);
  for (let r = 0; r * columns < values.length; r++) {
    const start = direction === 1 ? r * columns : (r + 1) * columns - 1;
    for (let k = 0; k + 2 < columns; k++) {
      const at = start + direction * k;
      const second = values[at + direction]!;
      const first = values[at]!;
      // Written so that NaN fails; most pixels leave here.
      if (!(second > above && second < 0.96 * first && first < limit)) continue;
      const share = values[at + 2 * direction]! / second;
      if (!(Math.abs(share - second / first) <= steady + (3 * noise) / second) || share <= 0) continue;
      shares.push(share);
      lines.push(r);
      counts[Math.min(bins, Math.floor(share * bins))]!++;
    }
  }
  return { direction, shares, lines, counts };
}

/** Share at which most steps run this way and not the other (the slow variation of the ground runs both ways), and how many. */
function excessOf(own: Tails, other: Tails): { share: number; steps: number } {
  const excess = (b: number): number => own.counts[b]! - other.counts[b]!;
  let best = { share: 0, steps: 0 };
  for (let b = Math.floor(bins * keptOf(searched.least)); b <= bins * keptOf(searched.most); b++) {
    const steps = excess(b - 1) + excess(b) + excess(b + 1);
    if (steps > best.steps) best = { share: (b + 0.5) / bins, steps };
  }
  return best;
}

/** Kept share at the densest half of the steps near the mode (half-sample mode; Robertson & Cryer, J. Am. Stat. Assoc. 69, 1012, 1974), for a current left under a tail raises its share. */
function refined({ shares, lines }: Tails, mode: number): { kept: number; scatter: number; count: number; lines: number } {
  const near = shares.map((share, k) => ({ share, line: lines[k]! })).filter(({ share }) => Math.abs(share - mode) < window);
  let part = Float64Array.from(near, ({ share }) => share).sort();
  let scatter = 0;
  for (let round = 0; part.length > 3; round++) {
    const half = (part.length + 1) >> 1;
    let from = 0;
    for (let i = 0; i + half <= part.length; i++) if (part[i + half - 1]! - part[i]! < part[from + half - 1]! - part[from]!) from = i;
    part = part.subarray(from, from + half);
    // Half of the steps within ± 0.6745 standard deviations.
    if (round === 0) scatter = (madScale * (part[half - 1]! - part[0]!)) / 2;
  }
  return { kept: part[part.length >> 1] ?? mode, scatter, count: near.length, lines: new Set(near.map(({ line }) => line)).size };
}

/** Falls from well above the noise that keep clearly less than the amplifier would. */
function fasterFalls(values: Float32Array, columns: number, direction: 1 | -1, above: number, limit: number, kept: number): number {
  const bound = 0.8 * kept - 0.01;
  let count = 0;
  for (let i = 0; i < values.length; i++) {
    const before = values[i]!;
    if (!(before > above && before < limit)) continue;
    const c = i % columns;
    if (direction === 1 ? c + 1 < columns : c > 0) {
      if (values[i + direction]! < bound * before) count++;
    }
  }
  return count;
}
