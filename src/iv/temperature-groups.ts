/** Rows of one table taken at different temperatures. */

/** Temperatures closer than this to the next one are one temperature that wandered. */
const gapK = (temperatureK: number): number => Math.max(0.3, 0.005 * temperatureK);

/**
 * Parts rows where the sorted temperatures leave a gap of more than 0.3 K or 0.5 %; each group has the
 * mean of its rows, and keeps their order. Groups rise in temperature; rows without one come last.
 * Always at least one group.
 */
export function temperatureGroups<Row>(rows: readonly Row[], temperatureOf: (row: Row) => number): { rows: readonly Row[]; temperatureK: number | undefined }[] {
  const known = rows.map(temperatureOf).filter((value) => value === value).sort((a, b) => a - b);
  const tops: number[] = [];
  known.forEach((value, k) => {
    if (k + 1 === known.length || known[k + 1]! - value > gapK(value)) tops.push(value);
  });
  const groups = tops.map((top, k) => {
    const members = rows.filter((row) => temperatureOf(row) <= top && !(k > 0 && temperatureOf(row) <= tops[k - 1]!));
    const sum = members.reduce((total, row) => total + temperatureOf(row), 0);
    return { rows: members as readonly Row[], temperatureK: (sum / members.length) as number | undefined };
  });
  const without = rows.filter((row) => Number.isNaN(temperatureOf(row)));
  if (without.length > 0 || groups.length === 0) groups.push({ rows: without, temperatureK: undefined });
  return groups;
}
