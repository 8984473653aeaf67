/** Markdown tables of pooled scores. */
import { causes } from '../../src/ledger/ledger.ts';
import { cleanMeasure, intervalMeasures, measures } from './measures.ts';
import type { Measure } from './measures.ts';
import { f1, poolScores } from './score-pool.ts';
import type { Pool } from './score-pool.ts';
import type { SceneScore } from './score-scene.ts';
import type { SceneResult } from './work.ts';

const none = '–';

export interface Both {
  readonly ours: Pool;
  readonly baseline: Pool;
}

export function both(results: readonly SceneResult[]): Both {
  return { ours: poolScores(results.map(({ ours }) => ours)), baseline: poolScores(results.flatMap(({ baseline }) => (baseline ? [baseline] : []))) };
}

/** Ours and the baseline on the family and on the harder scenes; a group without scenes is a dash. */
export function mainTable(groups: { readonly family: Both; readonly harder: Both; readonly clean: Both; readonly intervals: Both }): string {
  const cells = (measure: Measure, { ours, baseline }: Both): string[] => [ours, baseline].map((pool) => (pool.scenes > 0 ? measure.value(pool) : none));
  const row = (measure: Measure, family: Both | undefined, harder: Both | undefined): string[] => [
    measure.name, measure.family ?? none, ...(family ? cells(measure, family) : [none, none]), measure.harder ?? none, ...(harder ? cells(measure, harder) : [none, none]),
  ];
  return markdown([
    ['measure', 'target family', 'ours', 'baseline', 'target harder', 'ours', 'baseline'],
    ...measures.map((measure) => row(measure, groups.family, groups.harder)),
    row(cleanMeasure, undefined, groups.clean),
    ...intervalMeasures.map((measure) => row(measure, groups.intervals, undefined)),
  ]);
}

/** One column for each kind (or scene), ours only. */
export function kindTable(groups: readonly { readonly name: string; readonly pool: Pool }[]): string {
  return markdown([
    ['measure', ...groups.map(({ name, pool }) => (pool.scenes > 1 ? `${name} (${pool.scenes})` : name))],
    ...[...measures, cleanMeasure, ...intervalMeasures].map((measure) => [measure.name, ...groups.map(({ pool }) => measure.value(pool))]),
  ]);
}

/** Every scene on a few lines, the one with most wrongly booked pixels first: its measures and the larger confusions. */
export function worstList(results: readonly SceneResult[]): string {
  return results
    .map((result) => ({ result, wrong: wrongPixels(result.ours) }))
    .sort((a, b) => b.wrong - a.wrong)
    .map(({ result: { name, ours }, wrong }) => {
      const { bubbles, shorts } = ours;
      const scores = [3, 4, 5].map((code) => `${causes[code]} ${f1(ours.confusion, code).toFixed(3)}`).join(', ');
      return [
        `${name}: ${wrong} px wrong; F1 ${scores}; usable ${ours.usable[0].toFixed(4)} for ${ours.usable[1].toFixed(4)}; level ${ours.levelRatio.toFixed(2)}; wear ${ours.wear[0].toFixed(3)} for ${ours.wear[1].toFixed(3)}; lag ${ours.lag[0] === null ? none : ours.lag[0].toFixed(2)} for ${ours.lag[1].toFixed(2)}`,
        `  bubbles ${bubbles.found} of ${bubbles.there} found, ${bubbles.true} of ${bubbles.claimed} true; shorts ${shorts.found} of ${shorts.there} found, ${shorts.true} of ${shorts.claimed} true; ${ours.flawsReported} flaws reported`,
        `  ${confusions(ours).slice(0, 10).map(({ truth, found, pixels }) => `${truth} as ${found} ${pixels}`).join(', ')}`,
      ].join('\n');
    })
    .join('\n');
}

function wrongPixels(score: SceneScore): number {
  return confusions(score).reduce((sum, { pixels }) => sum + pixels, 0);
}

function confusions({ confusion }: SceneScore): { truth: string; found: string; pixels: number }[] {
  const side = causes.length;
  return confusion
    .map((pixels, k) => ({ truth: causes[Math.floor(k / side)]!, found: causes[k % side]!, pixels }))
    .filter(({ truth, found, pixels }) => pixels > 0 && truth !== found)
    .sort((a, b) => b.pixels - a.pixels);
}

function markdown(rows: readonly (readonly string[])[]): string {
  const widths = rows[0]!.map((_, k) => Math.max(...rows.map((cells) => cells[k]!.length)));
  const line = (cells: readonly string[]): string => `| ${cells.map((cell, k) => cell.padEnd(widths[k]!)).join(' | ')} |`;
  return [line(rows[0]!), `|${widths.map((width) => '-'.repeat(width + 2)).join('|')}|`, ...rows.slice(1).map(line)].join('\n');
}
