import { seededRandom } from '../stats/random.ts';
import type { Canvas } from './canvas.ts';
import { createCanvas } from './canvas.ts';
import { addBubbles, addPinholes, addResidue, addWrinkles } from './features.ts';
import type { SceneOptions } from './scene.ts';
import { addBorders, addEdges, addFlakeEdge } from './terraces.ts';

/** Draws what an invented flake is, before anything is measured. The same options give the same flake; the scan of it is `paintScene`'s. */
export function drawCanvas(options: SceneOptions): Canvas {
  const random = seededRandom(`${options.seed}: flake`);
  const canvas = createCanvas(options.columns, options.rows, options.widthUm, options.heightUm, options.baseLayers);
  addBorders(canvas, random, options.borders);
  addEdges(canvas, random, options.edges ?? []);
  if (options.flakeEdge) addFlakeEdge(canvas, options.flakeEdge);
  addWrinkles(canvas, random, options.wrinkles);
  addResidue(canvas, random, options.particles, options.films);
  addBubbles(canvas, random, options.bubbles, options.bubbleRadiusNm, options.bubbleAspect);
  addPinholes(canvas, random, options.pinholes, options.pinholeTrail);
  return canvas;
}
