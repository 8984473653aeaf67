// Height above the mean of the surrounding ground, the ground found by rounds.

/** Least share of a window that must be ground. */
const least: f64 = 0.12;

/**
 * `values`: columns × rows f32, NaN missing, with 16 bytes behind them. `use`: as many bytes. `sums`: (columns + 1) × (rows + 1) f64, `counts`: as many i32,
 * each with 16 bytes behind it. `rise`: columns × rows f32, the result. `half`: half the window. `startM`: what stands out further is no ground.
 */
export function riseAboveGround(values: usize, use: usize, columns: i32, rows: i32, half: i32, startM: f64, rounds: i32, sums: usize, counts: usize, rise: usize): void {
  const length = columns * rows;
  for (let i: i32 = 0; i < length; i++) {
    store<u8>(use + <usize>i, abs(<f64>load<f32>(values + (<usize>i << 2))) < 3 * startM ? 1 : 0);
  }
  const stride = columns + 1;
  memory.fill(sums, 0, <usize>stride << 3);
  memory.fill(counts, 0, <usize>stride << 2);
  for (let round: i32 = 0; round < rounds; round++) {
    summedAreas(values, use, columns, rows, sums, counts);
    for (let row: i32 = 0; row < rows; row++) riseOfRow(values, use, columns, rows, row, half, startM, sums, counts, rise);
  }
}

function summedAreas(values: usize, use: usize, columns: i32, rows: i32, sums: usize, counts: usize): void {
  const stride = <usize>(columns + 1);
  for (let row: i32 = 0; row < rows; row++) {
    let sum: f64 = 0;
    let count: i32 = 0;
    let at = <usize>(row + 1) * stride;
    store<f64>(sums + (at << 3), 0);
    store<i32>(counts + (at << 2), 0);
    const start = <usize>row * <usize>columns;
    for (let column: usize = 0; column < <usize>columns; column++) {
      const value = load<f32>(values + ((start + column) << 2));
      if (load<u8>(use + start + column) && value === value) {
        sum += <f64>value;
        count++;
      }
      at++;
      store<f64>(sums + (at << 3), load<f64>(sums + ((at - stride) << 3)) + sum);
      store<i32>(counts + (at << 2), load<i32>(counts + ((at - stride) << 2)) + count);
    }
  }
}

function riseOfRow(values: usize, use: usize, columns: i32, rows: i32, row: i32, half: i32, startM: f64, sums: usize, counts: usize, rise: usize): void {
  const start = <usize>row * <usize>columns;
  const stride = <usize>(columns + 1);
  const top = max(0, row - half);
  const bottom = min(rows, row + half + 1);
  const needed = f64x2.splat(least * <f64>(bottom - top) * <f64>(2 * half + 1));
  const high = f64x2.splat(0.75 * startM);
  const low = f64x2.splat(-2 * startM);
  const firstWhole = half;
  const lastWhole = columns - half - 1;
  const upper = <usize>top * stride;
  const lower = <usize>bottom * stride;
  let column: i32 = 0;
  while (column < columns) {
    // Two windows at a time where neither is cut off and both hold enough ground.
    if (column >= firstWhole && column + 1 <= lastWhole) {
      const left = <usize>(column - half);
      const right = <usize>(column + half + 1);
      const n = f64x2.convert_low_i32x4_s(i32x4.add(
        i32x4.sub(i32x4.sub(load2(counts, lower + right), load2(counts, upper + right)), load2(counts, lower + left)), load2(counts, upper + left)));
      if (i64x2.all_true(f64x2.ge(n, needed))) {
        const area = f64x2.add(f64x2.sub(f64x2.sub(
          v128.load(sums + ((lower + right) << 3)), v128.load(sums + ((upper + right) << 3))), v128.load(sums + ((lower + left) << 3))), v128.load(sums + ((upper + left) << 3)));
        const ground = f32x4.demote_f64x2_zero(f64x2.div(area, n));
        const at = start + <usize>column;
        const next = f32x4.sub(v128.load64_zero(values + (at << 2)), ground);
        v128.store64_lane(rise + (at << 2), next, 0);
        const wide = f64x2.promote_low_f32x4(next);
        const isGround = v128.and(f64x2.lt(wide, high), f64x2.gt(wide, low));
        store<u8>(use + at, <u8>(i64x2.extract_lane(isGround, 0) & 1));
        store<u8>(use + at + 1, <u8>(i64x2.extract_lane(isGround, 1) & 1));
        column += 2;
        continue;
      }
    }
    const ground = <f32>groundAt(columns, rows, row, column, half, sums, counts);
    const at = start + <usize>column;
    const next = load<f32>(values + (at << 2)) - ground;
    store<f32>(rise + (at << 2), next);
    store<u8>(use + at, <f64>next < 0.75 * startM && <f64>next > -2 * startM ? 1 : 0);
    column++;
  }
}

@inline
function load2(counts: usize, index: usize): v128 {
  return v128.load64_zero(counts + (index << 2));
}

/** Mean ground in the smallest window that holds enough of it; NaN when the whole map holds none. */
function groundAt(columns: i32, rows: i32, row: i32, column: i32, firstHalf: i32, sums: usize, counts: usize): f64 {
  const stride = <usize>(columns + 1);
  let half = firstHalf;
  while (true) {
    const top = max(0, row - half);
    const bottom = min(rows, row + half + 1);
    const left = max(0, column - half);
    const right = min(columns, column + half + 1);
    const upper = <usize>top * stride;
    const lower = <usize>bottom * stride;
    const n = load<i32>(counts + ((lower + <usize>right) << 2)) - load<i32>(counts + ((upper + <usize>right) << 2))
      - load<i32>(counts + ((lower + <usize>left) << 2)) + load<i32>(counts + ((upper + <usize>left) << 2));
    const whole = top === 0 && left === 0 && bottom === rows && right === columns;
    if (<f64>n >= least * <f64>(bottom - top) * <f64>(right - left) || (whole && n > 0)) {
      const area = load<f64>(sums + ((lower + <usize>right) << 3)) - load<f64>(sums + ((upper + <usize>right) << 3))
        - load<f64>(sums + ((lower + <usize>left) << 3)) + load<f64>(sums + ((upper + <usize>left) << 3));
      return area / <f64>n;
    }
    if (whole) break;
    half *= 2;
  }
  return NaN;
}
