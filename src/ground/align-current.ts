/** Brings a current over the height that was measured with it. */
import { registerMaps } from './register-maps.ts';
import type { Registration } from './register-maps.ts';

/** A shift and what was done about it. */
export interface Shift extends Registration {
  /** Whole pixels by which the map was moved back; 0 where the shift is none or not certain. */
  readonly undoneXPx: number;
  readonly undoneYPx: number;
}

/** Side up to which maps are compared pixel by pixel; larger ones by means over squares. */
const comparedSide = 400;
/** Heights between which a flaw goes from open to blocked, metres. */
const blocking = { from: 1e-9, to: 4e-9 } as const;
/** Decades above the floor over which a current goes from blocked to open. */
const blockedDecades = 1;
/** A shift is undone from this size and this many standard errors up. */
const least = { px: 0.5, errors: 3 } as const;

/**
 * Shift of the current against the height, from the flaws that stand up and block the current: their outlines are in both maps. `undone` is in
 * whole pixels, because a current between two pixels of which one carries none is not their mean.
 *
 * @param levelled height over the ground, metres; @param log10 log10 of the current; @param floorLog log10 of the floor; both row-major, NaN missing.
 * @returns undefined where the maps do not show enough of the same flaws.
 */
export function shiftAgainstHeight(levelled: Float32Array, log10: Float32Array, floorLog: number, columns: number, rows: number): Shift | undefined {
  const raised = (start: number, row: Float64Array): void => {
    for (let c = 0; c < row.length; c++) row[c] = share((levelled[start + c]! - blocking.from) / (blocking.to - blocking.from));
  };
  const lost = (start: number, row: Float64Array): void => {
    for (let c = 0; c < row.length; c++) row[c] = 1 - share((log10[start + c]! - floorLog) / blockedDecades);
  };
  return shiftBetween(raised, lost, columns, rows);
}

/** Shift of one map against another of the same quantity, as return against forward scan; looked for up to `reach` pixels of the maps that are compared. */
export function shiftBetweenDirections(reference: Float32Array, moved: Float32Array, columns: number, rows: number, reach?: number): Shift | undefined {
  const plain = (map: Float32Array): RowReader => (start, row) => row.set(map.subarray(start, start + row.length));
  return shiftBetween(plain(reference), plain(moved), columns, rows, reach);
}

/** Fills a row with what is compared, from the pixel `start` on. */
type RowReader = (start: number, row: Float64Array) => void;

function shiftBetween(reference: RowReader, moved: RowReader, columns: number, rows: number, reach?: number): Shift | undefined {
  const step = Math.max(1, Math.ceil(Math.max(columns, rows) / comparedSide));
  const [across, down] = [Math.floor(columns / step), Math.floor(rows / step)];
  const found = registerMaps(smoothed(reference, columns, across, down, step), smoothed(moved, columns, across, down, step), across, down, reach);
  if (!found) return undefined;
  const scaled = { dxPx: step * found.dxPx, dyPx: step * found.dyPx, seXPx: step * found.seXPx, seYPx: step * found.seYPx, correlation: found.correlation };
  const undone = (d: number, se: number): number => (Math.abs(d) >= least.px && Math.abs(d) > least.errors * se ? Math.round(d) : 0);
  return { ...scaled, undoneXPx: undone(scaled.dxPx, scaled.seXPx), undoneYPx: undone(scaled.dyPx, scaled.seYPx) };
}

/** The map moved back by whole pixels; what comes from beyond its border is `fill`. */
export function movedBack<Data extends Float32Array | Uint8Array>(data: Data, columns: number, { undoneXPx, undoneYPx }: Pick<Shift, 'undoneXPx' | 'undoneYPx'>, fill: number): Data {
  const rows = data.length / columns;
  const out = data.slice() as Data;
  for (let r = 0, i = 0; r < rows; r++) {
    const from = r + undoneYPx;
    for (let c = 0; c < columns; c++, i++) {
      const at = c + undoneXPx;
      out[i] = from >= 0 && from < rows && at >= 0 && at < columns ? data[from * columns + at]! : fill;
    }
  }
  return out;
}

function share(value: number): number {
  return Math.min(1, Math.max(0, value));
}

/** Means over squares of `step`, then over three by three: an edge is as soft as a registration needs. NaN spreads. */
function smoothed(read: RowReader, columns: number, across: number, down: number, step: number): Float32Array {
  const means = new Float32Array(across * down);
  const row = new Float64Array(across * step);
  const sums = new Float64Array(across);
  for (let v = 0; v < down; v++) {
    sums.fill(0);
    for (let y = 0; y < step; y++) {
      read((v * step + y) * columns, row);
      addGroups(row, step, sums);
    }
    for (let u = 0; u < across; u++) means[v * across + u] = sums[u]! / (step * step);
  }
  const rowMeans = means.slice();
  for (let i = 1; i + 1 < means.length; i++) rowMeans[i] = (means[i - 1]! + means[i]! + means[i + 1]!) / 3;
  const out = rowMeans.slice();
  for (let i = across; i + across < out.length; i++) out[i] = (rowMeans[i - across]! + rowMeans[i]! + rowMeans[i + across]!) / 3;
  return out;
}

/** Adds the values of each `step` neighbours to the sum of their group, one after the other. */
function addGroups(row: Float64Array, step: number, sums: Float64Array): void {
  for (let u = 0, at = 0; u < sums.length; u++) for (let x = 0; x < step; x++) sums[u]! += row[at++]!;
}
