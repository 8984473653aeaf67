/** Seeded random numbers: the same seed gives the same numbers in every run. */

export interface Random {
  /** Uniform on [0, 1), 32 bits. */
  uniform(): number;
  /** Whole number from 0 to `below` − 1, without bias; `below` from 1 to 2³². */
  integer(below: number): number;
  /** Standard normal deviate. */
  normal(): number;
}

/**
 * Generator for a seed, usually the hash of a source. State of 128 bits with a counter (sfc32 of
 * C. Doty-Humphrey's PractRand; public domain), normals by the polar method (Marsaglia & Bray,
 * SIAM Rev. 6, 260, 1964).
 */
export function seededRandom(seed: string): Random {
  let [a, b, c] = hashWords(seed);
  let counter = 1;
  let spare: number | undefined;

  function next(): number {
    const sum = (a + b + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = ((c << 21) | (c >>> 11)) + sum | 0;
    return sum >>> 0;
  }
  for (let round = 0; round < 15; round++) next();

  const uniform = (): number => next() / 4294967296;
  return {
    uniform,
    integer(below) {
      // Numbers from the last, incomplete round would favour the low values.
      const limit = 4294967296 - (4294967296 % below);
      for (;;) {
        const drawn = next();
        if (drawn < limit) return drawn % below;
      }
    },
    normal() {
      if (spare !== undefined) {
        const value = spare;
        spare = undefined;
        return value;
      }
      for (;;) {
        const x = 2 * uniform() - 1;
        const y = 2 * uniform() - 1;
        const square = x * x + y * y;
        if (square >= 1 || square === 0) continue;
        const factor = Math.sqrt((-2 * Math.log(square)) / square);
        spare = y * factor;
        return x * factor;
      }
    },
  };
}

/**
 * Three 32-bit words from a string: FNV-1a (Fowler, Noll & Vo) over its UTF-16 units from three
 * starting points, each finished by MurmurHash3's mixer (A. Appleby, public domain).
 */
export function hashWords(text: string): [number, number, number] {
  const word = (start: number): number => {
    let hash = start;
    for (let k = 0; k < text.length; k++) {
      hash = Math.imul(hash ^ (text.charCodeAt(k) & 0xff), 0x01000193);
      hash = Math.imul(hash ^ (text.charCodeAt(k) >>> 8), 0x01000193);
    }
    hash = Math.imul(hash ^ (hash >>> 16), 0x85ebca6b);
    hash = Math.imul(hash ^ (hash >>> 13), 0xc2b2ae35);
    return hash ^ (hash >>> 16);
  };
  return [word(0x811c9dc5 | 0), word(0x2f0b4c47), word(0x5bd1e995)];
}
