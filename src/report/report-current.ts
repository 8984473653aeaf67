/** The report's lines about the current: offset, noise and floor, then lag, alignment and wear. */
import type { CurrentGround, Ground } from '../ground/ground.ts';
import { leastWearDecades } from '../ground/wear.ts';
import { markup } from './markup.ts';
import type { Markup } from './markup.ts';
import { counted, fixed, withError, withPrefix, withUnit } from './numbers.ts';

const origins = {
  blocked: 'read where flaws block', 'off the sample': 'read beside the sample', 'noise peak': 'read from the noise peak', given: 'given', assumed: 'assumed',
} as const;

export function currentLines(current: CurrentGround, returned: Ground['returned']): Markup {
  const unit = current.unit;
  const value = (amount: number, digits = 3): string => (unit === 'A' ? withPrefix(amount, 'A', digits) : withUnit(amount, 'of the file’s unit', digits));
  const measured = (amount: number, error: number | undefined): string => (unit === 'A' ? withError(amount, error, 'A') : `${withError(amount, error, '')} of the file’s unit`);
  const from = current.offsetFrom === undefined ? '' : ` (${origins[current.offsetFrom]})`;
  const step = current.stepA === undefined ? '' : `, readings in steps of ${value(current.stepA)}`;
  return markup`<dt>Current</dt><dd>offset ${measured(current.offsetA, current.offsetSeA)} removed${from}, noise ${value(current.noiseA)}, floor ${measured(current.floorA, current.floorSeA)}${step}, ${counted(current.saturatedPixels, 'pixel')} saturated, ${current.repairedPixels} repaired; ${wearText(current)}</dd>
<dt>Lag and alignment</dt><dd>${lagText(current)}; ${shiftText(current)}</dd>${returned && returnLine(returned, value)}`;
}

function wearText({ wearDecades, driftDecades, driftSeDecades }: CurrentGround): string {
  if (wearDecades >= leastWearDecades) return `the tip lost ${withUnit(wearDecades, 'decades', 2)} of conductance${driftSeDecades === undefined ? '' : ` (± ${fixed(driftSeDecades, 2)})`}`;
  const none = 'tip wear cannot be told from the barrier, none undone';
  if (driftDecades === undefined || driftSeDecades === undefined || Number.isNaN(driftDecades)) return none;
  return `${none} (trend from first to last line ${fixed(-driftDecades, 2)} ± ${fixed(driftSeDecades, 2)} decades)`;
}

function lagText({ lagPx, lagSePx }: CurrentGround): string {
  if (lagPx === 0) return 'no lag of the amplifier found';
  return `amplifier lag with a time constant of ${fixed(lagPx, 2)}${lagSePx === undefined ? '' : ` ± ${fixed(Math.max(0.01, lagSePx), 2)}`} pixels undone`;
}

function shiftText({ shift }: CurrentGround): string {
  if (!shift) return 'shift against the height not measured';
  const size = `${fixed(shift.dxPx, 2)} ± ${fixed(shift.seXPx, 2)} pixels to the right and ${fixed(shift.dyPx, 2)} ± ${fixed(shift.seYPx, 2)} down`;
  const undone = shift.undoneXPx === 0 && shift.undoneYPx === 0 ? 'left as it is' : `moved back by ${fixed(shift.undoneXPx, 0)} and ${fixed(shift.undoneYPx, 0)} whole pixels`;
  return `current against height ${size}, ${undone}`;
}

function returnLine({ height, current }: NonNullable<Ground['returned']>, value: (amount: number) => string): Markup {
  const parts = [
    ...(height ? [`height noise ${withUnit(height.noiseM * 1e9, 'nm')}`] : []),
    ...(current ? [`current offset ${value(current.offsetA)}, noise ${value(current.noiseA)}`] : []),
    ...(current?.shift ? [`current ${fixed(current.shift.dxPx, 2)} ± ${fixed(current.shift.seXPx, 2)} pixels to the right of the forward scan’s`] : []),
  ];
  return markup`<dt>Return scan</dt><dd>compared, not mixed in: ${parts.join('; ')}</dd>`;
}
