/** Pixels in order of their height. */

/** Bits sorted by at a time: three rounds for the 32 of a height. */
const digitBits = 11;
const digits = 1 << digitBits;

/**
 * The listed pixels, the highest first, equally high ones in the order of the list; NaN counts as lowest. Sorts by the digits of the height's bits, the last digit first
 * (radix sort: Knuth, The Art of Computer Programming 3, section 5.2.5), because comparing pairs takes several times as long on a map's flawed ground.
 */
export function highestFirst(pixels: Int32Array, heights: Float32Array): Int32Array {
  let order = pixels;
  let keys = keysOf(pixels, heights);
  for (let shift = 0; shift < 32; shift += digitBits) {
    const nextOrder = new Int32Array(order.length);
    const nextKeys = new Uint32Array(keys.length);
    sortByDigit(order, keys, shift, nextOrder, nextKeys);
    order = nextOrder;
    keys = nextKeys;
  }
  return order;
}

/** Whole numbers that fall as the heights rise. */
function keysOf(pixels: Int32Array, heights: Float32Array): Uint32Array {
  const values = new Float32Array(pixels.length);
  for (let n = 0; n < values.length; n++) {
    const height = heights[pixels[n]!]!;
    // The sum makes −0 a 0, which is as high.
    values[n] = height === height ? height + 0 : Number.NEGATIVE_INFINITY;
  }
  const keys = new Uint32Array(values.buffer);
  // As whole numbers the bits of positive values rise with them; those of negative ones, which have the top bit set, fall.
  for (let n = 0; n < keys.length; n++) if (keys[n]! < 0x80000000) keys[n] = 0x7fffffff - keys[n]!;
  return keys;
}

/** Orders by one digit of the keys; what has the same digit keeps its order. */
function sortByDigit(order: Int32Array, keys: Uint32Array, shift: number, nextOrder: Int32Array, nextKeys: Uint32Array): void {
  const places = new Uint32Array(digits + 1);
  for (let n = 0; n < keys.length; n++) places[((keys[n]! >>> shift) & (digits - 1)) + 1]!++;
  for (let digit = 0; digit < digits; digit++) places[digit + 1]! += places[digit]!;
  for (let n = 0; n < keys.length; n++) {
    const place = places[(keys[n]! >>> shift) & (digits - 1)]!++;
    nextOrder[place] = order[n]!;
    nextKeys[place] = keys[n]!;
  }
}
