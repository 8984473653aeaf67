/** Draws the stage: the picture at hand, moved and scaled to the present view, and what lies over it. */
import type { Picture } from '../../workers/api.ts';
import { drawHand, drawSpots } from '../hand/draw-hand.ts';
import type { HandScene } from '../hand/draw-hand.ts';
import { withUnit, figure } from '../sample/format.ts';
import { boxOnStage, roundLength, toStage } from './view.ts';
import type { Extent, Part, Size, View } from './view.ts';

export interface HeldPicture {
  readonly image: CanvasImageSource;
  readonly part: Part;
}

export interface MapColours {
  readonly background: string;
  readonly line: string;
  readonly ink: string;
  readonly mark: string;
  readonly halo: string;
}

/** The page's colours where they are set, else those of the dark theme. */
export function coloursOf(element: Element): MapColours {
  const style = getComputedStyle(element);
  const colour = (name: string, fallback: string): string => style.getPropertyValue(name).trim() || fallback;
  return { background: colour('--background', '#0d1216'), line: colour('--line', '#25313b'), ink: '#ffffff', mark: '#ffffff', halo: '#0d1216' };
}

export interface MapScene {
  readonly extent: Extent;
  readonly stage: Size;
  readonly pixelRatio: number;
  readonly view: View;
  readonly picture: HeldPicture | undefined;
  /** In µm, y up. */
  readonly flaw: { readonly flaw: number; readonly xUm: number; readonly yUm: number; readonly diameterUm: number } | undefined;
  readonly cut: { readonly fromUm: readonly [number, number]; readonly toUm: readonly [number, number] | undefined } | undefined;
  /** Place whose values are read out by keyboard. */
  readonly cross: { readonly xUm: number; readonly yUm: number } | undefined;
  /** Spots of ground picked by hand, µm. */
  readonly spots?: readonly (readonly [x: number, y: number])[];
  /** What is being drawn by hand. */
  readonly hand?: HandScene | undefined;
  readonly colours: MapColours;
}

/** Rings larger than this, in stage pixels, are left out. */
const ringLimit = 40;

/** The canvas has so many pixels of the screen as the stage covers. */
export function sizeCanvas(canvas: HTMLCanvasElement, stage: Size, pixelRatio: number): void {
  const width = Math.round(stage.width * pixelRatio);
  const height = Math.round(stage.height * pixelRatio);
  // Setting a size clears the canvas, even to the size that it has.
  if (canvas.width === width && canvas.height === height) return;
  canvas.width = width;
  canvas.height = height;
}

/** A picture of the computation as something that can be drawn. */
export function imageOf({ width, height, rgba }: Picture): HTMLCanvasElement {
  const image = document.createElement('canvas');
  image.width = width;
  image.height = height;
  image.getContext('2d')?.putImageData(new ImageData(rgba, width, height), 0, 0);
  return image;
}

/** Draws onto a canvas of `stage` CSS pixels times `pixelRatio`. */
export function drawMap(pen: CanvasRenderingContext2D, scene: MapScene): void {
  const { stage, pixelRatio, colours, picture, view, extent } = scene;
  pen.setTransform(pixelRatio, 0, 0, pixelRatio, 0, 0);
  pen.fillStyle = colours.background;
  pen.fillRect(0, 0, stage.width, stage.height);
  const whole = boxOnStage({ left: 0, top: 0, columns: extent.columns, rows: extent.rows }, view, extent);
  if (picture) {
    const box = boxOnStage(picture.part, view, extent);
    pen.imageSmoothingEnabled = false;
    // Whole pixels of the screen, so that a picture of the right size is copied and not resampled.
    const snap = (value: number): number => Math.round(value * pixelRatio) / pixelRatio;
    const left = snap(box.left);
    const top = snap(box.top);
    pen.drawImage(picture.image, left, top, snap(box.left + box.width) - left, snap(box.top + box.height) - top);
  }
  pen.strokeStyle = colours.line;
  pen.lineWidth = 1;
  pen.strokeRect(Math.round(whole.left) - 0.5, Math.round(whole.top) - 0.5, Math.round(whole.width) + 1, Math.round(whole.height) + 1);
  if (scene.flaw) drawFlaw(pen, scene, scene.flaw);
  if (scene.cut) drawCut(pen, scene, scene.cut);
  if (scene.spots) drawSpots(pen, scene.spots.map(([x, y]) => toStage(view, x, y, extent)), (width, path) => { haloed(pen, colours, width, path); });
  if (scene.hand) drawHand(pen, view, extent, colours, scene.hand, (width, path) => { haloed(pen, colours, width, path); });
  if (scene.cross) drawCross(pen, scene, scene.cross);
  drawScaleBar(pen, scene, Math.max(whole.left, 0), Math.min(whole.top + whole.height, stage.height));
}

