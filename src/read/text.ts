/** Bytes to text, on any platform. */

// Module-scoped because the science is compiled without DOM and Node types; every realm has it.
declare const TextDecoder: new (encoding: string) => { decode(bytes: Uint8Array): string };
declare const TextEncoder: new () => { encode(text: string): Uint8Array };

/** Text of a file: UTF-16 where a byte order mark says so, else UTF-8 (bad bytes become U+FFFD); the mark is removed. */
export function textOf(bytes: Uint8Array): string {
  const encoding = bytes[0] === 0xff && bytes[1] === 0xfe ? 'utf-16le' : bytes[0] === 0xfe && bytes[1] === 0xff ? 'utf-16be' : 'utf-8';
  return new TextDecoder(encoding).decode(bytes);
}

/** A text as UTF-8. */
export function bytesOfText(text: string): Uint8Array {
  return new TextEncoder().encode(text);
}

/** Whether the first kilobytes look like text: no zero bytes (save in UTF-16) and hardly any control characters. */
export function looksLikeText(bytes: Uint8Array): boolean {
  const head = bytes.subarray(0, 4096);
  if ((head[0] === 0xff && head[1] === 0xfe) || (head[0] === 0xfe && head[1] === 0xff)) return true;
  let control = 0;
  for (const byte of head) {
    if (byte === 0) return false;
    if (byte < 32 && byte !== 9 && byte !== 10 && byte !== 13 && byte !== 12) control++;
  }
  return control <= head.length / 100;
}
