/**
 * What a short script would do, for comparison: one plane for the whole map, each line's median, one height threshold, one current threshold
 * around the map's median, and the simplest classes there are.
 */
import type { FlawCause } from '../../src/flaws/flaws.ts';
import { labelComponents } from '../../src/grid/label-components.ts';
import { codeOf } from '../../src/ledger/book-causes.ts';
import { channelOf } from '../../src/read/sample.ts';
import type { Sample } from '../../src/read/sample.ts';
import { median } from '../../src/stats/median.ts';
import { fitPlane } from './plane.ts';
import type { Answer } from './score-answer.ts';

const raisedNm = 2;
const bandFactor = 3;
const shortMaxM2 = 0.02e-12;
/** Longer than wide by this much is a wrinkle; higher over its radius than this is a particle. */
const longRatio = 3;
const steepest = 0.25;

export function baselineAnswer(sample: Sample): Answer {
  const { columns, rows, pitchXM, pitchYM } = sample.grid;
  const levelledNm = levelled(Float64Array.from(channelOf(sample, 'height')!.values.data, (value) => value * 1e9), columns);
  const current = channelOf(sample, 'current')!.values.data;
  const saturation = current.reduce((most, value) => (value > most ? value : most), 0);
  const log10 = Float64Array.from(current, (value) => Math.log10(Math.max(value, 1e-13)));

  const raised = labelComponents(Uint8Array.from(levelledNm, (value) => (value > raisedNm ? 1 : 0)), columns, rows, 8);
  const bright = labelComponents(Uint8Array.from(current, (value) => (value >= saturation ? 1 : 0)), columns, rows, 8);
  const flawLabels = new Uint32Array(current.length);
  const flawCauses: (FlawCause | undefined)[] = [undefined];
  const shapes = shapesOf(raised.labels, raised.count, levelledNm, columns, pitchXM, pitchYM);
  for (let n = 1; n <= raised.count; n++) flawCauses.push(classOf(shapes[n]!));
  const shortNumber = new Uint32Array(bright.count + 1);
  for (let n = 1; n <= bright.count; n++) if (bright.pixels[n]! * pitchXM * pitchYM <= shortMaxM2) shortNumber[n] = flawCauses.push('short') - 1;
  for (let i = 0; i < flawLabels.length; i++) flawLabels[i] = shortNumber[bright.labels[i]!]! || raised.labels[i]!;

  const middle = median(log10.filter((_, i) => flawLabels[i] === 0));
  const band = Math.log10(bandFactor);
  const [usable, unmeasured, thin, thick] = [codeOf('usable'), codeOf('unmeasured'), codeOf('thin'), codeOf('thick')];
  const codes = Uint8Array.from(log10, (value, i) => {
    const cause = flawCauses[flawLabels[i]!];
    if (cause) return codeOf(cause);
    if (Number.isNaN(value)) return unmeasured;
    return value > middle + band ? thin : value < middle - band ? thick : usable;
  });
  return { codes, flawLabels, flawCauses, levelledNm, wearDecades: 0, lagPx: 0 };
}

function levelled(values: Float64Array, columns: number): Float64Array {
  const plane = fitPlane(values, columns);
  const flat = values.map((value, i) => value - plane(i));
  for (let start = 0; start < flat.length; start += columns) {
    const row = flat.subarray(start, start + columns);
    const middle = median(row);
    if (!Number.isNaN(middle)) for (let c = 0; c < columns; c++) row[c]! -= middle;
  }
  return flat;
}

interface Shape {
  readonly longM: number;
  readonly shortM: number;
  readonly peakM: number;
  readonly radiusM: number;
}

/** Box and peak of every region. */
function shapesOf(labels: ArrayLike<number>, count: number, heightNm: Float64Array, columns: number, pitchXM: number, pitchYM: number): (Shape | undefined)[] {
  const sums = Array.from({ length: count + 1 }, () => ({ n: 0, x: 0, y: 0, xx: 0, xy: 0, yy: 0, peak: 0 }));
  for (let i = 0; i < labels.length; i++) {
    const sum = sums[labels[i]!]!;
    const x = (i % columns) * pitchXM;
    const y = Math.floor(i / columns) * pitchYM;
    sum.n++;
    sum.x += x;
    sum.y += y;
    sum.xx += x * x;
    sum.xy += x * y;
    sum.yy += y * y;
    if (heightNm[i]! > sum.peak) sum.peak = heightNm[i]!;
  }
  return sums.map(({ n, x, y, xx, xy, yy, peak }, label) => {
    if (label === 0) return undefined;
    // A pixel is as wide as its pitch, which keeps a single line of them from being endlessly long.
    const cxx = xx / n - (x / n) ** 2 + pitchXM ** 2 / 12;
    const cyy = yy / n - (y / n) ** 2 + pitchYM ** 2 / 12;
    const cxy = xy / n - (x / n) * (y / n);
    const half = Math.hypot((cxx - cyy) / 2, cxy);
    const middle = (cxx + cyy) / 2;
    return { longM: Math.sqrt(middle + half), shortM: Math.sqrt(Math.max(0, middle - half)), peakM: peak * 1e-9, radiusM: Math.sqrt((n * pitchXM * pitchYM) / Math.PI) };
  });
}

function classOf({ longM, shortM, peakM, radiusM }: Shape): FlawCause {
  if (longM > longRatio * shortM) return 'wrinkle';
  return peakM > steepest * radiusM || peakM < 0.08 * radiusM ? 'residue' : 'bubble';
}
