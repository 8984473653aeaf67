/** Tunnel elements: how much each pixel would carry without voltage drop, and along which curve. */
import { pixelCount } from '../grid/maps.ts';
import type { SheetInput, StepDensities } from './sheet-input.ts';
import { TunnelCurve } from './tunnel-curve.ts';

export interface Elements {
  /** Shape rows·columns; density over the reference's without voltage drop, NaN unknown or off the footprint, 0 where not live. */
  readonly ratio: Float64Array;
  /** Sum of the ratios, and of those in shorts. */
  readonly total: number;
  readonly inShorts: number;
}

/**
 * @param live Shape rows·columns, 1 on footprint that both sheets join to their terminals.
 */
export function elementsOf(input: SheetInput, live: Uint8Array): Elements {
  const count = pixelCount(input.grid);
  const { shorts } = input;
  const ratio = powersOfTen(input.log10Relative.data, input.footprint.data, live);
  let inShorts = 0;
  for (let p = 0; shorts && p < count; p++) {
    if (shorts.mask.data[p] !== 1) continue;
    if (input.footprint.data[p] === 1) ratio[p] = 10 ** shorts.log10Relative.data[p]! * live[p]!;
    if (ratio[p]! > 0) inShorts += ratio[p]!;
  }
  return { ratio, total: sumOf(ratio), inShorts };
}

/** 10 to the power of what lies on the footprint, 0 where it is not live; NaN elsewhere. Most pixels of a terrace have the power of the one before. */
function powersOfTen(log10: Float32Array, footprint: Uint8Array, live: Uint8Array): Float64Array {
  const powers = new Float64Array(log10.length).fill(Number.NaN);
  let of = Number.NaN;
  let power = Number.NaN;
  for (let p = 0; p < powers.length; p++) {
    if (footprint[p] !== 1) continue;
    if (log10[p] !== of) {
      of = log10[p]!;
      power = 10 ** of;
    }
    powers[p] = power * live[p]!;
  }
  return powers;
}

function sumOf(ratio: Float64Array): number {
  let total = 0;
  for (let p = 0; p < ratio.length; p++) if (ratio[p]! > 0) total += ratio[p]!;
  return total;
}

/**
 * The tunnel curves and, per pixel, the number of the curve it follows. Curve 0 is the reference's;
 * it also serves steps that carry nothing at all at the device bias. Ohmic shorts share the last one.
 */
export function curvesOf(input: SheetInput, biasV: number, reference: (biasV: number) => number): { curves: readonly TunnelCurve[]; numbers: Uint8Array } {
  const curves = [new TunnelCurve(reference, biasV)];
  const numbers = new Uint8Array(pixelCount(input.grid));
  const { steps, shorts } = input;
  if (steps) followSteps(steps, biasV, curves, numbers);
  if (shorts?.ohmic && shorts.mask.data.includes(1)) {
    const ohmic = curves.push(new TunnelCurve((v) => v, biasV)) - 1;
    for (let p = 0; p < numbers.length; p++) if (shorts.mask.data[p] === 1) numbers[p] = ohmic;
  }
  return { curves, numbers };
}

function followSteps(steps: StepDensities, biasV: number, curves: TunnelCurve[], numbers: Uint8Array): void {
  const known = new Map<number, number>([[-128, 0], [0, 0]]);
  for (let p = 0; p < numbers.length; p++) {
    const step = steps.map.data[p]!;
    let number = known.get(step);
    if (number === undefined) {
      number = steps.densityAPerM2(step, biasV) > 0 ? curves.push(new TunnelCurve((v) => steps.densityAPerM2(step, v), biasV)) - 1 : 0;
      known.set(step, number);
    }
    numbers[p] = number;
  }
}
