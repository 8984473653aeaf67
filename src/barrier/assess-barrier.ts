import ndarray from 'ndarray';
import { pairDistancePx } from '../ground/gap-height.ts';
import type { Grid, MaskMap } from '../grid/maps.ts';
import { pixelAreaM2, scalarMap } from '../grid/maps.ts';
import type { CurrentGround, FurtherCurrent } from '../ground/ground.ts';
import type { Flaws } from '../flaws/flaws.ts';
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { anchorOf, layersAt } from './anchor.ts';
import type { DeviceQuestion } from './anchor.ts';
import type { Barrier, Reference, Rung } from './barrier.ts';
import { deviceFieldNotices, ladderNotices, probeFieldNotices, referenceNotices } from './barrier-notices.ts';
import { biasMap, biasThickness, evenedCurrent } from './bias-thickness.ts';
import type { BiasThickness } from './bias-thickness.ts';
import { chooseAnchored } from './choose-anchored.ts';
import { deviceDensity } from './device-density.ts';
import { edgeStep } from './edge-step.ts';
import type { EdgeGround } from './edge-step.ts';
import type { BarrierSection } from './recipe.ts';
import { chooseReference } from './reference.ts';
import type { Candidate } from './reference.ts';
import { anchorsOf, gatherWitnesses, takenOf } from './thickness-anchors.ts';
import { findTerraces, unknownStep } from './terraces.ts';
import type { Terraces } from './terraces.ts';
import { thicknessMap } from './thickness-map.ts';

/** What the barrier stage needs to know of the device and the band, in SI. */
export interface BandQuestion extends DeviceQuestion {
  readonly minAPerM2: number;
  readonly maxAPerM2: number;
  readonly bandFactor: number;
  readonly terraceMinM2: number;
  /** A device field above this is warned of. */
  readonly deviceFieldVPerNm: number;
}

/** What else the sample shows of the thickness. */
export interface BesideBarrier {
  /** Currents at further biases over the same ground. */
  readonly further?: readonly FurtherCurrent[] | undefined;
  /** Where the flake's edge may lie over bare injector. */
  readonly edge?: EdgeGround | undefined;
}

/**
 * Barrier stage: terraces and their ladder, the reference terrace, whole layers and thickness, and the density each terrace would carry in the
 * device before any voltage drop.
 *
 * Scatter of the current inside a terrace is not thickness, because layers are whole: with `withinTerrace: contact` it stays out of layers, thickness
 * and density. With `withinTerrace: barrier` thickness and density follow the current pixel by pixel. No ground is thinner than one layer.
 *
 * Where the device's density is not known (`noDensity` says why) the relative density is the ratio of currents at the scan's bias.
 *
 * @param footprint 1 where the device could be; @param surface on a finished stack the emitter spreads the current, so no thickness is given there.
 * Thickness and layers follow the best anchor there is (`thickness-anchors.ts`); the others are compared with it, and a contradiction is a remark.
 *
 * @param levelled levelled height, metres: a witness for layers that are missing between terraces; absent without a height map.
 * @param beside further maps and outlines that can anchor the thickness.
 * @returns maps of the grid's shape; steps −128, layers 0 and thickness NaN where unknown (no current, flaw, outside the footprint).
 * @throws nothing for a valid recipe; a map without any usable ground yields unknown everywhere and a remark.
 */
