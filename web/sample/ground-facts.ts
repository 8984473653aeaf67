/** What was found of the ground, fact by fact, in plain words: before any knob is shown. */
import type { SampleSummary, ShiftSummary } from '../../workers/api.ts';
import { counted, figure, fixed, heightText, percent, withError, withPrefix, withUnit } from './format.ts';

export interface GroundFact {
  readonly name: string;
  readonly value: string;
  /** Why it matters, or how it was told. */
  readonly note?: string;
  /** Of the method page. */
  readonly topic: string;
}

export function groundFacts(summary: SampleSummary): readonly GroundFact[] {
  return [...heightFacts(summary), ...currentFacts(summary), ...returnFacts(summary)];
}

/** Polynomials are named by what they do to a surface. */
const orderWords = ['a level only', 'tilt', 'tilt and bow', 'up to third powers', 'up to fourth powers', 'up to fifth powers'] as const;

/** What of an order of the form the spots picked by hand support: "lowered to 1: 3 spots support a tilt only". Empty where they support it. */
export function loweredWords(order: number, { order: used, spotsUsed = 0 }: { readonly order: number; readonly spotsUsed?: number }): string {
  return order <= used ? '' : `lowered to ${used}: ${counted(spotsUsed, 'spot')} ${spotsUsed < termsOf(used + 1) ? '' : 'in these places '}support ${onlyWords[used] ?? 'no more'}`;
}

const onlyWords = ['a level only', 'a tilt only', 'tilt and bow only', 'third powers at most', 'fourth powers at most'] as const;

/** Terms of a polynomial of x and y, and with them the least number of spots. */
function termsOf(order: number): number {
  return ((order + 1) * (order + 2)) / 2;
}

/** What a form of that order takes out besides tilt. */
export function curveWord(order: number): string {
  return order > 2 ? 'curvature' : 'bow';
}

function heightFacts({ height, texture }: SampleSummary): GroundFact[] {
  if (!height) return [];
  const { levels } = height;
  return [
    ...(levels ? levelFacts(levels, height.noiseNm) : [{ name: 'Form removed', value: `${heightText(height.tiltNm, height.noiseNm)} from end to end`, topic: 'form' }]),
    { name: 'Repaired in the height', value: counted(height.repairedPixels, 'pixel'), note: 'spikes, and broken runs of one to three lines, filled from agreeing neighbours', topic: 'repair' },
    { name: 'Noise of the height', value: withUnit(height.noiseNm, 'nm', 2), note: 'standard deviation from pixel to pixel on flat ground', topic: 'noise' },
    ...(texture ? [textureFact(texture)] : []),
  ];
}

function levelFacts(levels: NonNullable<NonNullable<SampleSummary['height']>['levels']>, noiseNm: number): GroundFact[] {
  const { formFrom, order, spotsUsed, tiltNm, bowNm, lineRmsNm, lineMostNm, planesNm, gapNm } = levels;
  const highest = planesNm[planesNm.length - 1];
  return [
    {
      name: 'Form removed', topic: 'form',
      value: `order ${order} (${orderWords[order] ?? 'higher powers'}): tilt ${heightText(tiltNm, noiseNm)}${order > 1 ? `, ${curveWord(order)} ${heightText(bowNm, noiseNm)}` : ''}, peak to peak`,
      note: formFrom === 'spots' ? `fitted to ${counted(spotsUsed ?? 0, 'spot')} picked by hand` : 'fitted to ground found automatically, flaws left out',
    },
    lineRmsNm === undefined
      ? { name: 'Line offsets', value: 'left as they are', topic: 'lines' }
      : {
        name: 'Line offsets', value: `${heightText(lineRmsNm, noiseNm, 2)} rms, ${heightText(lineMostNm, noiseNm, 2)} at most`, topic: 'lines',
        note: 'each line’s median ground over the terraces’ planes, so that steps do not pull it; first found from differences between lines near each other',
      },
    planesNm.length > 1 && highest !== undefined
      ? {
        name: 'Terraces', value: `${planesNm.length} heights taken as parallel planes, ${heightText(highest, noiseNm, 2)} from lowest to highest`, topic: 'planes',
        ...(gapNm === undefined ? {} : { note: `one step of the current’s ladder is ${heightText(gapNm, noiseNm)} high` }),
      }
      : { name: 'Terraces', value: 'one plane', note: 'nothing told a step of whole layers in the height', topic: 'planes' },
  ];
}

const noEstimate: Readonly<Record<string, string>> = {
  'little-ground': 'what levelling took of it is not known: too little ground',
  'no-correlation': 'nothing but noise from pixel to pixel, of which levelling takes next to nothing',
  'too-wide': 'what levelling took of it is not known: it varies over too large a part of the map',
};

function textureFact({ sqNm, sqInsideTerracesNm, sqCorrectedNm, levellingBiasShare, noEstimate: why }: NonNullable<SampleSummary['texture']>): GroundFact {
  const note = why === undefined
    ? `levelling takes roughness along with form: Sq is too low by about ${percent(levellingBiasShare)}, corrected ${withUnit(sqCorrectedNm, 'nm')}`
    : noEstimate[why];
  return {
    name: 'Roughness Sq', value: `${withUnit(sqNm, 'nm')}${sqInsideTerracesNm === undefined ? '' : ` (${withUnit(sqInsideTerracesNm, 'nm')} inside terraces)`}`, topic: 'texture',
    ...(note === undefined ? {} : { note: `rms height of the flawless ground (ISO 25178-2); ${note}` }),
  };
}

