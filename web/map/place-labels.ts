/** Labels along a line that never overlap. */

export interface LineLabel {
  /** Wanted middle, pixels from the line's left end. */
  readonly x: number;
  readonly width: number;
  /** Larger wins its place. */
  readonly weight: number;
}

/**
 * Left edges, undefined for labels that are left out. Labels are kept inside the line; the heavier one keeps its place where two collide.
 * The two heaviest are never left out: when they collide with each other they stand side by side about their middle, in the order of `x`.
 */
export function placeLabels(labels: readonly LineLabel[], length: number, gap: number): readonly (number | undefined)[] {
  const within = (left: number, width: number): number => Math.max(0, Math.min(length - width, left));
  const lefts: (number | undefined)[] = labels.map(() => undefined);
  const order = labels.map((_, index) => index).sort((a, b) => (labels[b]?.weight ?? 0) - (labels[a]?.weight ?? 0) || a - b);
  const taken: { readonly from: number; readonly to: number }[] = [];
  const put = (index: number, left: number): void => {
    lefts[index] = left;
    taken.push({ from: left - gap, to: left + (labels[index]?.width ?? 0) + gap });
  };
  const free = (left: number, width: number): boolean => taken.every(({ from, to }) => left >= to || left + width <= from);
  order.forEach((index, rank) => {
    const label = labels[index];
    if (!label) return;
    const left = within(label.x - label.width / 2, label.width);
    if (free(left, label.width)) put(index, left);
    else if (rank === 1) {
      const [first = index] = order;
      const other = labels[first];
      if (!other) return;
      const both = label.width + gap + other.width;
      const start = within((label.x + other.x) / 2 - both / 2, both);
      const [before, after] = label.x < other.x ? [index, first] as const : [first, index] as const;
      taken.length = 0;
      put(before, start);
      put(after, start + (labels[before]?.width ?? 0) + gap);
    }
  });
  return lefts;
}
