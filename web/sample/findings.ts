/** What each chapter found, in one or two plain sentences composed from the summary. */
import type { Preview, SampleSummary } from '../../workers/api.ts';
import { area, biasText, counted, density, densitySpan, figure, fixed, heightText, percent, volts, withUnit } from './format.ts';
import { curveWord } from './ground-facts.ts';

/** "Bare barrier, height and current, 5.9 V between tip and sample; 512 × 512 pixels on 10.0 × 10.0 µm." */
export function scanFinding(summary: SampleSummary): string {
  const surface = summary.surface === 'stack' ? 'Finished stack' : 'Bare barrier';
  const channels = summary.height && summary.current ? 'height and current' : summary.height ? 'height only' : 'current only';
  const bias = summary.current === undefined ? '' : summary.current.biasV === undefined ? ', bias not stated' : `, ${volts(summary.current.biasV)} at the scan`;
  return `${surface}, ${channels}${bias}; ${summary.columns} × ${summary.rows} pixels on ${figure(summary.widthUm)} × ${withUnit(summary.heightUm, 'µm')}.`;
}

/** "20 nm of tilt and 3.6 nm of bow removed, 625 pixels repaired in the height, 285 in the current (0.0881 µm²), noise 0.08 nm; the tip lost 0.28 decades." */
export function groundFinding({ height, current, repairedUm2 }: SampleSummary): string {
  const parts: string[] = [];
  if (height) parts.push(`${formWords(height)} removed`);
  parts.push(repairedWords(height?.repairedPixels, current?.repairedPixels, repairedUm2));
  if (height) parts.push(`noise ${withUnit(height.noiseNm, 'nm', 2)}`);
  const first = capital(parts.join(', '));
  if (!current) return `${first}.`;
  const wear = current.wearTold ? `the tip lost ${fixed(current.wearDecades, 2)} decades of conductance (a factor of ${figure(10 ** current.wearDecades, 2)})` : 'tip wear cannot be told from the barrier, none undone';
  return `${first}; ${wear}.`;
}

/** From the same numbers as the table of facts below. */
function formWords({ tiltNm, noiseNm, levels }: NonNullable<SampleSummary['height']>): string {
  if (!levels) return `${heightText(tiltNm, noiseNm, 2)} of tilt`;
  if (levels.order === 0) return 'only a level';
  return `${heightText(levels.tiltNm, noiseNm, 2)} of tilt${levels.order > 1 ? ` and ${heightText(levels.bowNm, noiseNm, 2)} of ${curveWord(levels.order)}` : ''}`;
}

/** The area is that of the current where there is one, for that is what is booked. */
function repairedWords(height: number | undefined, current: number | undefined, um2: number): string {
  if ((height ?? 0) + (current ?? 0) === 0) return 'nothing to repair';
  const booked = um2 > 0 ? ` (${area(um2)})` : '';
  if (height === undefined || current === undefined) return `${counted(height ?? current ?? 0, 'pixel')} repaired${booked}`;
  return `${counted(height, 'pixel')} repaired in the height, ${current === 0 ? 'none' : String(current)} in the current${booked}`;
}

/** Where a held handle would lead: "about 40.2 µm² usable; 34 bubbles, 9 residue patches …, from every 2nd pixel". */
export function lookFinding({ usableUm2, flaws, everyPx }: Preview): string {
  const seen = [
    [flaws.bubble, 'bubble', 'bubbles'], [flaws.residue, 'residue patch', 'residue patches'], [flaws.wrinkle, 'wrinkle', 'wrinkles'], [flaws.short, 'short', 'shorts'], [flaws.open, 'open spot', 'open spots'],
  ] as const;
  const found = seen.filter(([number]) => number > 0).map(([number, one, many]) => counted(number, one, many)).join(', ');
  return `About ${area(usableUm2)} usable; ${found === '' ? 'no flaws' : found}${everyPx > 1 ? `; a quick look at every ${everyPx === 2 ? '2nd' : everyPx === 3 ? '3rd' : `${everyPx}th`} pixel` : ''}. Let go for the result.`;
}

