/** The files of one appraised sample: one list for the command line, the page and the worker. */
import type { App, Appraised } from './appraised.ts';
import { writeReport } from './report.ts';
import { resultMaps } from './result-maps.ts';
import { writeFlawsCsv, writeLedgerCsv } from './tables.ts';
import { writeVerdict } from './verdict.ts';

/** Kinds of files that `--only` names. */
export const resultKinds = ['json', 'csv', 'tif', 'html', 'gds', 'dxf', 'svg'] as const;
export type ResultKind = (typeof resultKinds)[number];

export interface ResultFile {
  /** Name inside the sample's folder. */
  readonly name: string;
  readonly kind: ResultKind;
  /** Makes the content when asked, so that files are not all held at once; texts are UTF-8. */
  readonly content: () => string | Uint8Array;
}

/** Every file that an appraisal writes, in the order of writing; maps whose data the sample does not have are absent. */
export function resultFiles(appraised: Appraised, app: App): ResultFile[] {
  return [
    ...resultMaps(appraised).map(({ file, bytes }): ResultFile => ({ name: file, kind: 'tif', content: bytes })),
    { name: 'ledger.csv', kind: 'csv', content: () => writeLedgerCsv(appraised.ledger) },
    { name: 'flaws.csv', kind: 'csv', content: () => writeFlawsCsv(appraised.flaws) },
    { name: 'report.html', kind: 'html', content: () => writeReport(appraised, app) },
    { name: 'verdict.json', kind: 'json', content: () => writeVerdict(appraised, app) },
  ];
}
