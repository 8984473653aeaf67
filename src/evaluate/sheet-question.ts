import { anchorOf } from '../barrier/anchor.ts';
import type { Barrier } from '../barrier/barrier.ts';
import type { Flaws } from '../flaws/flaws.ts';
import { maskMap, scalarMap } from '../grid/maps.ts';
import type { Ground } from '../ground/ground.ts';
import type { Sample } from '../read/sample.ts';
import type { Recipe } from '../recipe/recipe.ts';
import type { SheetInput } from '../sheet/sheet-input.ts';

/**
 * Puts the sheet stage's question together. The reference's density follows its thickness through the model, scaled to the density stated for the
 * device's bias, so that voltage drop and ledger speak of the same numbers. A short conducts as much more than the reference as
 * it did under the probe, a lower bound where it saturated.
 */
export function sheetInput(sample: Sample, ground: Ground, flaws: Flaws, barrier: Barrier, recipe: Recipe): SheetInput {
  const { stack, band } = recipe;
  const current = ground.current;
  const anchor = anchorOf(recipe.barrier, { offsetV: stack.offsetV, targetAPerM2: 1 }, current?.unit === 'A' ? current.biasV : undefined);
  const thicknessM = barrier.reference.thicknessM;
  const device = anchor && barrier.device && thicknessM !== undefined ? deviceOf(anchor, barrier.device, thicknessM) : undefined;
  return {
    grid: sample.grid,
    footprint: sample.footprint,
    outlines: sample.outlines,
    log10Relative: barrier.log10Relative,
    bandFactor: band.factor,
    emitterSheetOhm: stack.emitterSheetOhm,
    injectorSheetOhm: stack.injectorSheetOhm,
    contactOhmUm: stack.contactOhmUm,
    ...(device ? { device } : {}),
    ...(current ? { shorts: shortsOf(sample, current.log10.data, flaws, Math.log10(barrier.reference.median)) } : {}),
  };
}

function deviceOf(anchor: NonNullable<ReturnType<typeof anchorOf>>, device: NonNullable<Barrier['device']>, thicknessM: number): SheetInput['device'] {
  const shape = { ...anchor.material, thicknessM };
  const scale = device.median / anchor.model.density(shape, anchor.acrossV(device.biasV));
  if (!Number.isFinite(scale)) return undefined;
  return { biasV: device.biasV, densityAPerM2: (biasV) => scale * anchor.model.density(shape, anchor.acrossV(biasV)) };
}

function shortsOf(sample: Sample, log10: Float32Array, flaws: Flaws, referenceLog10: number): NonNullable<SheetInput['shorts']> {
  const isShort = Uint8Array.from([0, ...flaws.list.map((flaw) => (flaw.cause === 'short' ? 1 : 0))]);
  const labels = flaws.labels.data;
  const mask = new Uint8Array(labels.length);
  const relative = new Float32Array(labels.length).fill(Number.NaN);
  for (let i = 0; i < mask.length; i++) {
    if (isShort[labels[i]!] === 0) continue;
    mask[i] = 1;
    relative[i] = log10[i]! - referenceLog10;
  }
  return { mask: maskMap(sample.grid, mask), log10Relative: scalarMap(sample.grid, relative) };
}
