/** SHA-256 of source files, so that another lab can check that it has the same bytes. */

// Module-scoped because the science is compiled without DOM types. Absent on pages served without TLS to another machine.
declare const crypto: { readonly subtle?: { digest(name: 'SHA-256', bytes: Uint8Array): Promise<ArrayBuffer> } } | undefined;

/** SHA-256 as 64 hexadecimal digits. Uses the platform's implementation where there is one. */
export async function sha256(bytes: Uint8Array): Promise<string> {
  const subtle = typeof crypto === 'undefined' ? undefined : crypto.subtle;
  return hex(subtle === undefined ? sha256Plain(bytes) : new Uint8Array(await subtle.digest('SHA-256', bytes)));
}

function hex(digest: Uint8Array): string {
  let text = '';
  for (const byte of digest) text += byte.toString(16).padStart(2, '0');
  return text;
}

/** The same in plain TypeScript, 32 bytes. Source: FIPS PUB 180-4 (2015), section 6.2. */
export function sha256Plain(bytes: Uint8Array): Uint8Array {
  const padded = new Uint8Array(Math.ceil((bytes.length + 9) / 64) * 64);
  padded.set(bytes);
  padded[bytes.length] = 0x80;
  const view = new DataView(padded.buffer);
  view.setUint32(padded.length - 8, Math.floor(bytes.length / 2 ** 29));
  view.setUint32(padded.length - 4, (bytes.length << 3) >>> 0);

  const { constants, initial } = tables();
  const state = initial.slice();
  const w = new Uint32Array(64);
  for (let start = 0; start < padded.length; start += 64) {
    for (let t = 0; t < 16; t++) w[t] = view.getUint32(start + 4 * t);
    for (let t = 16; t < 64; t++) {
      const a = w[t - 15]!;
      const b = w[t - 2]!;
      w[t] = w[t - 16]! + (rotate(a, 7) ^ rotate(a, 18) ^ (a >>> 3)) + w[t - 7]! + (rotate(b, 17) ^ rotate(b, 19) ^ (b >>> 10));
    }
    let [a, b, c, d, e, f, g, h] = state as unknown as [number, number, number, number, number, number, number, number];
    for (let t = 0; t < 64; t++) {
      const t1 = (h + (rotate(e, 6) ^ rotate(e, 11) ^ rotate(e, 25)) + ((e & f) ^ (~e & g)) + constants[t]! + w[t]!) | 0;
      const t2 = ((rotate(a, 2) ^ rotate(a, 13) ^ rotate(a, 22)) + ((a & b) ^ (a & c) ^ (b & c))) | 0;
      h = g; g = f; f = e; e = (d + t1) | 0; d = c; c = b; b = a; a = (t1 + t2) | 0;
    }
    [a, b, c, d, e, f, g, h].forEach((value, i) => { state[i] = state[i]! + value; });
  }
  const out = new Uint8Array(32);
  state.forEach((word, i) => new DataView(out.buffer).setUint32(4 * i, word));
  return out;
}

function rotate(x: number, n: number): number {
  return (x >>> n) | (x << (32 - n));
}

/** Fractional parts of the cube and square roots of the first primes (FIPS 180-4, sections 4.2.2 and 5.3.3), exact in integers. */
function tables(): { constants: Uint32Array; initial: Uint32Array } {
  const primes: number[] = [];
  for (let n = 2; primes.length < 64; n++) if (primes.every((p) => n % p !== 0)) primes.push(n);
  const fraction = (prime: number, power: 2 | 3) => {
    const target = BigInt(prime) << BigInt(32 * power);
    let low = 0n;
    let high = 1n << 40n;
    while (high - low > 1n) {
      const middle = (low + high) >> 1n;
      if (middle ** BigInt(power) <= target) low = middle; else high = middle;
    }
    return Number(low & 0xffffffffn);
  };
  return {
    constants: Uint32Array.from(primes, (p) => fraction(p, 3)),
    initial: Uint32Array.from(primes.slice(0, 8), (p) => fraction(p, 2)),
  };
}
