/** Height over the plane, the terrace, that each pixel lies on. */
import { squaredDistance } from '../grid/distance.ts';
import { labelComponents } from '../grid/label-components.ts';
import { mostCommon } from '../ground/centre.ts';
import { subSample } from '../ground/fit-form.ts';
import type { HeightGround } from '../ground/ground.ts';
import { dropFilmIslands, samePlaneM } from './film-islands.ts';
import { nearestAdmitted } from './local-ground.ts';
import { bothOf, higherThan, onlyFirst, pixelsOf } from './mask-pixels.ts';

/** Ground lies within this of its plane, or within four standard deviations of the noise, metres: more than its undulation, less than a flaw. */
const onPlaneM = 0.45e-9;

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
 * at the same height it is dead, not thick; higher up it may as well be a film, whose height is no evidence for layers. A small island whose current conducts
 * counts as a terrace two layers up or more only where its height agrees with its current (`dropFilmIslands`).
 *
 * @param floor 1 where the current is at the floor; absent without current.
 * @param films the size in pixels below which an island may be a film, and the planes by the current alone; islands are not looked at without it.
 */
export function overPlanes(
  height: HeightGround, columns: number, rows: number, floor: Uint8Array | undefined, terraceMinPixels: number, layerM: number, films?: { readonly maxPixels: number; readonly told?: Float32Array | undefined },
): OverPlanes {
  const heights = height.levelled.data;
  const { plane } = height;
  const off = difference(heights, plane);
  const centre = mostCommon(subSample(off, columns, rows, Math.max(1, Math.floor(columns / 200))));
  const reach = Math.max(onPlaneM, 4 * height.noiseM);
  const onPlane = nearValue(off, centre, reach);
  if (floor) dropSmallPatches(onPlane, floor, plane, columns, rows, terraceMinPixels, layerM);
  const core = cores(onPlane, plane, columns, rows);
  const zero = Number.isNaN(centre) ? 0 : centre;
  let nearest = nearestAdmitted(core, columns, rows);
  if (films && dropFilmIslands({ columns, rows, heights, zero, plane, told: films.told, core, nearest, onPlane, layerM, noiseM: height.noiseM, filmMaxPixels: films.maxPixels })) {
    nearest = nearestAdmitted(core, columns, rows);
  }
  // The rim of a film passes through the height that its current suggests.
  leaveOtherPlanes(onPlane, plane, nearest);
  if (floor) lendFloorPlanes(nearest, onPlane, { heights, zero, core, floor, plane, columns, rows, reach });
  return { over: overLent(heights, zero, plane, nearest), onPlane };
}

function difference(a: Float32Array, b: Float32Array): Float32Array {
  const out = new Float32Array(a.length);
  for (let i = 0; i < out.length; i++) out[i] = a[i]! - b[i]!;
  return out;
}

function nearValue(values: Float32Array, centre: number, reach: number): Uint8Array {
  const near = new Uint8Array(values.length);
  for (let i = 0; i < near.length; i++) if (Math.abs(values[i]! - centre) < reach) near[i] = 1;
  return near;
}

/** Takes out of `onPlane` what has not the plane of the nearest core. */
function leaveOtherPlanes(onPlane: Uint8Array, plane: Float32Array, nearest: Int32Array): void {
  for (let i = 0; i < onPlane.length; i++) if (onPlane[i] === 1 && nearest[i] !== i && !(nearest[i]! >= 0 && Math.abs(plane[nearest[i]!]! - plane[i]!) < samePlaneM)) onPlane[i] = 0;
}

/** Heights over the planes that the pixels named in `lender` lend; −1 lends none. */
function overLent(heights: Float32Array, zero: number, plane: Float32Array, lender: Int32Array): Float32Array {
  const over = new Float32Array(heights.length);
  for (let i = 0; i < over.length; i++) over[i] = Math.fround(heights[i]! - zero) - (lender[i]! < 0 ? 0 : plane[lender[i]!]!);
  return over;
}

/** 1 on ground well inside a terrace: no place within two pixels lies on another plane or on none. */
function cores(onPlane: Uint8Array, plane: Float32Array, columns: number, rows: number): Uint8Array {
  const alike = new Uint8Array(onPlane.length);
  for (let r = 0; r < rows; r++) markAlike(onPlane, plane, columns, r * columns, r + 1 < rows ? columns : 0, alike);
  const core = higherThan(squaredDistance(alike, columns, rows, {}), coreHalfPx ** 2);
  return core.includes(1) ? core : onPlane;
}

/** Marks what of one row has the plane of its neighbours to the right and `below` pixels on, where those lie on theirs. */
function markAlike(onPlane: Uint8Array, plane: Float32Array, columns: number, start: number, below: number, alike: Uint8Array): void {
  const last = start + columns - 1;
  for (let i = start; i <= last; i++) {
    if (onPlane[i] === 0) continue;
    const own = plane[i]!;
    const right = i < last && onPlane[i + 1] === 1 ? plane[i + 1]! : own;
    const under = onPlane[i + below] === 1 ? plane[i + below]! : own;
    if (Math.abs(right - own) < samePlaneM && Math.abs(under - own) < samePlaneM) alike[i] = 1;
  }
}

/** What `lendFloorPlanes` looks at; heights count from `zero`. */
interface Lending {
  readonly heights: Float32Array;
  readonly zero: number;
  readonly core: Uint8Array;
  readonly floor: Uint8Array;
  readonly plane: Float32Array;
  readonly columns: number;
  readonly rows: number;
  readonly reach: number;
}

/**
 * Ground at the floor beside a terrace at the floor belongs to that where it lies on its plane: along its border, too narrow to be a segment, the nearest ground
 * may be a far lower terrace. Changes `lender` and `onPlane`.
 */
function lendFloorPlanes(lender: Int32Array, onPlane: Uint8Array, { heights, zero, core, floor, plane, columns, rows, reach }: Lending): void {
  const dark = bothOf(core, floor);
  if (!dark.includes(1)) return;
  const nearest = nearestAdmitted(dark, columns, rows, besidePx);
  for (const i of pixelsOf(onlyFirst(floor, onPlane))) {
    const from = nearest[i]!;
    if (from < 0 || !(Math.abs(Math.fround(heights[i]! - zero) - plane[from]!) < reach)) continue;
    lender[i] = from;
    onPlane[i] = 1;
  }
}

function dropSmallPatches(onPlane: Uint8Array, floor: Uint8Array, plane: Float32Array, columns: number, rows: number, least: number, layerM: number): void {
  const { labels, pixels, count } = labelComponents(bothOf(onPlane, floor), columns, rows, 8);
  const small = inSmall(labels, pixels, least);
  if (small.length === 0) return;
  const nearest = nearestAdmitted(onlyFirst(onPlane, floor), columns, rows);
  const layers = new Float64Array(count + 1);
  for (const i of small) layers[labels[i]!]! += nearest[i]! < 0 ? Number.NaN : (plane[i]! - plane[nearest[i]!]!) / layerM;
  for (let label = 1; label <= count; label++) layers[label]! /= pixels[label]!;
  for (const i of small) if (!(layers[labels[i]!]! > 0.5 && layers[labels[i]!]! < 2.5)) onPlane[i] = 0;
}

/** Pixels of the regions of fewer than `least`. */
function inSmall(labels: Uint32Array, pixels: Uint32Array, least: number): Int32Array {
  const found = new Int32Array(labels.length);
  let count = 0;
  for (let i = 0; i < labels.length; i++) if (labels[i]! > 0 && pixels[labels[i]!]! < least) found[count++] = i;
  return found.slice(0, count);
}