/** "34 bubbles, 9 residue patches, 4 wrinkles; 6 shorts seen, about 19 more expected." More: those between the scan lines, as in the verdict. */
export function flawsFinding({ flaws, shorts, current }: SampleSummary): string {
  const count = (cause: string): number => flaws.filter((flaw) => flaw.cause === cause).length;
  const kinds = [
    [count('bubble'), 'bubble', 'bubbles'], [count('residue'), 'residue patch', 'residue patches'], [count('wrinkle'), 'wrinkle', 'wrinkles'], [count('open'), 'open spot', 'open spots'],
  ] as const;
  const seen = kinds.filter(([number]) => number > 0).map(([number, one, many]) => counted(number, one, many));
  const first = seen.length > 0 ? seen.join(', ') : 'No bubbles, residue or wrinkles';
  if (!current || !shorts) return `${first}. Shorts do not show in height.`;
  const missed = shorts.expectedMissed;
  const more = shorts.seen === 0 ? '' : missed < 0.05 * shorts.seen ? ', hardly any missed between the scan lines' : `, about ${missed < 10 ? figure(missed, 2) : String(Math.round(missed))} more expected`;
  return `${first}; ${counted(shorts.seen, 'short')} seen${more}.`;
}

/** "At 4.0 V the reference (12 layers, 4.00 nm) would carry 6.3 nA/µm² (95 %: 0.9–40)." Or why that is not known. */
export function glowFinding(summary: SampleSummary): string {
  const { device, reference, current } = summary;
  if (!current) return 'Nothing is known of the barrier without a current map.';
  if (device) {
    const known = [reference?.layers === undefined ? '' : counted(reference.layers, 'layer'), reference?.thicknessNm === undefined ? '' : withUnit(reference.thicknessNm, 'nm')].filter((part) => part !== '');
    return `At ${biasText(device)}${device.proposed ? ' (proposed)' : ''} the reference${known.length > 0 ? ` (${known.join(', ')})` : ''} would carry ${density(device.medianNaPerUm2)} (95 %: ${densitySpan(device.medianNaPerUm2, device.low95NaPerUm2, device.high95NaPerUm2)}).`;
  }
  const share = reference ? ` The reference is ${percent(reference.shareOfUnflawed)} of the unflawed ground.` : '';
  if (current.unit !== 'A') return `Density is not known: the current has no scale in amperes.${share}`;
  if (current.biasV === undefined) return `Density is not known without a scan bias.${share}`;
  if (summary.surface === 'stack') return `Density is not predicted from a finished stack: its emitter spreads the probe’s current.${share}`;
  return `Density is not known for this sample.${share}`;
}

/** What the density rests on; empty when there is none. */
export function glowAssumption(summary: SampleSummary, value: (path: string) => unknown): string {
  if (!summary.device) return '';
  const number = (path: string): number | undefined => { const found = value(path); return typeof found === 'number' ? found : undefined; };
  const anchor = number('barrier.referenceLayers') === undefined
    ? `a probe contact of ${withUnit(number('barrier.tipAreaNm2'), 'nm²', 2)}, known to about a decade`
    : `${counted(number('barrier.referenceLayers') ?? 0, 'layer')} on the reference, as given`;
  return `Assumes ${anchor}, a barrier of ${withUnit(number('barrier.heightEv'), 'eV')} and a mass of ${figure(number('barrier.massRatio'), 2)}; extrapolated in field from the probe to the device.`;
}

/** The verdict's sentence without its leading area and interval, which are shown on their own; split at the first semicolon. */
export function verdictRest(verdict: string): { readonly what: string; readonly remarks: string } {
  const rest = verdict.replace(/^\S+\s+µm²\s*(\([^)]*\))?\s*/, '').replace(/\.$/, '');
  const at = rest.indexOf(';');
  return at < 0 ? { what: rest, remarks: '' } : { what: rest.slice(0, at), remarks: rest.slice(at + 1).trim() };
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
