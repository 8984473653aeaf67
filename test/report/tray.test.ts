import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { Appraisal } from '../../src/evaluate/appraisal.ts';
import { writeTrayPage } from '../../src/report/tray-page.ts';
import { failedTrayRow, rankRows, rowFromVerdict, trayHeader, trayRowSchema, writeTrayCsv, writeTrayLines } from '../../src/report/tray.ts';
import type { GoodRow } from '../../src/report/tray.ts';
import { verdictOf } from '../../src/report/verdict.ts';
import { createAppraisal, createHeightOnlyAppraisal, createRelativeAppraisal } from '../fixtures/create-appraisal.ts';

const app = { name: 'Evenglow', version: '0.1.0' };
const trayRow = (appraisal: Appraisal, folder?: string): GoodRow => rowFromVerdict(verdictOf(appraisal, app), folder);
const base = trayRow(createAppraisal(), 'flake 04');
const row = (sample: string, change: Partial<GoodRow> = {}): GoodRow => ({ ...base, sample, ...change });
const failed = failedTrayRow('=broken', { code: 'map-all-missing', message: 'x.tif: every <height> value is missing; export the channel again.' });

describe('tray rows', () => {
  it('carries the numbers of the verdict', () => {
    assert.equal(base.group, 'glows');
    assert.deepEqual([base.usableUm2, base.largestPatchUm2, base.footprintUm2, base.referenceLayers, base.medianNaPerUm2, base.flaws, base.warnings], [2, 1.625, 5.625, 12, 1, 5, 1]);
    assert.ok(!('requirementMet' in base));
    const { recipe } = createAppraisal();
    const asked = (requiredUm2: number) => trayRow(createAppraisal({ recipe: { ...recipe, plan: { ...recipe.plan, requiredUm2 } } }));
    assert.equal(asked(2).requirementMet, true);
    assert.equal(asked(2.01).requirementMet, false);
    assert.equal(trayRow(createHeightOnlyAppraisal()).group, 'flaw-free');
    assert.equal(trayRow(createRelativeAppraisal()).group, 'even');
  });

  it('ranks by the largest patch where no area is asked for, groups apart, failures last', () => {
    const ranked = rankRows([
      failed, row('h', { group: 'flaw-free', largestPatchUm2: 99 }), row('b', { largestPatchUm2: 3, usableUm2: 3 }),
      row('a', { largestPatchUm2: 2, usableUm2: 9 }), row('e', { group: 'even', largestPatchUm2: 50 }), row('c', { largestPatchUm2: 3, usableUm2: 1 }),
    ]);
    assert.deepEqual(ranked.map(({ sample, rank }) => [sample, rank]), [['b', 1], ['c', 2], ['a', 3], ['e', undefined], ['h', 1], ['=broken', undefined]]);
  });

  it('orders even ground by requirement and name, never by area across private references, and gives it no rank', () => {
    const even = (sample: string, change: Partial<GoodRow>) => row(sample, { group: 'even', ...change });
    const plainly = rankRows([even('c', { largestPatchUm2: 9, usableUm2: 9 }), even('a', { largestPatchUm2: 1 }), even('b', { largestPatchUm2: 5 })]);
    assert.deepEqual(plainly.map(({ sample, rank }) => [sample, rank]), [['a', undefined], ['b', undefined], ['c', undefined]]);
    const asked = rankRows([even('a', { requirementMet: false, usableUm2: 4 }), even('d', { requirementMet: true, usableUm2: 5 }), even('c', { requirementMet: true, usableUm2: 1 })]);
    assert.deepEqual(asked.map(({ sample }) => sample), ['c', 'd', 'a']);
    assert.match(writeTrayPage(plainly, app), /not ranked by area/);
  });

  it('ranks by requirement, then usable area', () => {
    const ranked = rankRows([
      row('misses', { requirementMet: false, usableUm2: 4 }), row('meets', { requirementMet: true, usableUm2: 6, largestPatchUm2: 1 }),
      row('meets more', { requirementMet: true, usableUm2: 7, largestPatchUm2: 0.5 }), row('misses more', { requirementMet: false, usableUm2: 1 }),
    ]);
    assert.deepEqual(ranked.map(({ sample }) => sample), ['meets more', 'meets', 'misses', 'misses more']);
  });
});

describe('tray files', () => {
  it('writes one CSV line per sample, failures with their error and safe names', () => {
    const lines = writeTrayCsv([failed, base]).trimEnd().split('\n');
    assert.equal(lines[0], trayHeader.join(','));
    const cells = lines[1]?.split(',') ?? [];
    assert.deepEqual(cells.slice(0, 11), ['flake 04', 'glows', '1', '', '2', '0.355555555556', '1.7', '2.2', '1.625', '5.625', '12']);
    assert.equal(lines[2], `'=broken,failed${','.repeat(trayHeader.length - 3)}map-all-missing,x.tif: every <height> value is missing; export the channel again.`);
    // Not assessed: empty, not nought.
    const unassessed = row('x', { causes: base.causes.map((cause) => (cause.cause === 'starved' ? { ...cause, areaUm2: 0 } : cause)) });
    assert.equal(writeTrayCsv([unassessed]).split('\n')[1]?.split(',')[trayHeader.indexOf('starved_um2')], '');
  });

  it('writes JSON lines that its own schema reads back', () => {
    const lines = writeTrayLines([failed, base]).trimEnd().split('\n');
    assert.deepEqual(lines.map((line) => trayRowSchema.parse(JSON.parse(line))), [base, failed]);
    assert.equal(JSON.parse(lines[0] ?? '').rank, 1);
  });

  it('shows bars, links that stay inside the tray, and failures with their sentence', () => {
    const html = writeTrayPage([failed, base, row('<b>x', { folder: '../../etc', group: 'even' })], app);
    assert.equal(html.match(/class="ledger-bar"/g)?.length, 2);
    assert.ok(html.includes('href="flake%2004/report.html"') && html.includes('href="..%2F..%2Fetc/report.html"'));
    assert.ok(html.includes('every &lt;height&gt; value is missing') && html.includes('<bdi>&lt;b&gt;x</bdi>'));
    assert.ok(html.includes('2 samples appraised; 1 failed.'));
    assert.doesNotMatch(html, /<script|<link|undefined|NaN/);
  });

  it('gives the same bytes in whatever order the samples come', () => {
    const rows = [failed, base, row('z'), row('y')];
    const reversed = [...rows].reverse();
    assert.equal(writeTrayPage(rows, app), writeTrayPage(reversed, app));
    assert.equal(writeTrayCsv(rows), writeTrayCsv(reversed));
  });
});