const offsetWords: Readonly<Record<string, string>> = {
  blocked: 'read where flaws block the current', 'off the sample': 'read off the sample', 'noise peak': 'read from the noise peak', given: 'as given', assumed: 'assumed, as no spot without current was found',
};

function currentFacts({ current }: SampleSummary): GroundFact[] {
  if (!current) return [{ name: 'Current', value: 'not measured', topic: 'zero' }];
  const { unit, offsetA, offsetSeA, offsetFrom, noiseA, floorA, floorSeA, stepA, saturationA, saturatedPixels, repairedPixels } = current;
  const amount = (value: number): string => (unit === 'A' ? withPrefix(value, 'A') : `${figure(value)} (file’s unit)`);
  const measured = (value: number, error: number | undefined): string => (error === undefined ? amount(value) : unit === 'A' ? withError(value, error, 'A') : `${figure(value)} ± ${figure(error, 1)} (file’s unit)`);
  return [
    { name: 'Current offset', value: measured(offsetA, offsetSeA), topic: 'zero', ...(offsetFrom === undefined ? {} : { note: offsetWords[offsetFrom] ?? offsetFrom }) },
    { name: 'Noise of the current', value: amount(noiseA), note: 'standard deviation where no current flows', topic: 'noise' },
    {
      name: 'Floor', value: measured(floorA, floorSeA), topic: 'zero',
      note: `below it a current cannot be told from none: three times the noise${stepA === undefined ? '' : `, or two of the steps of ${amount(stepA)} in which the current is digitised`}, or as given`,
    },
    {
      name: 'Saturation', topic: 'zero', value: saturationA === undefined ? 'none seen' : `at ${amount(saturationA)}, ${counted(saturatedPixels, 'pixel')}`,
      ...(saturationA === undefined ? {} : { note: 'there the current is at least this' }),
    },
    { name: 'Repaired in the current', value: counted(repairedPixels, 'pixel'), topic: 'repair' },
    wearFact(current),
    current.lagPx === 0
      ? { name: 'Amplifier’s lag', value: 'none found', topic: 'lag' }
      : { name: 'Amplifier’s lag', value: `${fixed(current.lagPx, 2)}${current.lagSePx === undefined ? '' : ` ± ${fixed(Math.max(0.01, current.lagSePx), 2)}`} pixels, undone`, note: 'time constant along the lines, from the tails behind sharp edges', topic: 'lag' },
    current.shift ? shiftFact('Current against height', current.shift) : { name: 'Current against height', value: 'the maps do not tell', topic: 'alignment' },
  ];
}

function wearFact({ wearTold, wearDecades, driftDecades, driftSeDecades }: NonNullable<SampleSummary['current']>): GroundFact {
  const trend = driftDecades === undefined ? undefined : `the terraces’ current falls by ${fixed(driftDecades, 2)}${driftSeDecades === undefined ? '' : ` ± ${fixed(driftSeDecades, 2)}`} decades (powers of ten) from the first line to the last`;
  if (!wearTold) return { name: 'Wear of the tip', value: 'none undone', topic: 'wear', ...(trend === undefined ? {} : { note: `${trend}, which cannot be told from the barrier’s own variation` }) };
  return {
    name: 'Wear of the tip', value: `${fixed(wearDecades, 2)} decades lost (a factor of ${figure(10 ** wearDecades, 2)}), undone`, topic: 'wear',
    note: `${trend === undefined ? 'told on the terraces, line by line' : trend}; scan again with a fresh tip if the verdict hangs on it`,
  };
}

function shiftFact(name: string, { rightPx, rightSePx, downPx, downSePx, undoneRightPx, undoneDownPx }: ShiftSummary): GroundFact {
  const undone = undoneRightPx !== 0 || undoneDownPx !== 0;
  return {
    name, topic: 'alignment', value: `${fixed(rightPx, 2)} ± ${fixed(rightSePx, 2)} pixels to the right, ${fixed(downPx, 2)} ± ${fixed(downSePx, 2)} down`,
    note: undone ? `moved back by whole pixels: ${Math.abs(undoneRightPx)} to the ${undoneRightPx > 0 ? 'left' : 'right'}, ${Math.abs(undoneDownPx)} ${undoneDownPx > 0 ? 'up' : 'down'}` : 'too little, or too uncertain, to be undone',
  };
}

function returnFacts({ returned, current }: SampleSummary): GroundFact[] {
  if (!returned) return [];
  const { heightNoiseNm, heightShift, currentNoiseA, lagPx, driftDecades, currentShift } = returned;
  const parts = [
    ...(heightNoiseNm === undefined ? [] : [`height noise ${withUnit(heightNoiseNm, 'nm', 2)}`]),
    ...(currentNoiseA === undefined ? [] : [`current noise ${current?.unit === 'relative' ? figure(currentNoiseA) : withPrefix(currentNoiseA, 'A')}`]),
    ...(lagPx === undefined || lagPx === 0 ? [] : [`lag ${fixed(lagPx, 2)} pixels`]),
    ...(driftDecades === undefined ? [] : [`current falls by ${fixed(driftDecades, 2)} decades down the map`]),
  ];
  return [
    { name: 'Return scan', value: parts.length === 0 ? 'read' : parts.join(', '), note: 'compared, not mixed into the maps', topic: 'alignment' },
    ...(heightShift ? [shiftFact('Return against forward, height', heightShift)] : []),
    ...(currentShift ? [shiftFact('Return against forward, current', currentShift)] : []),
  ];
}
