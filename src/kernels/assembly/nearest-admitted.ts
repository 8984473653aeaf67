// Nearest admitted pixel by city-block distance, breadth first from the rim of the admitted region.

/**
 * `use`: columns × rows bytes, 1 = admitted, with 32 bytes before and behind it. `nearest`: as many i32, the result: an admitted pixel's own index, for others
 * that of a nearest admitted one, −1 where there is none at most `within` steps away. `queue`: as many i32.
 */
export function nearestAdmitted(use: usize, columns: i32, rows: i32, nearest: usize, queue: usize, within: i32): void {
  const count = columns * rows;
  let tail: i32 = 0;
  for (let row: i32 = 0; row < rows; row++) {
    const start = row * columns;
    let column: i32 = 0;
    while (column < columns) {
      if (row > 0 && row + 1 < rows && column > 0 && column + 16 < columns && allInside(use + <usize>(start + column), columns)) {
        fillOwn(nearest + (<usize>(start + column) << 2), start + column);
        column += 16;
        continue;
      }
      // Sixteen one by one before the next try: beside a rim it would mostly be in vain.
      const end = min(columns, column + 16);
      for (; column < end; column++) {
        const i = start + column;
        const at = use + <usize>i;
        if (load<u8>(at) !== 1) {
          store<i32>(nearest + (<usize>i << 2), -1);
          continue;
        }
        store<i32>(nearest + (<usize>i << 2), i);
        const inside = (column === 0 || load<u8>(at - 1) === 1) && (column + 1 === columns || load<u8>(at + 1) === 1)
          && (row === 0 || load<u8>(at - <usize>columns) === 1) && (row + 1 === rows || load<u8>(at + <usize>columns) === 1);
        if (!inside) {
          store<i32>(queue + (<usize>tail << 2), i);
          tail++;
        }
      }
    }
  }
  // The queue holds the rim, then what lies one step from it, then two.
  let steps: i32 = 0;
  let endOfStep = tail;
  for (let head: i32 = 0; head < tail; head++) {
    if (head === endOfStep) {
      steps++;
      endOfStep = tail;
    }
    if (steps >= within) break;
    const i = load<i32>(queue + (<usize>head << 2));
    const from = load<i32>(nearest + (<usize>i << 2));
    const column = i % columns;
    if (column > 0) tail = reach(nearest, queue, i - 1, from, tail);
    if (column + 1 < columns) tail = reach(nearest, queue, i + 1, from, tail);
    if (i >= columns) tail = reach(nearest, queue, i - columns, from, tail);
    if (i + columns < count) tail = reach(nearest, queue, i + columns, from, tail);
  }
}

/** Whether sixteen pixels and all their neighbours by edges are admitted. */
@inline
function allInside(at: usize, columns: i32): bool {
  const one = i8x16.splat(1);
  const stride = <usize>columns;
  const equal = v128.and(
    v128.and(i8x16.eq(v128.load(at), one), v128.and(i8x16.eq(v128.load(at - 1), one), i8x16.eq(v128.load(at + 1), one))),
    v128.and(i8x16.eq(v128.load(at - stride), one), i8x16.eq(v128.load(at + stride), one)));
  return i8x16.all_true(equal);
}

@inline
function fillOwn(at: usize, index: i32): void {
  const four = i32x4.add(i32x4.splat(index), i32x4(0, 1, 2, 3));
  v128.store(at, four);
  v128.store(at, i32x4.add(four, i32x4.splat(4)), 16);
  v128.store(at, i32x4.add(four, i32x4.splat(8)), 32);
  v128.store(at, i32x4.add(four, i32x4.splat(12)), 48);
}

@inline
function reach(nearest: usize, queue: usize, to: i32, from: i32, tail: i32): i32 {
  const at = nearest + (<usize>to << 2);
  if (load<i32>(at) >= 0) return tail;
  store<i32>(at, from);
  store<i32>(queue + (<usize>tail << 2), to);
  return tail + 1;
}
