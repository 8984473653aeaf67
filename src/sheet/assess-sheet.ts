/** The sheet stage's public function: what the device carries where, with its sheets' voltage drop. */
import { maskMap, pixelAreaM2, scalarMap } from '../grid/maps.ts';
import type { MaskMap } from '../grid/maps.ts';
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { bandEdgeLog10 } from './band-edge.ts';
import { elementsOf } from './elements.ts';
import type { Elements } from './elements.ts';
import { groundOfStack } from './ground-of-stack.ts';
import type { StackGround } from './ground-of-stack.ts';
import type { Sheet } from './sheet.ts';
import type { SheetInput } from './sheet-input.ts';
import { solveDrop } from './solve-drop.ts';

/**
 * Density, local bias and starved ground of one device.
 *
 * Both sheets are resistive layers joined by tunnel elements, div(1/R_s grad u) = J(local bias), fed
 * at their contacts (Berger, Solid-State Electron. 15, 145, 1972, in two dimensions and with elements
 * of any shape). A contact's metal holds the sheet under it at the terminal's potential and feeds the
 * sheet beside it through `contactOhmUm` over its edge's length. A resistive sheet without a drawn
 * contact is fed along its whole outer edge, and a warning says so.
 *
 * - No sheet resistance: the density is 10^`log10Relative`; no local bias, starved not assessed.
 * - NaN in `log10Relative`: no injection there, NaN in the density; the sheets conduct and the local bias is given.
 * - Off the footprint everything is NaN or 0. The map's border is an edge of the sheets.
 * - Ground that no sheet path joins to its drawn contact carries nothing: density 0, local bias 0, `unconnected` 1, never starved.
 * - Starved: |log10Relative| within the band, but the density with voltage drop below the reference's over `bandFactor`.
 * - Shorts follow a straight line of current over bias where `shorts.ohmic` is given, and a remark says that this is assumed.
 * - Not settled: a warning `sheet-not-converged`; density as without drop, no local bias, no starved, no totals.
 *
 * @param input Maps of shape [rows, columns] on `input.grid`; Ω/sq, Ω·µm, V, A/m². Time and memory grow with the pixel count.
 * @throws Problem `sheet-density` where a density is negative, not finite, falls with bias, or is zero at the device bias.
 */
export function assessSheet(input: SheetInput): Sheet {
  const stack = groundOfStack(input);
  const warnings: Notice[] = [...stack.warnings];
  const elements = elementsOf(input, stack.live);
  const base = { relativeDensity: scalarMap(input.grid, Float32Array.from(elements.ratio)), ...(stack.unconnected && { unconnected: stack.unconnected }) };
  const resistive = (input.emitterSheetOhm ?? 0) > 0 || (input.injectorSheetOhm ?? 0) > 0;
  const { device } = input;
  if (device && input.shorts?.ohmic && elements.inShorts > 0 && Math.abs(device.biasV) !== Math.abs(input.shorts.ohmic.scanBiasV)) warnings.push(notice('shorts-ohmic', { ...input.shorts.ohmic, deviceBiasV: device.biasV }));
  if (!resistive || !device || device.biasV === 0) {
    if (resistive) warnings.push(notice('sheet-no-density', { reason: input.noDensity }));
    return { ...base, totals: totalsWithoutDrop(input, elements), warnings };
  }
  return { ...base, ...withDrop(input, stack, elements, device, warnings), warnings };
}

function totalsWithoutDrop(input: SheetInput, { total, inShorts }: Elements) {
  const { device, grid, shorts } = input;
  return {
    ...(device && { deviceCurrentA: total * device.densityAPerM2(Math.abs(device.biasV)) * pixelAreaM2(grid) }),
    ...(shorts && total > 0 && { shortShareOfCurrent: inShorts / total }),
  };
}

function withDrop(
  input: SheetInput, stack: StackGround, elements: Elements, device: NonNullable<SheetInput['device']>, warnings: Notice[],
): Partial<Sheet> {
  const drop = solveDrop(input, stack, elements, device);
  if (!drop.converged) {
    warnings.push(notice('sheet-not-converged', { residual: drop.residual.toExponential(1), iterations: drop.steps }));
    return {};
  }
  const relative = new Float32Array(elements.ratio.length);
  const localBias = new Float32Array(elements.ratio.length);
  const sign = device.biasV < 0 ? -1 : 1;
  for (let p = 0; p < relative.length; p++) {
    relative[p] = elements.ratio[p]! * drop.factor[p]!;
    localBias[p] = sign * drop.localBiasV[p]!;
  }
  return {
    relativeDensity: scalarMap(input.grid, relative),
    localBiasV: scalarMap(input.grid, localBias),
    starved: starvedGround(input, stack.live, relative),
    totals: {
      deviceCurrentA: drop.currentA,
      imbalance: drop.imbalance,
      ...(input.shorts && drop.currentA > 0 && { shortShareOfCurrent: drop.shortCurrentA / drop.currentA }),
    },
  };
}

function starvedGround(input: SheetInput, live: Uint8Array, relative: Float32Array): MaskMap {
  const starved = maskMap(input.grid);
  const limit = bandEdgeLog10(input.bandFactor);
  const before = input.log10Relative.data;
  for (let p = 0; p < relative.length; p++) {
    // Shorts keep their own cause; a comparison with NaN is false, so unknown ground is not starved.
    const short = input.shorts !== undefined && input.shorts.mask.data[p] === 1;
    if (live[p] === 1 && !short && Math.abs(before[p]!) <= limit && Math.log10(relative[p]!) < -limit) starved.data[p] = 1;
  }
  return starved;
}
