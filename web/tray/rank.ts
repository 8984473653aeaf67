/** The order of the tray: what needs an answer, then the appraised in their groups, then what is at work, then what failed. */
import type { SampleSummary } from '../../workers/api.ts';
import type { SampleState } from '../session/state.ts';

/** Appraised samples are ranked in three groups apart, because their areas do not mean the same. */
export const groupNames = ['asking', 'glows', 'even', 'flaw-free', 'at-work', 'failed'] as const;
export type GroupName = (typeof groupNames)[number];

export interface RankedSample {
  readonly sample: SampleState;
  /** Place within its group, from 1; absent where nothing is ranked. */
  readonly rank?: number;
}

export interface Group {
  readonly name: GroupName;
  readonly rows: readonly RankedSample[];
}

/**
 * Groups that are not empty. Within a ranked group, as in the command line's tray: with a required area those that have it
 * first, then by usable area; without one by the largest patch; ties by name. Even ground that is not known to glow is ordered by requirement and
 * name alone and has no ranks: each sample's reference is its own, so their areas do not compare. Others keep the order they came in.
 */
export function rankSamples(samples: readonly SampleState[], requiredUm2: number | undefined): Group[] {
  return groupNames.flatMap((name): Group[] => {
    const members = samples.filter((sample) => groupOf(sample) === name);
    if (members.length === 0) return [];
    if (name === 'even') return [{ name, rows: [...members].sort((a, b) => metOrder(a, b, requiredUm2) || nameOrder(a, b)).map((sample) => ({ sample })) }];
    if (!isRanked(name)) return [{ name, rows: members.map((sample) => ({ sample })) }];
    const sorted = [...members].sort((a, b) => order(a, b, requiredUm2));
    return [{ name, rows: sorted.map((sample, i) => ({ sample, rank: i + 1 })) }];
  });
}

export function isRanked(name: GroupName): boolean {
  return name === 'glows' || name === 'flaw-free';
}

/** A sample with a result keeps its place while it is computed anew. */
export function groupOf({ status, summary }: SampleState): GroupName {
  if (status === 'asking') return 'asking';
  if (status === 'failed') return 'failed';
  if (summary !== undefined) return groupOfSummary(summary);
  return status === 'cancelled' ? 'failed' : 'at-work';
}

function groupOfSummary({ usable }: SampleSummary): GroupName {
  if (usable.meaning === 'flaw-free') return 'flaw-free';
  return usable.knownToGlow ? 'glows' : 'even';
}

function order(a: SampleState, b: SampleState, requiredUm2: number | undefined): number {
  const first = a.summary!.usable;
  const second = b.summary!.usable;
  if (requiredUm2 === undefined) return second.largestPatchUm2 - first.largestPatchUm2 || nameOrder(a, b);
  return metOrder(a, b, requiredUm2) || second.areaUm2 - first.areaUm2 || nameOrder(a, b);
}

function metOrder(a: SampleState, b: SampleState, requiredUm2: number | undefined): number {
  if (requiredUm2 === undefined) return 0;
  return Number(b.summary!.usable.areaUm2 >= requiredUm2) - Number(a.summary!.usable.areaUm2 >= requiredUm2);
}

const nameOrder = (a: SampleState, b: SampleState): number => (a.name < b.name ? -1 : a.name > b.name ? 1 : 0);
