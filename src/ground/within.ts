/** A map without what lies beside the ground that counts. */

/** The map with NaN where `inside` is not 1; the map itself, not a copy, where all of it counts. */
export function within(map: Float32Array, inside: Uint8Array | undefined): Float32Array {
  if (!inside) return map;
  const out = map.slice();
  for (let i = 0; i < out.length; i++) if (inside[i] !== 1) out[i] = Number.NaN;
  return out;
}
