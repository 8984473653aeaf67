/** Books every pixel of the footprint to one cause. */
import type { FlawCause } from '../flaws/flaws.ts';
import { squaredDistance } from '../grid/distance.ts';
import type { Grid } from '../grid/maps.ts';
import { pixelAreaM2 } from '../grid/maps.ts';
import { labelComponents } from '../grid/label-components.ts';
import { bandEdgeLog10 } from '../sheet/band-edge.ts';
import type { Cause } from './ledger.ts';
import { causes } from './ledger.ts';

/** Code of a cause. */
export function codeOf(cause: Cause): number {
  return causes.indexOf(cause);
}

/** 1 where a pixel has the code. */
export function maskOfCode(codes: Uint8Array, code: number): Uint8Array {
  const mask = new Uint8Array(codes.length);
  for (let i = 0; i < mask.length; i++) if (codes[i] === code) mask[i] = 1;
  return mask;
}

export interface BookingInput {
  readonly grid: Grid;
  readonly footprint: Uint8Array;
  /** Flaw number per pixel and the cause of each number (index 0 unused). */
  readonly flawLabels: Uint32Array;
  readonly flawCauses: readonly (FlawCause | undefined)[];
  /** 1 where nothing was measured that could book the pixel. */
  readonly unmeasured: Uint8Array;
  /** Log10 of density over the reference's, NaN unknown; absent for a height alone. */
  readonly log10Relative?: Float32Array;
  readonly starved?: Uint8Array;
  readonly unconnected?: Uint8Array;
  readonly bandFactor: number;
  readonly rimM: number;
  readonly shortRimM: number;
  readonly strayMinM2: number;
}

/**
 * Cause codes, row-major, in the fixed order of test: short, bubble, residue, wrinkle, unmeasured, open, thin, thick, starved, rim, stray; what
 * none claims is usable, what lies outside the footprint 0.
 *
 * - A pixel of the footprint whose density is unknown without a flaw to explain it is unmeasured.
 * - Rim: closer than `rimM` to the footprint's edge (the map's border is one) or than `shortRimM` to a short's, measured from the pixel's centre.
 * - Stray: what is left in band in a patch (4-connected) below `strayMinM2`, or unconnected.
 */
export function bookCauses(input: BookingInput): Uint8Array {
  const { grid, footprint, flawLabels, flawCauses, log10Relative, unmeasured: notMeasured, starved: starvedAt } = input;
  const count = footprint.length;
  const codes = new Uint8Array(count);
  const flawCodes = Uint8Array.from(flawCauses, (cause) => (cause ? codeOf(cause) : 0));
  const [usable, unmeasured, thin, thick, starved] = [codeOf('usable'), codeOf('unmeasured'), codeOf('thin'), codeOf('thick'), codeOf('starved')];
  const open = codeOf('open');
  const band = bandEdgeLog10(input.bandFactor);
  for (let i = 0; i < count; i++) {
    if (footprint[i] === 0) continue;
    const flaw = flawCodes[flawLabels[i]!]!;
    if (flaw !== 0 && flaw !== open) {
      codes[i] = flaw;
      continue;
    }
    if (notMeasured[i] === 1) codes[i] = unmeasured;
    else if (flaw === open) codes[i] = open;
    else if (!log10Relative) codes[i] = usable;
    else {
      const relative = log10Relative[i]!;
      if (Number.isNaN(relative)) codes[i] = unmeasured;
      else if (relative > band) codes[i] = thin;
      else if (relative < -band) codes[i] = thick;
      else codes[i] = starvedAt && starvedAt[i] === 1 ? starved : usable;
    }
  }
  if (input.rimM > 0) bookNear(codes, footprint, grid, input.rimM, true);
  if (input.shortRimM > 0) {
    const short = codeOf('short');
    bookNear(codes, codes.map((code) => (code === short ? 0 : 1)), grid, input.shortRimM, false);
  }
  bookStray(codes, input, pixelAreaM2(grid));
  return codes;
}

