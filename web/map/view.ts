/**
 * Which part of a map is on the stage. Lengths on the map are micrometres from its upper left corner, y down, as on the screen;
 * `toSample` turns them into the sample's own frame (origin lower left, y up).
 */

export interface Extent {
  readonly columns: number;
  readonly rows: number;
  readonly widthUm: number;
  readonly heightUm: number;
}

export interface Size {
  readonly width: number;
  readonly height: number;
}

/** Scale in stage pixels per micrometre and the map's point in the stage's upper left corner. */
export interface View {
  readonly scale: number;
  readonly leftUm: number;
  readonly topUm: number;
}

export interface Box {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

const largestPixel = 64;

/** The whole map, as large as fits, in the middle. */
export function fitView(extent: Extent, stage: Size): View {
  const scale = Math.max(1e-9, Math.min(stage.width / extent.widthUm, stage.height / extent.heightUm));
  return {
    scale,
    leftUm: (extent.widthUm - stage.width / scale) / 2,
    topUm: (extent.heightUm - stage.height / scale) / 2,
  };
}

/** Zooms by `factor` so that the map's point at (x, y) on the stage stays where it is. */
export function zoomView(view: View, factor: number, x: number, y: number, extent: Extent, stage: Size): View {
  const least = fitView(extent, stage).scale / 2;
  const most = Math.max(least * 2, largestPixel * Math.max(extent.columns / extent.widthUm, extent.rows / extent.heightUm));
  const scale = Math.min(most, Math.max(least, view.scale * factor));
  return keepInSight({ scale, leftUm: view.leftUm + x / view.scale - x / scale, topUm: view.topUm + y / view.scale - y / scale }, extent, stage);
}

/** Moves the map by stage pixels: positive moves it right and down. */
export function panView(view: View, dx: number, dy: number, extent: Extent, stage: Size): View {
  return keepInSight({ ...view, leftUm: view.leftUm - dx / view.scale, topUm: view.topUm - dy / view.scale }, extent, stage);
}

/** The map's point (µm from the upper left) as near the middle as the map's edges allow, at `scale` or closer. */
export function centreView(view: View, xUm: number, topUm: number, scale: number, extent: Extent, stage: Size): View {
  const used = Math.max(view.scale, scale);
  const edge = (middle: number, length: number, room: number): number => (room >= length ? (length - room) / 2 : Math.min(length - room, Math.max(0, middle - room / 2)));
  return { scale: used, leftUm: edge(xUm, extent.widthUm, stage.width / used), topUm: edge(topUm, extent.heightUm, stage.height / used) };
}

/** The stage's middle never leaves the map. */
function keepInSight(view: View, extent: Extent, stage: Size): View {
  const halfWidth = stage.width / view.scale / 2;
  const halfHeight = stage.height / view.scale / 2;
  return {
    scale: view.scale,
    leftUm: Math.min(extent.widthUm, Math.max(0, view.leftUm + halfWidth)) - halfWidth,
    topUm: Math.min(extent.heightUm, Math.max(0, view.topUm + halfHeight)) - halfHeight,
  };
}

/** Stage point → sample coordinates in µm (y up); undefined outside the map. */
export function toSample(view: View, x: number, y: number, extent: Extent): { readonly xUm: number; readonly yUm: number } | undefined {
  const xUm = view.leftUm + x / view.scale;
  const down = view.topUm + y / view.scale;
  if (xUm < 0 || down < 0 || xUm > extent.widthUm || down > extent.heightUm) return undefined;
  return { xUm, yUm: extent.heightUm - down };
}

/** The same for any stage point, beside the map too. */
export function toSampleAnywhere(view: View, x: number, y: number, extent: Extent): readonly [xUm: number, yUm: number] {
  return [view.leftUm + x / view.scale, extent.heightUm - view.topUm - y / view.scale];
}

/** Sample coordinates in µm (y up) → stage point. */
export function toStage(view: View, xUm: number, yUm: number, extent: Extent): { readonly x: number; readonly y: number } {
  return { x: (xUm - view.leftUm) * view.scale, y: (extent.heightUm - yUm - view.topUm) * view.scale };
}

/** A part of the map in pixels of the map, fractions allowed. */
export interface Part {
  readonly left: number;
  readonly top: number;
  readonly columns: number;
  readonly rows: number;
}

/** The visible part of the map, and the size of its picture in pixels of the screen. Undefined when nothing is visible. */
export function visiblePart(view: View, extent: Extent, stage: Size, pixelRatio: number): { readonly part: Part; readonly picture: Size } | undefined {
  const left = Math.max(0, view.leftUm);
  const top = Math.max(0, view.topUm);
  const right = Math.min(extent.widthUm, view.leftUm + stage.width / view.scale);
  const bottom = Math.min(extent.heightUm, view.topUm + stage.height / view.scale);
  if (right <= left || bottom <= top) return undefined;
  const across = extent.columns / extent.widthUm;
  const down = extent.rows / extent.heightUm;
  return {
    part: { left: left * across, top: top * down, columns: (right - left) * across, rows: (bottom - top) * down },
    picture: {
      width: Math.max(1, Math.round((right - left) * view.scale * pixelRatio)),
      height: Math.max(1, Math.round((bottom - top) * view.scale * pixelRatio)),
    },
  };
}

/** Where a part of the map lies on the stage. */
export function boxOnStage(part: Part, view: View, extent: Extent): Box {
  const pitchX = extent.widthUm / extent.columns;
  const pitchY = extent.heightUm / extent.rows;
  return {
    left: (part.left * pitchX - view.leftUm) * view.scale,
    top: (part.top * pitchY - view.topUm) * view.scale,
    width: part.columns * pitchX * view.scale,
    height: part.rows * pitchY * view.scale,
  };
}

/** Longest round length (1, 2 or 5 times a power of ten, µm) that is drawn no longer than `longest` stage pixels. */
export function roundLength(scale: number, longest: number): number {
  const most = longest / scale;
  const power = 10 ** Math.floor(Math.log10(most) + 1e-9);
  const lead = most / power;
  return Number(((lead >= 5 ? 5 : lead >= 2 ? 2 : 1) * power).toPrecision(1));
}

/** By how many stage pixels an arrow key moves the map; undefined for other keys. */
export function keyMove(key: string, step: number): readonly [dx: number, dy: number] | undefined {
  const moves: Readonly<Record<string, readonly [number, number]>> = { ArrowLeft: [step, 0], ArrowRight: [-step, 0], ArrowUp: [0, step], ArrowDown: [0, -step] };
  return moves[key];
}
