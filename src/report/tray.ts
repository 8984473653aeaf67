/** The tray: one row per sample, ranked, and the files tray.csv and tray.jsonl. */
import { z } from 'zod';
import { causes } from '../ledger/ledger.ts';
import { writeCsv } from './csv.ts';
import type { Cell } from './csv.ts';
import type { Verdict } from './verdict.ts';

/**
 * Groups are ranked apart, because their areas do not mean the same: ground whose reference is known to
 * glow, ground that is even about a reference of its own, and ground that is only free of flaws in height.
 */
export const trayGroups = ['glows', 'even', 'flaw-free'] as const;

const goodRow = z.object({
  sample: z.string(),
  /** Folder of the sample's results, relative to the tray's files. */
  folder: z.string().optional(),
  group: z.enum(trayGroups),
  verdict: z.string(),
  /** Absent when the recipe asks for no area. */
  requirementMet: z.boolean().optional(),
  footprintUm2: z.number(),
  usableUm2: z.number(),
  share: z.number(),
  low95Um2: z.number(),
  high95Um2: z.number(),
  largestPatchUm2: z.number(),
  referenceLayers: z.number().optional(),
  deviceBiasV: z.number().optional(),
  /** True when the bias is the program's proposal, not given. */
  biasProposed: z.boolean().optional(),
  medianNaPerUm2: z.number().optional(),
  low95NaPerUm2: z.number().optional(),
  high95NaPerUm2: z.number().optional(),
  flaws: z.number(),
  warnings: z.number(),
  causes: z.array(z.object({ cause: z.enum(causes), areaUm2: z.number(), share: z.number(), assessed: z.boolean() })),
});
const failedRow = z.object({ sample: z.string(), error: z.object({ code: z.string(), message: z.string() }) });

/** One line of tray.jsonl, without its rank: a rank belongs to a tray, and trays are merged. */
export const trayRowSchema = z.union([failedRow, goodRow]);
export type GoodRow = z.output<typeof goodRow>;
export type FailedRow = z.output<typeof failedRow>;
export type TrayRow = GoodRow | FailedRow;
export type RankedRow = TrayRow & { readonly rank?: number };

export function isFailed(row: TrayRow): row is FailedRow {
  return 'error' in row;
}

/** The row of an appraised sample from its verdict; `folder` is where its results lie, relative to the tray's files. */
export function rowFromVerdict({ sample, verdict, usable, ledger, reference, device, flaws, warnings, recipe }: Verdict, folder?: string): GoodRow {
  const required = recipe.plan.requiredUm2;
  return {
    sample,
    ...(folder === undefined ? {} : { folder }),
    group: usable.meaning === 'flaw-free' ? 'flaw-free' : usable.knownToGlow ? 'glows' : 'even',
    verdict,
    ...(required === undefined ? {} : { requirementMet: usable.areaUm2 >= required }),
    footprintUm2: ledger.footprintUm2,
    usableUm2: usable.areaUm2,
    share: usable.share,
    low95Um2: usable.low95Um2,
    high95Um2: usable.high95Um2,
    largestPatchUm2: usable.largestPatchUm2,
    ...(reference?.layers === undefined ? {} : { referenceLayers: reference.layers }),
    ...(device === undefined ? {} : {
      deviceBiasV: device.biasV, biasProposed: device.proposed, medianNaPerUm2: device.medianNaPerUm2, low95NaPerUm2: device.low95NaPerUm2, high95NaPerUm2: device.high95NaPerUm2,
    }),
    flaws: Object.values(flaws.count).reduce((sum, count) => sum + count, 0),
    warnings: warnings.length,
    causes: ledger.causes.map(({ cause, areaUm2, share, assessed }) => ({ cause, areaUm2, share, assessed })),
  };
}

/** The row of a sample that could not be appraised. */
export function failedTrayRow(sample: string, error: { readonly code: string; readonly message: string }): FailedRow {
  return { sample, error: { code: error.code, message: error.message } };
}

/**
 * Rows in the order of the groups, failures last. Within a group: those that meet their requirement, then
 * those without one, then those that miss it; of these the larger usable area first, or, where no area
 * is asked for, the larger patch; ties by name. Even ground that is not known to glow is ordered by requirement and name alone: each
 * sample's reference is its own, so their areas do not compare. `rank` counts within the group; failures and even ground have none.
 */
export function rankRows(rows: readonly TrayRow[]): RankedRow[] {
  const sorted = [...rows].sort(compare);
  const counts = new Map<string, number>();
  return sorted.map((row) => {
    if (isFailed(row) || row.group === 'even') return row;
    const rank = (counts.get(row.group) ?? 0) + 1;
    counts.set(row.group, rank);
    return { ...row, rank };
  });
}

function compare(a: TrayRow, b: TrayRow): number {
  const byName = a.sample < b.sample ? -1 : a.sample > b.sample ? 1 : 0;
  if (isFailed(a) || isFailed(b)) return Number(isFailed(a)) - Number(isFailed(b)) || byName;
  return trayGroups.indexOf(a.group) - trayGroups.indexOf(b.group) || requirementOrder(a) - requirementOrder(b) || rankedArea(b) - rankedArea(a) || byName;
}

const requirementOrder = ({ requirementMet }: GoodRow): number => (requirementMet === undefined ? 1 : requirementMet ? 0 : 2);
const rankedArea = (row: GoodRow): number => (row.group === 'even' ? 0 : row.requirementMet === undefined ? row.largestPatchUm2 : row.usableUm2);

const bookedCauses = causes.filter((cause) => cause !== 'outside' && cause !== 'usable');

export const trayHeader = [
  'sample', 'group', 'rank', 'requirement_met', 'usable_um2', 'share', 'low95_um2', 'high95_um2', 'largest_patch_um2', 'footprint_um2',
  'reference_layers', 'device_bias_v', 'median_na_per_um2', 'low95_na_per_um2', 'high95_na_per_um2',
  ...bookedCauses.map((cause) => `${cause}_um2`), 'flaws', 'warnings', 'verdict', 'error_code', 'error',
] as const;

/** tray.csv: ranked; a failed sample's line holds its name, group `failed` and its error. Causes not assessed are empty. */
export function writeTrayCsv(rows: readonly TrayRow[]): string {
  return writeCsv(trayHeader, rankRows(rows).map((row): Cell[] => {
    if (isFailed(row)) return [row.sample, 'failed', ...Array.from({ length: trayHeader.length - 4 }, () => undefined), row.error.code, row.error.message];
    const area = (cause: string): Cell => {
      const share = row.causes.find((candidate) => candidate.cause === cause);
      return share === undefined || (!share.assessed && share.areaUm2 === 0) ? undefined : share.areaUm2;
    };
    return [
      row.sample, row.group, row.rank, row.requirementMet, row.usableUm2, row.share, row.low95Um2, row.high95Um2, row.largestPatchUm2, row.footprintUm2,
      row.referenceLayers, row.deviceBiasV, row.medianNaPerUm2, row.low95NaPerUm2, row.high95NaPerUm2,
      ...bookedCauses.map(area), row.flaws, row.warnings, row.verdict, undefined, undefined,
    ];
  }));
}

/** tray.jsonl: one JSON object per line, ranked. */
export function writeTrayLines(rows: readonly TrayRow[]): string {
  return rankRows(rows).map((row) => `${JSON.stringify(row)}\n`).join('');
}
