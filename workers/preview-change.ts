/** A full result moved by the difference between two quick looks, so that what a look itself gets wrong is not taken for the handle's doing. */
import type { Preview as QuickLook } from '../src/evaluate/preview.ts';
import type { Flaw, FlawThresholds } from '../src/flaws/flaws.ts';
import type { Ledger } from '../src/ledger/ledger.ts';
import { rounded, toUm2 } from '../src/report/units.ts';
import { flawCounts } from '../src/report/verdict.ts';
import type { FlawCause, LedgerEntry } from './api.ts';

/** The numbers of a quick look; its maps are not kept. */
export interface Look {
  /** Of the footprint, in the order of the ledger's rows. */
  readonly shares: readonly number[];
  readonly counts: Readonly<Record<FlawCause, number>>;
  readonly thresholds?: FlawThresholds;
}

export function looked({ flaws, ledger }: QuickLook): Look {
  return { shares: ledger.rows.map(({ share }) => share), counts: flawCounts(flaws.list), ...(flaws.thresholds ? { thresholds: flaws.thresholds } : {}) };
}

/**
 * The full ledger with what changes from one look to the other. A cause loses no more than it has; what the others gain is then less in proportion, so that the
 * areas still add up to the footprint.
 */
export function movedLedger({ rows, footprintM2, footprintPixels }: Pick<Ledger, 'rows' | 'footprintM2' | 'footprintPixels'>, before: Look, now: Look): readonly LedgerEntry[] {
  const changes = rows.map(({ share }, k) => Math.max(-share, now.shares[k]! - before.shares[k]!));
  const sum = (sign: 1 | -1): number => changes.reduce((total, change) => total + Math.max(0, sign * change), 0);
  const [lost, gained] = [sum(-1), sum(1)];
  const kept = gained > 0 ? Math.min(1, lost / gained) : 0;
  return rows.map(({ code, cause, share: full, assessed }, k) => {
    const change = changes[k]!;
    const share = Math.max(0, full + (change > 0 ? kept * change : change));
    return { code, cause, areaUm2: toUm2(share * footprintM2), pixels: Math.round(share * footprintPixels), share: rounded(share), assessed };
  });
}

/** The full result's number of flaws of each cause with what changes from one look to the other; never below none. */
export function movedCounts(list: readonly Flaw[], before: Look, now: Look): Readonly<Record<FlawCause, number>> {
  const full = flawCounts(list);
  const moved = (cause: FlawCause): number => Math.max(0, full[cause] + now.counts[cause] - before.counts[cause]);
  return { bubble: moved('bubble'), residue: moved('residue'), wrinkle: moved('wrinkle'), short: moved('short'), open: moved('open') };
}
