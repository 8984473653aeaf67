// Grey opening by a square: running minimum, then running maximum, each along rows and then along columns.

/**
 * `values`: columns × rows f32, replaced by the opening; `other`: as many. `line`: columns + 2 × halfX + 16 f32; `back`: (2 × halfY + 1) × columns f32,
 * `ahead`: columns f32; each with 16 bytes behind it.
 */
export function greyOpening(values: usize, other: usize, columns: i32, rows: i32, halfX: i32, halfY: i32, line: usize, back: usize, ahead: usize): void {
  alongRows(values, other, columns, rows, halfX, line, true);
  alongColumns(other, values, columns, rows, halfY, back, ahead, true);
  alongRows(values, other, columns, rows, halfX, line, false);
  alongColumns(other, values, columns, rows, halfY, back, ahead, false);
}

@inline
function pick(a: v128, b: v128, least: boolean): v128 {
  return least ? f32x4.min(a, b) : f32x4.max(a, b);
}

/** Extremes over powers of two grow by doubling; two overlapping ones make the window. */
function alongRows(from: usize, to: usize, columns: i32, rows: i32, half: i32, line: usize, least: boolean): void {
  const window = 2 * half + 1;
  const length = columns + 2 * half;
  const neutral: f32 = least ? Infinity : -Infinity;
  let power: i32 = 1;
  while (2 * power <= window) power *= 2;
  for (let row: i32 = 0; row < rows; row++) {
    const at = <usize>row * <usize>columns << 2;
    for (let k: i32 = 0; k < half; k++) store<f32>(line + (<usize>k << 2), neutral);
    memory.copy(line + (<usize>half << 2), from + at, <usize>columns << 2);
    for (let k = half + columns; k < length + 8; k++) store<f32>(line + (<usize>k << 2), neutral);
    for (let p: i32 = 1; p < power; p *= 2) {
      for (let k: i32 = 0; k < length - p; k += 4) {
        const here = line + (<usize>k << 2);
        v128.store(here, pick(v128.load(here), v128.load(here + (<usize>p << 2)), least));
      }
    }
    const rest = <usize>(window - power) << 2;
    let k: i32 = 0;
    for (; k + 4 <= columns; k += 4) {
      const here = line + (<usize>k << 2);
      v128.store(to + at + (<usize>k << 2), pick(v128.load(here), v128.load(here + rest), least));
    }
    for (; k < columns; k++) {
      const here = line + (<usize>k << 2);
      const a = load<f32>(here);
      const b = load<f32>(here + rest);
      store<f32>(to + at + (<usize>k << 2), least ? min<f32>(a, b) : max<f32>(a, b));
    }
  }
}

/**
 * Blocks as long as the window (van Herk; Gil and Werman): a window is the end of one block and the beginning of the next. Whole rows are
 * compared at a time.
 */
function alongColumns(from: usize, to: usize, columns: i32, rows: i32, half: i32, back: usize, ahead: usize, least: boolean): void {
  const window = 2 * half + 1;
  const stride = <usize>columns << 2;
  for (let start: i32 = 0; start < rows; start += window) {
    // Row j of `back`: extreme over rows start + j − half … start + half.
    for (let j = window - 1; j >= 0; j--) {
      const row = start + j - half;
      const into = back + <usize>j * stride;
      const later = into + stride;
      if (row < 0 || row >= rows) {
        if (j < window - 1) memory.copy(into, later, stride);
        else fill(into, columns, least ? Infinity : -Infinity);
      } else if (j < window - 1) {
        extreme(into, later, from + <usize>row * stride, columns, least);
      } else {
        memory.copy(into, from + <usize>row * stride, stride);
      }
    }
    fill(ahead, columns, least ? Infinity : -Infinity);
    for (let j: i32 = 0; j < window && start + j < rows; j++) {
      const row = start + j + half;
      if (j > 0 && row < rows) extreme(ahead, ahead, from + <usize>row * stride, columns, least);
      extreme(to + <usize>(start + j) * stride, back + <usize>j * stride, ahead, columns, least);
    }
  }
}

function fill(at: usize, columns: i32, value: f32): void {
  for (let k: i32 = 0; k < columns; k++) store<f32>(at + (<usize>k << 2), value);
}

function extreme(into: usize, a: usize, b: usize, columns: i32, least: boolean): void {
  let k: usize = 0;
  const whole = <usize>(columns & ~3) << 2;
  const end = <usize>columns << 2;
  if (least) {
    for (; k < whole; k += 16) v128.store(into + k, f32x4.min(v128.load(a + k), v128.load(b + k)));
    for (; k < end; k += 4) store<f32>(into + k, min<f32>(load<f32>(a + k), load<f32>(b + k)));
  } else {
    for (; k < whole; k += 16) v128.store(into + k, f32x4.max(v128.load(a + k), v128.load(b + k)));
    for (; k < end; k += 4) store<f32>(into + k, max<f32>(load<f32>(a + k), load<f32>(b + k)));
  }
}
