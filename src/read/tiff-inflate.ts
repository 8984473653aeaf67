/** Deflate with a bound: geotiff's own inflation unpacks a block to its end, however far a small file swells. */

// Module-scoped because the science is compiled without DOM types; every realm has it.
declare const DecompressionStream: new (format: 'deflate') => {
  readonly writable: { getWriter(): { write(chunk: Uint8Array): Promise<void>; close(): Promise<void> } };
  readonly readable: { getReader(): { read(): Promise<{ done: boolean; value?: Uint8Array }>; cancel(): Promise<void> } };
};

/** The bytes of a zlib block (RFC 1950), whatever follows it. Throws RangeError when they are damaged or more than `most`. */
export async function inflate(stored: Uint8Array, most: number): Promise<ArrayBuffer> {
  const stream = new DecompressionStream('deflate');
  const writer = stream.writable.getWriter();
  const reader = stream.readable.getReader();
  // Their failures arrive at the reader as well.
  writer.write(stored).catch(() => undefined);
  writer.close().catch(() => undefined);
  const out = new Uint8Array(most);
  let written = 0;
  try {
    while (written < most) {
      const { done, value } = await reader.read();
      if (done || value === undefined) break;
      const part = value.subarray(0, most - written);
      out.set(part, written);
      written += part.length;
    }
  } catch {
    // The platform calls bytes after the block's end a failure too; the checksum tells.
  }
  await reader.cancel().catch(() => undefined);
  if (!holds(stored, adler32(out.subarray(0, written)))) throw new RangeError('not the bytes that were packed');
  return written === most ? out.buffer : out.buffer.slice(0, written);
}

/** RFC 1950 (1996), section 8.2: the checksum that closes a block. */
function adler32(bytes: Uint8Array): number {
  let a = 1;
  let b = 0;
  for (let start = 0; start < bytes.length; start += 4096) {
    const end = Math.min(start + 4096, bytes.length);
    for (let i = start; i < end; i++) {
      a += bytes[i]!;
      b += a;
    }
    a %= 65521;
    b %= 65521;
  }
  return b * 65536 + a;
}

/** Whether the number stands in the bytes, high byte first; sought from the end, where it belongs. */
function holds(bytes: Uint8Array, sum: number): boolean {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  for (let at = bytes.length - 4; at >= 0; at--) if (view.getUint32(at) === sum) return true;
  return false;
}
