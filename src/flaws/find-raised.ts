/** Where the surface stands above the ground and the current is missing or lowered: bubbles, residue, wrinkles. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import { dilate, nearestAdmitted } from './local-ground.ts';

export interface RaisedInput {
  readonly columns: number;
  readonly rows: number;
  /** Height above the local ground, metres, NaN missing. */
  readonly rise: Float32Array;
  /** The same as a mean over nine pixels. */
  readonly smooth: Float32Array;
  /** 1 where the pixel lies on its own terrace's plane: by height and current nothing is wrong there. */
  readonly onPlane: Uint8Array;
  /** log10 current, NaN missing; absent for a height alone. */
  readonly log10?: Float32Array;
  /** log10 of the lowest current that can be told from none. */
  readonly floorLog10?: number;
  readonly saturated?: Uint8Array;
  /** Starting threshold in metres and the share of it that ends a flaw. */
  readonly startM: number;
  readonly edgeShare: number;
  /** Decades below the surroundings that count as lost current. */
  readonly dropDecades: number;
  readonly minPixels: number;
  /** 1 at the floor. */
  readonly floor?: Uint8Array;
  /** Thickness of a layer, metres, and decades of current it costs: what a mere step of the barrier looks like. */
  readonly layerM: number;
  readonly layerDecades: number;
}

export interface Raised {
  /** 1 on flawed ground. */
  readonly mask: Uint8Array;
  /** 1 on flawed ground where the current could not be judged, so that the height alone speaks; absent without current. */
  readonly byHeight?: Uint8Array;
  /** Decades the current lies below that of the nearest undisturbed ground, within three pixels of raised ground; absent without current. */
  readonly drop?: Float32Array;
  /** Raised pixels apart from all flaws whose current is in order: worth a note, not a loss. */
  readonly conductingPixels: number;
}

/** How far a flaw may reach beyond its raised part to follow the missing current, pixels. */
const reachPx = 3;
/** Ground must lie this much further above the floor than the drop that is looked for, decades. */
const marginDecades = 0.5;
/** Fewer pixels without current mark nothing. */
const leastLost = 4;
/** Half-width from which a low strip can be told from the rim of something higher, pixels. */
const stepHalfPx = 1.5;

/**
 * Joint two-threshold detection. A region starts where the rise exceeds `startM` and extends to `edgeShare · startM`
 * (hysteresis, Canny, IEEE Trans. PAMI 8, 679, 1986). Its outline then follows the current where the current can be judged: within
 * three pixels of the raised part a pixel is flawed if its current lies `dropDecades` below that of the nearest undisturbed
 * ground, and not flawed if its current is in order, or if it lies on the plane of a terrace of its own. Where the surroundings are censored
 * (saturated or at the floor) or the current is missing, the height alone decides.
 *
 * Steps of the barrier are no rises, because the rise is taken over the terraces' planes.
 */
export function findRaised(input: RaisedInput): Raised {
  const { columns, rows, rise, onPlane, log10 } = input;
  const edgeM = input.edgeShare * input.startM;
  // Started by a mean over nine pixels, so that no single noisy one starts a flaw.
  const { smooth } = input;
  const raised = hysteresis(smooth, rise, columns, rows, input.startM, edgeM);
  if (!log10) return { mask: withoutSpecks(raised, columns, rows, input.minPixels), conductingPixels: 0 };

  const zone = dilate(raised, columns, rows, reachPx);
  const outside = new Uint8Array(zone.length);
  for (let i = 0; i < zone.length; i++) outside[i] = zone[i] === 1 || Number.isNaN(log10[i]!) ? 0 : 1;
  const nearest = nearestAdmitted(outside, columns, rows);
  const mask = new Uint8Array(zone.length);
  const drop = new Float32Array(zone.length);
  const conducting = new Uint8Array(zone.length);
  const undecided = new Uint8Array(zone.length);
  const byHeight = new Uint8Array(zone.length);
  const dim = (input.floorLog10 ?? Number.NEGATIVE_INFINITY) + input.dropDecades + marginDecades;
  for (let i = 0; i < zone.length; i++) {
    if (zone[i] === 0) continue;
    const from = nearest[i]!;
    const loss = from < 0 ? Number.NaN : log10[from]! - log10[i]!;
    drop[i] = loss;
    if (Number.isNaN(loss)) mask[i] = raised[i]!;
    else if (loss > input.dropDecades) mask[i] = onPlane[i] === 1 && !(rise[i]! > input.startM) ? 0 : 1;
    // Beside ground that is saturated, or too dim for a drop to show above the floor, the current cannot be judged: the height alone decides.
    else if (input.saturated?.[from] === 1 || log10[from]! < dim) {
      mask[i] = raised[i]!;
      byHeight[i] = raised[i]!;
      if (input.saturated?.[i] === 1) undecided[i] = raised[i]!;
    }
    else if (raised[i] === 1 && rise[i]! > input.startM) conducting[i] = 1;
  }
  decideSaturated(mask, undecided, columns, rows);
  removeSteps(mask, drop, smooth, input);
  // What is left beside a terrace's border does not reach the starting threshold and goes with it.
  const strong = new Uint8Array(zone.length);
  for (let i = 0; i < strong.length; i++) strong[i] = mask[i] === 1 && smooth[i]! > input.startM ? 1 : 0;
  const final = withoutSpecks(keepTouching(mask, strong, columns, rows), columns, rows, input.minPixels);
  // The flanks of a flaw rise too; only what stands apart from all flaws is a bump of its own.
  const near = dilate(final, columns, rows, reachPx);
  let conductingPixels = 0;
  for (let i = 0; i < near.length; i++) if (conducting[i] === 1 && near[i] === 0) conductingPixels++;
  return { mask: final, byHeight, drop, conductingPixels };
}

