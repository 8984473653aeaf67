/** Sentences about maps and what can be concluded from them. */
export const appraisalSentences = {
  'current-saturated': (d: { file: string; share: number }) =>
    `${d.file}: ${(100 * d.share).toFixed(1)} % of the current map sits at the amplifier's limit, so it says nothing about the barrier; scan again at lower gain or bias.`,
  'current-offset-assumed': (_: Record<string, never>) =>
    'The current map shows no spot without current, so its offset could not be measured and zero was assumed.',
  'current-inverted': (d: { biasV: number }) =>
    `Nearly all of the current has the sign opposite to the bias of ${d.biasV} V; the amplifier was taken to invert and the current was turned. Correct the bias's sign if that is wrong.`,
  'footprint-proposed': (d: { sample: string; ground: 'injector' | 'substrate' | 'both' | 'unknown'; areaUm2: number; stepNm: number; flakeUm2: number }) =>
    `${bareWords[d.ground]} seems to be in view over ${d.areaUm2.toFixed(2)} µm², ${d.stepNm.toFixed(1)} nm below the rest, and is counted as footprint; to appraise the flake alone, save footprintProposal from verdict.json (${d.flakeUm2.toFixed(2)} µm²) as ${d.sample}.outlines.geojson beside the maps.`,
  'threshold-raised': (d: { statedNm: number; usedNm: number; noiseNm: number; times: number }) =>
    `The height's noise is ${short(d.noiseNm)} nm, so flaws were sought from ${short(d.usedNm)} nm up, ${short(d.times)} times that (flaws.heightNoise), instead of flaws.heightNm = ${short(d.statedNm)} nm.`,
  'bumps-conduct': (d: { areaUm2: number }) =>
    `Bumps over ${d.areaUm2.toFixed(2)} µm² stand above the ground but conduct like it; they are noted and not booked as flaws.`,
  'tip-gaps': (d: { areaUm2: number; tipNm: number }) =>
    `${d.areaUm2 < 0.01 ? 'Less than 0.01' : d.areaUm2.toFixed(2)} µm² of ground lies in gaps between tall flaws too narrow for a tip of ${d.tipNm.toFixed(0)} nm radius: what was measured there is the tip’s flank, and the ledger can only book it as it looks.`,
  'barrier-no-ground': (_: Record<string, never>) => 'All flawless ground lies at the amplifier’s floor or limit, so there is no reference and nothing is usable; scan again at another gain or bias.',
  'barrier-stack-surface': (_: Record<string, never>) =>
    'A finished stack was scanned: its emitter spreads the current, so layers and thickness are not given.',
  'reference-runner-up': (d: { layers: number; areaUm2: number; ownUm2: number }) =>
    `Another terrace (${layersApart(d.layers)}, ${d.areaUm2.toFixed(2)} µm²) is almost as large as the reference (${d.ownUm2.toFixed(2)} µm²); the choice between them decides the verdict.`,
  'reference-may-glow': (d: { naPerUm2: number; lowNaPerUm2: number; highNaPerUm2: number; biasV: number }) =>
    `The reference would carry ${short(d.naPerUm2)} nA/µm² (95 %: ${short(d.lowNaPerUm2)}–${short(d.highNaPerUm2)}) at ${asGiven(d.biasV)} V, outside the range known to glow, but its interval reaches into it.`,
  'reference-not-known-to-glow': (d: { naPerUm2: number; lowNaPerUm2: number; highNaPerUm2: number; biasV: number }) =>
    `Even, but not known to glow: the reference would carry ${short(d.naPerUm2)} nA/µm² (95 %: ${short(d.lowNaPerUm2)}–${short(d.highNaPerUm2)}) at ${asGiven(d.biasV)} V, outside the recipe's range.`,
  'reference-passed-over': (d: { layers: number; areaUm2: number }) =>
    `A terrace ${layersApart(d.layers)} (${d.areaUm2.toFixed(2)} µm²) would carry a density in range, but it is too rare or too near the floor to measure a map against.`,
  'device-field': (d: { fieldVPerNm: number; acrossV: number }) =>
    `The device's bias would put ${short(d.fieldVPerNm)} V/nm on the reference terrace; hBN was found to break down near 1.2 V/nm (Hattori et al., ACS Nano 9, 916, 2015). Do not apply it; lower stack.biasV.`,
  'probe-field': (d: { fieldVPerNm: number; biasV: number }) =>
    `The scan put ${short(d.fieldVPerNm)} V/nm on the reference terrace at ${asGiven(d.biasV)} V; hBN was found to break down near 1.2 V/nm (Hattori et al., ACS Nano 9, 916, 2015), so some shorts may be the scan's own.`,
  'reference-layers-disputed': (d: { referenceLayers: number; layers: number; areaUm2: number }) =>
    `barrier.referenceLayers = ${d.referenceLayers} is taken as the count of the most common terrace; a terrace ${layersApart(d.layers)} (${d.areaUm2.toFixed(2)} µm²) would then carry a density in range, but cannot be the reference, because its count is another. Check the count and stack.biasV.`,
  'ladder-one-terrace': (d: { from: 'model' | 'assumed'; stepDecades: number }) => d.from === 'model'
    ? `The map shows one terrace only, so the step per layer (${d.stepDecades.toFixed(2)} decades) is taken from the model.`
    : `The map shows one terrace only and no model can be asked, so a step of ${asGiven(d.stepDecades)} ${d.stepDecades === 1 ? 'decade' : 'decades'} per layer is assumed, and every pixel is judged by its own current.`,
  'ladder-skips': (d: { layersPerGap: number; measured: number; model: number }) =>
    `Neighbouring terraces differ by ${d.measured.toFixed(2)} decades, about ${d.layersPerGap} times what the model expects of one layer (${d.model.toFixed(2)}), and their heights agree, so ${d.layersPerGap} layers are counted between them.`,
  'ladder-contradicts': (d: { measured: number; model: number }) =>
    `The current falls by ${d.measured.toFixed(2)} decades per layer, the model expects ${d.model.toFixed(2)}; thickness and density from this model are in doubt.`,
  'model-out-of-range': (d: { model: string; heightEv: number; biasV: number; scanBiasV: number; where: 'scan' | 'device' }) =>
    `The model ${d.model} gives no density at the ${d.where === 'scan' ? 'scan’s' : 'device’s'} bias of ${asGiven(d.biasV)} V (barrier.heightEv = ${asGiven(d.heightEv)}): ${d.where === 'scan' ? 'layers, thickness and density in the device' : 'the density in the device and its interval'} are absent${ratioInstead(d.scanBiasV)}; ${d.model === 'wkb' ? 'check barrier.heightEv and barrier.massRatio' : 'set barrier.model to wkb, which holds at any bias'}.`,
  'model-no-thickness': (d: { model: string; biasV: number; currentA: number; fromNm: number; toNm: number }) =>
    `The model ${d.model} knows no barrier between ${asGiven(d.fromNm)} and ${asGiven(d.toNm)} nm that carries the reference's ${d.currentA.toExponential(1)} A at ${asGiven(d.biasV)} V: layers, thickness and density in the device are absent${ratioInstead(d.biasV)}; check barrier.tipAreaNm2, barrier.heightEv and barrier.massRatio, or give barrier.referenceLayers.`,
  'device-bias-no-density': (d: { biasV: number; offsetV: number; scanBiasV: number }) =>
    `No current flows at stack.biasV = ${asGiven(d.biasV)} V${d.biasV === 0 ? '' : `, because stack.offsetV = ${asGiven(d.offsetV)} V leaves nothing across the barrier`}: no density in the device is given${ratioInstead(d.scanBiasV)}; ${d.biasV === 0 ? 'give a bias other than 0, or none to have one proposed' : 'raise stack.biasV or lower stack.offsetV'}.`,
  'device-bias-not-found': (d: { model: string; targetNaPerUm2: number; scanBiasV: number }) =>
    `By the model ${d.model} no bias up to 50 V gives the reference stack.targetNaPerUm2 = ${asGiven(d.targetNaPerUm2)} nA/µm²: no device bias is proposed${ratioInstead(d.scanBiasV)}; give stack.biasV or another target, or check stack.offsetV.`,
  'bias-missing': (_: Record<string, never>) =>
    'No scan bias is stated (scan.biasV): layers, thickness, device bias and density are absent, and the band is judged by the ratio of currents.',
  'current-relative': (_: Record<string, never>) =>
    'The current has no scale in amperes: layers, thickness, device bias and density are absent, and the band is judged by the ratio of currents.',
};

const bareWords = {
  injector: 'Bare injector', substrate: 'Substrate or barrier without injector', both: 'Bare injector and substrate', unknown: 'Substrate or bare injector',
} as const;

function short(value: number): string {
  return String(Number(value.toPrecision(2)));
}

/** A number the user gave, without the last bits' noise of a unit's conversion. */
function asGiven(value: number): string {
  return String(Number(value.toPrecision(12)));
}

function ratioInstead(scanBiasV: number): string {
  return `, and the band is judged by the ratio of currents at the scan’s bias of ${asGiven(scanBiasV)} V`;
}

function layersApart(layers: number): string {
  const n = Math.abs(layers);
  return `${n} ${n === 1 ? 'layer' : 'layers'} ${layers < 0 ? 'thinner' : 'thicker'}`;
}
