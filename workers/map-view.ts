/** The maps that can be asked for by name, in the units the page speaks. */
import { channelOf } from '../src/read/sample.ts';
import type { Appraised } from '../src/report/appraised.ts';
import { displayRange } from '../src/report/display-range.ts';
import type { MapInfo, MapName } from './api.ts';
import { mapNames } from './api.ts';
import { failure } from './errors.ts';

/** Values without a copy: the value of pixel i is `data[i] · factor`, missing where that is NaN or where `data[i]` is `missing`. */
export interface MapView {
  readonly name: MapName;
  readonly data: Float32Array | Uint8Array;
  readonly columns: number;
  readonly rows: number;
  readonly factor: number;
  readonly unit: string;
  readonly log: boolean;
  /** A number that stands for "unknown" in maps of counts. */
  readonly missing?: number;
  /** Least value worth a colour on a logarithmic scale. */
  readonly floor?: number;
}

/**
 * `height` levelled, `current` conditioned (offset removed, broken runs repaired, drift undone, positive whatever the bias's sign), `layers`,
 * `thickness`, `glow`, and the first forward channels as read.
 */
export function viewOf(appraised: Appraised, name: MapName): MapView | undefined {
  const { sample, ground, barrier, ledger } = appraised;
  const view = (data: Float32Array | Uint8Array | undefined, factor: number, unit: string, more: Partial<MapView> = {}): MapView | undefined =>
    data && { name, data, columns: sample.grid.columns, rows: sample.grid.rows, factor, unit, log: false, ...more };
  switch (name) {
    case 'height': return view(ground.height?.levelled.data, 1e9, 'nm');
    case 'current': {
      const current = ground.current;
      return current && view(current.conditioned.data, 1, current.unit, { log: true, floor: current.floorA });
    }
    case 'layers': return view(barrier?.layers?.data, 1, '', { missing: 0 });
    case 'thickness': return view(barrier?.thickness?.data, 1e9, 'nm');
    case 'glow': return ground.current && view(ledger.glow.data, 1, '');
    case 'rawHeight': return view(channelOf(sample, 'height')?.values.data, 1e9, 'nm');
    case 'rawCurrent': {
      const channel = channelOf(sample, 'current');
      // A negative bias gives negative currents, which have no logarithm.
      return channel && view(channel.values.data, 1, channel.unit, { log: !((channel.biasV ?? 0) < 0) });
    }
  }
}

/** @throws ComputeError `map-absent` */
export function viewFor(appraised: Appraised, name: MapName): MapView {
  const view = viewOf(appraised, name);
  if (!view) throw failure('map-absent', String(name));
  return view;
}

/** Value of a pixel in the view's unit, NaN where missing. */
export function valueAt(view: MapView, index: number): number {
  const value = view.data[index];
  return value === undefined || value === view.missing ? Number.NaN : value * view.factor;
}

/** What is told about the maps that this sample has and that hold a value. */
export function mapInfos(appraised: Appraised): MapInfo[] {
  return mapNames.flatMap((name) => {
    const view = viewOf(appraised, name);
    const info = view && infoOf(view);
    return info ? [info] : [];
  });
}

function infoOf(view: MapView): MapInfo | undefined {
  const { data, factor, missing, log, unit, name } = view;
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < data.length; i++) {
    const value = data[i]!;
    if (value === missing) continue;
    if (value < least) least = value;
    if (value > most) most = value;
  }
  // Also true when every value is missing.
  if (!(least <= most)) return undefined;
  const drawable = log || missing !== undefined ? Float32Array.from(data, (value) => (value === missing || (log && value <= 0) ? Number.NaN : value)) : (data as Float32Array);
  const range = displayRange(drawable);
  const low = Math.max(range?.low ?? least, log ? (view.floor ?? 0) : Number.NEGATIVE_INFINITY);
  return { name, unit, log: log && range !== undefined, low: low * factor, high: Math.max(low, range?.high ?? most) * factor, least: least * factor, most: most * factor };
}
