/** verdict.json: the appraisal in numbers, for scripts. Its layout is frozen by `version`. */
import type { Barrier } from '../barrier/barrier.ts';
import type { Flaw, FlawCause, FlawThresholds, Flaws } from '../flaws/flaws.ts';
import type { LevelsFound } from '../ground/describe-levels.ts';
import type { CurrentGround, FootprintProposal, Ground } from '../ground/ground.ts';
import type { Ledger } from '../ledger/ledger.ts';
import type { Sample } from '../read/sample.ts';
import type { SheetTotals } from '../sheet/sheet.ts';
import { poissonInterval } from '../stats/poisson.ts';
import type { App, Appraised } from './appraised.ts';
import { resultNames } from './result-names.ts';
import { rounded, toNaPerUm2, toNm, toPerUm2, toUm, toUm2 } from './units.ts';
import { currentPart, returnPart } from './verdict-current.ts';
import { fieldsPart, thicknessPart } from './verdict-thickness.ts';
import { texturePart } from './verdict-texture.ts';
import { withoutMissing } from './without-missing.ts';

export const verdictFormat = 'evenglow-verdict';
export const verdictVersion = 1;
const flawCauses = ['bubble', 'residue', 'wrinkle', 'short', 'open'] as const satisfies readonly FlawCause[];

/** What `verdict.json` holds; sections and numbers that this sample does not have are absent. */
export type Verdict = ReturnType<typeof verdictOf>;

/**
 * The verdict as a plain object: SI converted to the units in the field names, nothing missing,
 * infinite or undefined in it. `files` names the result files that this sample has; fewer lie beside it when fewer were asked for. The same appraisal gives the same object; only `timings` differs between runs.
 */
export function verdictOf(appraised: Appraised, app: App) {
  const { sample, recipe, ground, flaws, barrier, sheet, ledger, texture, warnings } = appraised;
  return withoutMissing({
    format: verdictFormat,
    version: verdictVersion,
    app: { name: app.name, version: app.version },
    sample: sample.name,
    verdict: ledger.verdict,
    sources: sample.sources.map(({ name, sha256, bytes }) => ({ name, sha256, bytes })),
    recipe,
    files: resultNames(appraised),
    map: mapPart(sample),
    ground: groundPart(ground),
    footprintProposal: ground.footprintProposal && footprintPart(ground.footprintProposal),
    ledger: ledgerPart(ledger),
    usable: usablePart(ledger),
    reference: barrier && referencePart(barrier, ground.current),
    ladder: barrier && ladderPart(barrier),
    thickness: barrier && thicknessPart(barrier, recipe.barrier.layerNm * 1e-9),
    device: barrier?.device && devicePart(barrier.device, sample, ground.current, sheet?.totals),
    texture: texture && texturePart(texture),
    flaws: flawsPart(flaws, ledger),
    corrections: flaws.corrections && { given: flaws.corrections.given, applied: flaws.corrections.applied },
    warnings: warnings.map(({ code, message }) => ({ code, message })),
    timings: Object.fromEntries(Object.entries(appraised.timings).map(([stage, ms]) => [stage, Number(ms.toFixed(1))])),
  });
}

/** The text of verdict.json: two-space indented, ends with a line feed. */
export function writeVerdict(appraised: Appraised, app: App): string {
  return `${JSON.stringify(verdictOf(appraised, app), null, 2)}\n`;
}

function mapPart({ grid }: Sample) {
  return { columns: grid.columns, rows: grid.rows, pitchXUm: toUm(grid.pitchXM), pitchYUm: toUm(grid.pitchYM) };
}

function groundPart({ height, current, returned }: Ground) {
  return {
    height: height && { noiseNm: toNm(height.noiseM), repairedPixels: height.repairedPixels, tiltNm: toNm(height.tiltM), levels: height.levels && levelsPart(height.levels) },
    current: current && currentPart(current),
    returnScan: returned && returnPart(returned, current?.unit),
  };
}

/** What levelling took out: the form's linear part and the rest of it peak to peak, and the offsets of lines. */
function levelsPart(levels: LevelsFound) {
  return {
    formFrom: levels.formFrom,
    formOrder: levels.order,
    spotsUsed: levels.spotsUsed,
    linearNm: toNm(levels.tiltM),
    curvedNm: toNm(levels.bowM),
    lineRmsNm: levels.lineRmsM === undefined ? undefined : toNm(levels.lineRmsM),
    planes: levels.planesM.length,
  };
}

/** GeoJSON (RFC 7946) in µm from the map's lower-left corner: saved by itself it is an outlines file that the read stage takes. */
function footprintPart({ outline }: FootprintProposal) {
  const coordinates = outline.rings.map((ring) => ring.map(([xM, yM]) => [toUm(xM), toUm(yM)]));
  return { type: 'FeatureCollection', features: [{ type: 'Feature', properties: { layer: outline.layer }, geometry: { type: 'Polygon', coordinates } }] };
}

function ledgerPart(ledger: Ledger) {
  return {
    footprintUm2: toUm2(ledger.footprintM2),
    footprintPixels: ledger.footprintPixels,
    repairedUm2: toUm2(ledger.repairedM2),
    causes: ledger.rows.map((row) => ({
      code: row.code, cause: row.cause, areaUm2: toUm2(row.areaM2), pixels: row.pixels, share: rounded(row.share), assessed: row.assessed,
    })),
  };
}

