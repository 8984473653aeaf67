/** How far this map's usable area is known. */
import type { Barrier } from '../barrier/barrier.ts';
import type { Grid } from '../grid/maps.ts';
import { pixelAreaM2 } from '../grid/maps.ts';
import { bandEdgeLog10 } from '../sheet/band-edge.ts';
import { codeOf } from './book-causes.ts';

export interface IntervalInput {
  readonly grid: Grid;
  readonly codes: Uint8Array;
  /** Pixels booked as usable, and of the footprint. */
  readonly usablePixels: number;
  readonly footprintPixels: number;
  /** Absent for a height alone. */
  readonly density?: {
    readonly barrier: Barrier;
    /** Log10 of the current, NaN missing. */
    readonly log10: Float32Array;
    /** True where log density follows the current pixel by pixel rather than in whole layers. */
    readonly byPixel: boolean;
    readonly bandFactor: number;
    /** 95 % half-width of the decades a layer costs in the device, as a share (`layerCostSpread`). */
    readonly layerCostSpread: number;
  };
}

/**
 * Standard deviation of the position of an outline, in pixels. Our own judgement, not a measurement: rounding to whole pixels alone is √(1/12) = 0.29 px,
 * and the thresholds move an outline by about as much again on the shallow flank of a bubble and by less on a steep one.
 */
const outlinePx = 0.35;
/**
 * Part of the sum of all outlines' errors that is left, because different outlines err independently: 1/√n for n of them. Our own
 * judgement: about nine, few and large ones ruling the sum.
 */
const outlinesTogether = 1 / 3;
/**
 * Part of the ladder's step by which the border between two terraces may lie elsewhere (one standard deviation). Our own judgement: a border
 * half-way between two peaks of a histogram is placed to about the width of one of its bins, a sixteenth of a step.
 */
const borderPart = 0.06;

/**
 * Ends of the 95 % interval of the usable area, m². Three independent parts in quadrature:
 *
 * - outlines: everything that borders usable ground is placed to about a third of a pixel, and errs the same way along one outline, so the
 *   error is length × position error;
 * - borders of terraces: pixels whose log current lies within a small part of the step (or its standard error) from the border between the last
 *   terrace in band and the next could belong to either side;
 * - band edges: log densities over the reference's are stretched and shrunk by `layerCostSpread`; usable ground that leaves the band by it is taken
 *   from the lower end, thin and thick ground that enters is added to the upper one (also where rim, starvation or size would then
 *   claim it, so that the upper end is rather too high).
 *
 * A map is a census of its footprint: no sampling error is added. Not included: another choice of reference (said as a remark), the class
 * of a flaw (all are lost ground), and effects that the chain does not model.
 */
export function usableInterval(input: IntervalInput): { readonly low95M2: number; readonly high95M2: number } {
  const { codes, grid, density, usablePixels, footprintPixels } = input;
  const area = pixelAreaM2(grid);
  const { near, leaving, entering } = density ? atTheEdges(codes, density) : { near: 0, leaving: 0, entering: 0 };
  const half = 1.96 * Math.hypot(outlinePx * outlinesTogether * outlinePixels(input), near / 2);
  return {
    low95M2: Math.max(0, usablePixels - Math.hypot(half, leaving)) * area,
    high95M2: Math.min(footprintPixels, usablePixels + Math.hypot(half, entering)) * area,
  };
}

/** Pixels of a one-pixel seam along all borders of usable ground with flaws or other ground (the map's own border is none). */
function outlinePixels({ codes, grid: { columns, rows } }: IntervalInput): number {
  const usable = codeOf('usable');
  let edges = 0;
  for (let r = 0, i = 0; r < rows; r++) {
    let left = codes[i] === usable;
    for (let c = 0; c < columns; c++, i++) {
      const here = codes[i] === usable;
      if (here !== left) edges++;
      if (r > 0 && here !== (codes[i - columns] === usable)) edges++;
      left = here;
    }
  }
  // Edges of pixels overstate the length of an outline by 4/π on average (Cauchy–Crofton with two directions).
  return edges * (Math.PI / 4);
}

/** Pixels near the borders of terraces, and those that a change of the layers' cost takes out of the band or into it. */
function atTheEdges(codes: Uint8Array, density: NonNullable<IntervalInput['density']>): { near: number; leaving: number; entering: number } {
  const { barrier, log10, byPixel, layerCostSpread } = density;
  const { stepDecades, stepSeDecades } = barrier.ladder;
  const relative = barrier.log10Relative.data;
  const band = bandEdgeLog10(density.bandFactor);
  const { thin: thinBorder, thick: thickBorder } = byPixel ? { thin: Number.NaN, thick: Number.NaN } : terraceBorders(barrier, band);
  const reach = Math.hypot(borderPart * stepDecades, stepSeDecades);
  const [usable, thin, thick] = [codeOf('usable'), codeOf('thin'), codeOf('thick')];
  const leaves = band / (1 + layerCostSpread);
  const enters = layerCostSpread < 1 ? band / (1 - layerCostSpread) : Number.POSITIVE_INFINITY;
  let near = 0;
  let leaving = 0;
  let entering = 0;
  for (let i = 0; i < codes.length; i++) {
    const code = codes[i]!;
    if (code !== usable && code !== thin && code !== thick) continue;
    const off = Math.abs(relative[i]!);
    if (code === usable) {
      if (off > leaves) leaving++;
    } else if (off <= enters) entering++;
    // No border is NaN, and nothing is near it.
    const value = log10[i]!;
    if (byPixel ? Math.abs(off - band) < reach : Math.abs(value - thinBorder) < reach || Math.abs(value - thickBorder) < reach) near++;
  }
  return { near, leaving, entering };
}

/** Log currents half a step beyond the last terrace in band on either side; NaN where no terrace lies beyond it. */
function terraceBorders(barrier: Barrier, band: number): { thin: number; thick: number } {
  const { rungs, stepDecades } = barrier.ladder;
  const steps = barrier.step.data;
  const relative = barrier.log10Relative.data;
  // By step + 128. Density goes by whole layers here, so one pixel of a terrace speaks for all.
  const seen = new Uint8Array(256);
  const outOfBand = new Uint8Array(256);
  for (let i = 0, left = rungs.length; i < steps.length && left > 0; i++) {
    const place = steps[i]! + 128;
    if (seen[place] === 1 || Number.isNaN(relative[i]!)) continue;
    seen[place] = 1;
    left--;
    if (Math.abs(relative[i]!) > band) outOfBand[place] = 1;
  }
  const border = (side: 1 | -1): number => {
    const outwards = rungs.filter(({ step }) => step * side >= 0).sort((a, b) => side * (a.step - b.step));
    const beyond = outwards.findIndex(({ step }) => outOfBand[step + 128] === 1);
    const last = outwards[beyond - 1];
    return last ? last.medianLog10 - (side * stepDecades) / 2 : Number.NaN;
  };
  return { thin: border(-1), thick: border(1) };
}
