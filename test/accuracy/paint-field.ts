/** Smooth random surfaces that do not know of pixels: sums of plane waves. */
import type { Random } from '../../src/stats/random.ts';
import { pitchXNm, pitchYNm } from './paint-grid.ts';
import type { PaintGrid } from './paint-grid.ts';

const waves = 80;

/**
 * Samples a random field of standard deviation `sd` with the autocorrelation exp(−d²/length²): its spectrum is a Gaussian too, from which the
 * wave vectors are drawn (Shinozuka & Jan, J. Sound Vib. 25, 111, 1972). Near-normal, because many waves add up.
 */
export function waveField(random: Random, grid: PaintGrid, lengthNm: number, sd: number): Float64Array {
  const { columns, rows } = grid;
  const out = new Float64Array(columns * rows);
  const amplitude = sd * Math.sqrt(2 / waves);
  const spread = Math.SQRT2 / lengthNm;
  const [px, py] = [pitchXNm(grid), pitchYNm(grid)];
  for (let k = 0; k < waves; k++) {
    const kx = spread * random.normal();
    const ky = spread * random.normal();
    const phase = 2 * Math.PI * random.uniform();
    // A step along the row turns the wave's phase by a fixed angle.
    const [turnCos, turnSin] = [Math.cos(kx * px), Math.sin(kx * px)];
    for (let r = 0, i = 0; r < rows; r++) {
      const start = phase + 0.5 * kx * px + (r + 0.5) * ky * py;
      let [re, im] = [amplitude * Math.cos(start), amplitude * Math.sin(start)];
      for (let c = 0; c < columns; c++, i++) {
        out[i]! += re;
        const turned = re * turnCos - im * turnSin;
        im = re * turnSin + im * turnCos;
        re = turned;
      }
    }
  }
  return out;
}
