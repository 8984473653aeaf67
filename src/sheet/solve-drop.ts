/** Sets up and solves the voltage drop of one device, and reads currents and biases back. */
import { pixelAreaM2 } from '../grid/maps.ts';
import { buildNetwork } from './build-network.ts';
import type { ResistingSheet } from './build-network.ts';
import { curvesOf } from './elements.ts';
import type { Elements } from './elements.ts';
import type { StackGround } from './ground-of-stack.ts';
import type { Level } from './network.ts';
import { localBias, settle } from './settle.ts';
import type { SheetInput } from './sheet-input.ts';

export interface Drop {
  readonly converged: boolean;
  readonly residual: number;
  readonly steps: number;
  /** Conjugate-gradient steps on the finest grid. */
  readonly iterations: number;
  /** Shape rows·columns, magnitudes in volts: 0 where not live, NaN off the footprint. */
  readonly localBiasV: Float64Array;
  /** Shape rows·columns: density with the drop over that without. */
  readonly factor: Float64Array;
  readonly currentA: number;
  readonly shortCurrentA: number;
  /** Largest relative difference between the current through the barrier and that at a terminal. */
  readonly imbalance: number;
}

/** A terminal's current may differ from the barrier's by this much, relatively. */
const maxImbalance = 1e-9;

/** At least one of the two sheet resistances must be above 0. */
export function solveDrop(input: SheetInput, stack: StackGround, elements: Elements, device: NonNullable<SheetInput['device']>): Drop {
  const { grid } = input;
  const biasV = Math.abs(device.biasV);
  const { curves, numbers } = curvesOf(input, biasV, device.densityAPerM2);
  const contactOhmM = (input.contactOhmUm ?? 0) * 1e-6;
  const sheets: ResistingSheet[] = [];
  if ((input.emitterSheetOhm ?? 0) > 0) sheets.push({ ground: stack.emitter, sheetOhm: input.emitterSheetOhm!, contactOhmM });
  if ((input.injectorSheetOhm ?? 0) > 0) sheets.push({ ground: stack.injector, sheetOhm: input.injectorSheetOhm!, contactOhmM });
  const unitOhm = Math.max(...sheets.map((sheet) => sheet.sheetOhm));
  const level = buildNetwork(grid, sheets, unitOhm);
  const pixelA = device.densityAPerM2(biasV) * pixelAreaM2(grid);
  for (let p = 0; p < elements.ratio.length; p++) {
    const i = ringedIndex(grid.columns, p);
    if (elements.ratio[p]! > 0) level.source[i] = elements.ratio[p]! * pixelA * unitOhm;
    level.curve[i] = numbers[p]!;
  }
  const settled = settle(level, curves);
  const localBiasV = new Float64Array(numbers.length).fill(Number.NaN);
  const factor = new Float64Array(numbers.length);
  let current = 0;
  let shortCurrent = 0;
  for (let p = 0; p < numbers.length; p++) {
    if (input.footprint.data[p] !== 1) continue;
    localBiasV[p] = 0;
    if (stack.live[p] !== 1) continue;
    const i = ringedIndex(grid.columns, p);
    const curve = curves[numbers[p]!]!;
    localBiasV[p] = localBias(settled.drops, biasV, i, sheets.length === 2 ? level.size : 0);
    curve.at(localBiasV[p]!);
    factor[p] = curve.density;
    const flow = level.source[i]! * curve.density;
    current += flow;
    if (input.shorts?.mask.data[p] === 1) shortCurrent += flow;
  }
  const imbalance = current > 0 ? Math.max(...sheets.map((_, f) => Math.abs(terminalCurrent(level, f, settled.drops.high, factor) / current - 1))) : 0;
  return {
    converged: settled.converged && imbalance <= maxImbalance,
    residual: Math.max(settled.residual, imbalance),
    steps: settled.steps, iterations: settled.iterations, localBiasV, factor,
    currentA: current / unitOhm, shortCurrentA: shortCurrent / unitOhm, imbalance,
  };
}

/** Index in a ringed array of pixel `p` of the map. */
function ringedIndex(columns: number, p: number): number {
  const row = Math.floor(p / columns);
  return (row + 1) * (columns + 2) + (p - row * columns) + 1;
}

/** What a sheet's terminal delivers: across the contact's edge, and straight through the barrier under the metal. */
function terminalCurrent(level: Level, f: number, drops: Float64Array, factor: Float64Array): number {
  const { feed, free } = level.fields[f]!;
  let total = 0;
  for (let p = 0; p < factor.length; p++) {
    const i = ringedIndex(level.columns, p);
    total += free[i] === 1 ? feed[i]! * drops[f * level.size + i]! : level.source[i]! * factor[p]!;
  }
  return total;
}
