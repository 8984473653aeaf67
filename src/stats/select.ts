/** Order statistics by selection. */

/**
 * The k-th smallest (0-based) of the first `length` numbers, which are rearranged so that nothing
 * before k is larger and nothing after k smaller. Hoare's FIND (Commun. ACM 4, 321, 1961) with the
 * median of three as pivot. The numbers must hold no NaN; 0 ≤ k < length is the caller's duty.
 */
export function selectInPlace(values: Float32Array | Float64Array, k: number, length = values.length): number {
  let low = 0;
  let high = length - 1;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (values[middle]! < values[low]!) swap(values, low, middle);
    if (values[high]! < values[low]!) swap(values, low, high);
    if (values[high]! < values[middle]!) swap(values, middle, high);
    const pivot = values[middle]!;
    let i = low;
    let j = high;
    while (i <= j) {
      while (values[i]! < pivot) i += 1;
      while (values[j]! > pivot) j -= 1;
      if (i <= j) {
        swap(values, i, j);
        i += 1;
        j -= 1;
      }
    }
    if (k <= j) high = j;
    else if (k >= i) low = i;
    else break;
  }
  return values[k]!;
}

function swap(values: Float32Array | Float64Array, i: number, j: number): void {
  const held = values[i]!;
  values[i] = values[j]!;
  values[j] = held;
}

/** A copy of the numbers without the missing ones (NaN), as doubles. */
export function presentValues(values: ArrayLike<number>): Float64Array {
  const kept = new Float64Array(values.length);
  let count = 0;
  for (let k = 0; k < values.length; k++) {
    const value = values[k]!;
    if (value === value) kept[count++] = value;
  }
  return kept.subarray(0, count);
}
