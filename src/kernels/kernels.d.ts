declare namespace __AdaptedExports {
  /** Exported memory */
  export const memory: WebAssembly.Memory;
  /**
   * src/kernels/assembly/label-runs/findRuns
   * @param mask `usize`
   * @param columns `i32`
   * @param rows `i32`
   * @param reach `i32`
   * @param starts `usize`
   * @param ends `usize`
   * @param parents `usize`
   * @returns `i32`
   */
  export function findRuns(mask: number, columns: number, rows: number, reach: number, starts: number, ends: number, parents: number): number;
  /**
   * src/kernels/assembly/label-runs/numberRuns
   * @param starts `usize`
   * @param ends `usize`
   * @param parents `usize`
   * @param runs `i32`
   * @param pixels `usize`
   * @returns `i32`
   */
  export function numberRuns(starts: number, ends: number, parents: number, runs: number, pixels: number): number;
  /**
   * src/kernels/assembly/squared-distances/squaredDistances
   * @param mask `usize`
   * @param columns `i32`
   * @param rows `i32`
   * @param ratio `f64`
   * @param unit `f64`
   * @param outside `i32`
   * @param steps `usize`
   * @param height `usize`
   * @param bounds `usize`
   * @param centres `usize`
   * @param result `usize`
   * @param filled `usize`
   */
  export function squaredDistances(mask: number, columns: number, rows: number, ratio: number, unit: number, outside: number, steps: number, height: number, bounds: number, centres: number, result: number, filled: number): void;
  /**
   * src/kernels/assembly/grey-opening/greyOpening
   * @param values `usize`
   * @param other `usize`
   * @param columns `i32`
   * @param rows `i32`
   * @param halfX `i32`
   * @param halfY `i32`
   * @param line `usize`
   * @param back `usize`
   * @param ahead `usize`
   */
  export function greyOpening(values: number, other: number, columns: number, rows: number, halfX: number, halfY: number, line: number, back: number, ahead: number): void;
  /**
   * src/kernels/assembly/row-difference-medians/rowDifferenceMedians
   * @param values `usize`
   * @param columns `i32`
   * @param rows `i32`
   * @param lag `i32`
   * @param step `i32`
   * @param limit `f64`
   * @param least `i32`
   * @param medians `usize`
   * @param counts `usize`
   * @param first `usize`
   * @param second `usize`
   */
  export function rowDifferenceMedians(values: number, columns: number, rows: number, lag: number, step: number, limit: number, least: number, medians: number, counts: number, first: number, second: number): void;
  /**
   * src/kernels/assembly/rise-above-ground/riseAboveGround
   * @param values `usize`
   * @param use `usize`
   * @param columns `i32`
   * @param rows `i32`
   * @param half `i32`
   * @param startM `f64`
   * @param rounds `i32`
   * @param sums `usize`
   * @param counts `usize`
   * @param rise `usize`
   */
  export function riseAboveGround(values: number, use: number, columns: number, rows: number, half: number, startM: number, rounds: number, sums: number, counts: number, rise: number): void;
}
/** Instantiates the compiled WebAssembly module with the given imports. */
export declare function instantiate(module: WebAssembly.Module, imports: {
}): Promise<typeof __AdaptedExports>;
