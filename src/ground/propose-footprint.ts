/**
 * Where a map without outlines shows bare injector or substrate beside the flake, the flake's outline is proposed: that ground would
 * otherwise be booked as if it were barrier. Without evidence there is no proposal, and nothing else is changed either way.
 */
import { labelComponents } from '../grid/label-components.ts';
import type { Components } from '../grid/label-components.ts';
import { pixelAreaM2 } from '../grid/maps.ts';
import type { Grid, MaskMap, ScalarMap } from '../grid/maps.ts';
import { traceOutline } from '../grid/trace-outline.ts';
import { median } from '../stats/median.ts';
import { mostCommon } from './centre.ts';
import { sampleStep, subSample } from './fit-form.ts';
import type { BareGround, CurrentGround, FootprintProposal } from './ground.ts';
import { lineDifferencesSolved } from './lines.ts';
import { takeLines } from './plane-maps.ts';
import { slopeForm } from './slope-form.ts';

/** Ground this far below the most common one is looked at: more than four layers, so that a terrace or two below are not. */
const lowM = 1.5e-9;
/** With a telling current: least step at the border, metres, and least share of the map. */
const told = { stepM: 2e-9, share: 0.03 };
/** With the height alone. */
const untold = { stepM: 2.5e-9, share: 0.05 };
/** Censored share that makes a region's current telling; the rest must have less than `restShare`. */
const censoredShare = 0.75;
const restShare = 0.5;
/** Smaller gaps inside the flake belong to it: they are pinholes, which the ledger books. Smaller bare pieces are no region. */
const holeM2 = 0.25e-12;
/** The step is read between points this far from the border on both sides, so that a rounded edge does not shrink it. */
const reachM = 60e-9;
/** A border with fewer crossings along the lines than this share of those across them is a jump between lines. */
const crossingShare = 0.05;

/**
 * Proposes the flake's outline. A region counts as bare when it touches the map's border, lies at least 2 nm below the most common
 * ground behind a distinct step, covers 3 % of the map, and its current is censored over three quarters while the rest's is not:
 * saturated = injector, at the floor = substrate. Without such a current, 2.5 nm and 5 % are asked for and the ground is
 * "unknown". A region whose border only runs along scan lines is never taken: the scanner may have jumped.
 * The outline is the largest connected rest with gaps below 0.25 µm² filled.
 *
 * @param height as read, metres, not levelled: a form or lines fitted to heights lean on a step, so both are fitted here on differences, which
 * a step spoils only where it is crossed. NaN is no evidence; missing pixels go with the pixel above.
 * @param repaired pixels whose height is broken (they count as missing); @param order of the form.
 * @returns undefined without evidence, and for maps below 32 × 32.
 */
export function proposeFootprint(height: ScalarMap, repaired: MaskMap, current: CurrentGround | undefined, grid: Grid, order: number): FootprintProposal | undefined {
  const { columns, rows } = grid;
  if (columns < 32 || rows < 32) return undefined;
  const h = height.data.slice();
  for (let i = 0; i < h.length; i++) if (repaired.data[i] === 1) h[i] = Number.NaN;
  levelOnDifferences(h, columns, rows, order);
  fillShortGaps(h, columns);
  const low = new Uint8Array(h.length);
  let lowPixels = 0;
  for (let i = 0; i < h.length; i++) if (h[i]! < -lowM) lowPixels += low[i] = 1;
  if (lowPixels < told.share * h.length) return undefined;

  const regions = labelComponents(low, columns, rows, 4);
  const currents = current && censoredIn(current, regions);
  const atBorder = touching(regions.labels, columns, rows, regions.count);
  const accepted: { region: number; kind: BareGround; depthM: number; stepM: number }[] = [];
  for (let region = 1; region <= regions.count; region++) {
    if (atBorder[region] === 0 || regions.pixels[region]! < told.share * h.length) continue;
    const kind = currents ? kindOf(currents, region) : 'unknown';
    if (kind === undefined) continue;
    const least = kind === 'unknown' ? untold : told;
    if (regions.pixels[region]! < least.share * h.length) continue;
    const depthM = -medianIn(h, regions, region);
    const stepM = borderStep(h, regions.labels, region, grid);
    if (depthM >= least.stepM && stepM >= least.stepM) accepted.push({ region, kind, depthM, stepM });
  }
  if (accepted.length === 0) return undefined;

  const bare = bareMask(h, regions, grid, currents, accepted);
  const flake = mainPatch(bare, grid);
  const outlines = traceOutline(flake, grid);
  const rings = outlines[0];
  if (rings === undefined) return undefined;
  const kinds = new Set(accepted.map(({ kind }) => kind));
  return {
    ground: kinds.size === 1 ? accepted[0]!.kind : kinds.has('unknown') ? 'unknown' : 'both',
    bareM2: areaOf(bare, grid),
    stepM: median(accepted.map(({ stepM }) => stepM)),
    flakeM2: areaOf(flake, grid),
    outline: { layer: 'barrier', rings },
  };
}

