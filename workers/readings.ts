/** Numbers read off the maps: the values under a point, a cut, a histogram. */
import { causes } from '../src/ledger/ledger.ts';
import { toUm } from '../src/report/units.ts';
import type { Appraised } from '../src/report/appraised.ts';
import type { CutRequest, HistogramRequest, MapName, PointValues } from './api.ts';
import { mapNames } from './api.ts';
import { failure } from './errors.ts';
import { valueAt, viewFor, viewOf } from './map-view.ts';
import { flawEntry } from './summary.ts';

const mostPoints = 1 << 20;
const mostBins = 1 << 16;

/**
 * Values of the pixel that holds a point in µm (origin lower left). A point beside the map is taken for the nearest one on its edge.
 *
 * @throws ComputeError `request-value` when a coordinate is not a number.
 */
export function pointValues(appraised: Appraised, xUm: number, yUm: number): PointValues {
  const { sample: { grid }, ground: { height, current }, flaws, ledger } = appraised;
  if (Number.isNaN(xUm) || Number.isNaN(yUm)) throw failure('request-value', 'a coordinate of the point is not a number');
  const x = clamp(xUm, toUm(grid.columns * grid.pitchXM));
  const y = clamp(yUm, toUm(grid.rows * grid.pitchYM));
  const column = Math.min(grid.columns - 1, Math.floor((x * 1e-6) / grid.pitchXM));
  const row = grid.rows - 1 - Math.min(grid.rows - 1, Math.floor((y * 1e-6) / grid.pitchYM));
  const index = row * grid.columns + column;
  const values: Partial<Record<MapName, number>> = {};
  for (const name of mapNames) {
    const view = viewOf(appraised, name);
    const value = view ? valueAt(view, index) : Number.NaN;
    if (Number.isFinite(value)) values[name] = value;
  }
  const label = flaws.labels.data[index];
  const flaw = label === 0 ? undefined : flaws.list.find((candidate) => candidate.flaw === label);
  return {
    xUm: x, yUm: y, column, row, values,
    cause: causes[ledger.codes.data[index]!] ?? 'outside',
    saturated: current?.saturated.data[index] === 1,
    atFloor: current?.floor.data[index] === 1,
    repaired: height?.repaired.data[index] === 1 || current?.repaired.data[index] === 1,
    ...(flaw ? { flaw: flawEntry(flaw) } : {}),
  };
}

/**
 * Values at equally spaced points from one end to the other, both included, each that of the pixel that holds it (nothing is smoothed, so a cut
 * shows what was measured); NaN where missing and beside the map.
 *
 * @throws ComputeError `map-absent`, `request-value`.
 */
export function cutValues(appraised: Appraised, { map, fromUm, toUm: endUm, points }: CutRequest): Float32Array<ArrayBuffer> {
  if (!(Number.isInteger(points) && points >= 2 && points <= mostPoints)) throw failure('request-value', `a cut takes 2 to ${mostPoints} points, not ${points}`);
  if (![...fromUm, ...endUm].every(Number.isFinite)) throw failure('request-value', 'an end of the cut is not a number');
  const view = viewFor(appraised, map);
  const { columns, rows, pitchXM, pitchYM } = appraised.sample.grid;
  const out = new Float32Array(points);
  for (let i = 0; i < points; i++) {
    const t = i / (points - 1);
    // A point on the map's far edge still belongs to the last pixel.
    const u = ((1 - t) * fromUm[0] + t * endUm[0]) * (1e-6 / pitchXM);
    const v = ((1 - t) * fromUm[1] + t * endUm[1]) * (1e-6 / pitchYM);
    const inside = u >= 0 && u <= columns && v >= 0 && v <= rows;
    const column = Math.min(columns - 1, Math.floor(u));
    const row = rows - 1 - Math.min(rows - 1, Math.floor(v));
    out[i] = inside ? valueAt(view, row * columns + column) : Number.NaN;
  }
  return out;
}

/**
 * Pixels per bin between `low` and `high`, equal bins of the value or, with `log`, of its logarithm; `high` itself counts in the last bin.
 * Values outside, and missing ones, are left out.
 *
 * @throws ComputeError `map-absent`, `request-value`.
 */
export function histogramOf(appraised: Appraised, { map, low, high, log, bins }: HistogramRequest): Uint32Array<ArrayBuffer> {
  if (!(Number.isInteger(bins) && bins >= 1 && bins <= mostBins)) throw failure('request-value', `a histogram takes 1 to ${mostBins} bins, not ${bins}`);
  if (!(high > low && Number.isFinite(high - low)) || (log && !(low > 0))) throw failure('request-value', 'the limits of the histogram are empty, or not positive on a logarithmic scale');
  const view = viewFor(appraised, map);
  const counts = new Uint32Array(bins);
  const from = log ? Math.log(low) : low;
  const perUnit = bins / ((log ? Math.log(high) : high) - from);
  for (let i = 0; i < view.data.length; i++) {
    const value = valueAt(view, i);
    if (!(value >= low && value <= high)) continue;
    const bin = Math.min(bins - 1, Math.max(0, Math.floor(((log ? Math.log(value) : value) - from) * perUnit)));
    counts[bin] = counts[bin]! + 1;
  }
  return counts;
}

function clamp(value: number, most: number): number {
  return Math.min(most, Math.max(0, value));
}
