/** What an invented scan shows: everything in nanometres and decades, so that the geometry does not depend on the pixel count. */

export interface SceneOptions {
  readonly seed: string;
  readonly columns: number;
  readonly rows: number;
  readonly widthUm: number;
  readonly heightUm: number;
  /** Layers of the ground, and how many curved borders cross it, each adding or taking one layer on one side. */
  readonly baseLayers: number;
  readonly borders: number;
  readonly bubbles: number;
  readonly bubbleRadiusNm: readonly [least: number, most: number];
  /** Height over radius. */
  readonly bubbleAspect: readonly [least: number, most: number];
  readonly particles: number;
  readonly films: number;
  readonly wrinkles: number;
  readonly pinholes: number;
  readonly brokenRuns: number;
  /** Decades of conductance lost by the tip from first to last line. */
  readonly wearDecades: number;
  readonly scanBiasV: number;
  /** Contact area of the probe, nm². */
  readonly tipAreaNm2: number;
}

export const defaultScene: SceneOptions = {
  seed: 'scene', columns: 512, rows: 512, widthUm: 10, heightUm: 10, baseLayers: 11, borders: 3,
  bubbles: 20, bubbleRadiusNm: [60, 400], bubbleAspect: [0.09, 0.14], particles: 5, films: 3, wrinkles: 2, pinholes: 4, brokenRuns: 5,
  wearDecades: 0, scanBiasV: 6, tipAreaNm2: 17,
};

/** A painted scan: what a microscope would export, and nothing of what is behind it. */
export interface PaintedScan {
  /** Metres, NaN missing, row 0 at the top. */
  readonly height: Float32Array;
  /** Amperes, NaN missing. */
  readonly current: Float32Array;
}
