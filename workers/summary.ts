/** Everything about an appraised sample except its maps, rounded as in the result files. */
import { alternativeOf } from '../src/flaws/alternative.ts';
import { correctionWords } from '../src/flaws/correction-words.ts';
import type { Flaw } from '../src/flaws/flaws.ts';
import { innerPoints } from '../src/flaws/inner-points.ts';
import { channelOf } from '../src/read/sample.ts';
import type { Appraised } from '../src/report/appraised.ts';
import { rounded, toNaPerUm2, toNm, toUm, toUm2 } from '../src/report/units.ts';
import type { FlawEntry, RecipeData, SampleSummary } from './api.ts';
import { mapInfos } from './map-view.ts';
import { groundParts, textureOf, thresholdsIn } from './summary-ground.ts';

export function summaryOf(id: string, appraised: Appraised): SampleSummary {
  const { sample, recipe, ledger, warnings } = appraised;
  const { grid } = sample;
  const { usable, missedShorts } = ledger;
  return {
    id, name: sample.name, verdict: ledger.verdict, surface: sample.surface,
    columns: grid.columns, rows: grid.rows, widthUm: toUm(grid.columns * grid.pitchXM), heightUm: toUm(grid.rows * grid.pitchYM),
    ...readUnits(appraised),
    footprintUm2: toUm2(ledger.footprintM2),
    ledger: ledger.rows.map((row) => ({
      code: row.code, cause: row.cause, areaUm2: toUm2(row.areaM2), pixels: row.pixels, share: rounded(row.share), assessed: row.assessed,
    })),
    usable: {
      areaUm2: toUm2(usable.areaM2), share: rounded(usable.share), low95Um2: toUm2(usable.low95M2), high95Um2: toUm2(usable.high95M2),
      largestPatchUm2: toUm2(usable.largestPatchM2), knownToGlow: usable.knownToGlow, meaning: usable.meaning,
    },
    repairedUm2: toUm2(ledger.repairedM2),
    ...groundParts(appraised),
    ...(appraised.texture ? { texture: textureOf(appraised.texture) } : {}),
    ...(appraised.flaws.thresholds ? { thresholds: thresholdsIn(appraised.flaws.thresholds) } : {}),
    ...barrierParts(appraised),
    ...(missedShorts ? { shorts: { seen: missedShorts.seen, expectedMissed: rounded(missedShorts.expectedMissed), crossedShare: rounded(missedShorts.crossedShare) } } : {}),
    flaws: flawList(appraised),
    corrections: recipe.corrections.map(correctionWords),
    maps: mapInfos(appraised),
    remarks: warnings.map(({ code, message }) => ({ code, message })),
    recipe: plainJson({ ...recipe }),
    sources: sample.sources.map(({ name, sha256, bytes }) => ({ name, sha256, bytes })),
    timings: { ...appraised.timings },
  };
}

/** What files, sidecar or recipe state of the units. */
function readUnits({ sample }: Appraised): Pick<SampleSummary, 'heightUnit' | 'currentUnit'> {
  const [height, current] = [channelOf(sample, 'height')?.readIn, channelOf(sample, 'current')?.readIn];
  return { ...(height === undefined ? {} : { heightUnit: height }), ...(current === undefined ? {} : { currentUnit: current }) };
}

function flawList({ flaws, sample }: Appraised): FlawEntry[] {
  const inner = innerPoints(flaws, sample.grid);
  return flaws.list.map((flaw, k) => ({ ...flawEntry(flaw), insideUm: [toUm(inner[k]!.xM), toUm(inner[k]!.yM)] as const }));
}

export function flawEntry(flaw: Flaw): FlawEntry {
  const other = alternativeOf(flaw);
  return {
    flaw: flaw.flaw, cause: flaw.cause, confidence: rounded(flaw.confidence), reason: flaw.reason,
    xUm: toUm(flaw.xM), yUm: toUm(flaw.yM), areaUm2: toUm2(flaw.areaM2), diameterUm: toUm(flaw.diameterM),
    ...(Number.isFinite(flaw.peakM) ? { peakNm: toNm(flaw.peakM) } : {}),
    ...(Number.isFinite(flaw.heightToRadius) ? { heightToRadius: rounded(flaw.heightToRadius) } : {}),
    ...(other ? { other } : {}),
    ...(flaw.byHand ? { byHand: flaw.byHand } : {}),
  };
}

function barrierParts({ barrier }: Appraised): Pick<SampleSummary, 'ladder' | 'reference' | 'device'> {
  if (!barrier) return {};
  const { ladder, reference, device } = barrier;
  return {
    ladder: {
      stepDecades: rounded(ladder.stepDecades), stepSeDecades: rounded(ladder.stepSeDecades), from: ladder.from,
      ...(ladder.modelStepDecades === undefined ? {} : { modelStepDecades: rounded(ladder.modelStepDecades) }),
      rungs: ladder.rungs.map((rung) => ({
        step: rung.step, ...(rung.layers === undefined ? {} : { layers: rung.layers }),
        areaUm2: toUm2(rung.areaM2), medianLog10: rounded(rung.medianLog10), bound: rung.bound,
      })),
    },
    reference: {
      ...(reference.layers === undefined ? {} : { layers: reference.layers }),
      ...(reference.thicknessM === undefined ? {} : { thicknessNm: toNm(reference.thicknessM) }),
      medianA: rounded(reference.median), areaUm2: toUm2(reference.areaM2), shareOfUnflawed: rounded(reference.shareOfUnflawed),
    },
    ...(device ? {
      device: {
        biasV: rounded(device.biasV), proposed: device.proposed,
        medianNaPerUm2: toNaPerUm2(device.median), low95NaPerUm2: toNaPerUm2(device.low95), high95NaPerUm2: toNaPerUm2(device.high95),
      },
    } : {}),
  };
}

/** A recipe is plain JSON, so a JSON round trip is a deep copy that nobody else holds. */
function plainJson(value: object): RecipeData {
  return JSON.parse(JSON.stringify(value)) as RecipeData;
}