/**
 * Books usable pixels whose centre lies closer than `reachM` to a pixel where `mask` is 0 (to its nearest edge, not its centre) as rim. Exact for
 * unequal pitches. The distance between centres decides nearly all: the nearest edge is closer than the nearest centre by at most half
 * a pixel's diagonal, so only pixels within that of the limit are measured to the edges themselves.
 */
function bookNear(codes: Uint8Array, mask: Uint8Array, grid: Grid, reachM: number, outsideIsBackground: boolean): void {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const [usable, rim] = [codeOf('usable'), codeOf('rim')];
  if (outsideIsBackground) {
    for (let r = 0, i = 0; r < rows; r++) {
      const nearRow = (Math.min(r, rows - 1 - r) + 0.5) * pitchYM < reachM;
      for (let c = 0; c < columns; c++, i++) {
        if (codes[i] === usable && (nearRow || (Math.min(c, columns - 1 - c) + 0.5) * pitchXM < reachM)) codes[i] = rim;
      }
    }
  }
  if (!mask.includes(0)) return;
  const between = squaredDistance(mask, columns, rows, { pitchX: pitchXM, pitchY: pitchYM });
  // Widened by more than the rounding of the distances to single precision.
  const certain = (reachM * (1 - 1e-6)) ** 2;
  const possible = ((reachM + Math.hypot(pitchXM, pitchYM) / 2) * (1 + 1e-6)) ** 2;
  let vertical: Float32Array | undefined;
  for (let i = 0; i < codes.length; i++) {
    if (codes[i] !== usable || between[i]! >= possible) continue;
    if (between[i]! < certain || edgeWithin(i, grid, reachM, (vertical ??= verticalEdges(mask, grid)))) codes[i] = rim;
  }
}

/** Whether the edge of a pixel of the mask's background lies closer than `reachM` to a pixel's centre: looks at the columns within reach. */
function edgeWithin(i: number, { columns, pitchXM }: Grid, reachM: number, vertical: Float32Array): boolean {
  const c = i % columns;
  const reachPx = Math.ceil(reachM / pitchXM + 0.5);
  for (let d = -Math.min(reachPx, c); d <= Math.min(reachPx, columns - 1 - c); d++) {
    if (Math.hypot(Math.max(0, Math.abs(d) - 0.5) * pitchXM, vertical[i + d]!) < reachM) return true;
  }
  return false;
}

/** Distance from each pixel's centre up or down to the nearest edge of a background pixel of its column, Infinity where there is none. */
function verticalEdges(mask: Uint8Array, { columns, pitchYM }: Grid): Float32Array {
  const steps = new Float32Array(mask.length);
  for (let i = 0; i < steps.length; i++) steps[i] = mask[i] === 0 ? 0 : i < columns ? Number.POSITIVE_INFINITY : steps[i - columns]! + 1;
  for (let i = steps.length - columns - 1; i >= 0; i--) steps[i] = Math.min(steps[i]!, steps[i + columns]! + 1);
  for (let i = 0; i < steps.length; i++) steps[i] = Math.max(0, steps[i]! - 0.5) * pitchYM;
  return steps;
}

function bookStray(codes: Uint8Array, input: BookingInput, areaM2: number): void {
  const usable = codeOf('usable');
  const stray = codeOf('stray');
  if (input.unconnected) for (let i = 0; i < codes.length; i++) if (codes[i] === usable && input.unconnected[i] === 1) codes[i] = stray;
  if (!(input.strayMinM2 > 0)) return;
  const { labels, pixels } = labelComponents(maskOfCode(codes, usable), input.grid.columns, input.grid.rows, 4);
  for (let i = 0; i < codes.length; i++) if (labels[i]! > 0 && pixels[labels[i]!]! * areaM2 < input.strayMinM2) codes[i] = stray;
}
