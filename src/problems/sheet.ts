/** A bias as it was given; one that was proposed has endless digits and is rounded. */
const volts = (value: number): string => {
  const given = String(Number(value.toPrecision(12)));
  return given.length <= 8 ? given : String(Number(value.toPrecision(3)));
};

/** The way out for each reason why no density is known. */
const noDensityWords = {
  'current-relative': 'state the current’s unit (scan.currentUnit)',
  'bias-missing': 'state the scan’s bias (scan.biasV)',
  'stack-surface': 'scan the bare barrier, as a finished stack’s surface does not give it',
  'no-ground': 'scan again at another gain or bias, as all flawless ground lies at the amplifier’s floor or limit',
  model: 'set barrier.model to wkb or check the barrier’s values, as the model does not hold at these biases or currents',
  'device-bias': 'check stack.biasV, stack.offsetV and stack.targetNaPerUm2',
} as const;

/** Sentences about outlines, contacts and voltage drop. */
export const sheetSentences = {
  'sheet-not-converged': (d: { residual: string; iterations: number }) =>
    `The voltage drop did not settle (residual ${d.residual} after ${d.iterations} steps); starved ground is not assessed.`,
  'sheet-fed-all-round': (d: { sheet: string }) =>
    `No contact-${d.sheet} outline is drawn: the ${d.sheet} is taken as fed along its whole outer edge; draw its contact for the true voltage drop.`,
  'sheet-contact-apart': (d: { sheet: string }) =>
    `The contact-${d.sheet} outline touches no ${d.sheet} ground on the map, so nothing is connected to it; check the outlines' position and size.`,
  'sheet-no-density': (d: { reason: keyof typeof noDensityWords | undefined }) =>
    `Sheet resistances are given, but no density is known at the device's bias, so the voltage drop is not assessed; ${d.reason === undefined ? 'state the scan bias and the current unit' : noDensityWords[d.reason]}.`,
  'shorts-ohmic': (d: { scanBiasV: number; deviceBiasV: number; saturated: boolean }) =>
    `Shorts are assumed ohmic between the scan's ${volts(d.scanBiasV)} V and the device's ${volts(d.deviceBiasV)} V: their share of the device's current rests on that${d.saturated ? ', and is a lower bound, because shorts saturated the amplifier' : ''}.`,
  'sheet-density': (d: { biasV: string; value: string; reason: string }) =>
    `The tunnel density at ${d.biasV} V is ${d.value} A/m², which ${d.reason}; check barrier.model, barrier.heightEv and stack.biasV.`,
};
