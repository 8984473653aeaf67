/** A current–voltage curve as it was measured. */

export interface IvCurve {
  /** File without its extension, with the column's label or the temperature where the file holds several curves. */
  readonly name: string;
  /** Volts, in the order in which the points were taken. */
  readonly biasV: Float64Array;
  /** Amperes, as long as `biasV`; both finite. */
  readonly currentA: Float64Array;
  /** Kelvin, above 0; absent when nothing states it. */
  readonly temperatureK?: number;
}
