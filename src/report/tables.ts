/** ledger.csv and flaws.csv. Headers are frozen by the file formats. */
import type { Flaws } from '../flaws/flaws.ts';
import type { Ledger } from '../ledger/ledger.ts';
import { writeCsv } from './csv.ts';
import { rounded, toNm, toUm, toUm2, toUm2Nm } from './units.ts';

export const ledgerHeader = ['code', 'cause', 'area_um2', 'pixels', 'share'] as const;

export const flawsHeader = [
  'flaw', 'cause', 'confidence', 'reason', 'x_um', 'y_um', 'area_um2', 'boundary_um', 'diameter_um', 'long_um', 'short_um', 'angle_deg',
  'peak_nm', 'mean_nm', 'volume_um2nm', 'height_to_radius', 'log10_current', 'touches_edge',
] as const;

/** One line per cause of the footprint (codes 1–12), areas in µm², shares of the footprint. */
export function writeLedgerCsv(ledger: Ledger): string {
  return writeCsv(ledgerHeader, ledger.rows.map((row) => [row.code, row.cause, toUm2(row.areaM2), row.pixels, rounded(row.share)]));
}

/** One line per flaw in the order of their numbers, which are those of flaws.tif; quantities that do not apply are empty. */
export function writeFlawsCsv(flaws: Flaws): string {
  const list = [...flaws.list].sort((a, b) => a.flaw - b.flaw);
  return writeCsv(flawsHeader, list.map((flaw) => [
    flaw.flaw, flaw.cause, rounded(flaw.confidence), flaw.reason,
    toUm(flaw.xM), toUm(flaw.yM), toUm2(flaw.areaM2), toUm(flaw.boundaryM), toUm(flaw.diameterM),
    toUm(flaw.longM), toUm(flaw.shortM), rounded(flaw.angleDeg),
    toNm(flaw.peakM), toNm(flaw.meanM), toUm2Nm(flaw.volumeM3), rounded(flaw.heightToRadius),
    rounded(flaw.log10Current), flaw.touchesEdge,
  ]));
}