/**
 * A raised pixel that saturates beside saturated ground may be flawed or not. Near what has lost its current it is the conducting flank of that; elsewhere the
 * height alone decides. Changes `mask`.
 */
function decideSaturated(mask: Uint8Array, undecided: Uint8Array, columns: number, rows: number): void {
  if (!undecided.includes(1)) return;
  const decided = new Uint8Array(mask.length);
  for (let i = 0; i < mask.length; i++) decided[i] = mask[i]! & (1 - undecided[i]!);
  const lost = withoutSpecks(decided, columns, rows, leastLost);
  const near = dilate(lost, columns, rows, reachPx);
  for (let i = 0; i < mask.length; i++) if (undecided[i] === 1 && near[i] === 1) mask[i] = 0;
}

/**
 * Takes mere barrier steps out of the mask: strips of ground too narrow for a plane of their own, whose mean rise is that of one or two layers, and whose
 * current has fallen by as many or is censored where it would have. Changes `mask`.
 */
function removeSteps(mask: Uint8Array, drop: Float32Array, smooth: Float32Array, { columns, rows, rise, floor, layerM, layerDecades }: RaisedInput): void {
  const low = new Uint8Array(mask.length);
  for (let i = 0; i < low.length; i++) if (mask[i] === 1 && smooth[i]! > 0.4 * layerM && smooth[i]! < 2.6 * layerM) low[i] = 1;
  const { labels, count, pixels } = labelComponents(low, columns, rows, 4);
  if (count === 0) return;
  const widest = new Float64Array(count + 1);
  const [riseSum, dropSum, dark] = [0, 0, 0].map(() => new Float64Array(count + 1)) as [Float64Array, Float64Array, Float64Array];
  const distance2 = squaredDistance(low, columns, rows, {});
  for (let i = 0; i < labels.length; i++) {
    const n = labels[i]!;
    if (n === 0) continue;
    if (distance2[i]! > widest[n]!) widest[n] = distance2[i]!;
    riseSum[n]! += rise[i]!;
    dropSum[n]! += drop[i] === drop[i] ? drop[i]! : 0;
    dark[n]! += floor?.[i] ?? 0;
  }
  const step = new Uint8Array(count + 1);
  for (let n = 1; n <= count; n++) {
    const layers = Math.max(1, Math.round(riseSum[n]! / pixels[n]! / layerM));
    const lost = dropSum[n]! / pixels[n]! / layerDecades;
    const fits = dark[n]! > pixels[n]! / 2 ? lost < layers + 0.35 : Math.abs(lost - layers) < 0.35;
    step[n] = widest[n]! > stepHalfPx ** 2 && fits && Math.abs(riseSum[n]! / pixels[n]! / layerM - layers) < 0.35 ? 1 : 0;
  }
  for (let i = 0; i < mask.length; i++) if (step[labels[i]!] === 1) mask[i] = 0;
}

/** Pixels above `low` connected (8) to at least one whose smoothed height is above `high`. */
function hysteresis(smooth: Float32Array, values: Float32Array, columns: number, rows: number, high: number, low: number): Uint8Array {
  const weak = new Uint8Array(values.length);
  const strong = new Uint8Array(values.length);
  for (let i = 0; i < weak.length; i++) {
    if (!(values[i]! > low)) continue;
    weak[i] = 1;
    if (smooth[i]! > high) strong[i] = 1;
  }
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
