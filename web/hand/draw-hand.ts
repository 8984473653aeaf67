/** Draws what is being drawn by hand over the map: brush, stroke, line or outline. */
import type { Extent, View } from '../map/view.ts';
import { toStage } from '../map/view.ts';
import type { Drawing } from './drawing.ts';
import type { PointUm } from './hand.ts';

export interface HandScene {
  readonly drawing: Drawing;
  /** Of the brush; undefined without one. */
  readonly widthUm: number | undefined;
  /** Colour of the cause that is drawn; undefined for flawless ground. */
  readonly fill: string | undefined;
}

/** A line or ring over the map in the map's own marks. */
export type Haloed = (width: number, path: () => void) => void;

export function drawHand(pen: CanvasRenderingContext2D, view: View, extent: Extent, colours: { readonly halo: string }, { drawing, widthUm, fill }: HandScene, haloed: Haloed): void {
  const { kind, points, aimed, settling } = drawing;
  const place = ([x, y]: PointUm) => toStage(view, x, y, extent);
  const trace = (path: readonly PointUm[]): void => {
    path.forEach((point, k) => {
      const { x, y } = place(point);
      if (k === 0) pen.moveTo(x, y);
      else pen.lineTo(x, y);
    });
  };
  if (kind === 'places') {
    for (const path of [...settling, points]) drawSpots(pen, path.map(place), haloed);
    return;
  }
  const area = fill ?? colours.halo;
  if (kind === 'stroke' && widthUm !== undefined) {
    const width = Math.max(2, widthUm * view.scale);
    for (const path of [...settling, points]) if (path[0]) brushed(pen, path.length === 1 ? [path[0], besides(path[0], view)] : path, trace, area, width);
    if (aimed) ring(haloed, pen, place(aimed), width / 2);
    return;
  }
  for (const path of settling) {
    pen.globalAlpha = 0.45;
    pen.fillStyle = area;
    pen.beginPath();
    trace(path);
    if (kind === 'corners') pen.fill();
    pen.globalAlpha = 1;
    haloed(1.5, () => { trace(kind === 'corners' ? [...path, path[0]!] : path); });
  }
  const open = aimed && points.length > 0 ? [...points, aimed] : points;
  if (open.length > 1) haloed(1.5, () => { trace(open); });
  if (kind === 'corners' && open.length > 2) {
    pen.setLineDash([4, 4]);
    haloed(1, () => { trace([open.at(-1)!, open[0]!]); });
    pen.setLineDash([]);
  }
  points.forEach((point, k) => { ring(haloed, pen, place(point), k === 0 && kind === 'corners' ? 6 : 3); });
}

/** Spots of ground: a ring with a dot, on the stage. */
export function drawSpots(pen: CanvasRenderingContext2D, places: readonly { readonly x: number; readonly y: number }[], haloed: Haloed): void {
  for (const place of places) {
    ring(haloed, pen, place, 8);
    ring(haloed, pen, place, 1.5);
  }
}

/** A hundredth of a stage pixel away: a line from a point to itself leaves no dot. */
function besides([x, y]: PointUm, view: View): PointUm {
  return [x + 0.01 / view.scale, y];
}

function brushed(pen: CanvasRenderingContext2D, path: readonly PointUm[], trace: (path: readonly PointUm[]) => void, colour: string, width: number): void {
  pen.save();
  pen.globalAlpha = 0.6;
  pen.strokeStyle = colour;
  pen.lineWidth = width;
  pen.lineCap = 'round';
  pen.lineJoin = 'round';
  pen.beginPath();
  trace(path);
  pen.stroke();
  pen.restore();
}

function ring(haloed: Haloed, pen: CanvasRenderingContext2D, { x, y }: { readonly x: number; readonly y: number }, radius: number): void {
  haloed(1.5, () => {
    pen.moveTo(x + radius, y);
    pen.arc(x, y, radius, 0, 2 * Math.PI);
  });
}
