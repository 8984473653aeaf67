// Medians of the differences between scan lines a given number of rows apart.

/**
 * For each row r ≥ `lag`: the median over every `step`-th column of the difference between row r and row r − lag, and how many differences it
 * is of. Differences that are not at most `limit` in size, or of which a value is NaN, are left out.
 *
 * `values`: columns × rows f32. `medians`: rows f64 and `counts`: rows i32, written from row `lag` on (the median only for at least `least` differences).
 * `first`, `second`: columns + 1 f64 each.
 */
export function rowDifferenceMedians(
  values: usize, columns: i32, rows: i32, lag: i32, step: i32, limit: f64, least: i32, medians: usize, counts: usize, first: usize, second: usize
): void {
  const back = <usize>lag * <usize>columns << 2;
  const stride = <usize>step << 2;
  for (let row = lag; row < rows; row++) {
    let here = values + ((<usize>row * <usize>columns + <usize>(row % step)) << 2);
    const end = values + (<usize>(row + 1) * <usize>columns << 2);
    let into = first;
    for (; here < end; here += stride) {
      const difference = <f64>load<f32>(here) - <f64>load<f32>(here - back);
      store<f64>(into, difference);
      into += <usize>(abs(difference) <= limit) << 3;
    }
    const count = <i32>((into - first) >> 3);
    store<i32>(counts + (<usize>row << 2), count);
    if (count >= least) store<f64>(medians + (<usize>row << 3), median(first, second, count));
  }
}

/** Numbers few enough to be sorted by insertion. */
const few: i32 = 12;

/**
 * Median by selection without branches on the data: each round parts the numbers at a pivot into the other buffer, smaller ones from the left,
 * the rest from the right. Even counts: lower + (upper − lower) / 2.
 */
function median(first: usize, second: usize, length: i32): f64 {
  let from = first;
  let other = second;
  let count = length;
  let k = length >>> 1;
  // Largest of the numbers left out below.
  let below: f64 = -Infinity;
  const even = (length & 1) === 0;
  while (count > few) {
    const pivot = middleOf(load<f64>(from), load<f64>(from + (<usize>(count >>> 1) << 3)), load<f64>(from + (<usize>(count - 1) << 3)));
    let smaller = part(from, other, count, pivot, false);
    if (smaller === 0) {
      // The pivot is the smallest: part off all that equal it.
      smaller = part(from, other, count, pivot, true);
      if (k < smaller) return even && k === 0 ? below + (pivot - below) / 2 : pivot;
    }
    if (k < smaller) {
      count = smaller;
      const held = from;
      from = other;
      other = held;
    } else {
      if (even) below = largest(other, smaller);
      k -= smaller;
      count -= smaller;
      const rest = other + (<usize>smaller << 3);
      other = from;
      from = rest;
    }
  }
  for (let i: i32 = 1; i < count; i++) {
    const value = load<f64>(from + (<usize>i << 3));
    let j = i - 1;
    for (; j >= 0 && load<f64>(from + (<usize>j << 3)) > value; j--) store<f64>(from + (<usize>(j + 1) << 3), load<f64>(from + (<usize>j << 3)));
    store<f64>(from + (<usize>(j + 1) << 3), value);
  }
  const upper = load<f64>(from + (<usize>k << 3));
  if (!even) return upper;
  const lower = k > 0 ? load<f64>(from + (<usize>(k - 1) << 3)) : below;
  return lower + (upper - lower) / 2;
}

/** Parts `count` numbers into `to`: those below the pivot (or at it, with `equal`) to the left, in place of the rest to the right. Returns how many. */
@inline
function part(from: usize, to: usize, count: i32, pivot: f64, equal: boolean): i32 {
  let left = to;
  let right = to + (<usize>(count - 1) << 3);
  const end = from + (<usize>count << 3);
  for (let at = from; at < end; at += 8) {
    const value = load<f64>(at);
    store<f64>(left, value);
    store<f64>(right, value);
    const goes = <usize>(equal ? value <= pivot : value < pivot) << 3;
    left += goes;
    right -= 8 - goes;
  }
  return <i32>((left - to) >> 3);
}

@inline
function middleOf(a: f64, b: f64, c: f64): f64 {
  return max<f64>(min<f64>(a, b), min<f64>(max<f64>(a, b), c));
}

function largest(at: usize, count: i32): f64 {
  let top: f64 = -Infinity;
  const end = at + (<usize>count << 3);
  for (; at < end; at += 8) top = max<f64>(top, load<f64>(at));
  return top;
}
