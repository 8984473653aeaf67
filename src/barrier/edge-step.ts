/** The flake's thickness where its edge lies over bare injector: a step in height that needs no current model. */
import type { Grid } from '../grid/maps.ts';
import { scaledMad } from '../stats/mad.ts';
import { median } from '../stats/median.ts';
import { unknownStep } from './terraces.ts';

/** Where barrier and bare injector lie, as far as it is known. */
export interface EdgeGround {
  /** 1 on the barrier, by its outline or a proposed one. */
  readonly barrier: Uint8Array;
  /** 1 on the injector by its outline; absent where none is drawn: then saturated ground beside the barrier counts as bare injector. */
  readonly injector?: Uint8Array;
}

export interface EdgeStep {
  /** Median step and the number of places it was read at. */
  readonly stepM: number;
  readonly places: number;
  /** Thickness of the ladder's first (thinnest measured) terrace, and the standard error from the scatter; metres. */
  readonly firstM: number;
  readonly seM: number;
}

/** The step is read between points this far from the border on both sides, so that a rounded edge does not shrink it. */
const reachM = 60e-9;
const leastPlaces = 30;
/** Places beside each other share noise and edge: so many count as one. */
const alike = 10;
/** Of the places a quarter must rise by more than this part of the median, or there is no distinct step. */
const distinct = 0.5;

/**
 * Reads the height's rise from bare injector to the barrier at all places along their common border and takes off the whole layers by which each place's
 * terrace is thicker than the first. Both sides must lie on the injector: over bare substrate the step would be injector and barrier together.
 *
 * @param levelled metres, NaN missing; @param saturated 1 where the current is at the amplifier's limit; @param steps place on the ladder, `unknownStep` on flaws.
 * @returns undefined without such a border, with fewer than 30 places, or without a distinct step.
 */
export function edgeStep(levelled: Float32Array, saturated: Uint8Array, steps: Int8Array, ground: EdgeGround, grid: Grid, layerM: number): EdgeStep | undefined {
  const { columns, rows, pitchXM, pitchYM } = grid;
  const { barrier, injector } = ground;
  const reachC = Math.min(20, Math.max(3, Math.round(reachM / pitchXM)));
  const reachR = Math.min(20, Math.max(3, Math.round(reachM / pitchYM)));
  const bare = (i: number): boolean => barrier[i] === 0 && (injector ? injector[i] === 1 : saturated[i] === 1);
  const rises: number[] = [];
  const firsts: number[] = [];
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      if (barrier[i] === 0) continue;
      for (const [dc, dr] of [[1, 0], [-1, 0], [0, 1], [0, -1]] as const) {
        if (c + dc < 0 || c + dc >= columns || r + dr < 0 || r + dr >= rows || barrier[i + dc + dr * columns] === 1) continue;
        const [outC, outR, inC, inR] = [c + dc * reachC, r + dr * reachR, c - dc * reachC, r - dr * reachR];
        if (Math.min(outC, inC, outR, inR) < 0 || Math.max(outC, inC) >= columns || Math.max(outR, inR) >= rows) continue;
        const outer = outR * columns + outC;
        const inner = inR * columns + inC;
        if (!bare(outer) || barrier[inner] === 0 || steps[inner] === unknownStep || saturated[inner] === 1 || (injector && injector[inner] === 0)) continue;
        const rise = levelled[inner]! - levelled[outer]!;
        if (Number.isNaN(rise)) continue;
        rises.push(rise);
        firsts.push(rise - steps[inner]! * layerM);
      }
    }
  }
  if (rises.length < leastPlaces) return undefined;
  const stepM = median(rises);
  const quarter = Float64Array.from(rises).sort()[rises.length >> 2]!;
  if (!(stepM > 0 && quarter >= distinct * stepM)) return undefined;
  return { stepM, places: rises.length, firstM: median(firsts), seM: (Math.sqrt(Math.PI / 2) * scaledMad(firsts)) / Math.sqrt(rises.length / alike) };
}
