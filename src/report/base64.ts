import { textOf } from '../read/text.ts';

const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';
const letters = Uint8Array.from(alphabet, (letter) => letter.charCodeAt(0));
const padding = '='.charCodeAt(0);

/** Bytes as base64 with padding (RFC 4648, section 4); neither Node's Buffer nor the page's btoa is at hand here. */
export function base64(bytes: Uint8Array): string {
  const codes = new Uint8Array(4 * Math.ceil(bytes.length / 3));
  const whole = bytes.length - (bytes.length % 3);
  let to = 0;
  for (let at = 0; at < whole; at += 3) {
    const word = (bytes[at]! << 16) | (bytes[at + 1]! << 8) | bytes[at + 2]!;
    codes[to++] = letters[word >> 18]!;
    codes[to++] = letters[(word >> 12) & 63]!;
    codes[to++] = letters[(word >> 6) & 63]!;
    codes[to++] = letters[word & 63]!;
  }
  if (whole < bytes.length) {
    const left = bytes.length - whole;
    const word = (bytes[whole]! << 16) | ((left === 2 ? bytes[whole + 1]! : 0) << 8);
    codes[to++] = letters[word >> 18]!;
    codes[to++] = letters[(word >> 12) & 63]!;
    codes[to++] = left === 2 ? letters[(word >> 6) & 63]! : padding;
    codes[to] = padding;
  }
  return textOf(codes);
}
