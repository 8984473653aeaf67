/** The files of one appraised sample: one list for the command line, the page and the worker. */
import type { App, Appraised } from './appraised.ts';
import { writeReport } from './report.ts';
import { resultMaps } from './result-maps.ts';
import { fixedNames, kindOfResult } from './result-names.ts';
import type { ResultKind } from './result-names.ts';
import { writeFlawsCsv, writeLedgerCsv } from './tables.ts';
import { writeVerdict } from './verdict.ts';

export { resultKinds } from './result-names.ts';
export type { ResultKind } from './result-names.ts';

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
    ...fixedNames.map((name): ResultFile => ({ name, kind: kindOfResult(name)!, content: () => writers[name](appraised, app) })),
  ];
}

const writers: Readonly<Record<(typeof fixedNames)[number], (appraised: Appraised, app: App) => string>> = {
  'ledger.csv': ({ ledger }) => writeLedgerCsv(ledger),
  'flaws.csv': ({ flaws }) => writeFlawsCsv(flaws),
  'report.html': writeReport,
  'verdict.json': writeVerdict,
};
