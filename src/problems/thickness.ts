/** Sentences about what anchors the barrier's thickness. */
const leftOutWords = {
  bias: 'no bias other than 0 is stated for it or for the first map; state both, in the names (such as S.current.5V.tif) or in the files',
  unit: 'ratios need amperes in both maps; state the unit (scan.currentUnit)',
  polarity: 'it was scanned with the opposite polarity, where the other electrode emits; scan both with the same sign',
  same: 'its bias is that of another map within 2 %, so that their ratio says nothing of thickness; scan at biases further apart',
  model: 'the chosen model (barrier.model) does not hold at one of the biases; set barrier.model to wkb',
  saturated: 'nearly all of it sits at the amplifier’s limit; scan again at lower gain or bias',
  unlike: 'it cannot be laid over the first map (they do not look alike within the shift that was searched); scan the same frame again',
} as const;

interface Estimate {
  readonly thicknessNm: number;
  readonly sdNm: number;
  readonly materialNm: number;
  readonly layerNm: number;
}

/** Thickness with its standard deviations: of the measurement at the stated barrier, and with what height and mass add. */
function estimate({ thicknessNm, sdNm, materialNm, layerNm }: Estimate): string {
  const layers = (nm: number): string => (nm / layerNm).toFixed(nm / layerNm < 0.05 ? 2 : 1);
  const with1 = Math.hypot(sdNm, materialNm);
  const more = materialNm > 0 ? `; ± ${with1.toFixed(2)} nm (${layers(with1)}) with the spread of height and mass` : '';
  return `${thicknessNm.toFixed(2)} ± ${sdNm.toFixed(sdNm < 0.01 ? 3 : 2)} nm (${layers(thicknessNm)} ± ${layers(sdNm)} layers${more})`;
}

const kindWords = {
  layers: 'the stated layer count', edge: 'the step at the flake’s edge', biases: 'maps at two or more biases', device: 'the finished device’s current', area: 'the current through the stated contact area',
} as const;

export const thicknessSentences = {
  'bias-map-left-out': (d: { source: string; reason: keyof typeof leftOutWords }) => `${d.source} is not used for thickness from several biases: ${leftOutWords[d.reason]}.`,
  'biases-worn': (d: { decades: number; thicknessNm: number }) =>
    `The tip wore by ${d.decades.toFixed(2)} decades during one of the scans at several biases. If one scan followed the other, the thickness from their ratio may be off by ${d.thicknessNm.toFixed(2)} nm; scan again with a fresh tip, or take both biases line by line.`,
  'biases-no-terrace': (_: Record<string, never>) =>
    'On no terrace do most pixels show a measurable current at every bias, so the maps at several biases do not anchor the thickness; choose biases at which the same ground is neither saturated nor near the floor.',
  'biases-ladder': (d: { steps: number; layers: number }) =>
    `By the maps at several biases two terraces are ${Math.abs(d.layers).toFixed(1)} layers apart that the ladder of currents puts ${Math.abs(d.steps)} apart: the ladder took a change of the contact for a step, or missed one. Layers follow the biases.`,
  'anchor-layers': (d: { layers: number; thicknessNm: number }) =>
    `Stated: barrier.referenceLayers gives the reference ${d.layers} ${d.layers === 1 ? 'layer' : 'layers'}, ${d.thicknessNm.toFixed(2)} nm. Taken as exact.`,
  'anchor-edge': (d: Estimate & { stepNm: number; places: number; systematicNm: number }) =>
    `Step at the flake’s edge over bare injector, ${d.stepNm.toFixed(2)} nm (median of ${d.places} places): the reference is ${estimate(d)}. A probe’s step at a material’s edge can be off by water, adhesion and the tip’s force on the two materials; ${d.systematicNm.toFixed(2)} nm are allowed for that, by judgement.`,
  'anchor-biases': (d: Estimate & { biasesV: readonly number[]; contactPercent: number }) =>
    `Ratio of the currents at ${d.biasesV.map((biasV) => `${Number(biasV.toPrecision(6))} V`).join(' and ')}, without the contact’s area: the reference is ${estimate(d)}. It holds if the contact is the same in the scans; ${d.contactPercent} % between them is allowed for, by judgement.`,
  'anchor-device': (d: Estimate & { currentNa: number; areaUm2: number; biasV: number; factor: number }) =>
    `Finished device, ${Number(d.currentNa.toPrecision(3))} nA over ${Number(d.areaUm2.toPrecision(3))} µm² at ${Number(d.biasV.toPrecision(6))} V: the reference is ${estimate(d)}. The device is taken to stand on the most common terrace; ×/÷ ${d.factor} (95 %) is allowed for uneven ground and contacts, by judgement.`,
  'anchor-area': (d: Estimate & { areaNm2: number; factor: number }) =>
    `Current through the stated contact of ${Number(d.areaNm2.toPrecision(3))} nm², known to ×/÷ ${d.factor.toFixed(1)} (95 %): the reference is ${estimate(d)}.`,
  'anchors-disagree': (d: { taken: keyof typeof kindWords; takenNm: number; other: keyof typeof kindWords; otherNm: number; layerNm: number; sigmas: number }) =>
    `The reference is ${d.takenNm.toFixed(2)} nm (${(d.takenNm / d.layerNm).toFixed(1)} layers) by ${kindWords[d.taken]}, which is used, but ${d.otherNm.toFixed(2)} nm (${(d.otherNm / d.layerNm).toFixed(1)} layers) by ${kindWords[d.other]}: ${d.sigmas.toFixed(1)} standard deviations apart. One of them, or the barrier’s height and mass, is wrong.`,
  'finished-incomplete': (d: { missing: string }) =>
    `A finished device anchors the thickness only with bias, current and area; ${d.missing} is not given, so it is left out.`,
  'finished-no-thickness': (d: { model: string; densityNaPerUm2: number; biasV: number }) =>
    `The model ${d.model} knows no barrier between 0.2 and 20 nm that carries the finished device’s ${Number(d.densityNaPerUm2.toPrecision(3))} nA/µm² at ${Number(d.biasV.toPrecision(6))} V, so it is left out; check barrier.finishedBiasV, barrier.finishedCurrentNa, barrier.finishedAreaUm2 and stack.offsetV.`,
  'image-charge-unused': (d: { model: string }) =>
    `barrier.imagePermittivity is left out: the model ${d.model} has no image charge; set barrier.model to fowler-nordheim to use it.`,
  'device-field-limit': (d: { fieldVPerNm: number; limitVPerNm: number; acrossV: number }) =>
    `The device’s bias would put ${Number(d.fieldVPerNm.toPrecision(2))} V/nm on the reference terrace, above the limit of ${Number(d.limitVPerNm.toPrecision(3))} V/nm (band.deviceFieldVPerNm); hBN was found to break down near 1.2 V/nm (Hattori et al., ACS Nano 9, 916, 2015), and flakes differ. Raise the bias slowly, with a current limit, and try it on a flake that may be lost.`,
};
