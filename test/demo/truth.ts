/** What the demo samples really are, drawn once more from their scenes: for tests only. */
import type { Canvas } from '../../src/demo/canvas.ts';
import { demoScenes } from '../../src/demo/demo-scenes.ts';
import type { DemoScene } from '../../src/demo/demo-scenes.ts';
import { drawCanvas } from '../../src/demo/draw-canvas.ts';

export interface Truth {
  readonly scene: DemoScene;
  readonly canvas: Canvas;
  /** Layers of the most common unflawed terrace within the footprint. */
  readonly reference: number;
  /** 1 on unflawed ground of the reference's layers: one layer is ×6 in the device, more than the band's ×3. */
  readonly usable: Uint8Array;
}

export function truthOf(name: string, size: number, footprint: Uint8Array): Truth {
  const scene = demoScenes.find((known) => known.name === name)!;
  const canvas = drawCanvas({ ...scene.scene, columns: size, rows: size });
  const sound = footprint.map((inside, i) => (inside === 1 && canvas.lossDecades[i] === 0 && canvas.shorted[i] === 0 ? 1 : 0));
  const pixels = new Map<number, number>();
  for (let i = 0; i < sound.length; i++) if (sound[i] === 1) pixels.set(canvas.layers[i]!, (pixels.get(canvas.layers[i]!) ?? 0) + 1);
  const reference = [...pixels].sort((a, b) => b[1] - a[1])[0]![0];
  return { scene, canvas, reference, usable: sound.map((value, i) => (value === 1 && canvas.layers[i] === reference ? 1 : 0)) };
}
