/** What a recipe would give while a handle moves: the causes over the map and the areas by cause, over the ground of the last appraisal. */
import { previewOf, thinnedGround } from '../src/evaluate/preview.ts';
import type { ThinnedGround } from '../src/evaluate/preview.ts';
import type { Ground } from '../src/ground/ground.ts';
import type { Recipe } from '../src/recipe/recipe.ts';
import type { Appraised } from '../src/report/appraised.ts';
import { rounded, toUm2 } from '../src/report/units.ts';
import { flawCounts } from '../src/report/verdict.ts';
import type { Preview, PreviewRequest } from './api.ts';
import { drawPicture } from './picture.ts';
import { thresholdsIn } from './summary-ground.ts';

/** Longest side of the map that is looked at: what a tenth of a second is enough for. */
const side = 256;

const thinned = new WeakMap<Ground, ThinnedGround>();

/** @param recipe whose sections `scan` and `ground` are those of the appraisal, whatever is asked for: they would take a whole appraisal. */
export function preview(appraised: Appraised, recipe: Recipe, { picture }: PreviewRequest): Preview {
  const { sample, ground } = appraised;
  const coarse = thinned.get(ground) ?? thinnedGround(sample, ground, side);
  thinned.set(ground, coarse);
  const { flaws, ledger } = previewOf(coarse, recipe);
  const full = toUm2(appraised.ledger.footprintM2);
  const areaUm2 = (share: number): number => rounded(share * full);
  return {
    everyPx: coarse.step,
    ledger: ledger.rows.map(({ code, cause, share, pixels, assessed }) => ({ code, cause, areaUm2: areaUm2(share), pixels: pixels * coarse.step ** 2, share: rounded(share), assessed })),
    usableUm2: areaUm2(ledger.usable.share),
    flaws: flawCounts(flaws.list),
    ...(flaws.thresholds ? { thresholds: thresholdsIn(flaws.thresholds) } : {}),
    ...(picture ? { picture: drawPicture(appraised, picture, fullSize(ledger.codes.data, coarse, sample.grid)) } : {}),
  };
}

/** Codes of the thinned map on every pixel of the full one. */
function fullSize(codes: Uint8Array, { sample, step }: ThinnedGround, { columns, rows }: { readonly columns: number; readonly rows: number }): Uint8Array {
  if (step === 1) return codes;
  const { columns: across, rows: down } = sample.grid;
  const from = Int32Array.from({ length: columns }, (_, c) => Math.min(across - 1, Math.floor(c / step)));
  const out = new Uint8Array(columns * rows);
  for (let r = 0, i = 0; r < rows; r++) {
    const start = Math.min(down - 1, Math.floor(r / step)) * across;
    for (let c = 0; c < columns; c++, i++) out[i] = codes[start + from[c]!]!;
  }
  return out;
}
