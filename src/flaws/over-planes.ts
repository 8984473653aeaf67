/** Height over the plane, the terrace, that each pixel lies on. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import { mostCommon } from '../ground/centre.ts';
import { subSample } from '../ground/fit-form.ts';
import type { HeightGround } from '../ground/ground.ts';
import { nearestAdmitted } from './local-ground.ts';

/** Ground lies within this of its plane, or within four standard deviations of the noise, metres: more than its undulation, less than a flaw. */
const onPlaneM = 0.45e-9;

/** Planes nearer than this are one, metres. */
const samePlaneM = 0.1e-9;
/** Ground lends its plane only from where it is this far from other ground, pixels. */
const coreHalfPx = 2;
/** The border of a terrace at the floor is no wider than this, pixels (city-block). */
const besidePx = 9;

export interface OverPlanes {
  /** Height over the plane, metres, NaN missing. */
  readonly over: Float32Array;
  /** 1 where the pixel's own plane is known and it lies on it. */
  readonly onPlane: Uint8Array;
}

/**
 * Height over planes. Where no plane is known, or the pixel does not lie on the plane that its current suggests, the nearest ground that does lends its
 * own: under a bubble, a film or a fold the barrier is that of the ground around.
 *
 * A patch of flat ground at the amplifier's floor that is smaller than a terrace counts as one only where it lies one or two layers above the ground beside it:
 * at the same height it is dead, not thick; higher up it may as well be a film, whose height is no evidence for layers.
 *
 * @param floor 1 where the current is at the floor; absent without current.
 */
export function overPlanes(height: HeightGround, columns: number, rows: number, floor: Uint8Array | undefined, terraceMinPixels: number, layerM: number): OverPlanes {
  const heights = height.levelled.data;
  const { plane } = height;
  const off = new Float32Array(heights.length);
  for (let i = 0; i < off.length; i++) off[i] = heights[i]! - plane[i]!;
  const centre = mostCommon(subSample(off, columns, rows, Math.max(1, Math.floor(columns / 200))));
  const reach = Math.max(onPlaneM, 4 * height.noiseM);
  const onPlane = new Uint8Array(off.length);
  for (let i = 0; i < off.length; i++) if (Math.abs(off[i]! - centre) < reach) onPlane[i] = 1;
  if (floor) dropSmallPatches(onPlane, floor, plane, columns, rows, terraceMinPixels, layerM);
  const core = cores(onPlane, plane, columns, rows);
  const nearest = nearestAdmitted(core, columns, rows);
  // The rim of a film passes through the height that its current suggests.
  for (let i = 0; i < onPlane.length; i++) if (onPlane[i] === 1 && !(nearest[i]! >= 0 && Math.abs(plane[nearest[i]!]! - plane[i]!) < samePlaneM)) onPlane[i] = 0;
  const zero = Number.isNaN(centre) ? 0 : centre;
  const lent = new Float32Array(nearest.length);
  for (let i = 0; i < lent.length; i++) lent[i] = nearest[i]! < 0 ? 0 : plane[nearest[i]!]!;
  const over = new Float32Array(heights.length);
  for (let i = 0; i < over.length; i++) over[i] = heights[i]! - zero;
  if (floor) lendFloorPlanes(lent, over, onPlane, core, floor, plane, columns, rows, reach);
  for (let i = 0; i < over.length; i++) over[i]! -= lent[i]!;
  return { over, onPlane };
}

/** 1 on ground well inside a terrace: no place within two pixels lies on another plane or on none. */
function cores(onPlane: Uint8Array, plane: Float32Array, columns: number, rows: number): Uint8Array {
  const alike = new Uint8Array(onPlane.length);
  for (let r = 0, i = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, i++) {
      if (onPlane[i] === 0) continue;
      const right = c + 1 < columns && onPlane[i + 1] === 1 ? plane[i + 1]! : plane[i]!;
      const below = r + 1 < rows && onPlane[i + columns] === 1 ? plane[i + columns]! : plane[i]!;
      if (Math.abs(right - plane[i]!) < samePlaneM && Math.abs(below - plane[i]!) < samePlaneM) alike[i] = 1;
    }
  }
  const inside = squaredDistance(alike, columns, rows, {});
  const core = new Uint8Array(onPlane.length);
  let any = 0;
  for (let i = 0; i < core.length; i++) if (inside[i]! > coreHalfPx ** 2) any = core[i] = 1;
  return any === 1 ? core : onPlane;
}

/**
 * Ground at the floor beside a terrace at the floor belongs to that where it lies on its plane: along its border, too narrow to be a segment, the nearest ground
 * may be a far lower terrace. Changes `lent` and `onPlane`.
 */
function lendFloorPlanes(lent: Float32Array, heights: Float32Array, onPlane: Uint8Array, core: Uint8Array, floor: Uint8Array, plane: Float32Array, columns: number, rows: number, reach: number): void {
  const dark = bothOf(core, floor);
  if (!dark.includes(1)) return;
  const nearest = nearestAdmitted(dark, columns, rows);
  for (let i = 0; i < lent.length; i++) {
    const from = nearest[i]!;
    if (floor[i] === 0 || onPlane[i] === 1 || from < 0) continue;
    const away = Math.abs((i % columns) - (from % columns)) + Math.abs(Math.floor(i / columns) - Math.floor(from / columns));
    if (away > besidePx || !(Math.abs(heights[i]! - plane[from]!) < reach)) continue;
    lent[i] = plane[from]!;
    onPlane[i] = 1;
  }
}

function bothOf(a: Uint8Array, b: Uint8Array): Uint8Array {
  const both = new Uint8Array(a.length);
  for (let i = 0; i < both.length; i++) both[i] = a[i]! & b[i]!;
  return both;
}

function dropSmallPatches(onPlane: Uint8Array, floor: Uint8Array, plane: Float32Array, columns: number, rows: number, least: number, layerM: number): void {
  const { labels, pixels, count } = labelComponents(bothOf(onPlane, floor), columns, rows, 8);
  if (!pixels.some((size, label) => label > 0 && size < least)) return;
  const lit = new Uint8Array(onPlane.length);
  for (let i = 0; i < lit.length; i++) lit[i] = onPlane[i]! & (1 - floor[i]!);
  const nearest = nearestAdmitted(lit, columns, rows);
  const above = new Float64Array(count + 1);
  for (let i = 0; i < labels.length; i++) {
    const label = labels[i]!;
    if (label > 0) above[label]! += nearest[i]! < 0 ? Number.NaN : (plane[i]! - plane[nearest[i]!]!) / layerM;
  }
  const drop = Uint8Array.from(above, (sum, label) => {
    const layers = sum / pixels[label]!;
    return pixels[label]! < least && !(layers > 0.5 && layers < 2.5) ? 1 : 0;
  });
  for (let i = 0; i < onPlane.length; i++) if (labels[i]! > 0 && drop[labels[i]!] === 1) onPlane[i] = 0;
}
