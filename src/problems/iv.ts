/** Sentences about current–voltage curves. */
const columnExample = 'bias_V,current_nA';

export const ivSentences = {
  'iv-header': (d: { file: string }) => `${d.file} has no header that names a bias and a current; begin the table with a line such as ${columnExample}.`,
  'iv-column-twice': (d: { file: string; line: number; quantity: string; first: string; second: string }) =>
    `${d.file}, line ${d.line}: "${d.first}" and "${d.second}" are both a ${d.quantity}; keep one, or write one file per curve.`,
  'iv-unit': (d: { file: string; line: number; column: string; quantity: string }) =>
    `${d.file}, line ${d.line}: "${d.column}" states no unit of a ${d.quantity}; write it behind the name, such as ${d.quantity === 'bias' ? 'bias_V' : d.quantity === 'current' ? 'current_nA' : 'temperature_K'}.`,
  'iv-value': (d: { file: string; line: number; column: string; value: string }) =>
    `${d.file}, line ${d.line}, ${d.column}: "${d.value}" is not a number; write the number, or nan where it is missing.`,
  'iv-temperature': (d: { file: string; line: number; value: string }) => `${d.file}, line ${d.line}: a temperature of "${d.value}" is not above absolute zero; correct it or its unit.`,
  'iv-row': (d: { file: string; line: number; row: string; columns: number }) =>
    `${d.file}, line ${d.line}: "${d.row}" does not part into ${d.columns} cells of numbers; part them by tab, semicolon or comma.`,
  'iv-no-points': (d: { file: string }) => `${d.file} holds no line with both a bias and a current; export the curve again.`,
  'iv-columns-ignored': (d: { file: string; columns: string }) => `${d.file}: ${d.columns} is neither bias, current nor temperature by its header and was left out.`,
  'iv-few-points': (d: { curve: string; usable: number; points: number }) =>
    `${d.curve}: only ${d.usable} of ${d.points} points lie above the amplifier's floor, below its limit and above any ohmic part, too few for a line; measure to a higher bias within what the barrier stands, or at another gain.`,
  'iv-nowhere-straight': (d: { curve: string; points: number }) =>
    `${d.curve}: the Fowler–Nordheim plot of its ${d.points} usable points is straight nowhere, so no line was drawn; the current is not that of tunnelling through a triangular barrier, or the bias steps are too wide.`,
  'iv-wrong-slope': (d: { curve: string; slopeV: string }) =>
    `${d.curve}: ln(I/V²) does not fall with 1/V (slope ${d.slopeV} V), so no barrier follows; the current is not that of tunnelling through a triangular barrier.`,
  'iv-bent': (d: { curve: string; from: string; to: string; share: string }) =>
    `${d.curve}: the Fowler–Nordheim plot is straight on only ${d.share} of the usable points (${d.from}–${d.to} V); leakage, a series resistance, traps or a changing contact may bend the rest.`,
  'iv-top-bent': (d: { curve: string; to: string; toUsable: string }) =>
    `${d.curve}: above ${d.to} V (up to ${d.toUsable} V) the points leave the straight line and were not used: a series resistance, a limit of the amplifier or a beginning breakdown.`,
  'iv-saturated': (d: { curve: string; points: number; fromV: string }) => `${d.curve}: ${d.points} points from ${d.fromV} V on lie at the amplifier's limit and were left out.`,
  'iv-below-height': (d: { curve: string; from: string; heightEv: string }) =>
    `${d.curve}: the line begins at ${d.from} V, below the barrier height of ${d.heightEv} eV, where the barrier is no triangle; the slope there is too flat for the formula.`,
  'iv-leakage': (d: { curve: string; conductanceS: string; resistanceOhm: string }) =>
    `${d.curve}: an ohmic part at low bias (${d.conductanceS} S, ${d.resistanceOhm} Ω): a leak beside the barrier, or direct tunnelling if the barrier is thin; it was taken off the current, and biases where it is more than 5 % of what is left take no part in the line.`,
  'iv-hysteresis': (d: { curve: string; factor: string; higher: 'up' | 'down'; shiftV: string }) =>
    `${d.curve}: on the way ${d.higher} the current is ${d.factor} times as large (as if the bias were shifted by ${d.shiftV} V): charge was trapped, the contact changed, or the barrier was damaged; only the way up was used.`,
  'iv-other-polarity': (d: { curve: string; used: 'positive' | 'negative'; slopeV: string; slopeSe: string }) =>
    `${d.curve}: the line is that of ${d.used} bias; at the other polarity the slope is ${d.slopeV} ± ${d.slopeSe} V.`,
  'iv-area': (d: { curve: string; effectiveNm2: string; statedNm2: string }) =>
    `${d.curve}: height, mass and thickness as used imply a tunnelling area of ${d.effectiveNm2} nm² instead of the stated ${d.statedNm2} nm²; the thickness, the height or the area is off, or current flows through a part of it only.`,
  'iv-breakdown': (d: { curve: string; fromVPerNm: string; toVPerNm: string; thicknessNm: string; given: boolean }) =>
    `${d.curve}: the line spans ${d.fromVPerNm}–${d.toVPerNm} V/nm on ${d.thicknessNm} nm (${d.given ? 'as given' : 'as derived'}); breakdown of hBN was found at about 1.2 V/nm (Hattori et al., ACS Nano 9, 916, 2015). The barrier may not survive it; raise the bias slowly, with a current limit.`,
  'iv-tunnelling': (d: { spread: string; biasV: string; fromK: string; toK: string; expected: string }) =>
    `At ${d.biasV} V the current changes by ×${d.spread} from ${d.fromK} to ${d.toK} K, as tunnelling does (the model's factor is ×${d.expected}; up to about ×1.3 counts as not moving).`,
  'iv-thermally-activated': (d: { spread: string; biasV: string; fromK: string; toK: string; expected: string; activationMev: string; activationSeMev: string }) =>
    `At ${d.biasV} V the current rises by ×${d.spread} from ${d.fromK} to ${d.toK} K where tunnelling would give ×${d.expected}: thermally activated (${d.activationMev} ± ${d.activationSeMev} meV), so trap-assisted rather than tunnelling through the whole barrier; take no height or thickness from its slope.`,
  'iv-temperature-unclear': (d: { spread: string; biasV: string; fromK: string; toK: string; reason: string }) =>
    `At ${d.biasV} V the current changes by ×${d.spread} between ${d.fromK} and ${d.toK} K, and ${d.reason}; whether it is tunnelling stays open.`,
  'iv-temperature-apart': (d: { reason: string }) => `The curves at different temperatures cannot be compared: ${d.reason}.`,
};
