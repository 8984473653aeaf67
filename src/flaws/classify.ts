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
/** Up to about this elongation a row of bubbles that touch has the outline of a ridge: n equal ones are n times as long as wide. */
const rowOfBubbles = 5;
/**
 * Bounds of the measured fullness (`Region.fullness`: 0.95 × mean over the 95 % quantile of the height), which is 0.41 for a cone, 1/2 for a paraboloid (a pressurised membrane is close to one)
 * and near 1 for a plateau. The upper one lies half-way between a dome and what a rounded patch of material shows (about 0.78), the
 * lower one half-way between cone and dome.
 */
const domeToPatch = 0.64;
const coneToDome = 0.45;
/** A cone must explain this share of the height to be one; bubbles that lean on others are as peaked but explained by no single shape. */
const surelyCone = 0.9;
/** From so many pixels on a shape can be told from the noise in it. */
const shapePixels = 12;
/** A round paraboloid explains this share of a dome's height, wherever it is cut off, and less of what is uneven; of a smooth 1 − ρ⁴ it explains 15/16, so that the other looks must tell. */
const domeFits = 0.92;
/** Less than this, and no single shape is there. */
const unevenShare = 0.5;
/** Less than this, and it is rubble, however peaked. */
const rubbleShare = 0.3;
/** The same for `Region.topShare`: between the 0.55 of a paraboloid and the 0.71 of 1 − ρ⁴, nearer to the latter because lobes and noise lower a block's. */
const narrowToWide = 0.645;
/** Bubbles of smaller height over radius are not known: adhesion is too strong (evidence, not a rule). */
const flattest = 0.02;
/** A region with fewer of its pixels at the floor still conducts; and it is a film only if it has lost this much, decades. */
const conductingFloorShare = 0.25;
const leastDrop = 0.3;
/** Nothing tunnels through what is thicker than this, metres: a current read there is the amplifier's lag. */
const blockedFromM = 6e-9;
/** Confidence below which the other class is named. */
const unsureBelow = 0.65;

/** Whether the other class is named, in the reason as in lists; by the two decimals that are shown, so that word and number agree. */
export function isUnsure(confidence: number): boolean {
  return Math.round(confidence * 100) < Math.round(unsureBelow * 100);
}

/**
 * Class of a raised region. Where parting has told a crest (`kind` ridge) or a round dome, that is the class, and a film is known by a current that is lowered
 * but not lost on ground too low to block; the rest goes by shape:
 *
 * - Long and thin (only where nobody looked for crests): wrinkle. A short one that is as peaked as domes are could be a row of touching bubbles: it says so, at low confidence.
 * - A smooth dome: bubble. Three looks are weighed: the mean over peak height (1/2 for a paraboloid, more for a plateau), the width of the top, and the share of
 *   the height that a round paraboloid explains. What is as pointed as a cone is none. Below 12 pixels noise hides the shape and only the first look is taken.
 *   Height over radius is named as evidence; only what is flatter than any bubble known leans towards residue, because multilayer skins do not hold a
 *   narrow range (Nat. Commun. 13, 2022, s41467-022-32708-z).
 * - Otherwise residue: a particle when it blocks the current, a film when it only lowers it.
 *
 * Where no height is known the region is residue at confidence 0.5.
 */
export function classifyRaised(region: Region): Classified {
  const roundness = (4 * Math.PI * region.areaM2) / region.boundaryM ** 2;
  const inscribed = (2 * region.inscribedM) / region.diameterM;
  const elongation = region.shortM > 0 ? region.longM / region.shortM : Number.POSITIVE_INFINITY;
  const blocks = region.floorShare >= 0.5;
  const current = currentWords(region, blocks);
  const { fullness } = region;
  const heightToRadius = region.peakM / (region.diameterM / 2);
  if (Number.isNaN(fullness)) return { cause: 'residue', confidence: 0.5, reason: `height not measured here, ${current}: residue, could be a bubble` };
  if (region.kind === 'ridge') {
    const confidence = sure((elongation - 1.5) / 3);
    return { cause: 'wrinkle', confidence, reason: `crest that falls off on both sides, ${oneDigit(elongation)} times as long as wide, ${current}: wrinkle${orTouching(confidence)}` };
  }
  if (region.kind === undefined && region.pixels >= shapePixels && roundness < thinRoundness && (inscribed < thinInscribed || elongation > 3)) {
    const row = elongation < rowOfBubbles && fullness < domeToPatch;
    const confidence = Math.min(row ? 0.55 : 1, sure(Math.max((thinRoundness - roundness) / 0.3, (elongation - 3) / 5)));
    return { cause: 'wrinkle', confidence, reason: `long thin ridge, ${oneDigit(elongation)} times as long as wide, ${current}: wrinkle${orTouching(confidence)}` };
  }
  if (region.kind === 'dome') {
    return { cause: 'bubble', confidence: sure(0.6 + region.pixels / 250), reason: `round smooth dome, h/R ${twoDigits(heightToRadius)}, ${current}: bubble` };
  }
  const shaped = region.pixels >= shapePixels;
  // Trapped material blocks; what only lowers a current that can be told from none is a film.
  if (shaped && region.floorShare < conductingFloorShare && region.dropDecades > leastDrop && region.peakM < blockedFromM) {
    return { cause: 'residue', confidence: sure(0.4 + region.pixels / 100), reason: `patch, ${oneDigit(region.peakM * 1e9)} nm high, ${current} but not lost: residue, a film` };
  }
  const pointed = shaped && fullness < coneToDome && region.coneShare > Math.max(surelyCone, region.domeShare);
  // Three looks at the same question, each with its own noise: how full the shape is, how wide its top, and how well a paraboloid explains it.
  const looks = shaped ? clamp((region.topShare - narrowToWide) / 0.1) + 1.5 * clamp((domeFits - region.domeShare) / 0.06) : 0;
  const plateau = clamp((fullness - domeToPatch) / 0.14) + looks + (heightToRadius < flattest ? 0.5 : 0);
  const rubble = shaped && region.domeShare < rubbleShare;
  const isDome = plateau < 0 && !pointed && !rubble;
  const margin = pointed ? (coneToDome - fullness) / 0.09 : rubble ? 1 - region.domeShare / rubbleShare : Math.abs(plateau) / 2;
  const confidence = sure(shaped ? margin : margin / 2);
  const unsure = isUnsure(confidence) ? (isDome ? ', could be residue' : ', could be a bubble') : '';
  if (isDome) {
    return { cause: 'bubble', confidence, reason: `smooth dome, h/R ${twoDigits(heightToRadius)}, ${current}: bubble${unsure}` };
  }
  const uneven = shaped && region.domeShare < unevenShare;
  const what = pointed ? 'pointed lump' : uneven ? 'uneven lump' : blocks || Number.isNaN(region.floorShare) ? 'flat-topped lump' : 'flat patch';
  return { cause: 'residue', confidence, reason: `${what}, ${oneDigit(region.peakM * 1e9)} nm high, ${current}: residue${unsure}` };
}

function orTouching(confidence: number): string {
  return isUnsure(confidence) ? ', could be touching bubbles' : '';
}

function clamp(value: number): number {
  return Math.min(1, Math.max(-1, value));
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
