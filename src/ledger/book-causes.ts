/** Books every pixel of the footprint to one cause. */
import type { FlawCause } from '../flaws/flaws.ts';
import type { Grid } from '../grid/maps.ts';
import { pixelAreaM2 } from '../grid/maps.ts';
import { labelComponents } from '../grid/label-components.ts';
import type { Cause } from './ledger.ts';
import { causes } from './ledger.ts';

/** Code of a cause. */
export function codeOf(cause: Cause): number {
  return causes.indexOf(cause);
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
  const { grid, footprint, flawLabels, flawCauses } = input;
  const count = footprint.length;
  const codes = new Uint8Array(count);
  const flawCodes = Uint8Array.from(flawCauses, (cause) => (cause ? codeOf(cause) : 0));
  const [usable, unmeasured, thin, thick, starved] = [codeOf('usable'), codeOf('unmeasured'), codeOf('thin'), codeOf('thick'), codeOf('starved')];
  const open = codeOf('open');
  // A hair of tolerance, so that a density exactly at the band's edge is in band whatever the rounding.
  const band = Math.log10(input.bandFactor) + 1e-6;
  for (let i = 0; i < count; i++) {
    if (footprint[i] === 0) continue;
    const flaw = flawCodes[flawLabels[i]!]!;
    if (flaw !== 0 && flaw !== open) {
      codes[i] = flaw;
      continue;
    }
    if (input.unmeasured[i] === 1) codes[i] = unmeasured;
    else if (flaw === open) codes[i] = open;
    else if (!input.log10Relative) codes[i] = usable;
    else {
      const relative = input.log10Relative[i]!;
      if (Number.isNaN(relative)) codes[i] = unmeasured;
      else if (relative > band) codes[i] = thin;
      else if (relative < -band) codes[i] = thick;
      else codes[i] = input.starved?.[i] === 1 ? starved : usable;
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
 * unequal pitches: first the distance up and down to the nearest such pixel's edge, then the nearest over the columns within reach.
 */
function bookNear(codes: Uint8Array, mask: Uint8Array, grid: Grid, reachM: number, outsideIsBackground: boolean): void {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const vertical = new Float32Array(codes.length);
  for (let c = 0; c < columns; c++) {
    let run = outsideIsBackground ? 0 : Number.POSITIVE_INFINITY;
    for (let r = 0; r < rows; r++) vertical[r * columns + c] = run = mask[r * columns + c] === 0 ? 0 : run + 1;
    run = outsideIsBackground ? 0 : Number.POSITIVE_INFINITY;
    for (let r = rows - 1; r >= 0; r--) {
      const i = r * columns + c;
      run = mask[i] === 0 ? 0 : run + 1;
      vertical[i] = Math.max(0, Math.min(vertical[i]!, run) - 0.5) * pitchYM;
    }
  }
  const [usable, rim] = [codeOf('usable'), codeOf('rim')];
  const reachPx = Math.ceil(reachM / pitchXM + 0.5);
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      if (codes[i] !== usable) continue;
      if (outsideIsBackground && (Math.min(c, columns - 1 - c) + 0.5) * pitchXM < reachM) codes[i] = rim;
      for (let d = -Math.min(reachPx, c); codes[i] === usable && d <= Math.min(reachPx, columns - 1 - c); d++) {
        if (Math.hypot(Math.max(0, Math.abs(d) - 0.5) * pitchXM, vertical[i + d]!) < reachM) codes[i] = rim;
      }
    }
  }
}

function bookStray(codes: Uint8Array, input: BookingInput, areaM2: number): void {
  const usable = codeOf('usable');
  const stray = codeOf('stray');
  if (input.unconnected) for (let i = 0; i < codes.length; i++) if (codes[i] === usable && input.unconnected[i] === 1) codes[i] = stray;
  if (!(input.strayMinM2 > 0)) return;
  const { labels, pixels } = labelComponents(codes.map((code) => (code === usable ? 1 : 0)), input.grid.columns, input.grid.rows, 4);
  for (let i = 0; i < codes.length; i++) if (labels[i]! > 0 && pixels[labels[i]!]! * areaM2 < input.strayMinM2) codes[i] = stray;
}
