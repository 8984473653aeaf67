/**
 * Single passes over maps of planes. Each is a function of its own because most passes run once: a short function is compiled within a few rows of a
 * map, a long one that holds many loops goes on unoptimised for most of it.
 */

/** A copy with 0 in place of NaN. */
export function zeroWhereMissing(values: Float32Array): Float32Array {
  const out = values.slice();
  for (let i = 0; i < out.length; i++) if (out[i] !== out[i]) out[i] = 0;
  return out;
}

/** Sets every pixel to what the table holds for its number. */
export function mapThrough(numbers: Uint16Array, table: Uint16Array | Uint8Array, into: Uint16Array | Uint8Array): void {
  for (let i = 0; i < into.length; i++) into[i] = table[numbers[i]!]!;
}

/** Planes of the segments over what is known; a segment that no border links lies on what is known. */
export function raisePlanes(segment: Uint16Array, levelM: Float64Array, known: Float32Array, plane: Float32Array): void {
  const raise = levelM.map((height) => (height === height ? height : 0));
  for (let i = 0; i < plane.length; i++) plane[i] = known[i]! + raise[segment[i]!]!;
}

/** Takes off a map over the known planes by how much they were raised. */
export function takeRaise(over: Float32Array, plane: Float32Array, known: Float32Array): void {
  for (let i = 0; i < over.length; i++) over[i] = over[i]! - (plane[i]! - known[i]!);
}

/** Where neither current nor segment tells, nothing is known of the plane: it becomes NaN. */
export function loseUntold(segment: Uint16Array, planes: Float32Array | undefined, plane: Float32Array): void {
  if (planes) for (let i = 0; i < plane.length; i++) if (segment[i] === 0 && planes[i] !== planes[i]) plane[i] = Number.NaN;
  if (!planes) for (let i = 0; i < plane.length; i++) if (segment[i] === 0) plane[i] = Number.NaN;
}

/** Moves planes by what their levels moved, and takes the same off what lies over them. */
export function movePlanes(plane: Float32Array, over: Float32Array, level: Uint16Array, moves: Float64Array): void {
  for (let i = 0; i < plane.length; i++) {
    const move = moves[level[i]!]!;
    plane[i]! += move;
    over[i]! -= move;
  }
}

/** Takes one offset per row off a map. */
export function takeLines(values: Float32Array, lines: Float64Array, columns: number): void {
  for (let r = 0; r < lines.length; r++) {
    const line = lines[r]!;
    for (let i = r * columns; i < (r + 1) * columns; i++) values[i]! -= line;
  }
}

/** Takes one offset per row and the planes off a map; unknown planes make it NaN. */
export function takePlanes(values: Float32Array, plane: Float32Array, lines: Float64Array, columns: number): void {
  for (let r = 0; r < lines.length; r++) takePlanesOfRow(values, plane, lines[r]!, r * columns, (r + 1) * columns);
}

function takePlanesOfRow(values: Float32Array, plane: Float32Array, line: number, from: number, to: number): void {
  for (let i = from; i < to; i++) values[i] = values[i]! - line - plane[i]!;
}
