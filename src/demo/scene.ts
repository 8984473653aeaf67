/** What an invented scan shows: everything in lengths and decades, so that the geometry does not depend on the pixel count. */

/** A line across the map; on the side its normal points to the barrier has `layers` more (or fewer). */
export interface TerraceEdge {
  /** Direction of the normal, counter-clockwise from x. */
  readonly angleDeg: number;
  /** Distance of the line from the map's centre along the normal, µm. */
  readonly offsetUm: number;
  readonly layers: number;
}

export interface SceneOptions {
  readonly seed: string;
  readonly columns: number;
  readonly rows: number;
  readonly widthUm: number;
  readonly heightUm: number;
  /** Layers of the ground, and how many curved borders cross it at random, each adding or taking one layer on one side. */
  readonly baseLayers: number;
  readonly borders: number;
  /** Borders at stated places. */
  readonly edges?: readonly TerraceEdge[];
  /** Line beyond which the flake ends and the injector lies bare. */
  readonly flakeEdge?: Omit<TerraceEdge, 'layers'>;
  readonly bubbles: number;
  readonly bubbleRadiusNm: readonly [least: number, most: number];
  /** Usual height over radius. */
  readonly bubbleAspect: number;
  readonly particles: number;
  readonly films: number;
  readonly wrinkles: number;
  readonly pinholes: number;
  /** Further pinholes near one straight line. */
  readonly pinholeTrail: number;
  readonly brokenRuns: number;
  /** Decades of conductance lost by the tip from first to last line. */
  readonly wearDecades: number;
  readonly scanBiasV: number;
  /** Contact area of the probe, nm². */
  readonly tipAreaNm2: number;
}

export const defaultScene: SceneOptions = {
  seed: 'scene', columns: 512, rows: 512, widthUm: 10, heightUm: 10, baseLayers: 11, borders: 3,
  bubbles: 20, bubbleRadiusNm: [60, 400], bubbleAspect: 0.11, particles: 5, films: 3, wrinkles: 2, pinholes: 4, pinholeTrail: 0, brokenRuns: 5,
  wearDecades: 0, scanBiasV: 6, tipAreaNm2: 17,
};

/** A painted scan: what a microscope would export, and nothing of what is behind it. */
export interface PaintedScan {
  /** Metres, NaN missing, row 0 at the top. */
  readonly height: Float32Array;
  /** Amperes, NaN missing. */
  readonly current: Float32Array;
}
