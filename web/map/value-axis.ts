/** The axis of the value scale: values on a linear or logarithmic line, and its ticks. */
import type { MapInfo, SampleSummary } from '../../workers/api.ts';

export interface Axis {
  readonly low: number;
  readonly high: number;
  readonly log: boolean;
}

/** What a picture shows: colours run from `low` to `high`. */
export interface Limits extends Axis {}

/** Whether a map's values allow a logarithmic scale. */
export function canBeLog(map: MapInfo): boolean {
  return map.most > 0 && map.high > 0;
}

/** Good limits for a first picture. */
export function firstLimits(map: MapInfo): Limits {
  const log = map.log && canBeLog(map);
  const high = map.high;
  const low = log ? Math.max(map.low, high / 1e6, Number.MIN_VALUE) : map.low;
  return high > low ? { low, high, log } : { low, high: log ? low * 10 : low + 1, log };
}

/** The line under the handles: everything near the first limits, a little wider, but no further than the values go. */
export function axisOf(map: MapInfo, log: boolean): Axis {
  const first = firstLimits({ ...map, log });
  if (first.log) {
    const room = Math.max(0.5, 0.25 * Math.log10(first.high / first.low));
    return { low: Math.max(first.low / 10 ** room, map.least > 0 ? map.least : 0), high: Math.max(first.high, Math.min(first.high * 10 ** room, map.most)), log: true };
  }
  const room = 0.5 * (first.high - first.low);
  return { low: Math.min(first.low, Math.max(first.low - room, map.least)), high: Math.max(first.high, Math.min(first.high + room, map.most)), log: false };
}

/** Share of the axis at a value: 0 at its low end, 1 at its high end; clipped. */
export function shareOf(axis: Axis, value: number): number {
  if (Number.isNaN(value)) return Number.NaN;
  if (axis.log && value <= 0) return 0;
  const share = axis.log ? Math.log(value / axis.low) / Math.log(axis.high / axis.low) : (value - axis.low) / (axis.high - axis.low);
  return Math.min(1, Math.max(0, share));
}

/** Value at a share of the axis. */
export function valueAt(axis: Axis, share: number): number {
  return axis.log ? axis.low * (axis.high / axis.low) ** share : axis.low + share * (axis.high - axis.low);
}

export interface Tick {
  readonly share: number;
  readonly value: number;
  /** In layers, where the tick is a rung of the ladder; else the value itself is the label. */
  readonly label?: string;
  /** The reference's rung. */
  readonly reference?: boolean;
}

/** Rungs of the ladder on the axis of a current: "13" at the rung's median, "12 layers" at the reference's; the label carries ≤ or ≥ where its thickness is a bound. */
export function layerTicks(axis: Axis, ladder: SampleSummary['ladder']): readonly Tick[] {
  return (ladder?.rungs ?? []).flatMap((rung) => {
    const value = 10 ** rung.medianLog10;
    if (!(value > axis.low && value < axis.high)) return [];
    const bound = rung.bound === 'at-most' ? '≤' : rung.bound === 'at-least' ? '≥' : '';
    const count = rung.layers === undefined ? (rung.step > 0 ? `+${rung.step}` : String(rung.step).replace('-', '−')) : String(rung.layers);
    return [{ share: shareOf(axis, value), value, label: `${bound}${count}${rung.step === 0 ? ' layers' : ''}`, reference: rung.step === 0 }];
  });
}

/** Round values on the axis: powers of ten (or 1-2-5 within one decade or two) when logarithmic, else about five even steps. `whole`: whole numbers only. */
export function roundTicks(axis: Axis, whole = false): readonly Tick[] {
  const values: number[] = [];
  if (axis.log) {
    const decades = Math.log10(axis.high / axis.low);
    const leads = decades > 2.5 ? [1] : decades > 1 ? [1, 3] : [1, 2, 5];
    for (let power = Math.floor(Math.log10(axis.low)); power <= Math.log10(axis.high); power++) {
      for (const lead of leads) values.push(Number(`${lead}e${power}`));
    }
  } else {
    const rough = Math.max(whole ? 1 : 0, (axis.high - axis.low) / 5);
    const power = 10 ** Math.floor(Math.log10(rough));
    const step = (rough / power > 5 ? 10 : rough / power > 2 ? 5 : rough / power > 1 ? 2 : 1) * power;
    for (let i = Math.ceil(axis.low / step); i * step <= axis.high; i++) values.push(Number((i * step).toPrecision(12)));
  }
  return values.filter((value) => value >= axis.low && value <= axis.high).map((value) => ({ share: shareOf(axis, value), value }));
}

/**
 * What the scale marks as the reference's ground: on the current's axis the values read as the reference's layers (half a ladder step each
 * way), on the glow's axis the band itself (×/÷ the band factor about 1). Undefined where there is neither.
 */
export function referenceMark(axis: Axis, map: MapInfo, summary: SampleSummary, bandFactor: number): { readonly from: number; readonly to: number; readonly label: string } | undefined {
  const mark = (centre: number, factor: number, label: string) => ({ from: shareOf(axis, centre / factor), to: shareOf(axis, centre * factor), label });
  if (map.name === 'glow') return mark(1, bandFactor, 'band');
  if ((map.name !== 'current' && map.name !== 'rawCurrent') || !summary.reference || !summary.ladder) return undefined;
  const layers = summary.reference.layers;
  return mark(Math.abs(summary.reference.medianA), 10 ** (summary.ladder.stepDecades / 2), layers === undefined ? 'reference' : `${layers} layers, reference`);
}
