/** The sheets as networks of conductances between pixels, on the grid and on every coarser one. */

/** One sheet on one level. Arrays are ringed: `width = columns + 2`, zero on the ring. */
export interface SheetField {
  /** Conductance between pixel i and its right (`right`) or lower (`down`) neighbour. */
  readonly right: Float32Array;
  readonly down: Float32Array;
  /** Conductance between pixel i and the terminal, across its left and right sides, and its other two. */
  readonly feedX: Float32Array;
  readonly feedY: Float32Array;
  /** Their sum. */
  readonly feed: Float32Array;
  /** Sum of all conductances that meet in pixel i. */
  readonly sum: Float32Array;
  /** 1 where the potential is unknown. */
  readonly free: Uint8Array;
  /** Sheet resistance over the network's unit resistance, and the same for half a pixel across and along. */
  readonly halfX: number;
  readonly halfY: number;
  /** Correction and its right-hand side, the multigrid cycle's own. */
  readonly x: Float32Array;
  readonly rhs: Float32Array;
}

/** Both sheets (or the one that resists) on one grid, and the tunnel elements between them. */
export interface Level {
  readonly columns: number;
  readonly rows: number;
  readonly width: number;
  readonly size: number;
  readonly pitchXM: number;
  readonly pitchYM: number;
  readonly fields: readonly SheetField[];
  /** No-drop current of the tunnel element in pixel i, in volts over the unit resistance. */
  readonly source: Float64Array;
  /** Which tunnel curve the element follows. */
  readonly curve: Uint8Array;
  /** Slopes of the elements as they act on sheet 0, on sheet 1 and between both. */
  readonly slope0: Float32Array;
  readonly slope1: Float32Array;
  readonly slope01: Float32Array;
  /** Inverse of each pixel's own 1×1 or 2×2 block; zero where nothing is free. */
  readonly inverse0: Float32Array;
  readonly inverse1: Float32Array;
  readonly inverse01: Float32Array;
  /** Whether the next level halves the columns, the rows (0 or 1 each). */
  readonly shiftX: 0 | 1;
  readonly shiftY: 0 | 1;
}

const none = new Float32Array(0);

/** An empty level; its fields' networks are still to be filled. */
export function emptyLevel(columns: number, rows: number, pitchXM: number, pitchYM: number, halves: readonly { halfX: number; halfY: number }[]): Level {
  const width = columns + 2;
  const size = width * (rows + 2);
  const both = halves.length === 2;
  const floats = () => new Float32Array(size);
  // Halving only the direction of stronger coupling keeps pointwise relaxation effective on unequal pitches.
  const shiftX = columns > 1 && (pitchXM < 1.5 * pitchYM || rows === 1) ? 1 : 0;
  const shiftY = rows > 1 && (pitchYM < 1.5 * pitchXM || columns === 1) ? 1 : 0;
  return {
    columns, rows, width, size, pitchXM, pitchYM, shiftX, shiftY,
    fields: halves.map(({ halfX, halfY }) => ({
      right: floats(), down: floats(), feedX: floats(), feedY: floats(), feed: floats(), sum: floats(), free: new Uint8Array(size), halfX, halfY, x: floats(), rhs: floats(),
    })),
    source: new Float64Array(size), curve: new Uint8Array(size),
    slope0: floats(), slope1: both ? floats() : none, slope01: both ? floats() : none,
    inverse0: floats(), inverse1: both ? floats() : none, inverse01: both ? floats() : none,
  };
}

/** Adds up the conductances that meet in each pixel. */
export function sumConductances(level: Level): void {
  const { width, columns, rows } = level;
  for (const { right, down, feedX, feedY, feed, sum } of level.fields) {
    for (let r = 1; r <= rows; r++) {
      for (let i = r * width + 1; i <= r * width + columns; i++) {
        feed[i] = feedX[i]! + feedY[i]!;
        sum[i] = right[i]! + right[i - 1]! + down[i]! + down[i - width]! + feed[i]!;
      }
    }
  }
}

/** The level above `fine` in the hierarchy: pixels joined in pairs or fours, conductances as a scan at that pitch would have them. */
export function coarser(fine: Level): Level {
  const { shiftX, shiftY, width } = fine;
  const halves = fine.fields.map(({ halfX, halfY }) => ({
    halfX: halfX * (shiftX === 1 ? 2 : 1) / (shiftY === 1 ? 2 : 1),
    halfY: halfY * (shiftY === 1 ? 2 : 1) / (shiftX === 1 ? 2 : 1),
  }));
  const coarse = emptyLevel((fine.columns + shiftX) >> shiftX, (fine.rows + shiftY) >> shiftY,
    fine.pitchXM * (1 + shiftX), fine.pitchYM * (1 + shiftY), halves);
  const largest = new Float64Array(coarse.size);
  for (let r = 0; r < fine.rows; r++) {
    const coarseRow = ((r >> shiftY) + 1) * coarse.width + 1;
    for (let c = 0; c < fine.columns; c++) {
      const i = (r + 1) * width + c + 1;
      const j = coarseRow + (c >> shiftX);
      coarse.source[j]! += fine.source[i]!;
      if (fine.source[i]! > largest[j]!) {
        largest[j] = fine.source[i]!;
        coarse.curve[j] = fine.curve[i]!;
      }
    }
  }
  fine.fields.forEach((field, f) => joinField(fine, field, coarse, coarse.fields[f]!));
  sumConductances(coarse);
  return coarse;
}

function joinField(fine: Level, field: SheetField, coarse: Level, joined: SheetField): void {
  const { shiftX, shiftY, width } = fine;
  // Across a pair of pixels the path is twice as long; a feed gains the half pixel by which its pixel grew.
  const scaleX = shiftX === 1 ? 0.5 : 1;
  const scaleY = shiftY === 1 ? 0.5 : 1;
  const moreX = shiftX === 1 ? field.halfX : 0;
  const moreY = shiftY === 1 ? field.halfY : 0;
  for (let r = 0; r < fine.rows; r++) {
    for (let c = 0; c < fine.columns; c++) {
      const i = (r + 1) * width + c + 1;
      if (field.free[i] === 0) continue;
      const j = ((r >> shiftY) + 1) * coarse.width + (c >> shiftX) + 1;
      joined.free[j] = 1;
      if (shiftX === 0 || (c & 1) === 1) joined.right[j]! += scaleX * field.right[i]!;
      if (shiftY === 0 || (r & 1) === 1) joined.down[j]! += scaleY * field.down[i]!;
      const feedX = field.feedX[i]!;
      const feedY = field.feedY[i]!;
      if (feedX > 0) joined.feedX[j]! += 1 / (1 / feedX + moreX);
      if (feedY > 0) joined.feedY[j]! += 1 / (1 / feedY + moreY);
    }
  }
}

/** All levels, the given one first, down to a single pixel: there even a sheet behind a poor contact is solved exactly. */
export function hierarchy(finest: Level): readonly Level[] {
  const levels = [finest];
  for (let level = finest; level.columns > 1 || level.rows > 1;) {
    level = coarser(level);
    levels.push(level);
  }
  return levels;
}
