/** Where the surface stands above the ground and the current is missing or lowered: bubbles, residue, wrinkles. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import { dilate, nearestAdmitted } from './local-ground.ts';

export interface RaisedInput {
  readonly columns: number;
  readonly rows: number;
  /** Height above the local ground, metres, NaN missing. */
  readonly rise: Float32Array;
  /** log10 current, NaN missing; absent for a height alone. */
  readonly log10?: Float32Array;
  readonly floor?: Uint8Array;
  readonly saturated?: Uint8Array;
  /** Starting threshold in metres and the share of it that ends a flaw. */
  readonly startM: number;
  readonly edgeShare: number;
  /** Decades below the surroundings that count as lost current. */
  readonly dropDecades: number;
  readonly minPixels: number;
  /** Decades of current per layer, thickness of a layer and noise of the height, metres: what a mere step of the barrier looks like. */
  readonly layerDecades: number;
  readonly layerM: number;
  readonly noiseM: number;
}

export interface Raised {
  /** 1 on flawed ground. */
  readonly mask: Uint8Array;
  /** Decades the current lies below that of the nearest undisturbed ground, within three pixels of raised ground; absent without current. */
  readonly drop?: Float32Array;
  /** Raised pixels apart from all flaws whose current is in order: worth a note, not a loss. */
  readonly conductingPixels: number;
}

/** How far a flaw may reach beyond its raised part to follow the missing current, pixels. */
const reachPx = 3;
/** Half-width from which ground with the rise and loss of whole layers is a terrace, pixels. */
const terraceHalfPx = 2.5;

/**
 * Joint two-threshold detection. A region starts where the rise exceeds `startM` and extends to `edgeShare · startM`
 * (hysteresis, Canny, IEEE Trans. PAMI 8, 679, 1986). Its outline then follows the current where the current can be judged: within
 * three pixels of the raised part a pixel is flawed if its current lies `dropDecades` below that of the nearest undisturbed
 * ground, and not flawed if its current is in order. Where the surroundings are censored (saturated or at the floor) or the
 * current is missing, the height alone decides.
 */
export function findRaised(input: RaisedInput): Raised {
  const { columns, rows, rise, log10 } = input;
  const raised = hysteresis(rise, columns, rows, input.startM, input.edgeShare * input.startM);
  if (!log10) return { mask: withoutSpecks(raised, columns, rows, input.minPixels), conductingPixels: 0 };

  const zone = dilate(raised, columns, rows, reachPx);
  const outside = new Uint8Array(zone.length);
  for (let i = 0; i < zone.length; i++) outside[i] = zone[i] === 1 || Number.isNaN(log10[i]!) ? 0 : 1;
  const nearest = nearestAdmitted(outside, columns, rows);
  const mask = new Uint8Array(zone.length);
  const drop = new Float32Array(zone.length);
  const step = new Uint8Array(zone.length);
  const conducting = new Uint8Array(zone.length);
  for (let i = 0; i < zone.length; i++) {
    if (zone[i] === 0) continue;
    const from = nearest[i]!;
    const loss = from < 0 ? Number.NaN : log10[from]! - log10[i]!;
    drop[i] = loss;
    if (Number.isNaN(loss)) mask[i] = raised[i]!;
    else if (loss > input.dropDecades) {
      mask[i] = 1;
      if (isBarrierStep(input, i, loss)) step[i] = 1;
    }
    else if (raised[i] === 1 && rise[i]! > input.startM) {
      // Beside ground that is itself saturated or at the floor a drop cannot be judged: the height alone decides.
      if (input.saturated?.[from] === 1 || input.floor?.[from] === 1) mask[i] = 1;
      else conducting[i] = 1;
    }
  }
  removeTerraces(mask, step, drop, input);
  // What is left of a terrace's border does not reach the starting threshold and goes with it.
  const strong = new Uint8Array(zone.length);
  for (let i = 0; i < strong.length; i++) strong[i] = mask[i] === 1 && rise[i]! > input.startM ? 1 : 0;
  const final = withoutSpecks(keepTouching(mask, strong, columns, rows), columns, rows, input.minPixels);
  // The flanks of a flaw rise too; only what stands apart from all flaws is a bump of its own.
  const near = dilate(final, columns, rows, reachPx);
  let conductingPixels = 0;
  for (let i = 0; i < near.length; i++) if (conducting[i] === 1 && near[i] === 0) conductingPixels++;
  return { mask: final, drop, conductingPixels };
}

