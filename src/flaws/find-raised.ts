/** Where the surface stands above the ground and the current is missing or lowered: bubbles, residue, wrinkles. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import { dilate, nearestAdmitted } from './local-ground.ts';
import { bothOf, countOf, higherThan, knownOutside, maskOf, onlyFirst, pixelsOf, takeMask } from './mask-pixels.ts';

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
  /** Decades the current lies below that of the nearest undisturbed ground, within three pixels of raised ground, 0 elsewhere; absent without current. */
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
  const { columns, rows, rise, log10 } = input;
  const edgeM = input.edgeShare * input.startM;
  // Started by a mean over nine pixels, so that no single noisy one starts a flaw.
  const { smooth } = input;
  const weak = higherThan(rise, edgeM);
  if (!log10) return { mask: keepHigh(weak, smooth, input.startM, columns, rows, input.minPixels), conductingPixels: 0 };
  const raised = keepHigh(weak, smooth, input.startM, columns, rows, 1);

  const zone = dilate(raised, columns, rows, reachPx);
  const nearest = nearestAdmitted(knownOutside(zone, log10), columns, rows);
  const mask = new Uint8Array(zone.length);
  const drop = new Float32Array(zone.length);
  const conducting = new Uint8Array(zone.length);
  const undecided = new Uint8Array(zone.length);
  const byHeight = new Uint8Array(zone.length);
  const judged = { mask, drop, conducting, undecided, byHeight };
  judge(pixelsOf(zone), nearest, raised, log10, input, judged);
  decideSaturated(mask, undecided, columns, rows);
  removeSteps(mask, drop, smooth, input);
  // What is left beside a terrace's border does not reach the starting threshold and goes with it.
  const final = keepHigh(mask, smooth, input.startM, columns, rows, input.minPixels);
  // The flanks of a flaw rise too; only what stands apart from all flaws is a bump of its own.
  takeMask(conducting, dilate(final, columns, rows, reachPx));
  return { mask: final, byHeight, drop, conductingPixels: countOf(conducting) };
}

/** What the current says of each pixel; all maps begin at 0. */
interface Judged {
  readonly mask: Uint8Array;
  readonly drop: Float32Array;
  readonly conducting: Uint8Array;
  readonly undecided: Uint8Array;
  readonly byHeight: Uint8Array;
}

/** Judges the listed pixels of raised ground and around it by their current against that of the pixels named in `nearest`. */
function judge(pixels: Int32Array, nearest: Int32Array, raised: Uint8Array, log10: Float32Array, input: RaisedInput, { mask, drop, conducting, undecided, byHeight }: Judged): void {
  const { rise, onPlane, saturated, startM, dropDecades } = input;
  const dim = (input.floorLog10 ?? Number.NEGATIVE_INFINITY) + dropDecades + marginDecades;
  for (let n = 0; n < pixels.length; n++) {
    const i = pixels[n]!;
    const from = nearest[i]!;
    const loss = from < 0 ? Number.NaN : log10[from]! - log10[i]!;
    drop[i] = loss;
    if (loss !== loss) mask[i] = raised[i]!;
    else if (loss > dropDecades) mask[i] = onPlane[i] === 1 && !(rise[i]! > startM) ? 0 : 1;
    // Beside ground that is saturated, or too dim for a drop to show above the floor, the current cannot be judged: the height alone decides.
    else if (saturated?.[from] === 1 || log10[from]! < dim) {
      mask[i] = raised[i]!;
      byHeight[i] = raised[i]!;
      if (saturated?.[i] === 1) undecided[i] = raised[i]!;
    }
    else if (raised[i] === 1 && rise[i]! > startM) conducting[i] = 1;
  }
}

/**
 * A raised pixel that saturates beside saturated ground may be flawed or not. Near what has lost its current it is the conducting flank of that; elsewhere the
 * height alone decides. Changes `mask`.
 */
