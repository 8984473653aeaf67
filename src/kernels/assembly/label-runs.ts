// Connected regions by runs: stretches of mask pixels along a row, joined by union-find on their numbers.

/** Root of a run; the path is halved on the way. */
@inline
function rootOf(parents: usize, run: u32): u32 {
  let at = run;
  let parent = load<u32>(parents + (<usize>at << 2));
  while (parent !== at) {
    const above = load<u32>(parents + (<usize>parent << 2));
    store<u32>(parents + (<usize>at << 2), above);
    at = above;
    parent = load<u32>(parents + (<usize>at << 2));
  }
  return at;
}

@inline
function join(parents: usize, a: u32, b: u32): void {
  const rootA = rootOf(parents, a);
  const rootB = rootOf(parents, b);
  if (rootA < rootB) store<u32>(parents + (<usize>rootB << 2), rootA);
  else store<u32>(parents + (<usize>rootA << 2), rootB);
}

/**
 * Finds the runs of non-zero pixels in raster order and joins those that touch.
 *
 * `mask`: columns × rows bytes, with 16 readable bytes behind them. `starts`, `ends`, `parents`: room for
 * rows × ⌈columns / 2⌉ u32 each; starts and ends (one past the last) are indices of pixels. `reach`: 0 joins by edges, 1 by corners too.
 * Returns the number of runs.
 */
export function findRuns(mask: usize, columns: i32, rows: i32, reach: i32, starts: usize, ends: usize, parents: usize): i32 {
  let count: i32 = 0;
  let previousFrom: i32 = 0;
  const zero = i8x16.splat(0);
  for (let row: i32 = 0; row < rows; row++) {
    const from = count;
    const base = row * columns;
    let inside: i32 = 0;
    for (let column: i32 = 0; column < columns; column += 16) {
      let bits = i8x16.bitmask(i8x16.ne(v128.load(mask + <usize>(base + column)), zero));
      if (columns - column < 16) bits &= (1 << (columns - column)) - 1;
      // A bit wherever the mask changes from the pixel before.
      let edges = (bits ^ ((bits << 1) | inside)) & 0xffff;
      inside = bits >> 15;
      while (edges !== 0) {
        const place = base + column + ctz(edges);
        edges &= edges - 1;
        if ((bits >> (place - base - column)) & 1) {
          store<u32>(starts + (<usize>count << 2), place);
          store<u32>(parents + (<usize>count << 2), count);
        } else {
          store<u32>(ends + (<usize>count << 2), place);
          count++;
        }
      }
    }
    if (inside) {
      store<u32>(ends + (<usize>count << 2), base + columns);
      count++;
    }
    joinRows(starts, ends, parents, previousFrom, from, count, columns, reach);
    previousFrom = from;
  }
  return count;
}

/** Joins the runs from…to of one row with the runs previous…from of the row before. */
function joinRows(starts: usize, ends: usize, parents: usize, previous: i32, from: i32, to: i32, columns: i32, reach: i32): void {
  let first = previous;
  for (let run = from; run < to; run++) {
    const start = <i32>load<u32>(starts + (<usize>run << 2)) - columns - reach;
    const end = <i32>load<u32>(ends + (<usize>run << 2)) - columns + reach;
    while (first < from && <i32>load<u32>(ends + (<usize>first << 2)) <= start) first++;
    let other = first;
    while (other < from && <i32>load<u32>(starts + (<usize>other << 2)) < end) {
      join(parents, run, other);
      other++;
    }
    // The last one met may reach on to the next run.
    if (other > first) first = other - 1;
  }
}

/**
 * Turns `parents` into region numbers 1…n in raster order and counts each region's pixels into `pixels`
 * (room for one u32 more than there are regions; at most as many regions as runs). Returns n.
 */
export function numberRuns(starts: usize, ends: usize, parents: usize, runs: i32, pixels: usize): i32 {
  let count: u32 = 0;
  for (let run: i32 = 0; run < runs; run++) {
    const at = parents + (<usize>run << 2);
    const parent = load<u32>(at);
    const length = load<u32>(ends + (<usize>run << 2)) - load<u32>(starts + (<usize>run << 2));
    if (parent === <u32>run) {
      count++;
      store<u32>(at, count);
      store<u32>(pixels + (<usize>count << 2), length);
    } else {
      // Roots come before their members, so the parent holds its number already.
      const number = load<u32>(parents + (<usize>parent << 2));
      store<u32>(at, number);
      const sum = pixels + (<usize>number << 2);
      store<u32>(sum, load<u32>(sum) + length);
    }
  }
  return count;
}
