/** LZW as TIFF stores it. Source: TIFF Revision 6.0 (Adobe, 1992), section 13. */

const clear = 256;
const end = 257;

/**
 * Decodes at most `expected` bytes; what lies beyond is dropped, what is missing is simply not there
 * (the result is then shorter). Returns undefined when a code refers to an entry that does not exist.
 */
export function decodeLzw(input: Uint8Array, expected: number): Uint8Array | undefined {
  const out = new Uint8Array(expected);
  const prefix = new Uint16Array(4096);
  const last = new Uint8Array(4096);
  const lengths = new Uint16Array(4096);
  for (let code = 0; code < 256; code++) {
    last[code] = code;
    lengths[code] = 1;
  }
  let written = 0;
  let next = 258;
  let width = 9;
  let previous = -1;
  let bits = 0;
  let held = 0;
  let at = 0;
  while (written < expected) {
    while (held < width) {
      if (at >= input.length) return out.subarray(0, written);
      bits = ((bits << 8) | input[at++]!) & 0xffffff;
      held += 8;
    }
    held -= width;
    const code = (bits >> held) & ((1 << width) - 1);
    if (code === end) break;
    if (code === clear) {
      next = 258;
      width = 9;
      previous = -1;
      continue;
    }
    if (code > next || (code === next && previous < 0) || (code > 255 && previous < 0)) return undefined;
    // A code that is about to be defined stands for the previous string plus its own first byte.
    const source = code === next ? previous : code;
    const length = lengths[source]!;
    let first = source;
    for (let k = written + length - 1; k >= written; k--) {
      if (k < expected) out[k] = last[first]!;
      if (k > written) first = prefix[first]!;
    }
    written += length;
    const firstByte = last[first]!;
    if (code === next) {
      if (written < expected) out[written] = firstByte;
      written++;
    }
    if (previous >= 0 && next < 4096) {
      prefix[next] = previous;
      last[next] = firstByte;
      lengths[next] = lengths[previous]! + 1;
      next++;
    }
    previous = code;
    // TIFF widens one code early.
    if (next >= (1 << width) - 1 && width < 12) width++;
  }
  return out.subarray(0, Math.min(written, expected));
}
