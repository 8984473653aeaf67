/** The bytes of one strip or tile, decompressed and with the predictor undone. */
import { Problem } from '../problems/problem.ts';
import { nativeLittleEndian, swapBytes } from './numeric.ts';
import { decodeLzw } from './tiff-lzw.ts';

// Module-scoped because the science is compiled without DOM types; every realm has it.
declare const DecompressionStream: new (format: 'deflate') => {
  readonly writable: { getWriter(): { write(chunk: Uint8Array): Promise<void>; close(): Promise<void> } };
  readonly readable: { getReader(): { read(): Promise<{ done: boolean; value?: Uint8Array }>; cancel(): Promise<void> } };
};

/** From this many stored bytes on, deflate goes through the platform's stream, which stops at the expected size. */
const streamFrom = 65536;

/**
 * At most `expected` bytes from a stored block; shorter when the block holds less.
 * The result is the caller's own copy. Throws `tiff-damaged` when the block cannot be decoded.
 */
export async function unpackBlock(file: string, place: string, stored: Uint8Array, compression: number, expected: number): Promise<Uint8Array> {
  const damaged = () => new Problem('tiff-damaged', { file, place, reason: 'its compressed data are damaged' });
  switch (compression) {
    case 1: return stored.slice(0, expected);
    case 5: {
      const bytes = decodeLzw(stored, expected);
      if (bytes === undefined) throw damaged();
      return bytes;
    }
    case 8: case 32946:
      if (stored.length >= streamFrom) {
        const bytes = await inflateStream(stored, expected);
        if (bytes === undefined) throw damaged();
        return bytes;
      }
  }
  try {
    // Loaded only when a file needs it: most maps are stored plainly.
    const { getDecoder } = await import('geotiff');
    const decoder = await getDecoder(compression, { tileWidth: 0, tileHeight: 0, predictor: 1, bitsPerSample: [8], planarConfiguration: 1 });
    const bytes = new Uint8Array(await decoder.decodeBlock(stored.slice().buffer));
    return bytes.length > expected ? bytes.slice(0, expected) : bytes;
  } catch {
    throw damaged();
  }
}

/** Stops reading at `expected` bytes, so that a small file cannot swell without bound; undefined when damaged before that. */
async function inflateStream(stored: Uint8Array, expected: number): Promise<Uint8Array | undefined> {
  const stream = new DecompressionStream('deflate');
  const writer = stream.writable.getWriter();
  const reader = stream.readable.getReader();
  // Their failures arrive at the reader as well; bytes after the stream's end are no failure here.
  writer.write(stored).catch(() => undefined);
  writer.close().catch(() => undefined);
  const out = new Uint8Array(expected);
  let written = 0;
  try {
    while (written < expected) {
      const { done, value } = await reader.read();
      if (done || value === undefined) break;
      const part = value.subarray(0, expected - written);
      out.set(part, written);
      written += part.length;
    }
  } catch {
    return undefined;
  }
  await reader.cancel().catch(() => undefined);
  return written === expected ? out : out.slice(0, written);
}

/**
 * Undoes differencing in place and leaves the numbers in this machine's byte order.
 * Sources: TIFF Revision 6.0, section 14 (predictor 2); Adobe Photoshop TIFF Technical Note 3 (2005) (predictor 3).
 */
export function undoPredictor(bytes: Uint8Array, predictor: number, columns: number, size: number, littleEndian: boolean): void {
  if (predictor === 3) {
    undoFloatDifferences(bytes, columns, size);
    return;
  }
  if (size > 1 && littleEndian !== nativeLittleEndian) swapBytes(bytes, size);
  if (predictor !== 2) return;
  const view = size === 1 ? bytes : size === 2
    ? new Uint16Array(bytes.buffer, bytes.byteOffset, bytes.length / 2)
    : new Uint32Array(bytes.buffer, bytes.byteOffset, bytes.length / 4);
  for (let start = 0; start + columns <= view.length; start += columns) {
    for (let i = start + 1; i < start + columns; i++) view[i] = view[i]! + view[i - 1]!;
  }
}

/** Each row holds all first bytes, then all second bytes and so on, most significant first, differenced byte by byte. */
function undoFloatDifferences(bytes: Uint8Array, columns: number, size: number): void {
  const width = columns * size;
  const row = new Uint8Array(width);
  for (let start = 0; start + width <= bytes.length; start += width) {
    let sum = 0;
    for (let i = 0; i < width; i++) {
      sum = (sum + bytes[start + i]!) & 255;
      row[i] = sum;
    }
    for (let b = 0; b < size; b++) {
      const place = nativeLittleEndian ? size - 1 - b : b;
      for (let i = 0; i < columns; i++) bytes[start + i * size + place] = row[b * columns + i]!;
    }
  }
}
