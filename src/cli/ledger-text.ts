import { isFailed } from '../report/tray.ts';
import type { GoodRow, TrayRow } from '../report/tray.ts';

/** The ledger of every sample as a table: cause, area, share. Causes that hold nothing are left out, those not assessed are said. */
export function ledgerText(rows: readonly TrayRow[]): string {
  return rows.map((row) => (isFailed(row) ? `${row.sample}\n  failed: ${row.error.message}\n` : ledgerOf(row))).join('\n');
}

function ledgerOf(row: GoodRow): string {
  const lines = row.causes.filter(({ areaUm2 }) => areaUm2 > 0).map(({ cause, areaUm2, share }) =>
    `  ${named(row, cause).padEnd(12)}${areaText(areaUm2)} µm²${(100 * share).toFixed(2).padStart(8)} %`);
  const silent = row.causes.filter(({ assessed }) => !assessed).map(({ cause }) => cause);
  return [
    row.sample,
    `  ${row.verdict}`,
    ...lines,
    `  ${'footprint'.padEnd(12)}${areaText(row.footprintUm2)} µm²`,
    ...(silent.length > 0 ? [`  not assessed: ${silent.join(', ')}`] : []),
    '',
  ].join('\n');
}

/** Without a current, what is left is free of flaws, not usable. */
function named(row: GoodRow, cause: string): string {
  return cause === 'usable' && row.group === 'flaw-free' ? 'flaw-free' : cause;
}

/** Three decimals, or four digits where that would say nothing. */
function areaText(areaUm2: number): string {
  return (areaUm2 >= 0.1 ? areaUm2.toFixed(3) : areaUm2.toPrecision(3)).padStart(14);
}
