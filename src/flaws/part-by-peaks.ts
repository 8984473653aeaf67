/** Parts raised ground by its peaks. */

export interface PeaksInput {
  readonly columns: number;
  readonly rows: number;
  /** 1 on the ground to be parted. */
  readonly mask: Uint8Array;
  /** Height, lightly smoothed, metres; NaN counts as lowest. */
  readonly rise: Float32Array;
  /** Standard deviation of its noise, metres. */
  readonly noiseM: number;
  readonly minPixels: number;
}

/** Two peaks are two things when the saddle between them lies below this part of the lower one. */
const saddlePart = 0.8;
/** And below it by this many standard deviations of the noise. */
const saddleSigmas = 5;

/**
 * Watershed from the peaks down (Vincent & Soille, IEEE Trans. PAMI 13, 583, 1991, in its ordered form): pixels in order of height join the highest
 * neighbouring part, or start one. Where two parts meet, they become one unless the saddle lies clearly below both peaks. Parts of
 * fewer than `minPixels` join their neighbour. Neighbours are the eight around.
 */
export function partByPeaks({ columns, rows, mask, rise, noiseM, minPixels }: PeaksInput): { labels: Uint32Array; count: number } {
  const members: number[] = [];
  for (let i = 0; i < mask.length; i++) if (mask[i] === 1) members.push(i);
  const height = (i: number): number => (rise[i] === rise[i] ? rise[i]! : Number.NEGATIVE_INFINITY);
  const order = Int32Array.from(members).sort((a, b) => height(b) - height(a) || a - b);
  const part = new Int32Array(mask.length);
  const parent: number[] = [0];
  const peak: number[] = [Number.NaN];
  const size: number[] = [0];
  const find = (k: number): number => {
    let root = k;
    while (parent[root] !== root) root = parent[root]!;
    parent[k] = root;
    return root;
  };
  for (const i of order) {
    const c = i % columns;
    const r = (i - c) / columns;
    const here = height(i);
    let best = 0;
    for (let dr = -1; dr <= 1; dr++) {
      for (let dc = -1; dc <= 1; dc++) {
        if (r + dr < 0 || r + dr >= rows || c + dc < 0 || c + dc >= columns) continue;
        const j = i + dr * columns + dc;
        if (part[j] === 0) continue;
        const other = find(part[j]!);
        if (best === 0) {
          best = other;
          continue;
        }
        if (other === best) continue;
        const [higher, lower] = peak[other]! > peak[best]! ? [other, best] : [best, other];
        const distinct = here < saddlePart * peak[lower]! && peak[lower]! - here > saddleSigmas * noiseM && size[lower]! >= minPixels;
        if (!distinct) {
          parent[lower] = higher;
          size[higher]! += size[lower]!;
        }
        // The pixel itself goes to the part on whose side it lies higher up.
        best = find(best);
        if (distinct && nearerTo(i, part, find, rise, best, other, columns, rows)) best = other;
      }
    }
    if (best === 0) {
      best = parent.length;
      parent.push(best);
      peak.push(here);
      size.push(0);
    }
    part[i] = best;
    size[best]!++;
  }
  return numbered(part, find, columns, rows, size, minPixels);
}

/** Whether the highest neighbour of a pixel belongs to `other` rather than to `best`. */
function nearerTo(i: number, part: Int32Array, find: (k: number) => number, rise: Float32Array, best: number, other: number, columns: number, rows: number): boolean {
  const c = i % columns;
  const r = (i - c) / columns;
  let top = Number.NEGATIVE_INFINITY;
  let owner = best;
  for (let dr = -1; dr <= 1; dr++) {
    for (let dc = -1; dc <= 1; dc++) {
      if (r + dr < 0 || r + dr >= rows || c + dc < 0 || c + dc >= columns) continue;
      const j = i + dr * columns + dc;
      if (part[j] === 0 || !(rise[j]! > top)) continue;
      const of = find(part[j]!);
      if (of !== best && of !== other) continue;
      top = rise[j]!;
      owner = of;
    }
  }
  return owner === other;
}

function numbered(part: Int32Array, find: (k: number) => number, columns: number, rows: number, size: number[], minPixels: number): { labels: Uint32Array; count: number } {
  const labels = new Uint32Array(part.length);
  const numbers = new Map<number, number>();
  for (let i = 0; i < part.length; i++) {
    if (part[i] === 0) continue;
    let root = find(part[i]!);
    if (size[root]! < minPixels) root = neighbour(i, root, part, find, columns, rows);
    let number = numbers.get(root);
    if (number === undefined) {
      number = numbers.size + 1;
      numbers.set(root, number);
    }
    labels[i] = number;
  }
  return { labels, count: numbers.size };
}

/** Another part beside a pixel of a tiny one, or its own. */
function neighbour(i: number, own: number, part: Int32Array, find: (k: number) => number, columns: number, rows: number): number {
  const c = i % columns;
  const r = (i - c) / columns;
  for (let dr = -1; dr <= 1; dr++) {
    for (let dc = -1; dc <= 1; dc++) {
      if (r + dr < 0 || r + dr >= rows || c + dc < 0 || c + dc >= columns) continue;
      const j = i + dr * columns + dc;
      if (part[j] !== 0 && find(part[j]!) !== own) return find(part[j]!);
    }
  }
  return own;
}
