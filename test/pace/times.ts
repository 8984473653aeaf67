/** Times of repeated work and how they are printed. */

/** Milliseconds of one piece of work over several repeats. */
export interface Times {
  readonly minMs: number;
  readonly medianMs: number;
}

/** @param ms at least one measurement. */
export function timesOf(ms: readonly number[]): Times {
  const sorted = [...ms].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  const median = sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
  return { minMs: sorted[0]!, medianMs: median };
}

/** Milliseconds that `work` took. */
export function timed(work: () => void): number {
  const start = performance.now();
  work();
  return performance.now() - start;
}

/** The same for work that waits. */
export async function timedAsync(work: () => Promise<void>): Promise<number> {
  const start = performance.now();
  await work();
  return performance.now() - start;
}

/** Lines of equal columns: the first to the left, the others to the right. */
export function aligned(rows: readonly (readonly string[])[]): string {
  const widths: number[] = [];
  for (const row of rows) for (const [c, cell] of row.entries()) widths[c] = Math.max(widths[c] ?? 0, cell.length);
  return rows.map((row) => `  ${row.map((cell, c) => (c === 0 ? cell.padEnd(widths[c]!) : cell.padStart(widths[c]!))).join('  ')}`.trimEnd()).join('\n');
}

/** One digit below 100 ms, none above. */
export function shownMs(ms: number): string {
  return ms.toFixed(ms < 100 ? 1 : 0);
}
