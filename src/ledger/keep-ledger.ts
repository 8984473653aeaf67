import ndarray from 'ndarray';
import type { Barrier } from '../barrier/barrier.ts';
import type { BarrierSection } from '../barrier/recipe.ts';
import type { Flaws } from '../flaws/flaws.ts';
import { labelComponents } from '../grid/label-components.ts';
import { pixelAreaM2, scalarMap } from '../grid/maps.ts';
import type { CurrentGround, Ground } from '../ground/ground.ts';
import { layerMask } from '../read/footprint.ts';
import type { Sample } from '../read/sample.ts';
import type { Sheet } from '../sheet/sheet.ts';
import { bookCauses, codeOf, maskOfCode } from './book-causes.ts';
import { glowMap } from './glow-map.ts';
import { layerCostSpread } from './layer-cost-spread.ts';
import type { Cause, Ledger, LedgerRow, Usable } from './ledger.ts';
import { causes } from './ledger.ts';
import { missedShorts } from './missed-shorts.ts';
import type { SeenShorts } from './missed-shorts.ts';
import type { BandSection } from './recipe.ts';
import { usableInterval } from './usable-interval.ts';
import type { IntervalInput } from './usable-interval.ts';
import { verdictSentence } from './verdict.ts';

export interface LedgerInput {
  readonly sample: Sample;
  readonly ground: Ground;
  readonly flaws: Flaws;
  readonly barrier?: Barrier | undefined;
  readonly sheet?: Sheet | undefined;
  readonly band: BandSection;
  /** Recipe of the barrier, and the part of the device's bias that does not fall across it, volts. */
  readonly barrierSection: BarrierSection;
  readonly offsetV: number;
}

/**
 * Ledger stage: books every pixel of the footprint to exactly one cause, adds up areas, and says the verdict. Areas are pixel counts times pixel area, so they add up
 * to the footprint to the last pixel.
 *
 * Height alone: the ledger books raised flaws, and what is left is `flaw-free`, not usable. Current alone: flaws in height are not assessed.
 */
export function keepLedger(input: LedgerInput): Ledger {
  const { sample, ground, flaws, barrier, sheet, band } = input;
  const { grid, footprint } = sample;
  const count = footprint.data.length;
  const current = ground.current;
  const measured = current ? current.log10.data : ground.height!.levelled.data;
  const unmeasured = new Uint8Array(count);
  for (let i = 0; i < count; i++) unmeasured[i] = Number.isNaN(measured[i]!) ? 1 : 0;

  const codes = bookCauses({
    grid, footprint: footprint.data, flawLabels: flaws.labels.data, flawCauses: [undefined, ...flaws.list.map((flaw) => flaw.cause)], unmeasured,
    ...(barrier ? { log10Relative: barrier.log10Relative.data } : {}),
    ...(sheet?.starved ? { starved: sheet.starved.data } : {}), ...(sheet?.unconnected ? { unconnected: sheet.unconnected.data } : {}),
    bandFactor: band.factor, rimM: band.rimUm * 1e-6, shortRimM: band.shortRimUm * 1e-6, strayMinM2: band.strayMinUm2 * 1e-12,
  });

  const areaM2 = pixelAreaM2(grid);
  const pixels = new Uint32Array(causes.length);
  for (let i = 0; i < count; i++) pixels[codes[i]!]!++;
  const footprintPixels = count - pixels[0]!;
  const rows: LedgerRow[] = causes.slice(1).map((cause, k) => ({
    code: k + 1, cause, pixels: pixels[k + 1]!, areaM2: pixels[k + 1]! * areaM2,
    share: footprintPixels > 0 ? pixels[k + 1]! / footprintPixels : 0, assessed: pixels[k + 1]! > 0 || isAssessed(cause, input),
  }));

  const usable = usableOf(input, codes, pixels[codeOf('usable')]!, footprintPixels, areaM2);
  const repaired = current ? current.repaired.data : ground.height!.repaired.data;
  let repairedPixels = 0;
  for (let i = 0; i < count; i++) if (repaired[i] === 1 && footprint.data[i] === 1) repairedPixels++;
  const shorts = shortsByLines(input, codes);
  const areaOf = (...named: Cause[]): number => named.reduce((sum, cause) => sum + pixels[codeOf(cause)]!, 0) * areaM2;
  const seenOnM2 = footprintPixels * areaM2 - areaOf('unmeasured', 'bubble', 'residue', 'wrinkle');
  // Shorts do not show in height.
  const missed = current && missedShorts(shorts, seenOnM2, grid, input.barrierSection.tipAreaNm2 * 1e-18);
  return {
    codes: ndarray(codes, [grid.rows, grid.columns]),
    glow: scalarMap(grid, glowMap(codes, sheet?.relativeDensity.data ?? relativeOf(barrier), metalOf(sample))),
    rows,
    footprintM2: footprintPixels * areaM2,
    footprintPixels,
    repairedM2: repairedPixels * areaM2,
    usable,
    ...(missed ? { missedShorts: missed } : {}),
    verdict: verdictSentence({
      usable, footprintM2: footprintPixels * areaM2, surface: sample.surface, bandFactor: band.factor, hasCurrent: current !== undefined,
      biasV: barrier?.device?.biasV, proposed: barrier?.device?.proposed, shorts: missed, breaksDown: barrier?.warnings.some(({ code }) => code === 'device-field') === true,
      unmeasuredM2: areaOf('unmeasured'), setAsideM2: areaOf('starved', 'rim', 'stray'),
      mayGlow: barrier?.device !== undefined && barrier.device.high95 >= band.minNaPerUm2 * 1e3 && barrier.device.low95 <= band.maxNaPerUm2 * 1e3,
    }),
    warnings: [],
  };
}

