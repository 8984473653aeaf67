/** Borders between terraces, and the edge of the flake. */
import type { Random } from '../stats/random.ts';
import type { Canvas } from './canvas.ts';
import { eachPixel } from './canvas.ts';
import type { TerraceEdge } from './scene.ts';

/** Borders at random places: on one side of each the barrier has a layer more or less. */
export function addBorders(canvas: Canvas, random: Random, borders: number): void {
  for (let k = 0; k < borders; k++) {
    const angleDeg = random.uniform() * 360;
    const offsetUm = (random.uniform() - 0.5) * 0.7e-3 * Math.min(canvas.widthNm, canvas.heightNm);
    addStep(canvas, random, { angleDeg, offsetUm, layers: k % 2 === 0 ? 1 : -1 }, 300 + 500 * random.uniform());
  }
}

/** Borders at stated places, nearly straight as cleavage leaves them. */
export function addEdges(canvas: Canvas, random: Random, edges: readonly TerraceEdge[]): void {
  for (const edge of edges) addStep(canvas, random, edge, 40 + 80 * random.uniform());
}

/** Beyond this line the flake ends: no barrier, the probe touches the injector. */
export function addFlakeEdge(canvas: Canvas, edge: Omit<TerraceEdge, 'layers'>): void {
  const across = acrossOf(canvas, edge);
  eachPixel(canvas, undefined, (i, x, y) => {
    if (across(x, y)[0] <= 0) return;
    canvas.layers[i] = 0;
    canvas.shorted[i] = 1;
  });
}

function addStep(canvas: Canvas, random: Random, edge: TerraceEdge, meanderNm: number): void {
  const waves = [0.5 + 0.5 * random.uniform(), 0.13 + 0.1 * random.uniform()].map((share, n) => ({
    size: n === 0 ? meanderNm : meanderNm / 3, length: share * canvas.widthNm, phase: random.uniform() * 2 * Math.PI,
  }));
  const reach = 1.4 * meanderNm;
  const across = acrossOf(canvas, edge);
  eachPixel(canvas, undefined, (i, x, y) => {
    const [beyond, along] = across(x, y);
    // Far from the line its meander does not matter.
    if (beyond < -reach) return;
    if (beyond > reach || beyond > waves.reduce((sum, wave) => sum + wave.size * Math.sin((2 * Math.PI * along) / wave.length + wave.phase), 0)) canvas.layers[i]! += edge.layers;
  });
}

/** Distance beyond an edge and along it, nm. */
function acrossOf(canvas: Canvas, edge: Omit<TerraceEdge, 'layers'>): (x: number, y: number) => readonly [beyond: number, along: number] {
  const [cos, sin] = [Math.cos((edge.angleDeg * Math.PI) / 180), Math.sin((edge.angleDeg * Math.PI) / 180)];
  const offset = edge.offsetUm * 1000;
  return (x, y) => {
    const dx = x - canvas.widthNm / 2;
    const dy = canvas.heightNm / 2 - y;
    return [dx * cos + dy * sin - offset, dy * cos - dx * sin];
  };
}