/**
 * Height minus a form whose slopes agree with most differences between points a thirty-second of the map apart, minus line offsets from
 * differences too small to cross the step sought, zero at the most common height. Changes `h`.
 */
function levelOnDifferences(h: Float32Array, columns: number, rows: number, order: number): void {
  const powers: [number, number][] = [];
  for (let total = 1; total <= order; total++) for (let j = 0; j <= total; j++) powers.push([total - j, j]);
  const form = slopeForm(h, columns, rows, powers);
  const byRow = new Float64Array(order + 1);
  for (let r = 0; r < rows; r++) {
    const v = (2 * r) / (rows - 1) - 1;
    byRow.fill(0);
    powers.forEach(([p, q], k) => { byRow[p]! += form[k]! * v ** q; });
    takePolynomial(h, r * columns, columns, byRow);
  }
  takeLines(h, lineDifferencesSolved(h, columns, rows, () => true, lowM), columns);
  const zero = mostCommon(subSample(h, columns, rows, sampleStep(columns * rows)));
  for (let i = 0; i < h.length; i++) h[i]! -= zero;
}

/** Takes a polynomial in u, from −1 to 1 along the row, off one row. */
function takePolynomial(h: Float32Array, start: number, columns: number, coefficients: Float64Array): void {
  for (let c = 0; c < columns; c++) {
    const u = (2 * c) / (columns - 1) - 1;
    let sum = 0;
    for (let p = coefficients.length - 1; p >= 0; p--) sum = sum * u + coefficients[p]!;
    h[start + c]! -= sum;
  }
}

/** Missing pixels take the value above, three lines far at most: a broken run must not cut a region in two. Changes `h`. */
function fillShortGaps(h: Float32Array, columns: number): void {
  const depth = new Uint8Array(columns);
  for (let i = 0; i < h.length; i++) {
    const c = i % columns;
    if (!Number.isNaN(h[i]!)) depth[c] = 0;
    else if (i >= columns && depth[c]! < 3) {
      h[i] = h[i - columns]!;
      depth[c]!++;
    }
  }
}

/** Per region (0 = the rest): all pixels, those with a current, and how many of these are saturated or at the floor. */
interface Censored {
  readonly pixels: Uint32Array;
  readonly known: Float64Array;
  readonly saturated: Float64Array;
  readonly floor: Float64Array;
}

function censoredIn(current: CurrentGround, regions: Components): Censored {
  const [known, saturated, floor] = [0, 0, 0].map(() => new Float64Array(regions.count + 1)) as [Float64Array, Float64Array, Float64Array];
  const log10 = current.log10.data;
  for (let i = 0; i < log10.length; i++) {
    if (Number.isNaN(log10[i]!)) continue;
    const region = regions.labels[i]!;
    known[region]!++;
    saturated[region]! += current.saturated.data[i]!;
    floor[region]! += current.floor.data[i]!;
  }
  return { pixels: regions.pixels, known, saturated, floor };
}

/** What a region's current makes of it; undefined when it carries a current like a barrier. */
function kindOf({ pixels, known, saturated, floor }: Censored, region: number): BareGround | undefined {
  const share = (of: Float64Array, k: number) => (known[k]! > 0 ? of[k]! / known[k]! : 0);
  if (known[region]! < pixels[region]! / 2) return 'unknown';
  if (share(saturated, region) + share(floor, region) < censoredShare) return undefined;
  // A flake that is censored itself leaves only the height to judge by.
  if (share(saturated, 0) + share(floor, 0) > restShare) return 'unknown';
  return share(saturated, region) >= censoredShare ? 'injector' : share(floor, region) >= censoredShare ? 'substrate' : 'both';
}

function touching(labels: Uint32Array, columns: number, rows: number, count: number): Uint8Array {
  const touches = new Uint8Array(count + 1);
  for (let c = 0; c < columns; c++) touches[labels[c]!] = touches[labels[(rows - 1) * columns + c]!] = 1;
  for (let r = 0; r < rows; r++) touches[labels[r * columns]!] = touches[labels[r * columns + columns - 1]!] = 1;
  return touches;
}

/** Median over a region; of a large one every n-th pixel says enough. */
function medianIn(h: Float32Array, { labels, pixels }: Components, region: number): number {
  const every = Math.ceil(pixels[region]! / 50_000);
  const values: number[] = [];
  for (let i = 0, seen = 0; i < h.length; i++) if (labels[i] === region && seen++ % every === 0) values.push(h[i]!);
  return median(values);
}

