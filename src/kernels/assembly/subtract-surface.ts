// A surface that is a sum of products of a factor by row and a factor by column, taken off a map.

/**
 * `values`: columns × rows f32 with 16 bytes behind them, replaced by values − surface; NaN stays NaN. `byRow`: rows × terms f64. `byColumn`: terms × columns f64.
 * At row r and column c the surface is Σ byRow[r, n] · byColumn[n, c], summed from 0 up.
 */
export function subtractSurface(values: usize, columns: i32, rows: i32, terms: i32, byRow: usize, byColumn: usize): void {
  const stride = <usize>columns << 3;
  for (let row: i32 = 0; row < rows; row++) {
    const start = values + (<usize>row * <usize>columns << 2);
    const factors = byRow + (<usize>(row * terms) << 3);
    let column: i32 = 0;
    for (; column + 2 <= columns; column += 2) {
      let sum = f64x2.splat(0);
      let at = byColumn + (<usize>column << 3);
      for (let n: i32 = 0; n < terms; n++) {
        sum = f64x2.add(sum, f64x2.mul(v128.load64_splat(factors + (<usize>n << 3)), v128.load(at)));
        at += stride;
      }
      const value = start + (<usize>column << 2);
      v128.store64_lane(value, f32x4.demote_f64x2_zero(f64x2.sub(f64x2.promote_low_f32x4(v128.load64_zero(value)), sum)), 0);
    }
    if (column < columns) {
      let sum: f64 = 0;
      let at = byColumn + (<usize>column << 3);
      for (let n: i32 = 0; n < terms; n++) {
        sum += load<f64>(factors + (<usize>n << 3)) * load<f64>(at);
        at += stride;
      }
      const value = start + (<usize>column << 2);
      store<f32>(value, <f32>(<f64>load<f32>(value) - sum));
    }
  }
}
