/** Sentences about what the scan did to a current, and what of it was undone. */
export const groundSentences = {
  'current-wear': (d: { decades: number; seDecades: number }) =>
    `The tip lost ${d.decades.toFixed(2)} ± ${d.seDecades.toFixed(2)} decades of conductance from the first line to the last; this was undone as a factor per line. Scan again with a fresh tip if the verdict hangs on it.`,
  'current-drift-unclear': (d: { decades: number; seDecades: number }) =>
    `The current falls by ${d.decades.toFixed(2)} decades from the first line to the last; the barrier's own variation makes ${d.seDecades.toFixed(2)} of such a trend, so wear of the tip cannot be told from it and nothing was undone. A second scan with the slow axis turned round would tell.`,
  'current-drift-differs': (d: { forwardDecades: number; returnDecades: number }) =>
    `The current falls by ${d.forwardDecades.toFixed(2)} decades from the first line to the last on the forward scan and by ${d.returnDecades.toFixed(2)} on the return scan; a worn tip would lose the same on both, so nothing was undone. The contact differs between the directions.`,
  'current-lag': (d: { px: number; sePx: number }) =>
    `The amplifier drags the current along the lines with a time constant of ${d.px.toFixed(2)}${Number.isNaN(d.sePx) ? '' : ` ± ${Math.max(0.01, d.sePx).toFixed(2)}`} pixels; shift and smear were undone. Right behind saturated spots the current is only bounded. Scan more slowly, or at lower gain, to avoid it.`,
  'current-shifted': (d: { dxPx: number; dyPx: number; seXPx: number; seYPx: number; undoneXPx: number; undoneYPx: number }) =>
    `The current lies ${signed(d.dxPx)} ± ${d.seXPx.toFixed(2)} pixels to the right of the height and ${signed(d.dyPx)} ± ${d.seYPx.toFixed(2)} below it; it was moved back by whole pixels (${-d.undoneXPx} and ${-d.undoneYPx}), which leaves its border unmeasured.`,
  'current-quantised': (d: { step: number; floor: number; unit: 'A' | 'relative' }) =>
    `The current comes in steps of ${amount(d.step, d.unit)}, so readings up to ${amount(d.floor, d.unit)} are counted as no current; a higher gain would show thicker barrier.`,
  'spots-too-few': (d: { given: number; least: number }) =>
    `Of ${d.given} spots of ground picked by hand fewer than ${d.least} lie on measured ground of the map, so the ground was found automatically; pick spots inside the map where the height was measured.`,
  'spots-order-lowered': (d: { given: number; used: number; order: number; usedOrder: number }) =>
    `${d.used < d.given ? `${d.given - d.used} of ${d.given} spots of ground picked by hand lie on nothing measured. ` : ''}${d.usedOrder < d.order ? `${d.used} spots support a form of order ${d.usedOrder} and not ${d.order}${d.usedOrder === 0 ? ' (they lie on one line), so no tilt was taken out' : ''}; pick more spots, spread over the map, or lower ground.order.` : 'The others were used.'}`,
};

function signed(value: number): string {
  return value.toFixed(2).replace('-', '−');
}

function amount(value: number, unit: 'A' | 'relative'): string {
  return unit === 'A' ? `${value.toExponential(1)} A` : `${value.toPrecision(2)} (the file's unit)`;
}
