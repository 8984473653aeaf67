// Exact squared distance to the nearest zero pixel: steps along columns, then lower envelopes of parabolas along rows.

/** Marks a column without background; additions saturate at it. */
const never: u32 = 0xffff;

/**
 * `mask`: columns × rows bytes with 16 readable bytes behind them. `steps`: as many u16, with 32 bytes behind them. `height`: columns f64,
 * `bounds`: columns + 1 f64, `centres`: columns i32. `result`: columns × rows f32. `filled`: rows bytes, set to 1 where the row holds a non-zero
 * pixel; only those rows of `result` are written, the others are 0. Needs rows < 65535.
 */
export function squaredDistances(
  mask: usize, columns: i32, rows: i32, ratio: f64, unit: f64, outside: i32,
  steps: usize, height: usize, bounds: usize, centres: usize, result: usize, filled: usize
): void {
  stepsAlongColumns(mask, columns, rows, outside, steps);
  for (let row: i32 = 0; row < rows; row++) {
    const start = row * columns;
    const maskRow = mask + <usize>start;
    const into = result + (<usize>start << 2);
    const any = holdsAny(maskRow, columns);
    store<u8>(filled + <usize>row, any);
    if (any === 0) continue;
    const top = envelope(maskRow, steps + (<usize>start << 1), columns, ratio, height, bounds, centres);
    readEnvelope(maskRow, columns, unit, outside, top, height, bounds, centres, into);
  }
}

function holdsAny(mask: usize, columns: i32): i32 {
  let column: i32 = 0;
  for (; column + 16 <= columns; column += 16) if (v128.any_true(v128.load(mask + <usize>column))) return 1;
  for (; column < columns; column++) if (load<u8>(mask + <usize>column)) return 1;
  return 0;
}

/** Steps along the column to the nearest zero pixel. Rows run into each other by up to 7 pixels, which the next row then overwrites. */
function stepsAlongColumns(mask: usize, columns: i32, rows: i32, outside: i32, steps: usize): void {
  const one = i16x8.splat(1);
  const zero = i16x8.splat(0);
  const first = i16x8.splat(outside ? 1 : <i16>never);
  const length = columns * rows;
  for (let k: i32 = 0; k < length; k += 8) {
    const inMask = i16x8.ne(v128.load8x8_u(mask + <usize>k), zero);
    // The first row has nothing above; a group of eight that starts in it may end in the second.
    let above: v128;
    if (k >= columns) above = i16x8.add_sat_u(v128.load(steps + (<usize>(k - columns) << 1)), one);
    else if (k + 8 <= columns) above = first;
    else {
      for (let j = k; j < k + 8 && j < length; j++) stepDown(mask, columns, outside, steps, j);
      continue;
    }
    if (columns < 8) {
      for (let j = k; j < k + 8 && j < length; j++) stepDown(mask, columns, outside, steps, j);
      continue;
    }
    v128.store(steps + (<usize>k << 1), v128.and(above, inMask));
  }
  // Upwards one by one where eight would meet the rows' ends, else eight at a time.
  const last = (rows - 1) * columns;
  if (outside) for (let k = last; k < length; k++) if (load<u8>(mask + <usize>k)) store<u16>(steps + (<usize>k << 1), 1);
  for (let row = rows - 2; row >= 0; row--) {
    const start = row * columns;
    let column: i32 = 0;
    for (; column + 8 <= columns; column += 8) {
      const at = steps + (<usize>(start + column) << 1);
      const below = i16x8.add_sat_u(v128.load(steps + (<usize>(start + column + columns) << 1)), one);
      v128.store(at, i16x8.min_u(v128.load(at), below));
    }
    for (; column < columns; column++) {
      const at = steps + (<usize>(start + column) << 1);
      const below = min<u32>(<u32>load<u16>(steps + (<usize>(start + column + columns) << 1)) + 1, never);
      if (below < <u32>load<u16>(at)) store<u16>(at, <u16>below);
    }
  }
}

@inline
function stepDown(mask: usize, columns: i32, outside: i32, steps: usize, k: i32): void {
  let value: u32 = 0;
  if (load<u8>(mask + <usize>k)) {
    if (k < columns) value = outside ? 1 : never;
    else value = min<u32>(<u32>load<u16>(steps + (<usize>(k - columns) << 1)) + 1, never);
  }
  store<u16>(steps + (<usize>k << 1), <u16>value);
}

/**
 * Lower envelope of one row. Of a run of zero pixels only the two ends matter: inside, the nearest background is the pixel itself, and for
 * all others one of the ends lies nearer. Returns the index of the last parabola, −1 for none.
 */
function envelope(mask: usize, steps: usize, columns: i32, ratio: f64, height: usize, bounds: usize, centres: usize): i32 {
  let top: i32 = -1;
  let zeroBefore = false;
  for (let q: i32 = 0; q < columns; q++) {
    const isZero = load<u8>(mask + <usize>q) === 0;
    if (isZero && zeroBefore && q + 1 < columns) {
      if (load<u8>(mask + <usize>q + 1) === 0) continue;
    }
    zeroBefore = isZero;
    const count = <u32>load<u16>(steps + (<usize>q << 1));
    if (count === never) continue;
    const level = <f64>(count * count) * ratio;
    store<f64>(height + (<usize>q << 3), level);
    let from: f64 = -Infinity;
    while (top >= 0) {
      const v = load<i32>(centres + (<usize>top << 2));
      from = (level + <f64>q * <f64>q - load<f64>(height + (<usize>v << 3)) - <f64>v * <f64>v) / (2 * <f64>(q - v));
      if (from > load<f64>(bounds + (<usize>top << 3))) break;
      top--;
      from = -Infinity;
    }
    top++;
    store<i32>(centres + (<usize>top << 2), q);
    store<f64>(bounds + (<usize>top << 3), from);
  }
  return top;
}

function readEnvelope(mask: usize, columns: i32, unit: f64, outside: i32, top: i32, height: usize, bounds: usize, centres: usize, into: usize): void {
  let k: i32 = 0;
  for (let q: i32 = 0; q < columns; q++) {
    if (load<u8>(mask + <usize>q) === 0) {
      store<f32>(into + (<usize>q << 2), 0);
      continue;
    }
    let squared: f64 = Infinity;
    if (top >= 0) {
      while (k < top && load<f64>(bounds + (<usize>(k + 1) << 3)) < <f64>q) k++;
      const v = load<i32>(centres + (<usize>k << 2));
      squared = <f64>(q - v) * <f64>(q - v) + load<f64>(height + (<usize>v << 3));
    }
    if (outside) {
      const across = <f64>min(q + 1, columns - q);
      if (across * across < squared) squared = across * across;
    }
    store<f32>(into + (<usize>q << 2), <f32>(squared * unit));
  }
}
