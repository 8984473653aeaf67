/** tray.html: the ranking for people, one ledger bar per sample. */
import type { App } from './appraised.ts';
import { ledgerBar, swatch } from './ledger-figure.ts';
import { markup, named } from './markup.ts';
import type { Markup } from './markup.ts';
import { figure, interval, plain, withUnit } from './numbers.ts';
import { htmlPage } from './page.ts';
import { isFailed, rankRows, trayGroups } from './tray.ts';
import type { FailedRow, GoodRow, RankedRow, TrayRow } from './tray.ts';

const headings = {
  glows: ['Known to glow', 'The reference terrace carries a density in the range that glows. These samples compare with each other.'],
  even: ['Even, but not known to glow', 'Each of these is even about a reference of its own, so their areas do not compare: they are not ranked by area, but listed by name, those that meet their required area first.'],
  'flaw-free': ['From height alone', 'No current was measured: the area is free of visible flaws, which does not say that it conducts evenly.'],
} as const;

/** The tray as one self-contained page; reports are linked where a row knows its folder. */
export function writeTrayPage(rows: readonly TrayRow[], app: App): string {
  const ranked = rankRows(rows);
  const good = ranked.filter((row): row is GoodRow & { rank?: number } => !isFailed(row));
  const failed = ranked.filter(isFailed);
  const present = new Map(good.flatMap((row) => row.causes.filter(({ areaUm2 }) => areaUm2 > 0).map(({ cause }) => [cause, swatch(cause)])));
  const keys = good[0]?.causes.filter(({ cause }) => present.has(cause)).map(({ cause }) => markup`<span>${present.get(cause)}${cause}</span>`) ?? [];
  return htmlPage(`Tray – ${app.name}`, markup`<main><header><p class="over">Tray</p><h1>${headline(good, failed)}</h1><div class="keys">${keys}</div></header>
${trayGroups.map((group) => groupPart(group, good.filter((row) => row.group === group)))}
${failedPart(failed)}</main>
<footer>${app.name} ${app.version}. Colours of the causes after Okabe &amp; Ito (2008).</footer>`);
}

function headline(good: readonly GoodRow[], failed: readonly FailedRow[]): string {
  const asked = good.filter((row) => row.requirementMet !== undefined);
  const met = asked.filter((row) => row.requirementMet).length;
  const requirement = asked.length > 0 ? `, ${met} of ${asked.length} ${asked.length === 1 ? 'meets' : 'meet'} the required area` : '';
  const failures = failed.length > 0 ? `; ${failed.length} failed` : '';
  return `${good.length} ${good.length === 1 ? 'sample' : 'samples'} appraised${requirement}${failures}.`;
}

function groupPart(group: (typeof trayGroups)[number], rows: readonly RankedRow[]): Markup | undefined {
  if (rows.length === 0) return undefined;
  const [title, note] = headings[group];
  const lines = rows.filter((row): row is GoodRow & { rank?: number } => !isFailed(row)).map((row) => markup`<tr><td class="n">${row.rank}</td><td class="name">${sampleName(row)}${requirementText(row)}</td><td class="booked">${ledgerBar(row.causes, { width: 320, height: 26, labels: false })}</td><td class="n">${figure(row.usableUm2)}<br><span class="note">${interval(row.low95Um2, row.high95Um2, '')}</span></td><td class="n">${figure(row.largestPatchUm2)}</td><td class="n">${figure(row.footprintUm2)}</td><td class="n">${densityText(row)}</td></tr>`);
  const area = group === 'flaw-free' ? 'flaw-free, µm²' : 'usable, µm²';
  return markup`<section><h2>${title}</h2><p class="note">${note}</p><table class="tray"><thead><tr><th class="n rank"></th><th class="name">sample</th><th class="booked">ledger</th><th class="n wide">${area}<br>95 %</th><th class="n">largest<br>patch</th><th class="n">of</th><th class="n wide">density<br>at bias</th></tr></thead><tbody>${lines}</tbody></table></section>`;
}

function sampleName({ sample, folder }: GoodRow): Markup {
  return folder === undefined ? named(sample) : markup`<a href="${encodeURIComponent(folder)}/report.html">${named(sample)}</a>`;
}

function requirementText({ requirementMet }: GoodRow): Markup | undefined {
  if (requirementMet === undefined) return undefined;
  return markup`<br><span class="note">${requirementMet ? 'meets the requirement' : 'misses the requirement'}</span>`;
}

function densityText({ medianNaPerUm2, low95NaPerUm2, high95NaPerUm2, deviceBiasV, biasProposed }: GoodRow): Markup {
  if (medianNaPerUm2 === undefined) return markup`–`;
  return markup`${withUnit(medianNaPerUm2, 'nA/µm²', 2)} <br><span class="note">${interval(low95NaPerUm2, high95NaPerUm2, '', 2)}<br>at ${biasProposed ? withUnit(deviceBiasV, 'V') : `${plain(deviceBiasV)}\u00a0V`}</span>`;
}

function failedPart(rows: readonly FailedRow[]): Markup | undefined {
  if (rows.length === 0) return undefined;
  const lines = rows.map(({ sample, error }) => markup`<tr><td>${named(sample)}</td><td>${error.message}</td><td><code>${error.code}</code></td></tr>`);
  return markup`<section><h2>Failed</h2><table><thead><tr><th>sample</th><th>what is wrong and what to do</th><th>code</th></tr></thead><tbody>${lines}</tbody></table></section>`;
}