function usablePart({ usable }: Ledger) {
  return {
    areaUm2: toUm2(usable.areaM2),
    share: rounded(usable.share),
    low95Um2: toUm2(usable.low95M2),
    high95Um2: toUm2(usable.high95M2),
    largestPatchUm2: toUm2(usable.largestPatchM2),
    knownToGlow: usable.knownToGlow,
    meaning: usable.meaning,
  };
}

function referencePart({ reference }: Barrier, current: CurrentGround | undefined) {
  const amperes = current?.unit === 'A';
  return {
    layers: reference.layers,
    thicknessNm: reference.thicknessM === undefined ? undefined : toNm(reference.thicknessM),
    medianA: amperes ? rounded(reference.median) : undefined,
    medianRelative: amperes ? undefined : rounded(reference.median),
    areaUm2: toUm2(reference.areaM2),
    shareOfUnflawed: rounded(reference.shareOfUnflawed),
    inRange: reference.inRange,
  };
}

function ladderPart({ ladder }: Barrier) {
  return {
    stepDecades: rounded(ladder.stepDecades),
    stepSeDecades: rounded(ladder.stepSeDecades),
    from: ladder.from,
    modelStepDecades: ladder.modelStepDecades === undefined ? undefined : rounded(ladder.modelStepDecades),
    rungs: ladder.rungs.map((rung) => ({
      step: rung.step, layers: rung.layers, areaUm2: toUm2(rung.areaM2), pixels: rung.pixels,
      medianLog10: rounded(rung.medianLog10), scatterDecades: rounded(rung.scatterDecades), bound: rung.bound,
    })),
  };
}

/**
 * The device's whole current takes its interval from the reference's density, in proportion. It is `censored`
 * (only a lower bound) where pixels of the footprint saturated, because what flows there was not measured.
 */
function devicePart(device: NonNullable<Barrier['device']>, { footprint }: Sample, current: CurrentGround | undefined, totals: SheetTotals | undefined) {
  const whole = totals?.deviceCurrentA;
  const scaled = (density: number): number | undefined => (whole === undefined ? undefined : rounded((whole * density) / device.median));
  return {
    biasV: rounded(device.biasV),
    proposed: device.proposed,
    medianNaPerUm2: toNaPerUm2(device.median),
    low95NaPerUm2: toNaPerUm2(device.low95),
    high95NaPerUm2: toNaPerUm2(device.high95),
    ...fieldsPart(device),
    currentA: scaled(device.median),
    currentLow95A: scaled(device.low95),
    currentHigh95A: scaled(device.high95),
    shortShareOfCurrent: totals?.shortShareOfCurrent === undefined ? undefined : rounded(totals.shortShareOfCurrent),
    censored: whole === undefined || current === undefined ? undefined : current.saturated.data.some((mark, i) => mark === 1 && footprint.data[i] === 1),
  };
}

function flawsPart(flaws: Flaws, ledger: Ledger) {
  const footprintUm2 = toUm2(ledger.footprintM2);
  const seen = flaws.list.length;
  const interval = poissonInterval(seen);
  const shorts = ledger.missedShorts;
  return {
    count: flawCounts(flaws.list),
    densityPerUm2: {
      estimate: rounded(seen / footprintUm2), low95: rounded(interval.low / footprintUm2), high95: rounded(interval.high / footprintUm2),
    },
    thresholds: flaws.thresholds && thresholdsPart(flaws.thresholds),
    expectedMissedShorts: shorts && rounded(shorts.expectedMissed),
    shorts: shorts && {
      seen: shorts.seen,
      crossedShare: rounded(shorts.crossedShare),
      densityPerUm2: { estimate: toPerUm2(shorts.densityPerM2), low95: toPerUm2(shorts.low95PerM2), high95: toPerUm2(shorts.high95PerM2) },
    },
  };
}

/** The limits in force, and what they mean against this map's noise. */
export function thresholdsPart({ startM, ruledBy, noiseM, dropDecades, layerDecades, layerFrom, noiseDecades }: FlawThresholds) {
  const ratio = (value: number | undefined, unit: number | undefined): number | undefined => (value === undefined || !(unit! > 0) ? undefined : rounded(value / unit!));
  return {
    heightNm: startM === undefined ? undefined : toNm(startM),
    heightRuledBy: ruledBy,
    heightNoiseNm: noiseM === undefined ? undefined : toNm(noiseM),
    heightOverNoise: ratio(startM, noiseM),
    dropDecades: dropDecades === undefined ? undefined : rounded(dropDecades),
    layerDecades: layerDecades === undefined ? undefined : rounded(layerDecades),
    layerFrom,
    dropLayers: ratio(dropDecades, layerDecades),
    currentNoiseDecades: noiseDecades === undefined ? undefined : rounded(noiseDecades),
    dropOverNoise: ratio(dropDecades, noiseDecades),
  };
}

/** How many flaws of each cause, zeros included. */
export function flawCounts(list: readonly Flaw[]): Record<FlawCause, number> {
  const count: Record<FlawCause, number> = { bubble: 0, residue: 0, wrinkle: 0, short: 0, open: 0 };
  for (const cause of flawCauses) count[cause] = list.filter((flaw) => flaw.cause === cause).length;
  return count;
}
