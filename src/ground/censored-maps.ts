/** Single passes over a current and what is censored in it; short functions, for the reason given in plane-maps.ts. */

/** Log current and its masks, which the passes change. */
export interface Censored {
  readonly log10: Float32Array;
  /** 1 where the current is at most its bound. */
  readonly floor: Uint8Array;
  /** 1 where the current is at least its bound. */
  readonly saturated: Uint8Array;
}

export function lessOffset(values: Float32Array, offset: number): Float32Array {
  const out = new Float32Array(values.length);
  for (let i = 0; i < out.length; i++) out[i] = values[i]! - offset;
  return out;
}

/** Log10 of a current that is kept between floor and saturation; NaN stays NaN. */
export function censoredLog(values: Float32Array, floor: number, saturation: number): Float32Array {
  const out = new Float32Array(values.length);
  // The two bounds are met again and again, and a logarithm takes longer than the rest of the pass.
  const floorLog = Math.log10(floor);
  const saturationLog = Math.log10(saturation);
  for (let i = 0; i < out.length; i++) {
    const value = values[i]!;
    out[i] = value <= floor ? Math.min(floorLog, saturationLog) : value >= saturation ? saturationLog : Math.log10(value);
  }
  return out;
}

/**
 * Marks floor and saturation by the current itself; where a taken-off tail hides more than the floor the log current rises to it.
 *
 * @param blind what is hidden at each pixel, absent for none. @returns number of saturated pixels.
 */
export function markCensored(values: Float32Array, blind: Float32Array | undefined, floorA: number, saturation: number, { log10, floor, saturated }: Censored): number {
  if (blind) for (let i = 0; i < values.length; i++) if (values[i]! <= blind[i]! && blind[i]! > floorA) log10[i] = Math.log10(blind[i]!);
  const hidden = blind ?? new Float32Array(values.length);
  let pixels = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (value <= floorA || value <= hidden[i]!) floor[i] = 1;
    else if (value >= saturation) {
      saturated[i] = 1;
      pixels++;
    }
  }
  return pixels;
}

/**
 * Brings the masks up to a repaired log current: a pixel is censored like the neighbours it was filled from, as a run filled from saturated ones is as
 * saturated as they are.
 *
 * @param floorLog log current up to which a pixel is at the floor; @param saturationLog from which it is saturated. @returns number of repaired pixels.
 */
export function markRepaired(repaired: Uint8Array, floorLog: number, saturationLog: number, { log10, floor, saturated }: Censored): number {
  let pixels = 0;
  for (let i = 0; i < repaired.length; i++) {
    const value = log10[i]!;
    if (value <= floorLog) floor[i] = 1;
    else if (value >= saturationLog) saturated[i] = 1;
    else if (repaired[i] === 1 || value !== value) floor[i] = saturated[i] = 0;
    pixels += repaired[i]!;
  }
  return pixels;
}

/** The current with repaired pixels from the log current; NaN where that is missing. */
export function withRepairs(values: Float32Array, repaired: Uint8Array, log10: Float32Array): Float32Array {
  const out = values.slice();
  for (let i = 0; i < out.length; i++) {
    if (log10[i] !== log10[i]) out[i] = Number.NaN;
    if (repaired[i] === 1) out[i] = 10 ** log10[i]!;
  }
  return out;
}

/** Multiplies a current by 10 to the power of each row's decades, and adds them to its log. */
export function undoWear(decades: Float64Array, columns: number, values: Float32Array, log10: Float32Array): void {
  for (let r = 0; r < decades.length; r++) {
    const factor = 10 ** decades[r]!;
    for (let i = r * columns; i < (r + 1) * columns; i++) {
      values[i]! *= factor;
      log10[i]! += decades[r]!;
    }
  }
}
