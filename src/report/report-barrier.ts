/** The report's part on the barrier: reference, layer ladder beside the model's, and the device's density. */
import type { Appraised } from './appraised.ts';
import { markup } from './markup.ts';
import type { Markup } from './markup.ts';
import { currentText, figure, fixed, interval, percent, plain, withPrefix, withUnit } from './numbers.ts';
import type { Verdict } from './verdict.ts';

const bounds = { exact: '', 'at-most': 'at most (saturated)', 'at-least': 'at least (at the floor)' } as const;
const origins = {
  map: 'measured on this map’s terraces',
  model: 'from the model, because the map shows fewer than two terraces',
  assumed: 'assumed, because neither the map nor a bias gives it',
} as const;

/** Nothing for a sample without current. */
export function barrierPart({ ground, barrier }: Appraised, verdict: Verdict): Markup | undefined {
  const { reference, ladder } = verdict;
  if (barrier === undefined || reference === undefined || ladder === undefined) return undefined;
  const unit = ground.current?.unit ?? 'A';
  const layers = reference.layers === undefined ? 'not anchored' : `${reference.layers} (${withUnit(reference.thicknessNm, 'nm')})`;
  const rows = [...ladder.rungs].sort((a, b) => a.step - b.step).map((rung) => markup`<tr><td>${stepText(rung.step)}</td><td class="n">${rung.layers ?? '–'}</td><td class="n">${figure(rung.areaUm2)}</td><td class="n">${currentText(10 ** rung.medianLog10, unit)}</td><td class="n">${fixed(rung.scatterDecades, 2)}</td><td>${bounds[rung.bound]}</td></tr>`);
  return markup`<section><h2>Reference, ladder and device</h2><dl>
<dt>Reference terrace</dt><dd>${withUnit(reference.areaUm2, 'µm²')}, ${percent(reference.shareOfUnflawed)} of the unflawed ground; median current ${currentText(barrier.reference.median, unit)}</dd>
<dt>Layers</dt><dd>${layers}</dd>
<dt>Step per layer</dt><dd>${stepSize(ladder)}</dd>
${devicePart(verdict)}
</dl>
<table><thead><tr><th>terrace</th><th class="n">layers</th><th class="n">area, µm²</th><th class="n">median current</th><th class="n">scatter, decades</th><th>bound</th></tr></thead><tbody>${rows}</tbody></table></section>`;
}

function stepText(step: number): string {
  if (step === 0) return 'reference';
  return `${step > 0 ? '+' : '−'}${Math.abs(step)} ${Math.abs(step) === 1 ? 'layer' : 'layers'}`;
}

function stepSize(ladder: NonNullable<Verdict['ladder']>): string {
  const model = ladder.modelStepDecades === undefined ? '' : `; the model gives ${withUnit(ladder.modelStepDecades, 'decades')}`;
  const spread = Number.isFinite(ladder.stepSeDecades) && ladder.stepSeDecades > 0 ? ` ± ${fixed(ladder.stepSeDecades, 3)}` : '';
  return `${figure(ladder.stepDecades)}${spread} decades of current, ${origins[ladder.from]}${model}`;
}

/** No absolute density without its interval. */
function devicePart({ device, reference }: Verdict): Markup {
  if (device === undefined) return markup`<dt>Device</dt><dd>not assessed; the remarks say why</dd>`;
  const glow = reference?.inRange === undefined ? '' : reference.inRange ? ' Within the range that glows.' : ' Outside the range that glows.';
  return markup`<dt>Device bias</dt><dd>${device.proposed ? withUnit(device.biasV, 'V') : `${plain(device.biasV)}\u00a0V`}, ${device.proposed ? 'proposed: there the reference carries the target density' : 'given'}</dd>
<dt>Density there</dt><dd>${withUnit(device.medianNaPerUm2, 'nA/µm²')} on the reference before any voltage drop (95 %: ${interval(device.low95NaPerUm2, device.high95NaPerUm2, 'nA/µm²', 2)}, from contact area, barrier height and mass).${glow}</dd>
<dt>Extrapolated</dt><dd>from ${withUnit(device.probeFieldVPerNm, 'V/nm')} under the probe to ${withUnit(device.fieldVPerNm, 'V/nm')} in the device, ${figure(device.fieldRatio, 2)} times the field that was measured at</dd>${currentPart(device)}`;
}

function currentPart({ currentA, currentLow95A, currentHigh95A, shortShareOfCurrent, censored }: NonNullable<Verdict['device']>): Markup | undefined {
  if (currentA === undefined) return undefined;
  const shorts = shortShareOfCurrent === undefined ? '' : `; ${percent(shortShareOfCurrent)} of it through shorts, taken as ohmic`;
  const bound = censored ? ' Pixels saturated in the scan, so this is a lower bound.' : '';
  return markup`<dt>Whole device</dt><dd>${withPrefix(currentA, 'A')} (95 %: ${withPrefix(currentLow95A, 'A', 2)} – ${withPrefix(currentHigh95A, 'A', 2)})${shorts}.${bound}</dd>`;
}
