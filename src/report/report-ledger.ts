/** The report's first part: the verdict, the ledger as bar and table, and what the interval contains. */
import type { HeightGround } from '../ground/ground.ts';
import { orderOfTest } from '../ledger/ledger.ts';
import type { Appraised } from './appraised.ts';
import { ledgerBar, swatch } from './ledger-figure.ts';
import { markup, named } from './markup.ts';
import type { Markup } from './markup.ts';
import { counted, decimalsFor, fixed, heightFigure, interval, percent, plain, withUnit } from './numbers.ts';
import { currentLines } from './report-current.ts';
import { textureLine } from './report-texture.ts';
import type { Verdict } from './verdict.ts';

/** Head of the page with verdict sentence, bar and the line of the most important numbers. */
export function verdictPart(verdict: Verdict): Markup {
  const { usable, ledger } = verdict;
  const glows = usable.meaning === 'flaw-free' ? 'from height alone' : usable.knownToGlow ? 'the reference is in the range that glows' : 'the reference is not known to glow';
  return markup`<header>
<p class="over">${named(verdict.sample)}</p>
<h1>${verdict.verdict}</h1>
<p class="facts"><span class="amount">${withUnit(usable.areaUm2, 'µm²')} ${usable.meaning}</span> <span>95 %: ${interval(usable.low95Um2, usable.high95Um2, 'µm²')}</span> <span>${percent(usable.share)} of ${withUnit(ledger.footprintUm2, 'µm²')}</span> <span>largest patch ${withUnit(usable.largestPatchUm2, 'µm²')}</span> <span>${glows}</span></p>
</header>
${ledgerBar(ledger.causes, { width: 1000, height: 40, labels: true })}`;
}

/** The table behind the bar, and the limits of what it says. */
export function ledgerPart(verdict: Verdict): Markup {
  const { ledger, usable } = verdict;
  const flawFree = usable.meaning === 'flaw-free';
  const contents = flawFree ? outlinesText : `${outlinesText}; ground whose current lies near the border between a terrace in band and one out of it; and terraces that the error of the measured ladder, or barrier height (±0.2 eV), mass (×/÷1.2) and contact area (×/÷3.2) where the device’s bias is not the scan’s, would take into the band or out of it`;
  const decimals = decimalsFor(ledger.footprintUm2);
  const rows = ledger.causes.map((row) => markup`<tr${row.areaUm2 > 0 ? '' : markup` class="none"`}><td>${swatch(row.cause)}${row.cause}</td><td>${flawFree && row.cause === 'usable' ? 'no flaw seen in height; whether it conducts is not known' : meaningOf[row.cause] ?? ''}</td><td class="n">${row.assessed || row.areaUm2 > 0 ? fixed(row.areaUm2, decimals) : '–'}</td><td class="n">${row.assessed || row.areaUm2 > 0 ? percent(row.share) : '–'}</td><td class="n">${row.pixels}</td><td>${row.assessed ? 'yes' : 'not assessed'}</td></tr>`);
  const repaired = ledger.repairedUm2 > 0 ? markup` ${withUnit(ledger.repairedUm2, 'µm²')} of broken runs were repaired from their neighbours and booked by the repaired values.` : undefined;
  return markup`<section><h2>Ledger</h2>
<table><thead><tr><th>cause</th><th>meaning</th><th class="n">area, µm²</th><th class="n">share</th><th class="n">pixels</th><th>assessed</th></tr></thead><tbody>${rows}</tbody>
<tfoot><tr><td>footprint</td><td></td><td class="n">${fixed(ledger.footprintUm2, decimals)}</td><td class="n">100 %</td><td class="n">${ledger.footprintPixels}</td><td></td></tr></tfoot></table>
<p class="note">The causes add up to the footprint, pixel by pixel.${repaired} The 95 % interval of ${usable.meaning} ground, ${interval(usable.low95Um2, usable.high95Um2, 'µm²')}, is this map’s: it holds ${contents}. It does not hold another choice of the reference terrace. Position and border errors (a third of a pixel, 0.06 of a layer’s step) are this program’s judgement, not measured. Causes are tested in this order: ${orderOfTest.join(', ')}; what none claims is ${usable.meaning}. A map is a census of its footprint; the interval does not forecast another place or another flake.</p></section>`;
}

const outlinesText = 'where the outlines of flaws and of other ground lie';

const meaningOf: Readonly<Partial<Record<string, string>>> = {
  usable: 'even barrier in band',
  unmeasured: 'current missing, not repairable',
  bubble: 'smooth dome of trapped material; no injection',
  residue: 'contamination: particle, patch or film',
  wrinkle: 'fold or ridge',
  short: 'pinhole, breakdown or leak',
  open: 'dead spot that no flaw in height explains',
  thin: 'density at the device’s bias above the band',
  thick: 'density at the device’s bias below the band',
  starved: 'in band, but the sheets’ voltage drop leaves too little',
  rim: 'within the safety distance of an edge or short',
  stray: 'in band, but too small or cut off',
};

/** Tilt and bow apart where levelling tells them, as the app does. */
function formText({ tiltM, noiseM, levels }: HeightGround): string {
  const nm = (metres: number): string => `${heightFigure(metres * 1e9, noiseM * 1e9)}\u00a0nm`;
  if (!levels) return `${nm(tiltM)} of tilt and bow`;
  if (levels.order === 0) return 'only a level';
  return `${nm(levels.tiltM)} of tilt${levels.order > 1 ? ` and ${nm(levels.bowM)} of ${levels.order > 2 ? 'curvature' : 'bow'}` : ''}`;
}

/** What was scanned: surface, bias, map, channels and what levelling found. */
export function scanPart({ sample, ground }: Appraised, verdict: Verdict): Markup {
  const { map } = verdict;
  const surface = sample.surface === 'barrier'
    ? 'Bare barrier. The emitter’s own bubbles do not exist yet: usable is an upper bound.'
    : 'Finished stack. The emitter spreads the current: no thickness is taken from it.';
  const biases = [...new Set(sample.channels.filter((channel) => channel.biasV !== undefined).map((channel) => `${plain(channel.biasV)}\u00a0V`))].sort();
  const channels = sample.channels.map((channel) => markup`<li>${channel.quantity}, ${channel.direction}${channel.biasV === undefined ? '' : `, ${plain(channel.biasV)}\u00a0V`}: ${named(channel.source)}</li>`);
  const { height, current } = ground;
  return markup`<section><h2>What was scanned</h2><dl>
<dt>Surface</dt><dd>${surface}</dd>
<dt>Bias of the scan</dt><dd>${biases.length > 0 ? `${biases.join(', ')} (sample against tip)` : 'not stated'}</dd>
<dt>Map</dt><dd>${map.columns} × ${map.rows} pixels of ${withUnit(map.pitchXUm * 1000, 'nm')} × ${withUnit(map.pitchYUm * 1000, 'nm')}; ${withUnit(map.columns * map.pitchXUm, 'µm')} × ${withUnit(map.rows * map.pitchYUm, 'µm')}</dd>
<dt>Channels</dt><dd><ul>${channels}</ul></dd>
${height ? markup`<dt>Height</dt><dd>${formText(height)} removed, noise ${withUnit(height.noiseM * 1e9, 'nm')}, ${counted(height.repairedPixels, 'pixel')} repaired</dd>` : markup`<dt>Height</dt><dd>not measured: bubbles, residue and wrinkles cannot be seen</dd>`}
${textureLine(verdict)}
${current ? currentLines(current, ground.returned) : markup`<dt>Current</dt><dd>not measured: shorts, thin and thick ground cannot be seen</dd>`}
</dl></section>`;
}
