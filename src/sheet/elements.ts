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
  const ratio = new Float64Array(count);
  const { shorts } = input;
  let total = 0;
  let inShorts = 0;
  for (let p = 0; p < count; p++) {
    const short = shorts !== undefined && shorts.mask.data[p] === 1;
    const value = input.footprint.data[p] === 1 ? 10 ** (short ? shorts.log10Relative.data[p]! : input.log10Relative.data[p]!) : Number.NaN;
    ratio[p] = Number.isNaN(value) ? value : value * live[p]!;
    if (ratio[p]! > 0) {
      total += ratio[p]!;
      if (short) inShorts += ratio[p]!;
    }
  }
  return { ratio, total, inShorts };
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
