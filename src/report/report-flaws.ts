/** The report's part on flaws: how many, how dense, what the scan lines may have missed, and the largest ones. */
import { correctionWords } from '../flaws/correction-words.ts';
import type { Flaw } from '../flaws/flaws.ts';
import type { CorrectionEntry } from '../flaws/recipe.ts';
import type { Appraised } from './appraised.ts';
import { swatch } from './ledger-figure.ts';
import { markup } from './markup.ts';
import type { Markup } from './markup.ts';
import { counted, figure, fixed, heightFigure, interval, percent, withUnit } from './numbers.ts';
import { toNm, toUm, toUm2 } from './units.ts';
import type { Verdict } from './verdict.ts';

const shown = 100;

export function flawsPart({ flaws, ground, recipe }: Appraised, verdict: Verdict): Markup {
  const { count, densityPerUm2: density, shorts, expectedMissedShorts } = verdict.flaws;
  // What the input does not show is not counted as none.
  const counts = [
    ...(ground.height ? [counted(count.bubble, 'bubble'), counted(count.residue, 'patch of residue', 'patches of residue'), counted(count.wrinkle, 'wrinkle')] : []),
    ...(ground.current ? [counted(count.short, 'short'), counted(count.open, 'open spot')] : []),
  ].join(', ');
  const shortsLine = shorts
    ? markup`<p>${shorts.seen} ${shorts.seen === 1 ? 'short' : 'shorts'} seen. Scan lines cross about ${percent(shorts.crossedShare)} of shorts that are points; for those met on one line only, about ${figure(expectedMissedShorts, 2)} more are expected. Density of shorts ${withUnit(shorts.densityPerUm2.estimate, '/µm²', 2)} (95 %: ${interval(shorts.densityPerUm2.low95, shorts.densityPerUm2.high95, '/µm²', 2)}).</p>`
    : markup`<p>Shorts cannot be seen without a current map.</p>`;
  return markup`<section><h2>Flaws</h2>
<p>${counts}: ${withUnit(density.estimate, '/µm²')} (95 %: ${interval(density.low95, density.high95, '/µm²')}, exact Poisson).</p>
${verdict.flaws.thresholds ? limitsLine(verdict.flaws.thresholds) : undefined}
${shortsLine}
${verdict.corrections ? correctionsList(recipe.corrections, verdict.corrections.applied) : undefined}
${flaws.list.length > 0 ? flawTable(flaws.list, ground.height && toNm(ground.height.noiseM)) : undefined}</section>`;
}

/** What the limits in force mean on this map. */
function limitsLine(limits: NonNullable<Verdict['flaws']['thresholds']>): Markup | undefined {
  const rise = limits.heightNm === undefined ? undefined
    : `Sought from ${withUnit(limits.heightNm, 'nm')} above the ground up${limits.heightOverNoise === undefined ? '' : `, ${figure(limits.heightOverNoise)} times this map’s noise of ${withUnit(limits.heightNoiseNm, 'nm')}`}${limits.heightRuledBy === 'noise' ? ' (the limit by noise rules)' : ''}.`;
  const drop = limits.dropDecades === undefined ? undefined
    : `${rise === undefined ? 'A' : ' A'} current counts as lost when it is lower by ${figure(limits.dropDecades)} decades (powers of ten), ${figure(limits.dropLayers, 2)} layers${limits.layerFrom === 'map' ? ' of this map’s ladder' : limits.layerFrom === 'model' ? ' by the model' : ', a decade a layer assumed'}${limits.dropOverNoise === undefined ? '' : ` and ${figure(limits.dropOverNoise)} times the noise of its logarithm`}.`;
  return rise === undefined && drop === undefined ? undefined : markup`<p class="note">${rise ?? ''}${drop ?? ''}</p>`;
}

/** In the order in which they are applied. */
function correctionsList(corrections: readonly CorrectionEntry[], applied: number): Markup {
  const more = corrections.length - shown;
  return markup`<h3>Corrections by hand</h3>
<p>${applied} of ${corrections.length} met something and were applied, in this order.</p>
<ol>${corrections.slice(0, shown).map((entry) => markup`<li>${correctionWords(entry)}</li>`)}</ol>
${more > 0 ? markup`<p class="note">The first ${shown}; ${more} more are in the recipe below.</p>` : undefined}`;
}

/** Largest first; equal areas in the order of their numbers. */
function flawTable(list: readonly Flaw[], noiseNm: number | undefined): Markup {
  const sorted = [...list].sort((a, b) => b.areaM2 - a.areaM2 || a.flaw - b.flaw);
  const rows = sorted.slice(0, shown).map((flaw) => markup`<tr><td class="n">${flaw.flaw}</td><td>${swatch(flaw.cause)}${flaw.cause}</td><td class="n">${figure(toUm2(flaw.areaM2))}</td><td class="n">${fixed(toUm(flaw.xM), 2)}</td><td class="n">${fixed(toUm(flaw.yM), 2)}</td><td class="n">${heightFigure(toNm(flaw.peakM), noiseNm)}</td><td class="n">${figure(flaw.heightToRadius, 2)}</td><td>${flaw.reason}</td><td class="n">${fixed(flaw.confidence, 2)}</td></tr>`);
  const more = sorted.length - shown;
  return markup`<table><thead><tr><th class="n">no.</th><th>cause</th><th class="n">area, µm²</th><th class="n">x, µm</th><th class="n">y, µm</th><th class="n">peak, nm</th><th class="n">h/R</th><th>reason</th><th class="n">confidence</th></tr></thead><tbody>${rows}</tbody></table>
${more > 0 ? markup`<p class="note">The ${shown} largest; ${more} more are in flaws.csv.</p>` : undefined}`;
}
