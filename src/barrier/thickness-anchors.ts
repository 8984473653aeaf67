/** What the thickness of the terraces can be anchored to: each with an error and a sentence, compared with each other. */
import type { CurrentGround } from '../ground/ground.ts';
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import type { Anchor, AnchorGiven } from './anchor.ts';
import { anchorKinds } from './barrier.ts';
import type { AnchorKind, ThicknessAnchor } from './barrier.ts';
import type { BiasThickness } from './bias-thickness.ts';
import type { EdgeStep } from './edge-step.ts';
import { defaultSpread } from './model/density-interval.ts';
import { thicknessFromDensity } from './model/inverse.ts';
import type { BarrierMaterial } from './model/tunnel-model.ts';
import type { BarrierSection } from './recipe.ts';
import type { Candidate } from './reference.ts';
import { thicknessFromRatio } from './two-bias.ts';

const z95 = 1.959963984540054;
/** By judgement: ln of the contact's conductance between two scans over the same ground; a finished device's density against even ground; a step at a material's edge. */
export const contactSdLn = 0.05;
const deviceFactor95 = 2;
const edgeSystematicM = 0.3e-9;
/** What is not known to a layer is compared but not taken. Two anchors disagree from so many standard deviations, and half a layer, on. */
const takenLayers = 1;
const disagree = { sigmas: 2, layers: 0.5 } as const;

/** One anchor before the reference is chosen. */
export interface Witness {
  readonly kind: AnchorKind;
  /** Thickness of the reference at this place on the ladder with this median current, metres. */
  at(step: number, currentA: number): number;
  readonly sdM: number;
  /** Change with barrier height and mass, one standard deviation each, metres. */
  readonly byMaterial: readonly [height: number, mass: number];
  /** The sentence for the reference's thickness. */
  say(thicknessM: number): Notice;
  /** What densities and layers follow when this one is taken. */
  readonly given: AnchorGiven;
}

export interface WitnessQuestion {
  /** Anchor by the stated contact area and layer count. */
  readonly anchor: Anchor;
  readonly section: BarrierSection;
  readonly current: Pick<CurrentGround, 'wearDecades'>;
  /** All terraces, and the most common one that can be a reference. */
  readonly candidates: readonly Candidate[];
  readonly common: Candidate;
  readonly biases: BiasThickness | undefined;
  readonly edge: EdgeStep | undefined;
}

/** All anchors that recipe and map offer, in the order of preference. */
export function gatherWitnesses(question: WitnessQuestion): { witnesses: Witness[]; warnings: Notice[] } {
  const warnings: Notice[] = [];
  const witnesses = [byLayers(question), byBiases(question, warnings), byDevice(question, warnings), byEdge(question), byArea(question)].filter((witness) => witness !== undefined);
  return { witnesses, warnings };
}

/** The first in the order of preference that is known to a layer; a stated contact area is always good enough. */
export function takenOf(witnesses: readonly Witness[], layerM: number): Witness | undefined {
  return witnesses.find(({ kind, sdM }) => kind === 'area' || sdM <= takenLayers * layerM);
}

/** The anchors' thickness of the chosen reference, and a remark for each that contradicts the one that was taken. */
export function anchorsOf(witnesses: readonly Witness[], taken: Witness | undefined, chosen: Candidate, layerM: number): { anchors: ThicknessAnchor[]; warnings: Notice[] } {
  const currentA = 10 ** chosen.medianLog10;
  const anchors = witnesses.flatMap((witness): (ThicknessAnchor & { byMaterial: Witness['byMaterial'] })[] => {
    const thicknessM = witness.at(chosen.step, currentA);
    if (!(thicknessM > 0)) return [];
    const { kind, sdM, byMaterial } = witness;
    return [{ kind, taken: witness === taken, thicknessM, sdM, materialSdM: Math.hypot(...byMaterial), sentence: witness.say(thicknessM).message, byMaterial }];
  });
  const held = anchors.find((anchor) => anchor.taken);
  const warnings = !held ? [] : anchors.flatMap((other): Notice[] => {
    const apartM = Math.abs(other.thicknessM - held.thicknessM);
    // Height and mass move two thicknesses by the same model together, so only the difference counts.
    const sdM = Math.hypot(other.sdM, held.sdM, other.byMaterial[0] - held.byMaterial[0], other.byMaterial[1] - held.byMaterial[1]);
    if (other === held || apartM < disagree.layers * layerM || apartM <= disagree.sigmas * sdM) return [];
    return [notice('anchors-disagree', { taken: held.kind, takenNm: held.thicknessM * 1e9, other: other.kind, otherNm: other.thicknessM * 1e9, layerNm: layerM * 1e9, sigmas: apartM / sdM })];
  });
  return { anchors: anchors.map(({ byMaterial: _, ...anchor }) => anchor).sort((a, b) => anchorKinds.indexOf(a.kind) - anchorKinds.indexOf(b.kind)), warnings };
}

