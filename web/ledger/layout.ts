/** Where the ledger's segments and their labels stand; plain arithmetic in CSS pixels. */

export interface Span {
  readonly x: number;
  readonly width: number;
}

/** A segment below this cannot be seen or hit. */
export const leastWidth = 3;

/** The same for a cause of a few pixels of the map: a mark that it is there, not a segment like others. */
export const markWidth = 1.5;

/** Least width of each segment: what would be less than a quarter of a pixel wide is only marked. */
export function leastWidths(shares: readonly number[], width: number): readonly number[] {
  return shares.map((share) => (share * width < 0.25 ? markWidth : leastWidth));
}

/**
 * Widths in proportion to `shares` that fill `width` exactly, none below its `least` (one for all, or one each) and `gaps[i]` pixels free before segment i.
 * What the small ones gain, the large ones give in proportion. When not even `least` fits for all, they are equal.
 */
export function segmentSpans(shares: readonly number[], width: number, gaps: readonly number[], least: number | readonly number[] = leastWidth): readonly Span[] {
  const room = Math.max(0, width - gaps.reduce((sum, gap) => sum + gap, 0));
  const widths = sharedWidths(shares, room, typeof least === 'number' ? shares.map(() => least) : least);
  let x = 0;
  return widths.map((each, index) => {
    x += gaps[index] ?? 0;
    const span = { x, width: each };
    x += each;
    return span;
  });
}

function sharedWidths(shares: readonly number[], room: number, least: readonly number[]): readonly number[] {
  const leastOf = (index: number): number => least[index] ?? 0;
  if (least.reduce((sum, each) => sum + each, 0) >= room) return shares.map(() => room / Math.max(1, shares.length));
  const small = new Set<number>();
  // Each round lifts segments to the least width; the others share what is left, which may push further ones below it.
  for (;;) {
    const left = room - [...small].reduce((total, index) => total + leastOf(index), 0);
    const sum = shares.reduce((total, share, index) => (small.has(index) ? total : total + share), 0);
    const before = small.size;
    const widths = shares.map((share, index) => (small.has(index) ? leastOf(index) : (share / (sum > 0 ? sum : 1)) * left));
    widths.forEach((each, index) => { if (each < leastOf(index)) small.add(index); });
    if (small.size === before) return widths;
  }
}

/**
 * Left edges of labels in one row so that none overlap, each as near as the order allows to the left edge of its own segment;
 * undefined when the row is too short for all (then a wrapped legend is the answer).
 */
export function labelRow(wanted: readonly number[], widths: readonly number[], width: number, gap: number): readonly number[] | undefined {
  const needed = widths.reduce((sum, each) => sum + each, 0) + gap * Math.max(0, widths.length - 1);
  if (needed > width) return undefined;
  const places = [...wanted];
  for (let i = 0, free = 0; i < places.length; i++) {
    places[i] = Math.max(places[i] ?? 0, free);
    free = (places[i] ?? 0) + (widths[i] ?? 0) + gap;
  }
  for (let i = places.length - 1, end = width; i >= 0; i--) {
    places[i] = Math.min(places[i] ?? 0, end - (widths[i] ?? 0));
    end = (places[i] ?? 0) - gap;
  }
  return places;
}

export interface LeaderRoute {
  /** Where the line leaves the segment. */
  readonly from: number;
  /** Where it meets its label. */
  readonly to: number;
  /** Depth of its level run: 0 nearest the bar. */
  readonly level: number;
}

/**
 * Lines from segments to labels that do not begin inside them; undefined where none is needed. Of neighbours that move left the left one
 * runs nearest the bar, of those that move right the right one: so no two lines cross.
 *
 * @param anchor distance from a label's left edge to where its line ends.
 */
export function leaderRoutes(spans: readonly Span[], places: readonly number[], anchor: number): readonly (LeaderRoute | undefined)[] {
  const ends = spans.map((span, index) => {
    const to = (places[index] ?? span.x) + anchor;
    const from = span.x + Math.min(span.width / 2, anchor);
    return to >= span.x && to <= span.x + span.width ? undefined : { from, to };
  });
  return ends.map((end, index) => {
    if (!end) return undefined;
    const left = end.to < end.from;
    let level = 0;
    for (let i = index + (left ? -1 : 1); ; i += left ? -1 : 1) {
      const other = ends[i];
      if (!other || (other.to < other.from) !== left) return { ...end, level };
      level++;
    }
  });
}