function usableOf(input: LedgerInput, codes: Uint8Array, pixels: number, footprintPixels: number, areaM2: number): Usable {
  const { sample, ground, barrier } = input;
  const { columns, rows } = sample.grid;
  const usableCode = codeOf('usable');
  const patches = labelComponents(maskOfCode(codes, usableCode), columns, rows, 4);
  let largest = 0;
  for (let n = 1; n <= patches.count; n++) largest = Math.max(largest, patches.pixels[n]!);
  const interval = usableInterval({ grid: sample.grid, codes, usablePixels: pixels, footprintPixels, ...(barrier && ground.current ? { density: densityOf(input, barrier, ground.current) } : {}) });
  return {
    areaM2: pixels * areaM2,
    share: footprintPixels > 0 ? pixels / footprintPixels : 0,
    ...interval,
    largestPatchM2: largest * areaM2,
    knownToGlow: barrier?.reference.inRange === true,
    meaning: ground.current ? 'usable' : 'flaw-free',
  };
}

function densityOf({ barrierSection, band, offsetV }: LedgerInput, barrier: Barrier, current: CurrentGround): NonNullable<IntervalInput['density']> {
  return {
    barrier, log10: current.log10.data, bandFactor: band.factor,
    byPixel: barrierSection.withinTerrace === 'barrier' || barrier.ladder.from === 'assumed',
    layerCostSpread: layerCostSpread({ barrier, section: barrierSection, offsetV, scanBiasV: current.biasV }),
  };
}

/** Whether the input allows a cause to be told at all; a cause that a person painted is told whatever the input. */
function isAssessed(cause: Cause, input: LedgerInput): boolean {
  const hasHeight = input.ground.height !== undefined;
  const hasCurrent = input.ground.current !== undefined;
  switch (cause) {
    case 'bubble':
    case 'residue':
    case 'wrinkle':
      return hasHeight;
    case 'short':
    case 'open':
    case 'thin':
    case 'thick':
      return hasCurrent;
    case 'starved':
      return input.sheet?.starved !== undefined;
    case 'rim':
      return input.band.rimUm > 0 || input.band.shortRimUm > 0;
    case 'stray':
      return input.band.strayMinUm2 > 0 || input.sheet?.unconnected !== undefined;
    case 'usable':
    case 'unmeasured':
    case 'outside':
      return true;
  }
}

/** Shorts of the footprint by the number of scan lines they were met on. */
function shortsByLines({ flaws, sample }: LedgerInput, codes: Uint8Array): SeenShorts {
  const { columns } = sample.grid;
  const short = codeOf('short');
  const labels = flaws.labels.data;
  const first = new Int32Array(flaws.list.length + 1).fill(-1);
  const several = new Uint8Array(flaws.list.length + 1);
  for (let i = 0; i < labels.length; i++) {
    if (codes[i] !== short) continue;
    const [label, row] = [labels[i]!, (i / columns) | 0];
    if (first[label]! < 0) first[label] = row;
    else if (first[label] !== row) several[label] = 1;
  }
  let [onOneLine, onMoreLines] = [0, 0];
  for (let label = 1; label < first.length; label++) {
    if (first[label]! < 0) continue;
    if (several[label] === 1) onMoreLines++;
    else onOneLine++;
  }
  return { onOneLine, onMoreLines };
}

/** 1 under the drawn metal of either contact; undefined without any. */
function metalOf({ grid, outlines }: Sample): Uint8Array | undefined {
  if (!outlines.some(({ layer }) => layer === 'contact-emitter' || layer === 'contact-injector')) return undefined;
  const emitter = layerMask(grid, outlines, 'contact-emitter').data;
  const injector = layerMask(grid, outlines, 'contact-injector').data;
  return Uint8Array.from(emitter, (value, i) => value | injector[i]!);
}

/** Without a sheet stage the density is that of the barrier alone. */
function relativeOf(barrier: Barrier | undefined): Float32Array | undefined {
  if (!barrier) return undefined;
  const out = barrier.log10Relative.data.slice();
  for (let i = 0; i < out.length; i++) out[i] = 10 ** out[i]!;
  return out;
}
