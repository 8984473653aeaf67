/** Which pixels of a map lie under each pixel of a picture. */
import type { PictureRequest } from './api.ts';
import { failure } from './errors.ts';

/** Columns or rows of the map per picture column or row: `from[i]` to `to[i]` (exclusive); empty beside the map. */
export interface Span {
  readonly from: Int32Array;
  readonly to: Int32Array;
  /** The one that holds the picture pixel's centre, −1 beside the map. */
  readonly nearest: Int32Array;
  /** Map pixels per picture pixel. */
  readonly scale: number;
}

export interface Area {
  readonly width: number;
  readonly height: number;
  readonly across: Span;
  readonly down: Span;
}

/** Larger pictures than any screen shows are refused before they take the memory. */
const largestSide = 16384;

/** @throws ComputeError `request-value` */
export function areaOf(request: PictureRequest, columns: number, rows: number): Area {
  const { width, height, left, top, pixelRatio } = request;
  if (![width, height].every((side) => Number.isInteger(side) && side >= 1 && side <= largestSide)) {
    throw failure('request-value', `a picture has 1 to ${largestSide} pixels a side, not ${width} × ${height}`);
  }
  if (!(request.columns > 0 && request.rows > 0 && pixelRatio > 0 && [left, top, request.columns, request.rows, pixelRatio].every(Number.isFinite))) {
    throw failure('request-value', 'the part of the map to draw is empty');
  }
  return { width, height, across: spanOf(left, request.columns / width, width, columns), down: spanOf(top, request.rows / height, height, rows) };
}

/** Magnified, a picture pixel shows the one map pixel under its centre; reduced, all whose centres lie under it. */
function spanOf(start: number, scale: number, length: number, limit: number): Span {
  const from = new Int32Array(length);
  const to = new Int32Array(length);
  const nearest = new Int32Array(length);
  for (let i = 0; i < length; i++) {
    const centre = Math.floor(start + (i + 0.5) * scale);
    nearest[i] = centre >= 0 && centre < limit ? centre : -1;
    const first = scale > 1 ? Math.ceil(start + i * scale - 0.5) : centre;
    const end = scale > 1 ? Math.ceil(start + (i + 1) * scale - 0.5) : centre + 1;
    from[i] = Math.min(limit, Math.max(0, first));
    to[i] = Math.min(limit, Math.max(0, end));
  }
  return { from, to, nearest, scale };
}
