/** The report's last part: warnings, cautions, recipe, sources, and how another lab gets the same numbers. */
import { bandSection } from '../ledger/recipe.ts';
import { barrierSection } from '../barrier/recipe.ts';
import { flawsSection } from '../flaws/recipe.ts';
import { groundSection } from '../ground/recipe.ts';
import { planSection } from '../plan/recipe.ts';
import { scanSection } from '../read/recipe.ts';
import { stackSection } from '../sheet/recipe.ts';
import type { AppliedRecipe } from './appraised.ts';
import { markup, named } from './markup.ts';
import type { Markup } from './markup.ts';
import { figure, withUnit } from './numbers.ts';
import type { Verdict } from './verdict.ts';

const sections = {
  scan: scanSection, ground: groundSection, flaws: flawsSection, barrier: barrierSection, stack: stackSection, band: bandSection, plan: planSection,
} as const;

/** Published mean breakdown field of hBN along its stacking axis: Hattori et al., ACS Nano 9, 916 (2015). */
const breakdownVPerNm = 1.2;

/** One recipe value that is not the default. */
export interface ChangedValue {
  readonly path: string;
  readonly value: string;
  readonly fallback: string;
  readonly title: string;
}

/** The recipe's values that differ from the defaults, in the recipe's order, with unit; corrections are counted. */
export function changedValues(recipe: AppliedRecipe): ChangedValue[] {
  const changed: ChangedValue[] = [];
  for (const [name, schema] of Object.entries(sections)) {
    const applied: Readonly<Record<string, unknown>> = { ...recipe[name as keyof typeof sections] };
    const fallback: Readonly<Record<string, unknown>> = { ...schema.parse({}) };
    for (const [key, field] of Object.entries(schema.shape)) {
      if (JSON.stringify(applied[key]) === JSON.stringify(fallback[key])) continue;
      const { title, unit, absent } = field.meta() ?? {};
      const show = (value: unknown): string => (value === undefined ? String(absent ?? 'absent') : valueText(value, typeof unit === 'string' ? unit : ''));
      changed.push({ path: `${name}.${key}`, value: show(applied[key]), fallback: show(fallback[key]), title: String(title ?? key) });
    }
  }
  if (recipe.corrections.length > 0) changed.push({ path: 'corrections', value: `${recipe.corrections.length} by hand`, fallback: 'none', title: 'Corrections' });
  return changed;
}

function valueText(value: unknown, unit: string): string {
  if (Array.isArray(value)) return value.length === 0 ? 'none' : `${value.length} given`;
  const text = typeof value === 'object' ? JSON.stringify(value) : String(value);
  return unit === '' ? text : `${text} ${unit}`;
}

export function warningsPart({ warnings }: Verdict): Markup {
  return markup`<section><h2>Warnings</h2>${warnings.length > 0 ? markup`<ul>${warnings.map(({ message }) => markup`<li>${message}</li>`)}</ul>` : markup`<p>None.</p>`}</section>`;
}

/** What a reader must not conclude or do from these numbers alone. */
export function cautionsPart(verdict: Verdict): Markup {
  const { reference, device, ground } = verdict;
  const items = [
    `The breakdown field of hBN along its stacking axis is about ${breakdownVPerNm} V/nm (Hattori et al., ACS Nano 9, 916, 2015) and varies from flake to flake. ${fieldText(reference?.thicknessNm, ground.current?.biasV, device?.biasV)}Raise a bias slowly, with a current limit, and stay well below breakdown.`,
    'A probe presses a far higher field and density through the barrier than a device does. Every prediction for the device extrapolates from the scan, which its interval carries; a scan may also have made shorts of its own.',
    'This report judges the barrier. Contacts, the emitter and what happens during transfer are only in it as far as the recipe describes them.',
    'Bias, probe and laser work follows the rules of your laboratory and is for trained staff; those rules come before anything proposed here.',
  ];
  return markup`<section><h2>Cautions</h2><ul>${items.map((item) => markup`<li>${item}</li>`)}</ul></section>`;
}

function fieldText(thicknessNm: number | undefined, scanV: number | undefined, deviceV: number | undefined): string {
  if (thicknessNm === undefined || !(thicknessNm > 0)) return '';
  const fields = [
    scanV === undefined ? '' : `${withUnit(Math.abs(scanV) / thicknessNm, 'V/nm')} during the scan`,
    deviceV === undefined ? '' : `${withUnit(Math.abs(deviceV) / thicknessNm, 'V/nm')} at the device’s bias`,
  ].filter((field) => field !== '');
  return fields.length > 0 ? `Across the reference terrace the mean field is ${fields.join(' and ')}. ` : '';
}

export function recipePart(recipe: AppliedRecipe): Markup {
  const changed = changedValues(recipe);
  const rows = changed.map(({ path, value, fallback, title }) => markup`<tr><td><code>${path}</code></td><td>${title}</td><td class="changed">${value}</td><td>${fallback}</td></tr>`);
  const table = changed.length === 0
    ? markup`<p>All values are the defaults.</p>`
    : markup`<table><thead><tr><th>path</th><th>meaning</th><th>value</th><th>default</th></tr></thead><tbody>${rows}</tbody></table>`;
  return markup`<section><h2>Recipe</h2>${table}<details><summary>Complete recipe, version ${recipe.version} (JSON)</summary><pre>${JSON.stringify(recipe, null, 2)}</pre></details></section>`;
}

/** Sources by name, and the command that gives this result again. */
export function originPart(verdict: Verdict): Markup {
  const sources = [...verdict.sources].sort((a, b) => (a.name < b.name ? -1 : a.name > b.name ? 1 : 0));
  const rows = sources.map(({ name, sha256, bytes }) => markup`<tr><td>${named(name)}</td><td class="n">${bytes}</td><td><code>${sha256}</code></td></tr>`);
  return markup`<section><h2>Sources and how to reproduce</h2>
<table><thead><tr><th>file</th><th class="n">bytes</th><th>SHA-256</th></tr></thead><tbody>${rows}</tbody></table>
<ol><li>Put these files, under these names, into one folder <code>scans</code>.</li><li>Save the complete recipe above as <code>recipe.json</code>.</li><li>With ${verdict.app.name} ${verdict.app.version}, run:</li></ol>
<pre>npx evenglow appraise scans --recipe recipe.json --out results</pre>
<p class="note">The same bytes and the same recipe give the same files, byte for byte, apart from the timings in verdict.json. The map has ${figure(verdict.map.columns * verdict.map.rows, 12)} pixels; causes.tif books each of them.</p></section>`;
}
