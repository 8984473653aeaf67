/** What a raised region is, in a class, a reason in words and a confidence. */
import type { FlawCause } from './flaws.ts';
import type { Region } from './measure.ts';

export interface Classified {
  readonly cause: FlawCause;
  /** 0.5 (either way) to 1 (certain). */
  readonly confidence: number;
  readonly reason: string;
}

/** A wrinkle is thin against its own size and its outline is long. */
const thinRoundness = 0.5;
const thinInscribed = 0.6;
/**
 * Mean over peak height: 1/2 for a paraboloid (a pressurised membrane is close to one), near 1 for a plateau. The divide lies
 * half-way between a dome and what a rounded patch of material shows (about 0.78).
 */
const domeToPatch = 0.64;
/** Above this share of variance explained, a region is a dome whatever else. */
const surelyDome = 0.93;

/**
 * First classifier for raised regions.
 *
 * - Long and thin: wrinkle.
 * - A smooth dome (mean/peak near 1/2, well explained by a paraboloid over the region's ellipse): bubble. Height over radius is named as evidence
 *   but not used as a rule, because multilayer skins do not hold it (Nat. Commun. 13, 2022, s41467-022-32708-z).
 * - Otherwise residue: a particle when it blocks the current, a film when it only lowers it.
 */
export function classifyRaised(region: Region): Classified {
  const roundness = (4 * Math.PI * region.areaM2) / region.boundaryM ** 2;
  const inscribed = (2 * region.inscribedM) / region.diameterM;
  const elongation = region.shortM > 0 ? region.longM / region.shortM : Number.POSITIVE_INFINITY;
  const blocks = region.floorShare >= 0.5;
  const current = currentWords(region, blocks);
  if (region.pixels >= 12 && roundness < thinRoundness && (inscribed < thinInscribed || elongation > 3)) {
    const confidence = sure(Math.max((thinRoundness - roundness) / 0.3, (elongation - 3) / 5));
    return { cause: 'wrinkle', confidence, reason: `long thin ridge, ${oneDigit(elongation)} times as long as wide, ${current}: wrinkle` };
  }
  const { fullness } = region;
  const isDome = region.domeShare >= surelyDome || fullness < domeToPatch;
  const margin = Math.max(Math.abs(fullness - domeToPatch) / 0.14, region.domeShare >= surelyDome ? 0.6 : 0);
  const confidence = sure(region.pixels < 12 ? margin / 2 : margin);
  const unsure = confidence < 0.65 ? (isDome ? ', could be residue' : ', could be a bubble') : '';
  if (isDome) {
    return { cause: 'bubble', confidence, reason: `smooth dome, h/R ${twoDigits(region.peakM / (region.diameterM / 2))}, ${current}: bubble${unsure}` };
  }
  const what = blocks || Number.isNaN(region.floorShare) ? 'uneven or flat-topped lump' : 'flat patch';
  return { cause: 'residue', confidence, reason: `${what}, ${oneDigit(region.peakM * 1e9)} nm high, ${current}: residue${unsure}` };
}

function currentWords(region: Region, blocks: boolean): string {
  if (Number.isNaN(region.log10Current)) return 'current not measured';
  if (blocks) return 'no current';
  if (!(region.dropDecades > 0.05)) return 'current not to be judged here';
  return `current lower by ${oneDigit(region.dropDecades)} decades`;
}

function sure(margin: number): number {
  return 0.5 + 0.5 * Math.min(1, Math.max(0, margin));
}

function oneDigit(value: number): string {
  return Number.isFinite(value) ? value.toFixed(1) : 'many';
}

function twoDigits(value: number): string {
  return value.toFixed(2);
}
