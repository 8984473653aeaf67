// Growth of a mask by a square.

/**
 * `mask`: columns × rows bytes; those that are 1 grow by `radius` in all directions, cut off at the borders. `along`, `out`: as many bytes; `out` is the
 * result, of 0 and 1.
 */
export function dilate(mask: usize, columns: i32, rows: i32, radius: i32, along: usize, out: usize): void {
  for (let row: i32 = 0; row < rows; row++) {
    const from = mask + <usize>(row * columns);
    const to = along + <usize>(row * columns);
    memory.fill(to, 0, <usize>columns);
    let until: i32 = 0;
    for (let column: i32 = 0; column < columns; column++) {
      if (load<u8>(from + <usize>column) !== 1) continue;
      const start = max(until, column - radius);
      until = min(columns, column + radius + 1);
      if (until > start) memory.fill(to + <usize>start, 1, <usize>(until - start));
    }
  }
  for (let row: i32 = 0; row < rows; row++) {
    const to = out + <usize>(row * columns);
    memory.fill(to, 0, <usize>columns);
    const last = min(rows - 1, row + radius);
    for (let other = max(0, row - radius); other <= last; other++) {
      const from = along + <usize>(other * columns);
      let column: i32 = 0;
      for (; column + 16 <= columns; column += 16) {
        const at = to + <usize>column;
        v128.store(at, v128.or(v128.load(at), v128.load(from + <usize>column)));
      }
      for (; column < columns; column++) store<u8>(to + <usize>column, load<u8>(to + <usize>column) | load<u8>(from + <usize>column));
    }
  }
}
