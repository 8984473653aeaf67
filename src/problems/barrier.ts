/** Sentences about tunnelling models and thickness. */
export const barrierSentences = {
  'barrier-argument': (d: { name: string; value: string; reason: string }) => `${d.name}: ${d.value} ${d.reason}.`,
  'barrier-no-thickness': (d: { density: string; biasV: number; fromNm: string; toNm: string; lowest: string; highest: string }) =>
    `No thickness between ${d.fromNm} and ${d.toNm} nm carries ${d.density} A/cm² at ${d.biasV} V (the model spans ${d.lowest} to ${d.highest} A/cm²); check the current, the contact area and the bias.`,
  'barrier-breakdown': (d: { fieldVPerNm: string }) =>
    `The field is ${d.fieldVPerNm} V/nm; hBN was found to break down along its stacking axis at about 1.2 V/nm (Hattori et al., ACS Nano 9, 916, 2015). The barrier may not survive it.`,
  'barrier-thickness-range': (d: { thicknessNm: string }) =>
    `A thickness of ${d.thicknessNm} nm is outside 1–10 nm, where these models of an even barrier are commonly compared with measurements; take the numbers as a guide only.`,
  'barrier-simmons-range': (d: { biasV: number; heightEv: number }) =>
    `Simmons’ formula holds for biases between 0 V and the barrier height (${d.heightEv} eV), not at ${d.biasV} V, so it gives no density here; use the model wkb or fowler-nordheim.`,
  'barrier-simmons-thin': (d: { thicknessNm: string; thinnestNm: string }) =>
    `Simmons’ formula assumes an opaque barrier; for this height and mass its density stops falling with thickness near ${d.thinnestNm} nm, and ${d.thicknessNm} nm is thinner. Use the model wkb.`,
  'barrier-fowler-range': (d: { biasV: number; heightEv: number }) =>
    `Fowler–Nordheim’s formula holds for biases above the barrier height (${d.heightEv} eV); at ${d.biasV} V it takes the barrier for a longer triangle than it is and its density is too low. Use the model wkb.`,
  'barrier-image-lost': (d: { fieldVPerNm: string }) =>
    `At ${d.fieldVPerNm} V/nm the image charge pulls the top of the barrier below the Fermi level, so the formula gives no density; leave the image permittivity out or raise the thickness.`,
};
