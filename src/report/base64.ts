const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

/** Bytes as base64 with padding (RFC 4648, section 4); neither Node's Buffer nor the page's btoa is at hand here. */
export function base64(bytes: Uint8Array): string {
  const parts: string[] = [];
  for (let at = 0; at < bytes.length; at += 3) {
    const [a = 0, b = 0, c = 0] = bytes.subarray(at, at + 3);
    const word = (a << 16) | (b << 8) | c;
    const letters = [18, 12, 6, 0].map((shift) => alphabet[(word >> shift) & 63]).join('');
    const missing = Math.max(0, at + 3 - bytes.length);
    parts.push(letters.slice(0, 4 - missing) + '='.repeat(missing));
  }
  return parts.join('');
}