export function assessBarrier(
  scanned: CurrentGround, flaws: Flaws, footprint: MaskMap, grid: Grid, surface: 'barrier' | 'stack', section: BarrierSection, band: BandQuestion,
  levelled?: Float32Array, beside: BesideBarrier = {},
): Barrier {
  const warnings: Notice[] = [];
  const labels = flaws.labels.data;
  const inside = footprint.data;
  const onGround = (i: number): boolean => inside[i] === 1 && labels[i] === 0;
  const amperes = scanned.unit === 'A' && scanned.biasV !== undefined && scanned.biasV !== 0;
  const scanBiasV = amperes && surface === 'barrier' ? scanned.biasV : undefined;
  const plain = anchorOf(section, band, scanBiasV);
  if (section.imagePermittivity !== undefined && section.model !== 'fowler-nordheim') warnings.push(notice('image-charge-unused', { model: section.model }));
  const fallbackStep = plain?.modelStepDecades;
  const layerM = section.layerNm * 1e-9;
  const { further, edge } = beside;
  const byBiases = plain && further && biasMap(scanned, further, onGround, plain.model, plain.material);
  if (plain && further && !byBiases) warnings.push(...further.map(({ source }) => notice('bias-map-left-out', { source, reason: 'model' })));
  const current = byBiases ? evenedCurrent(scanned, byBiases, grid, plain.model, plain.material, layerM) : scanned;
  const terraces = findTerraces(current, onGround, {
    stepDecades: fallbackStep ?? 1, from: fallbackStep === undefined ? 'assumed' : 'model',
  }, levelled && { levelled, columns: grid.columns, layerM, apartPx: pairDistancePx(grid.pitchXM, grid.columns) });

  const area = pixelAreaM2(grid);
  const candidates: Candidate[] = terraces.rungs.map((rung) => ({ ...rung, areaM2: rung.pixels * area }));
  const rule = { ...band, floor: current.floorA };
  const common = plain && chooseReference(candidates, rule)?.chosen;
  const biases = byBiases && biasThickness(byBiases, terraces.steps, grid, plain.material);
  const found = plain && common && gatherWitnesses({
    anchor: plain, section, current, candidates, common, biases,
    edge: edge && levelled && edgeStep(levelled, current.saturated.data, terraces.steps, edge, grid, layerM),
  });
  const taken = found && takenOf(found.witnesses, layerM);
  const provisional = taken && taken.kind !== 'area' ? anchorOf(section, band, scanBiasV, taken.given) : plain;
  const choice = chooseAnchored(candidates, rule, provisional, band.biasV);
  if (!choice) warnings.push(notice('barrier-no-ground', {}));
  const origin = choice?.chosen.step ?? 0;
  const counted = taken?.given.firstLayers;
  const anchor = counted === undefined ? provisional : anchorOf({ ...section, referenceLayers: layersAt(counted, origin) }, band, scanBiasV, taken!.given);
  const { anchors, warnings: contradictions } = found && choice ? anchorsOf(found.witnesses, taken, choice.chosen, layerM) : { anchors: [], warnings: [] };
  const median = choice ? 10 ** choice.chosen.medianLog10 : Number.NaN;

  const wholeAt = wholeLayers(taken?.given.terraceM, layerM);
  const anchored = choice && (wholeAt ? { layers: wholeAt(origin), thicknessM: wholeAt(origin) * layerM } : anchor?.fix(median));
  const { device, noDensity, notices } = deviceDensity({ current, surface, section, device: band, anchor, reference: choice && { median, anchored } });
  const unflawedM2 = candidates.reduce((sum, candidate) => sum + candidate.areaM2, 0);
  const reference: Reference = {
    step: 0,
    ...(anchored ? { layers: anchored.layers, thicknessM: anchored.thicknessM } : {}),
    median,
    areaM2: choice?.chosen.areaM2 ?? 0,
    shareOfUnflawed: choice && unflawedM2 > 0 ? choice.chosen.areaM2 / unflawedM2 : 0,
    ...(device ? { inRange: device.median >= band.minAPerM2 && device.median <= band.maxAPerM2 } : {}),
  };
  const rungs: Rung[] = candidates.map((candidate) => ({
    step: candidate.step - origin,
    ...(anchored ? { layers: wholeAt?.(candidate.step) ?? layersAt(anchored.layers, candidate.step - origin) } : {}),
    areaM2: candidate.areaM2,
    pixels: candidate.pixels,
    medianLog10: candidate.medianLog10,
    scatterDecades: candidate.scatterDecades,
    bound: candidate.bound,
  }));
  if (choice) warnings.push(...referenceNotices(choice, origin, device, anchored?.layers), ...ladderNotices(terraces, anchor?.modelStepDecades));
  warnings.push(...probeFieldNotices(anchor?.scanBiasV, anchored?.thicknessM), ...notices);
  warnings.push(...deviceFieldNotices(device && anchor?.acrossV(device.biasV), anchored?.thicknessM, band.deviceFieldVPerNm));
  warnings.push(...(found?.warnings ?? []), ...contradictions);

  const maps = thicknessMap(current, terraces, origin, grid, {
    withinTerrace: section.withinTerrace, referenceLog10: choice?.chosen.medianLog10 ?? Number.NaN, rungs,
    ...(anchored ? { anchored } : {}), ...(device ? { deviceBiasV: device.biasV } : {}), ...(anchor ? { anchor } : {}),
  });
  return {
    step: ndarray(rebased(terraces, origin), [grid.rows, grid.columns]),
    ...(maps.layers ? { layers: ndarray(maps.layers, [grid.rows, grid.columns]) } : {}),
    ...(maps.thickness ? { thickness: scalarMap(grid, maps.thickness) } : {}),
    log10Relative: scalarMap(grid, maps.log10Relative),
    ladder: {
      stepDecades: terraces.stepDecades,
      stepSeDecades: terraces.stepSeDecades,
      from: terraces.from,
      ...(anchor ? { modelStepDecades: anchor.modelStepDecades } : {}),
      rungs,
    },
    reference,
    anchors,
    ...(biases ? { biases: fromReference(biases, origin) } : {}),
    ...(device ? { device } : {}),
    ...(noDensity ? { noDensity } : {}),
    warnings,
  };
}

function rebased(terraces: Terraces, origin: number): Int8Array {
  // By step + 128.
  const moved = Int8Array.from({ length: 256 }, (_, place) => (place - 128 === unknownStep ? unknownStep : Math.max(-127, Math.min(127, place - 128 - origin))));
  const steps = terraces.steps.slice();
  for (let i = 0; i < steps.length; i++) steps[i] = moved[steps[i]! + 128]!;
  return steps;
}

/** Whole layers by place on the ladder, where each terrace was measured by itself. */
function wholeLayers(terraceM: ((step: number) => number) | undefined, layerM: number): ((step: number) => number) | undefined {
  return terraceM && ((step) => layersAt(Math.round(terraceM(step) / layerM), 0));
}

function fromReference(biases: BiasThickness, origin: number): BiasThickness {
  return { ...biases, terraces: biases.terraces.map((terrace) => ({ ...terrace, step: terrace.step - origin })) };
}