function decideSaturated(mask: Uint8Array, undecided: Uint8Array, columns: number, rows: number): void {
  if (!undecided.includes(1)) return;
  const decided = onlyFirst(mask, undecided);
  const lost = withoutSpecks(decided, columns, rows, leastLost);
  takeMask(mask, bothOf(undecided, dilate(lost, columns, rows, reachPx)));
}

/**
 * Takes mere barrier steps out of the mask: strips of ground too narrow for a plane of their own, whose mean rise is that of one or two layers, and whose
 * current has fallen by as many or is censored where it would have. Changes `mask`.
 */
function removeSteps(mask: Uint8Array, drop: Float32Array, smooth: Float32Array, { columns, rows, rise, floor, layerM, layerDecades }: RaisedInput): void {
  const strips = pixelsBetween(mask, smooth, 0.4 * layerM, 2.6 * layerM);
  const low = maskOf(strips, mask.length);
  const { labels, count, pixels } = labelComponents(low, columns, rows, 4);
  if (count === 0) return;
  const widest = new Float64Array(count + 1);
  const [riseSum, risen, dropSum, dropped, dark] = Array.from({ length: 5 }, () => new Float64Array(count + 1)) as [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array];
  const distance2 = squaredDistance(low, columns, rows, {});
  for (const i of strips) {
    const n = labels[i]!;
    if (distance2[i]! > widest[n]!) widest[n] = distance2[i]!;
    // What is missing takes no part.
    if (rise[i] === rise[i]) {
      riseSum[n]! += rise[i]!;
      risen[n]!++;
    }
    if (drop[i] === drop[i]) {
      dropSum[n]! += drop[i]!;
      dropped[n]!++;
    }
    dark[n]! += floor?.[i] ?? 0;
  }
  const step = new Uint8Array(count + 1);
  for (let n = 1; n <= count; n++) {
    const up = riseSum[n]! / risen[n]! / layerM;
    const layers = Math.max(1, Math.round(up));
    const lost = dropSum[n]! / dropped[n]! / layerDecades;
    const fits = dark[n]! > pixels[n]! / 2 ? lost < layers + 0.35 : Math.abs(lost - layers) < 0.35;
    step[n] = widest[n]! > stepHalfPx ** 2 && fits && Math.abs(up - layers) < 0.35 ? 1 : 0;
  }
  for (const i of strips) if (step[labels[i]!] === 1) mask[i] = 0;
}

/** What of the mask lies between two values. */
function pixelsBetween(mask: Uint8Array, values: Float32Array, low: number, high: number): Int32Array {
  return pixelsOf(mask).filter((i) => values[i]! > low && values[i]! < high);
}

/** Components (8) of at least so many pixels that are higher than `high` in one place at least: hysteresis, where the mask is what is higher than something lower. */
function keepHigh(mask: Uint8Array, values: Float32Array, high: number, columns: number, rows: number, leastPixels: number): Uint8Array {
  const { labels, count, pixels } = labelComponents(mask, columns, rows, 8);
  const keep = new Uint8Array(count + 1);
  const members = pixelsOf(mask);
  for (const i of members) if (values[i]! > high) keep[labels[i]!] = 1;
  for (let n = 1; n <= count; n++) if (pixels[n]! < leastPixels) keep[n] = 0;
  return kept(labels, members, keep);
}

/** Drops components (8) of fewer than `least` pixels. */
function withoutSpecks(mask: Uint8Array, columns: number, rows: number, least: number): Uint8Array {
  const { labels, count, pixels } = labelComponents(mask, columns, rows, 8);
  const keep = new Uint8Array(count + 1);
  for (let n = 1; n <= count; n++) if (pixels[n]! >= least) keep[n] = 1;
  return kept(labels, pixelsOf(mask), keep);
}

function kept(labels: Uint32Array, members: Int32Array, keep: Uint8Array): Uint8Array {
  const out = new Uint8Array(labels.length);
  for (const i of members) out[i] = keep[labels[i]!]!;
  return out;
}
