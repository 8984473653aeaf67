import { anchorOf } from '../barrier/anchor.ts';
import type { Anchor } from '../barrier/anchor.ts';
import type { Barrier, DeviceDensity } from '../barrier/barrier.ts';
import type { Flaws } from '../flaws/flaws.ts';
import { maskMap, scalarMap } from '../grid/maps.ts';
import type { MaskMap, ScalarMap } from '../grid/maps.ts';
import type { CurrentGround, Ground } from '../ground/ground.ts';
import type { Sample } from '../read/sample.ts';
import type { Recipe } from '../recipe/recipe.ts';
import type { SheetInput } from '../sheet/sheet-input.ts';

/**
 * Puts the sheet stage's question together. The reference's density follows its thickness through the model, scaled to the density stated for the
 * device's bias, so that voltage drop and ledger speak of the same numbers.
 *
 * Shorts are assumed ohmic: the probe saw their ratio to the reference at the scan's bias, and from there to the device's bias their current falls in
 * proportion to the bias while the reference's falls along its tunnel curve, so the ratio becomes ratio × (V_d/V_s)·J_ref(V_s)/J_ref(V_d), V being what
 * falls across the barrier. Where a short saturated this is a lower bound. Without a density in the device the ratio stays the scan's.
 */
export function sheetInput(sample: Sample, ground: Ground, flaws: Flaws, barrier: Barrier, recipe: Recipe): SheetInput {
  const { stack, band } = recipe;
  const current = ground.current;
  const anchor = anchorOf(recipe.barrier, { offsetV: stack.offsetV, targetAPerM2: 1 }, current?.unit === 'A' ? current.biasV : undefined);
  const thicknessM = barrier.reference.thicknessM;
  const device = anchor && barrier.device && thicknessM !== undefined ? deviceOf(anchor, barrier.device, thicknessM) : undefined;
  const shorts = current && shortsOf(sample, current, flaws, Math.log10(barrier.reference.median), device?.shortsGainLog10 ?? 0);
  return {
    grid: sample.grid,
    footprint: sample.footprint,
    outlines: sample.outlines,
    log10Relative: barrier.log10Relative,
    bandFactor: band.factor,
    emitterSheetOhm: stack.emitterSheetOhm,
    injectorSheetOhm: stack.injectorSheetOhm,
    contactOhmUm: stack.contactOhmUm,
    ...(device ? { device: device.device } : {}),
    noDensity: barrier.noDensity,
    ...(shorts ? { shorts: { mask: shorts.mask, log10Relative: shorts.log10Relative, ...(device ? { ohmic: { scanBiasV: anchor!.scanBiasV, saturated: shorts.saturated } } : {}) } } : {}),
  };
}

/** The reference's curve, and by how many decades an ohmic current's ratio to it grows from the scan's bias to the device's. */
function deviceOf(
  anchor: Anchor, device: DeviceDensity, thicknessM: number,
): { readonly device: NonNullable<SheetInput['device']>; readonly shortsGainLog10: number } | undefined {
  const shape = { ...anchor.material, thicknessM };
  const across = anchor.acrossV(device.biasV);
  const scanV = Math.abs(anchor.scanBiasV);
  const lnAtDevice = anchor.model.lnDensity(shape, across);
  const scale = device.median / Math.exp(lnAtDevice);
  const shortsGainLog10 = Math.log10(across / scanV) + (anchor.model.lnDensity(shape, scanV) - lnAtDevice) / Math.LN10;
  if (!Number.isFinite(scale) || !Number.isFinite(shortsGainLog10)) return undefined;
  return { device: { biasV: device.biasV, densityAPerM2: (biasV) => scale * anchor.model.density(shape, anchor.acrossV(biasV)) }, shortsGainLog10 };
}

function shortsOf(
  sample: Sample, current: CurrentGround, flaws: Flaws, referenceLog10: number, gainLog10: number,
): { readonly mask: MaskMap; readonly log10Relative: ScalarMap; readonly saturated: boolean } {
  const isShort = Uint8Array.from([0, ...flaws.list.map((flaw) => (flaw.cause === 'short' ? 1 : 0))]);
  const labels = flaws.labels.data;
  const log10 = current.log10.data;
  const mask = new Uint8Array(labels.length);
  const relative = new Float32Array(labels.length).fill(Number.NaN);
  let saturated = false;
  for (let i = 0; i < mask.length; i++) {
    if (isShort[labels[i]!] === 0) continue;
    mask[i] = 1;
    relative[i] = log10[i]! - referenceLog10 + gainLog10;
    if (current.saturated.data[i] === 1 && sample.footprint.data[i] === 1) saturated = true;
  }
  return { mask: maskMap(sample.grid, mask), log10Relative: scalarMap(sample.grid, relative), saturated };
}