/**
 * Takes mere barrier steps out of the mask: ground of some width (the rounded edge of a film passes through such values too) whose mean rise and
 * mean loss of current, both free of pixel noise, are those of the same whole number of layers.
 */
function removeTerraces(mask: Uint8Array, step: Uint8Array, drop: Float32Array, input: RaisedInput): void {
  const { columns, rows, rise } = input;
  const distance2 = squaredDistance(step, columns, rows);
  if (!distance2.some((d) => d > terraceHalfPx ** 2)) return;
  const { labels, count, pixels } = labelComponents(step, columns, rows, 8);
  const widest = new Float64Array(count + 1);
  const riseSum = new Float64Array(count + 1);
  const dropSum = new Float64Array(count + 1);
  for (let i = 0; i < labels.length; i++) {
    const n = labels[i]!;
    if (n === 0) continue;
    widest[n] = Math.max(widest[n]!, distance2[i]!);
    riseSum[n]! += rise[i]!;
    dropSum[n]! += drop[i]!;
  }
  const terrace = new Uint8Array(count + 1);
  for (let n = 1; n <= count; n++) {
    const lost = dropSum[n]! / pixels[n]! / input.layerDecades;
    const layers = Math.round(lost);
    const fits = Math.abs(lost - layers) < 0.2 && Math.abs(riseSum[n]! / pixels[n]! - layers * input.layerM) < 0.5 * input.layerM;
    terrace[n] = widest[n]! > terraceHalfPx ** 2 && fits ? 1 : 0;
  }
  for (let i = 0; i < mask.length; i++) if (terrace[labels[i]!] === 1) mask[i] = 0;
}

/**
 * Whether rise and loss of current are those of the same whole number of added layers: then the pixel is a thicker terrace, not a flaw.
 * At the floor the loss is only a bound, so nothing is concluded there.
 */
function isBarrierStep(input: RaisedInput, i: number, loss: number): boolean {
  if (input.floor?.[i] === 1) return false;
  const layers = Math.round(loss / input.layerDecades);
  if (layers < 1 || Math.abs(loss / input.layerDecades - layers) > 0.35) return false;
  return Math.abs(input.rise[i]! - layers * input.layerM) < 0.5 * input.layerM + 2 * input.noiseM;
}

/** Pixels above `low` connected (8) to at least one above `high`. */
function hysteresis(values: Float32Array, columns: number, rows: number, high: number, low: number): Uint8Array {
  const weak = new Uint8Array(values.length);
  for (let i = 0; i < weak.length; i++) weak[i] = values[i]! > low ? 1 : 0;
  const strong = new Uint8Array(values.length);
  for (let i = 0; i < strong.length; i++) strong[i] = values[i]! > high ? 1 : 0;
  return keepTouching(weak, strong, columns, rows);
}

/** Components (8) of `mask` that share a pixel with `seeds`. */
function keepTouching(mask: Uint8Array, seeds: Uint8Array, columns: number, rows: number): Uint8Array {
  const { labels, count } = labelComponents(mask, columns, rows, 8);
  const keep = new Uint8Array(count + 1);
  for (let i = 0; i < labels.length; i++) if (seeds[i] === 1) keep[labels[i]!] = 1;
  keep[0] = 0;
  const out = new Uint8Array(mask.length);
  for (let i = 0; i < out.length; i++) out[i] = keep[labels[i]!]!;
  return out;
}

/** Drops components (8) of fewer than `least` pixels. */
function withoutSpecks(mask: Uint8Array, columns: number, rows: number, least: number): Uint8Array {
  const { labels, pixels } = labelComponents(mask, columns, rows, 8);
  const out = new Uint8Array(mask.length);
  for (let i = 0; i < out.length; i++) out[i] = mask[i] === 1 && pixels[labels[i]!]! >= least ? 1 : 0;
  return out;
}
