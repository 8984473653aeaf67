/** What a recipe would give while a handle moves: the causes over the map, and the appraisal's areas and counts with what the handle changes of them. */
import { previewOf, thinnedGround } from '../src/evaluate/preview.ts';
import type { ThinnedGround } from '../src/evaluate/preview.ts';
import type { Ground } from '../src/ground/ground.ts';
import type { Recipe } from '../src/recipe/recipe.ts';
import type { Appraised } from '../src/report/appraised.ts';
import type { Preview, PreviewRequest } from './api.ts';
import { drawPicture } from './picture.ts';
import { looked, movedCounts, movedLedger } from './preview-change.ts';
import type { Look } from './preview-change.ts';
import { thresholdsIn } from './summary-ground.ts';

/** Longest side of the map that is looked at: what a tenth of a second is enough for. */
const side = 256;

const thinned = new WeakMap<Ground, ThinnedGround>();

/** The same look at the recipe in force, by appraisal: what a thinned map shows otherwise than the full one is in both and cancels. */
const inForce = new WeakMap<Appraised, Look>();

/**
 * The appraisal's own areas and counts, plus what the look at `recipe` shows otherwise than the look at the recipe in force.
 *
 * @param recipe whose sections `scan` and `ground` are those of the appraisal, whatever is asked for: they would take a whole appraisal.
 */
export function preview(appraised: Appraised, recipe: Recipe, { picture }: PreviewRequest): Preview {
  const { sample, ground } = appraised;
  const coarse = thinned.get(ground) ?? thinnedGround(sample, ground, side);
  thinned.set(ground, coarse);
  const own: Recipe = { ...appraised.recipe, format: recipe.format, version: recipe.version, corrections: [...appraised.recipe.corrections] };
  const before = inForce.get(appraised) ?? looked(previewOf(coarse, own));
  inForce.set(appraised, before);
  // Asked for without a picture when a handle is taken, so that the first look that moves need not wait for it.
  const found = picture === undefined && JSON.stringify(recipe) === JSON.stringify(own) ? undefined : previewOf(coarse, recipe);
  const now = found ? looked(found) : before;
  const ledger = movedLedger(appraised.ledger, before, now);
  return {
    everyPx: coarse.step,
    ledger,
    usableUm2: ledger.find(({ cause }) => cause === 'usable')?.areaUm2 ?? 0,
    flaws: movedCounts(appraised.flaws.list, before, now),
    ...(now.thresholds ? { thresholds: thresholdsIn(now.thresholds) } : {}),
    ...(picture && found ? { picture: drawPicture(appraised, picture, fullSize(found.ledger.codes.data, coarse, sample.grid)) } : {}),
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
