/** The report's line on texture: how rough the flawless ground is, and what levelling itself took from that. */
import { markup } from './markup.ts';
import type { Markup } from './markup.ts';
import { figure, percent, withUnit } from './numbers.ts';
import type { Verdict } from './verdict.ts';

const noEstimate = {
  'little-ground': 'How much of it levelling took is not known: there is too little ground for an estimate.',
  'no-correlation': 'Neighbouring pixels have nothing in common, so this is noise, and levelling took nothing of it that counts.',
  'too-wide': 'How much of it levelling took is not known: height changes over so large a part of the map that it cannot be told from form. Sq may be much too low.',
} as const;

/** A normal distribution has 3; above this a few pixels carry much of Sq (this program's judgement). */
const tailedSku = 10;

/** Nothing where the sample has no texture. */
export function textureLine({ texture }: Verdict): Markup | undefined {
  if (!texture) return undefined;
  const { sqNm, saNm, szNm, ssk, sku, sdq, sqCorrectedNm, levellingBiasShare, correlationNm, lineVarianceShare, formVarianceShare, sqInsideTerracesNm } = texture;
  const terraces = sqInsideTerracesNm === undefined ? undefined : markup` (${withUnit(sqInsideTerracesNm, 'nm')} inside terraces)`;
  const tails = sku !== undefined && sku > tailedSku ? 'A few pixels far from the rest, such as flaws that were not found, carry much of Sq. ' : undefined;
  const estimate = texture.noEstimate === undefined
    ? markup`Levelling takes roughness away along with form, so Sq is too low by about ${percent(levellingBiasShare)}; <b>corrected ${withUnit(sqCorrectedNm, 'nm')}</b>. Estimated from the correlation length, ${withUnit(correlationNm, 'nm')}${inside(sqInsideTerracesNm)}: of the variance that it belongs to, ${percent(lineVarianceShare)} went with line offsets and ${percent(formVarianceShare)} with the form (Nečas, Klapetek &amp; Valtr, arXiv:2001.00433, 2020); structure as wide as the map is not in it, and from ground rougher than about half a layer less was taken than this.`
    : noEstimate[texture.noEstimate];
  return markup`<dt>Texture</dt><dd>Flawless measured ground: Sq ${withUnit(sqNm, 'nm')}${terraces}, Sa ${withUnit(saNm, 'nm')}, Sz ${withUnit(szNm, 'nm')}, Ssk ${figure(ssk)}, Sku ${figure(sku)}, Sdq ${figure(sdq)} (ISO 25178-2; central differences, no filter, pixel noise included). ${tails}${estimate}</dd>`;
}

function inside(sqInsideTerracesNm: number | undefined): string {
  return sqInsideTerracesNm === undefined ? '' : ' inside terraces';
}