function drawFlaw(pen: CanvasRenderingContext2D, { view, extent, colours }: MapScene, flaw: NonNullable<MapScene['flaw']>): void {
  const { x, y } = toStage(view, flaw.xUm, flaw.yUm, extent);
  const radius = Math.max(12, (flaw.diameterUm * view.scale) / 2 + 8);
  // A large flaw is seen by the outline in the picture; a small one needs the ring.
  if (radius < ringLimit) haloed(pen, colours, 1.5, () => { pen.arc(x, y, radius, 0, 2 * Math.PI); });
  haloedText(pen, colours, String(flaw.flaw), x + radius * 0.75 + 4, y - radius * 0.75);
}

function drawCut(pen: CanvasRenderingContext2D, { view, extent, colours }: MapScene, { fromUm, toUm }: NonNullable<MapScene['cut']>): void {
  const from = toStage(view, fromUm[0], fromUm[1], extent);
  const to = toUm ? toStage(view, toUm[0], toUm[1], extent) : from;
  haloed(pen, colours, 1.5, () => {
    pen.moveTo(from.x, from.y);
    pen.lineTo(to.x, to.y);
  });
  for (const [end, label] of [[from, 'A'], [to, 'B']] as const) {
    haloed(pen, colours, 1.5, () => { pen.arc(end.x, end.y, 4, 0, 2 * Math.PI); });
    if (toUm || label === 'A') haloedText(pen, colours, label, end.x + 8, end.y - 6);
  }
}

function drawCross(pen: CanvasRenderingContext2D, { view, extent, colours }: MapScene, place: NonNullable<MapScene['cross']>): void {
  const { x, y } = toStage(view, place.xUm, place.yUm, extent);
  haloed(pen, colours, 1.5, () => {
    for (const [dx, dy] of [[1, 0], [-1, 0], [0, 1], [0, -1]] as const) {
      pen.moveTo(x + 4 * dx, y + 4 * dy);
      pen.lineTo(x + 12 * dx, y + 12 * dy);
    }
  });
}

/** A round length in the lower left corner of what is visible of the map. */
function drawScaleBar(pen: CanvasRenderingContext2D, { view, colours }: MapScene, left: number, bottom: number): void {
  const length = roundLength(view.scale, 150);
  const width = length * view.scale;
  const label = length < 1 ? withUnit(length * 1000, 'nm', 1) : `${figure(length, 1)}\u00a0µm`;
  pen.font = '600 13px system-ui, sans-serif';
  const panel = Math.max(width, pen.measureText(label).width) + 20;
  pen.globalAlpha = 0.82;
  pen.fillStyle = colours.halo;
  pen.beginPath();
  pen.roundRect(left + 12, bottom - 52, panel, 40, 5);
  pen.fill();
  pen.globalAlpha = 1;
  pen.fillStyle = colours.ink;
  pen.fillRect(left + 22, bottom - 43, width, 3);
  pen.textBaseline = 'alphabetic';
  pen.fillText(label, left + 22, bottom - 21);
}

/** A line over a darker one, so that it is seen on any colour of the map. */
function haloed(pen: CanvasRenderingContext2D, colours: MapColours, width: number, path: () => void): void {
  for (const [colour, extra] of [[colours.halo, 3], [colours.mark, 0]] as const) {
    pen.beginPath();
    path();
    pen.strokeStyle = colour;
    pen.lineWidth = width + extra;
    pen.stroke();
  }
}

function haloedText(pen: CanvasRenderingContext2D, colours: MapColours, text: string, x: number, y: number): void {
  pen.font = '600 13px system-ui, sans-serif';
  pen.textBaseline = 'middle';
  pen.lineJoin = 'round';
  pen.strokeStyle = colours.halo;
  pen.lineWidth = 4;
  pen.strokeText(text, x, y);
  pen.fillStyle = colours.mark;
  pen.fillText(text, x, y);
}
