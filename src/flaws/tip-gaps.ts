/** Gaps between tall flaws that a round tip does not reach into. */

/** Radius of a coated probe's tip, metres: common for conductive coatings, 20–30 nm when new, as no recipe states it. */
export const assumedTipM = 25e-9;

/**
 * Marks ground in gaps too narrow for the tip: along a row or a column, flawed ground stands on both sides, and a tip of that radius that touches
 * both cannot touch the ground between. Between edges of height h it reaches the ground only in gaps wider than 2·√(h(2R − h)), and 2R from h = R on (a circle
 * over two upright edges; flanks that slope let it deeper, so that the mark is on the safe side).
 *
 * @param raised 1 on flawed ground that stands up; @param rise height above the ground, metres, NaN missing (no evidence).
 * @returns 1 where height and current are those of the tip's flanks rather than of the ground.
 */
export function tipGaps(raised: Uint8Array, rise: Float32Array, columns: number, rows: number, pitchXM: number, pitchYM: number, tipM: number): Uint8Array {
  const marks = new Uint8Array(raised.length);
  markAlong(marks, raised, rise, rows, columns, columns, 1, pitchXM, tipM);
  markAlong(marks, raised, rise, columns, rows, 1, columns, pitchYM, tipM);
  return marks;
}

/** All lines of one direction: `lines` of `length` pixels, `lineStep` apart, with `step` between neighbours. */
function markAlong(marks: Uint8Array, raised: Uint8Array, rise: Float32Array, lines: number, length: number, lineStep: number, step: number, pitchM: number, tipM: number): void {
  const widest = Math.floor((2 * tipM) / pitchM);
  const inwards = Math.max(2, Math.round(tipM / pitchM));
  for (let line = 0; line < lines; line++) {
    let last = -1;
    for (let k = 0; k < length; k++) {
      const at = line * lineStep + k * step;
      if (raised[at] === 0) continue;
      const gap = k - last - 1;
      if (last >= 0 && gap > 0 && gap <= widest) {
        const edgeM = Math.min(edgeHeight(raised, rise, line * lineStep + last * step, -step, Math.min(last, inwards)), edgeHeight(raised, rise, at, step, Math.min(length - 1 - k, inwards)));
        const reach = edgeM >= tipM ? 2 * tipM : 2 * Math.sqrt(Math.max(0, edgeM * (2 * tipM - edgeM)));
        if (gap * pitchM < reach) for (let g = last + 1; g < k; g++) marks[line * lineStep + g * step] = 1;
      }
      last = k;
    }
  }
}

/** Height of the flaw within so many pixels from its edge (a tip's radius, two pixels at least): what the tip leans on. */
function edgeHeight(raised: Uint8Array, rise: Float32Array, at: number, step: number, room: number): number {
  let highest = 0;
  for (let n = 0; n <= room; n++) {
    const i = at + n * step;
    if (raised[i] === 0) break;
    if (rise[i]! > highest) highest = rise[i]!;
  }
  return highest;
}