function byLayers({ section: { referenceLayers }, anchor: { layerM } }: WitnessQuestion): Witness | undefined {
  if (referenceLayers === undefined) return undefined;
  return {
    kind: 'layers', at: () => referenceLayers * layerM, sdM: 0, byMaterial: [0, 0], given: {},
    say: (thicknessM) => notice('anchor-layers', { layers: referenceLayers, thicknessNm: thicknessM * 1e9 }),
  };
}

function byBiases({ anchor, candidates, biases, current }: WitnessQuestion, warnings: Notice[]): Witness | undefined {
  if (!biases) return undefined;
  const { model, material, layerM } = anchor;
  const exact = new Set(candidates.filter(({ bound }) => bound === 'exact').map(({ step }) => step));
  const used = biases.terraces.filter(({ step, usedShare }) => usedShare >= 0.5 && exact.has(step));
  if (used.length === 0) {
    warnings.push(notice('biases-no-terrace', {}));
    return undefined;
  }
  const main = used.reduce((a, b) => (b.pixels > a.pixels ? b : a));
  /** A terrace that was not measured itself lies whole layers from the nearest one that was. */
  const at = (step: number): number => {
    const near = used.reduce((a, b) => (Math.abs(b.step - step) < Math.abs(a.step - step) ? b : a));
    return near.thicknessM + (step - near.step) * layerM;
  };
  const odd = used.find(({ step, thicknessM }) => Math.abs(thicknessM - main.thicknessM - (step - main.step) * layerM) > layerM / 2);
  if (odd) warnings.push(notice('biases-ladder', { steps: odd.step - main.step, layers: (odd.thicknessM - main.thicknessM) / layerM }));
  const mainM = main.thicknessM;
  const perLn = biases.solver.errorM(mainM, biases.biasesV.map(() => 0.5));
  const sdM = Math.hypot(main.seM, contactSdLn * perLn);
  const worn = Math.max(Math.abs(current.wearDecades), ...biases.further.map(({ wearDecades }) => Math.abs(wearDecades)));
  if (worn > 0) warnings.push(notice('biases-worn', { decades: worn, thicknessNm: worn * Math.LN10 * perLn * 1e9 }));
  const scanV = Math.abs(anchor.scanBiasV);
  const shape = { ...material, thicknessM: mainM };
  const currentA = 10 ** candidates.find(({ step }) => step === main.step)!.medianLog10;
  const moves = byMaterial(material, (moved) => thicknessFromRatio(model, moved, biases.lowV, biases.highV, main.lnRatio));
  return {
    kind: 'biases', at, sdM, byMaterial: moves,
    given: { ...calibrated(currentA, model.density(shape, scanV), model.slopes(shape, scanV).lnPerM, sdM), terraceM: at },
    say: (thicknessM) => notice('anchor-biases', { ...estimateOf(thicknessM, sdM, moves, layerM), biasesV: biases.biasesV, contactPercent: 100 * contactSdLn }),
  };
}