/**
 * Median rise from inside a region to outside, over all places along its border; 0 where the step is not distinct (a quarter of the
 * places rise by less than half of it), is seen at fewer than twenty places, or follows the scan lines.
 */
function borderStep(h: Float32Array, labels: Uint32Array, region: number, { columns, rows, pitchXM, pitchYM }: Grid): number {
  const reachC = Math.min(20, Math.max(3, Math.round(reachM / pitchXM)));
  const reachR = Math.min(20, Math.max(3, Math.round(reachM / pitchYM)));
  const steps: number[] = [];
  let along = 0;
  let across = 0;
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      if (labels[i] !== region) continue;
      for (const [dc, dr] of [[1, 0], [-1, 0], [0, 1], [0, -1]] as const) {
        const beside = i + dc + dr * columns;
        if (c + dc < 0 || c + dc >= columns || r + dr < 0 || r + dr >= rows || labels[beside] === region || Number.isNaN(h[beside]!)) continue;
        if (dr === 0) along++;
        else across++;
        const [c1, r1, c0, r0] = [c + dc * reachC, r + dr * reachR, c - dc * reachC, r - dr * reachR];
        if (Math.min(c0, c1) < 0 || Math.max(c0, c1) >= columns || Math.min(r0, r1) < 0 || Math.max(r0, r1) >= rows) continue;
        const inner = r0 * columns + c0;
        const outer = r1 * columns + c1;
        const step = h[outer]! - h[inner]!;
        if (labels[inner] === region && labels[outer] !== region && !Number.isNaN(step)) steps.push(step);
      }
    }
  }
  if (steps.length < 20 || along < crossingShare * across) return 0;
  const sorted = Float64Array.from(steps).sort();
  const middle = median(sorted);
  return sorted[sorted.length >> 2]! >= middle / 2 ? middle : 0;
}

/** Accepted regions and their like (as deep, same current, 0.25 µm² or more), each up to half the depth, where the edge's slope is cut in two. */
function bareMask(h: Float32Array, regions: Components, grid: Grid, currents: Censored | undefined, accepted: readonly { region: number; kind: BareGround; depthM: number }[]): Uint8Array {
  const limit = new Float64Array(regions.count + 1).fill(Number.NEGATIVE_INFINITY);
  for (const { region, depthM } of accepted) limit[region] = -Math.max(lowM, depthM / 2);
  for (let region = 1; region <= regions.count; region++) {
    if (Number.isFinite(limit[region]!) || regions.pixels[region]! * pixelAreaM2(grid) < holeM2) continue;
    const kind = currents ? kindOf(currents, region) : 'unknown';
    const depthM = -medianIn(h, regions, region);
    if (accepted.some((known) => known.kind === kind && Math.abs(depthM / known.depthM - 1) < 0.25)) limit[region] = -Math.max(lowM, depthM / 2);
  }
  const bare = new Uint8Array(h.length);
  for (let i = 0; i < h.length; i++) {
    if (Number.isNaN(h[i]!)) bare[i] = i >= grid.columns ? bare[i - grid.columns]! : 0;
    else if (h[i]! < limit[regions.labels[i]!]!) bare[i] = 1;
  }
  return bare;
}

/** The largest connected part of what is not bare, its small gaps filled. */
function mainPatch(bare: Uint8Array, grid: Grid): Uint8Array {
  const { columns, rows } = grid;
  const rest = labelComponents(turned(bare), columns, rows, 4);
  let largest = 1;
  for (let k = 2; k <= rest.count; k++) if (rest.pixels[k]! > rest.pixels[largest]!) largest = k;
  const patch = new Uint8Array(bare.length);
  for (let i = 0; i < patch.length; i++) if (rest.labels[i] === largest) patch[i] = 1;
  const gaps = labelComponents(turned(patch), columns, rows, 8);
  const outside = touching(gaps.labels, columns, rows, gaps.count);
  return patch.map((value, i) => {
    const gap = gaps.labels[i]!;
    return gap !== 0 && outside[gap] === 0 && gaps.pixels[gap]! * pixelAreaM2(grid) < holeM2 ? 1 : value;
  });
}

function turned(mask: Uint8Array): Uint8Array {
  const out = new Uint8Array(mask.length);
  for (let i = 0; i < out.length; i++) out[i] = 1 - mask[i]!;
  return out;
}

function areaOf(mask: Uint8Array, grid: Grid): number {
  let pixels = 0;
  for (const value of mask) pixels += value;
  return pixels * pixelAreaM2(grid);
}
