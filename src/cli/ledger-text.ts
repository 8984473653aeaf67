import { isFailed } from '../report/tray.ts';
import type { GoodRow, TrayRow } from '../report/tray.ts';

/** The ledger of every sample as a table: cause, area, share. Causes that hold nothing are left out, those not assessed are said. */
export function ledgerText(rows: readonly TrayRow[]): string {
  return rows.map((row) => (isFailed(row) ? `${row.sample}\n  failed: ${row.error.message}\n` : ledgerOf(row))).join('\n');
}

function ledgerOf(row: GoodRow): string {
  const lines = row.causes.filter(({ areaUm2 }) => areaUm2 > 0).map(({ cause, areaUm2, share }) =>
    `  ${cause.padEnd(12)}${areaUm2.toFixed(3).padStart(12)} µm²${(100 * share).toFixed(2).padStart(8)} %`);
  const silent = row.causes.filter(({ assessed }) => !assessed).map(({ cause }) => cause);
  return [
    row.sample,
    `  ${row.verdict}`,
    ...lines,
    `  ${'footprint'.padEnd(12)}${row.footprintUm2.toFixed(3).padStart(12)} µm²`,
    ...(silent.length > 0 ? [`  not assessed: ${silent.join(', ')}`] : []),
    '',
  ].join('\n');
}
