/**
 * Walks over an LZW or PackBits block before geotiff 3.0.5 decodes it. Its decoders collect the bytes in a list that
 * grows without limit, its LZW takes undefined codes for runs, and it never returns from code 4093, for which its
 * table has no room. A damaged block would end the whole program or give wrong values; here it gives one sentence.
 * Sources: TIFF Revision 6.0 (Adobe, 1992), sections 9 and 13.
 */

/** Most bytes of one decoded LZW or PackBits block: geotiff's list takes about twenty bytes for each of them. */
export const packedLimit = 64 * 2 ** 20;

/**
 * How many of the `stored` bytes geotiff needs for `full` decoded bytes (an LZW block may hold up to `most`);
 * undefined when the block is damaged or too short. `compression` is 5 (LZW) or 32773 (PackBits).
 */
export function packedLength(stored: Uint8Array, compression: number, full: number, most: number): number | undefined {
  return compression === 5 ? lzwLength(stored, full, most) : packBitsLength(stored, full);
}

/** Follows the lengths of the strings only, code by code as geotiff does. */
function lzwLength(stored: Uint8Array, full: number, most: number): number | undefined {
  const lengths = new Uint16Array(4096).fill(1, 0, 256);
  let next = 258;
  let width = 9;
  let previous = 0;
  let total = 0;
  let bits = 0;
  let held = 0;
  let at = 0;
  while (8 * at - held < 8 * stored.length) {
    for (; held < width; held += 8) bits = ((bits << 8) | (stored[at++] ?? 0)) & 0xffffff;
    held -= width;
    const code = (bits >> held) & ((1 << width) - 1);
    if (code === 257) break;
    if (code === 256) {
      next = 258;
      width = 9;
      previous = 0;
      continue;
    }
    // A code that is about to be defined stands for the previous string and one byte more.
    if (code > next || (code === next && previous === 0)) return undefined;
    if (code > 4093 || (code === 4093 && next > 4093)) return undefined;
    const length = code < next ? lengths[code]! : previous + 1;
    total += length;
    if (total > most) return undefined;
    if (previous > 0) lengths[next++] = previous + 1;
    previous = length;
    // TIFF widens one code early; a full table stays as it is.
    if (next + 1 >= 1 << width) {
      if (width === 12) previous = 0;
      else width++;
    }
  }
  return total < full ? undefined : Math.min(at, stored.length);
}

function packBitsLength(stored: Uint8Array, full: number): number | undefined {
  let total = 0;
  let at = 0;
  while (total < full) {
    const head = stored[at];
    // 128 means nothing in the standard, geotiff takes it for a run; writers do not use it.
    if (head === undefined || head === 128) return undefined;
    const count = head < 128 ? head + 1 : 257 - head;
    at += head < 128 ? 1 + count : 2;
    total += count;
  }
  return at <= stored.length ? at : undefined;
}
