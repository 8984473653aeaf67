// Values to colours on a linear scale, each picture pixel the mean of the map pixels under it.

/**
 * `data`: f32, `columns` a row, NaN missing. Picture pixel (x, y) covers columns left[x]…right[x] and rows top[y]…bottom[y] (i32, ends exclusive); without any it
 * is transparent. Its mean times `factor` lies at (mean − from) · perUnit on `palette` (256 × RGBA as u32), rounded and clipped. `missing`: colour where no value is
 * present. `rgba`: width × height u32, the result.
 */
export function colourMap(
  data: usize, columns: i32, width: i32, height: i32, left: usize, right: usize, top: usize, bottom: usize,
  factor: f64, from: f64, perUnit: f64, palette: usize, missing: u32, rgba: usize
): void {
  let out = rgba;
  for (let y: usize = 0; y < <usize>height; y++) {
    const firstRow = load<i32>(top + (y << 2));
    const endRow = load<i32>(bottom + (y << 2));
    for (let x: usize = 0; x < <usize>width; x++) {
      const first = load<i32>(left + (x << 2));
      const end = load<i32>(right + (x << 2));
      let colour: u32 = 0;
      if (firstRow < endRow && first < end) {
        let sum: f64 = 0;
        let count: i32 = 0;
        for (let row = firstRow; row < endRow; row++) {
          const line = data + (<usize>row * <usize>columns << 2);
          for (let column = first; column < end; column++) {
            const value = load<f32>(line + (<usize>column << 2));
            if (value === value) {
              sum += <f64>value;
              count++;
            }
          }
        }
        colour = count === 0 ? missing : load<u32>(palette + (<usize>entryOf((sum / <f64>count * factor - from) * perUnit) << 2));
      }
      store<u32>(out, colour);
      out += 4;
    }
  }
}

/** Nearest entry, halves upwards as Math.round has them; 0 where infinities left no number. */
@inline
function entryOf(position: f64): i32 {
  const clipped = min<f64>(255, max<f64>(0, position === position ? position : 0));
  const whole = Math.floor(clipped);
  return <i32>whole + <i32>(clipped - whole >= 0.5);
}
