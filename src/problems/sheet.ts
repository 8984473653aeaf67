/** Sentences about outlines, contacts and voltage drop. */
export const sheetSentences = {
  'sheet-not-converged': (d: { residual: string; iterations: number }) =>
    `The voltage drop did not settle (residual ${d.residual} after ${d.iterations} steps); starved ground is not assessed.`,
  'sheet-fed-all-round': (d: { sheet: string }) =>
    `No contact-${d.sheet} outline is drawn: the ${d.sheet} is taken as fed along its whole outer edge; draw its contact for the true voltage drop.`,
  'sheet-contact-apart': (d: { sheet: string }) =>
    `The contact-${d.sheet} outline touches no ${d.sheet} ground on the map, so nothing is connected to it; check the outlines' position and size.`,
  'sheet-no-density': () =>
    'Sheet resistances are given, but the density at the device bias is not known in amperes: the voltage drop is not assessed; state the scan bias and the current unit.',
  'sheet-density': (d: { biasV: string; value: string; reason: string }) =>
    `The tunnel density at ${d.biasV} V is ${d.value} A/m², which ${d.reason}; check barrier.model, barrier.heightEv and stack.biasV.`,
};
