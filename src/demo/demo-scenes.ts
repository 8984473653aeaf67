/** The six scenes behind the demo samples. Nothing of this reaches the app: it only gets the files. */
import type { SceneOptions } from './scene.ts';

export interface DemoScene {
  readonly name: string;
  readonly title: string;
  readonly scene: Omit<SceneOptions, 'columns' | 'rows'>;
  /** Corners of the flake as somebody drew them on the map, µm, y up; absent where the flake fills the map. */
  readonly barrierUm?: readonly (readonly [x: number, y: number])[];
}

/** A plain flake; the samples differ from it in what is wrong with them. */
const plain = {
  widthUm: 10, heightUm: 10, baseLayers: 12, borders: 0,
  bubbles: 0, bubbleRadiusNm: [60, 200], bubbleAspect: 0.11, particles: 0, films: 0, wrinkles: 0, pinholes: 0, pinholeTrail: 0, brokenRuns: 2,
  wearDecades: 0.05, scanBiasV: 6, tipAreaNm2: 17,
} as const satisfies Omit<SceneOptions, 'columns' | 'rows' | 'seed'>;

export const demoScenes: readonly DemoScene[] = [
  {
    name: 'quarry-03', title: 'An even flake',
    scene: { ...plain, seed: 'quarry-03', bubbles: 3, particles: 1, edges: [{ angleDeg: 215, offsetUm: 4.9, layers: 1 }], flakeEdge: { angleDeg: 62, offsetUm: 4.6 }, tipAreaNm2: 19 },
    barrierUm: [[0, 0], [10, 0], [10, 7.4], [6.4, 9.3], [5, 10], [0, 10]],
  },
  {
    name: 'quarry-07', title: 'Bubbles under the barrier',
    scene: { ...plain, seed: 'quarry-07', widthUm: 9, heightUm: 9, bubbles: 85, bubbleRadiusNm: [70, 620], wrinkles: 2, edges: [{ angleDeg: 100, offsetUm: 3.7, layers: -1 }], tipAreaNm2: 15 },
  },
  {
    name: 'quarry-11', title: 'Residue after transfer',
    scene: { ...plain, seed: 'quarry-11', widthUm: 11, heightUm: 11, bubbles: 4, particles: 30, films: 24, edges: [{ angleDeg: 20, offsetUm: 4.7, layers: 1 }], tipAreaNm2: 20 },
  },
  {
    name: 'quarry-16', title: 'Terraces of four thicknesses',
    scene: {
      ...plain, seed: 'quarry-16', widthUm: 12, heightUm: 9, bubbles: 2, particles: 2,
      edges: [{ angleDeg: 157, offsetUm: 3.6, layers: -1 }, { angleDeg: -18, offsetUm: -0.6, layers: 1 }, { angleDeg: -24, offsetUm: 3.2, layers: 1 }],
    },
  },
  {
    name: 'quarry-21', title: 'Pinholes along a scratch',
    scene: { ...plain, seed: 'quarry-21', widthUm: 8, heightUm: 8, baseLayers: 11, bubbles: 2, pinholes: 7, pinholeTrail: 22, edges: [{ angleDeg: 300, offsetUm: 3.6, layers: 1 }], tipAreaNm2: 14 },
  },
  {
    name: 'quarry-24', title: 'A wearing tip and broken runs',
    scene: { ...plain, seed: 'quarry-24', bubbles: 5, particles: 2, brokenRuns: 18, wearDecades: 0.46, edges: [{ angleDeg: 80, offsetUm: 3.9, layers: 1 }, { angleDeg: 190, offsetUm: 4.4, layers: -1 }] },
  },
];