function byDevice({ anchor, section, common }: WitnessQuestion, warnings: Notice[]): Witness | undefined {
  const { finishedBiasV, finishedCurrentNa, finishedAreaUm2 } = section;
  const fields = { 'barrier.finishedBiasV': finishedBiasV, 'barrier.finishedCurrentNa': finishedCurrentNa, 'barrier.finishedAreaUm2': finishedAreaUm2 };
  const missing = Object.entries(fields).filter(([, value]) => value === undefined).map(([path]) => path);
  if (missing.length === 3) return undefined;
  if (missing.length > 0) {
    warnings.push(notice('finished-incomplete', { missing: missing.join(' and ') }));
    return undefined;
  }
  const { model, material, layerM, acrossV } = anchor;
  const deviceV = acrossV(finishedBiasV!);
  // 1 nA/µm² is 1e3 A/m².
  const density = (finishedCurrentNa! / finishedAreaUm2!) * 1e3;
  const solve = (moved: BarrierMaterial): number => thicknessFromDensity(model, moved, deviceV, density);
  const ownM = solve(material);
  if (Number.isNaN(ownM)) {
    warnings.push(notice('finished-no-thickness', { model: model.name, densityNaPerUm2: density * 1e-3, biasV: finishedBiasV! }));
    return undefined;
  }
  const shape = { ...material, thicknessM: ownM };
  const sdM = Math.log(deviceFactor95) / z95 / Math.abs(model.slopes(shape, deviceV).lnPerM);
  const scanV = Math.abs(anchor.scanBiasV);
  const moves = byMaterial(material, solve);
  return {
    kind: 'device', at: (step) => ownM + (step - common.step) * layerM, sdM, byMaterial: moves,
    given: calibrated(10 ** common.medianLog10, model.density(shape, scanV), model.slopes(shape, scanV).lnPerM, sdM),
    say: (thicknessM) => notice('anchor-device', { ...estimateOf(thicknessM, sdM, moves, layerM), currentNa: finishedCurrentNa!, areaUm2: finishedAreaUm2!, biasV: finishedBiasV!, factor: deviceFactor95 }),
  };
}

function byEdge({ anchor: { layerM }, edge }: WitnessQuestion): Witness | undefined {
  if (!edge) return undefined;
  const { firstM, seM, stepM, places } = edge;
  const sdM = Math.hypot(seM, edgeSystematicM);
  return {
    kind: 'edge', at: (step) => firstM + step * layerM, sdM, byMaterial: [0, 0],
    given: { firstLayers: Math.max(1, Math.round(firstM / layerM)), thicknessSdM: sdM },
    say: (thicknessM) => notice('anchor-edge', { ...estimateOf(thicknessM, sdM, [0, 0], layerM), stepNm: stepM * 1e9, places, systematicNm: edgeSystematicM * 1e9 }),
  };
}

function byArea({ anchor, section, common }: WitnessQuestion): Witness | undefined {
  const { model, material, layerM } = anchor;
  const scanV = Math.abs(anchor.scanBiasV);
  const areaM2 = section.tipAreaNm2 * 1e-18;
  const solve = (moved: BarrierMaterial, currentA: number): number => thicknessFromDensity(model, moved, scanV, currentA / areaM2);
  const commonA = 10 ** common.medianLog10;
  const commonM = solve(material, commonA);
  if (Number.isNaN(commonM)) return undefined;
  const sdM = Math.log(defaultSpread.areaFactor95) / z95 / Math.abs(model.slopes({ ...material, thicknessM: commonM }, scanV).lnPerM);
  const moves = byMaterial(material, (moved) => solve(moved, commonA));
  return {
    kind: 'area', at: (_step, currentA) => solve(material, currentA), sdM, byMaterial: moves, given: {},
    say: (thicknessM) => notice('anchor-area', { ...estimateOf(thicknessM, sdM, moves, layerM), areaNm2: section.tipAreaNm2, factor: defaultSpread.areaFactor95 }),
  };
}

/** Half the change over one standard deviation each way; 0 where the model does not hold at an end. */
function byMaterial({ heightEv, massRatio }: BarrierMaterial, solve: (material: BarrierMaterial) => number): [height: number, mass: number] {
  const half = (up: BarrierMaterial, down: BarrierMaterial): number => {
    const change = (solve(up) - solve(down)) / 2;
    return Number.isFinite(change) ? change : 0;
  };
  const { heightSdEv, massSdRatio } = defaultSpread;
  return [
    half({ heightEv: heightEv + heightSdEv, massRatio }, { heightEv: heightEv - heightSdEv, massRatio }),
    half({ heightEv, massRatio: massRatio * Math.exp(massSdRatio) }, { heightEv, massRatio: massRatio * Math.exp(-massSdRatio) }),
  ];
}

/** The contact area that makes a known thickness carry a current. */
function calibrated(currentA: number, densityAPerM2: number, lnPerM: number, sdM: number): AnchorGiven {
  return { area: { areaM2: currentA / densityAPerM2, factor95: Math.exp(z95 * Math.abs(lnPerM) * sdM) } };
}

function estimateOf(thicknessM: number, sdM: number, moves: readonly [number, number], layerM: number) {
  return { thicknessNm: thicknessM * 1e9, sdNm: sdM * 1e9, materialNm: Math.hypot(...moves) * 1e9, layerNm: layerM * 1e9 };
}
