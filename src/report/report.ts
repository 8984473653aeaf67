/** report.html: everything a colleague needs to judge, cite or repeat an appraisal, in one file. */
import type { App, Appraised } from './appraised.ts';
import { markup } from './markup.ts';
import { htmlPage } from './page.ts';
import { barrierPart } from './report-barrier.ts';
import { reportFigures } from './report-figures.ts';
import { flawsPart } from './report-flaws.ts';
import { ledgerPart, scanPart, verdictPart } from './report-ledger.ts';
import { cautionsPart, originPart, recipePart, warningsPart } from './report-origin.ts';
import { thicknessPart } from './report-thickness.ts';
import { verdictOf } from './verdict.ts';

/**
 * The report as one self-contained HTML document: no script, no outside request, light, prints on A4.
 * Every text that comes from a file or a recipe is escaped. The same appraisal gives the same bytes;
 * neither the time of day nor the timings are in it.
 */
export function writeReport(appraised: Appraised, app: App): string {
  const verdict = verdictOf(appraised, app);
  return htmlPage(`${verdict.sample} – ${app.name}`, markup`<main>
${verdictPart(verdict)}
${reportFigures(appraised, verdict)}
${ledgerPart(verdict)}
${scanPart(appraised, verdict)}
${barrierPart(appraised, verdict)}
${thicknessPart(appraised, verdict)}
${flawsPart(appraised, verdict)}
${warningsPart(verdict)}
${cautionsPart(verdict)}
${recipePart(appraised.recipe)}
${originPart(verdict)}
</main>
<footer>${app.name} ${app.version}. Colours of the causes after Okabe &amp; Ito (2008), of the maps cividis (Nuñez, Anderton &amp; Renslow, 2018).</footer>`);
}
