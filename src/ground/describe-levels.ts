/** What levelling took out of a height, in numbers that a person can judge. */
import { formRange } from './form.ts';
import type { Form } from './form.ts';
import type { SpotFit } from './fit-spots.ts';
import type { RefinedLevels } from './refine-levels.ts';

export interface LevelsFound {
  /** `ground`: fitted to ground found by itself; `spots`: to places picked by hand. */
  readonly formFrom: 'ground' | 'spots';
  /** Order that was fitted. */
  readonly order: number;
  /** Spots with a height under them. */
  readonly spotsUsed?: number;
  /** Peak-to-peak over the map of the linear part of the form, and of all the rest, metres. */
  readonly tiltM: number;
  readonly bowM: number;
  /** Of the offsets of the lines: root mean square and the largest by amount, metres; absent when lines keep theirs. */
  readonly lineRmsM?: number;
  readonly lineMostM?: number;
  /** Heights of the terraces that were taken as parallel planes, metres from the lowest, lowest first; those over at least a hundredth of the known ground. */
  readonly planesM: readonly number[];
}

/** Planes nearer to each other than this are one, metres: half of what tells a layer of a van der Waals crystal from none. */
const samePlaneM = 0.15e-9;
const leastShare = 0.01;
const binM = 0.02e-9;

/**
 * @param levels with the form that was used; @param byHand the fit to spots, where that was it; @param hasLines whether lines had their offsets taken.
 */
export function describeLevels(levels: RefinedLevels, byHand: SpotFit | undefined, hasLines: boolean, columns: number, rows: number): LevelsFound {
  const { form, lines, plane } = levels;
  return {
    formFrom: byHand ? 'spots' : 'ground', order: byHand?.order ?? form.order, ...(byHand ? { spotsUsed: byHand.used } : {}),
    tiltM: coarseRange(part(form, (term) => term === 1 || term === 2), columns, rows), bowM: coarseRange(part(form, (term) => term > 2), columns, rows),
    ...(hasLines ? linesOf(lines) : {}),
    planesM: planesOf(plane),
  };
}

function part(form: Form, keep: (term: number) => boolean): Form {
  return { order: form.order, coefficients: form.coefficients.map((value, term) => (keep(term) ? value : 0)) };
}

/** A form is smooth: a coarse look at it, corners included, is enough. */
function coarseRange(form: Form, columns: number, rows: number): number {
  return formRange(form, Math.min(columns, 65), Math.min(rows, 65));
}

function linesOf(lines: Float64Array): Pick<LevelsFound, 'lineRmsM' | 'lineMostM'> {
  let sum = 0;
  let most = 0;
  for (const value of lines) {
    sum += value * value;
    most = Math.max(most, Math.abs(value));
  }
  return { lineRmsM: Math.sqrt(sum / lines.length), lineMostM: most };
}

/** Clusters of the heights in the map of planes: bins are joined to the most common one within reach. */
function planesOf(plane: Float32Array): number[] {
  const counts = new Map<number, number>();
  let known = 0;
  // Neighbours mostly lie on one plane: a run of them is counted at once.
  for (let i = 0; i < plane.length;) {
    const height = plane[i]!;
    const end = runEnd(plane, i);
    if (height === height) {
      const bin = Math.round(height / binM);
      counts.set(bin, (counts.get(bin) ?? 0) + end - i);
      known += end - i;
    }
    i = end;
  }
  const found: { heightM: number; pixels: number }[] = [];
  for (const [bin, pixels] of [...counts].sort((a, b) => b[1] - a[1] || a[0] - b[0])) {
    const near = found.find(({ heightM }) => Math.abs(heightM - bin * binM) < samePlaneM);
    if (near) near.pixels += pixels;
    else found.push({ heightM: bin * binM, pixels });
  }
  const heights = found.filter(({ pixels }) => pixels >= leastShare * known).map(({ heightM }) => heightM).sort((a, b) => a - b);
  return heights.map((height) => height - heights[0]!);
}

/** One past the last of the pixels from `i` on that hold the same value. */
function runEnd(values: Float32Array, i: number): number {
  const value = values[i]!;
  let end = i + 1;
  while (end < values.length && values[end] === value) end++;
  return end;
}
