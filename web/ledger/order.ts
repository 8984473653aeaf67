/** In which order and in which groups the ledger's segments stand. */
import type { LedgerEntry } from '../../workers/api.ts';

/** Groups read as units: what glows; what is out of band, as a pair; what a flaw covers; what else is lost. */
export type LedgerGroup = 'usable' | 'uneven' | 'flaw' | 'other';

const groups: readonly LedgerGroup[] = ['usable', 'uneven', 'flaw', 'other'];
const groupOf: Readonly<Record<string, LedgerGroup>> = {
  usable: 'usable', thick: 'uneven', thin: 'uneven', bubble: 'flaw', residue: 'flaw', wrinkle: 'flaw', short: 'flaw', open: 'flaw',
};

export interface OrderedEntry extends LedgerEntry {
  readonly group: LedgerGroup;
}

/** Usable first, then thick and thin side by side, then flaws, then the rest; by area within a group (ties by code), except that thick leads thin. Causes without area are left out. */
export function orderEntries(entries: readonly LedgerEntry[]): readonly OrderedEntry[] {
  return entries
    .filter((entry) => entry.areaUm2 > 0)
    .map((entry) => ({ ...entry, group: groupOf[entry.cause] ?? 'other' }))
    .sort((a, b) => groups.indexOf(a.group) - groups.indexOf(b.group)
      || (a.group === 'uneven' ? b.code - a.code : b.areaUm2 - a.areaUm2 || a.code - b.code));
}

/** Causes that the input does not allow to be tested, by name. */
export function notAssessed(entries: readonly LedgerEntry[]): readonly string[] {
  return entries.filter((entry) => !entry.assessed).map((entry) => entry.cause);
}
