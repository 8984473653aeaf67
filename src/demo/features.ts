/** What lies on an invented flake. Lengths in nanometres, x to the right, y down from the picture's top. */
import type { Random } from '../stats/random.ts';

export interface Canvas {
  readonly columns: number;
  readonly rows: number;
  readonly widthNm: number;
  readonly heightNm: number;
  /** Whole layers of the barrier. */
  readonly layers: Float64Array;
  /** Height of features above the terrace. */
  readonly reliefNm: Float64Array;
  /** Decades of current lost to features. */
  readonly lossDecades: Float64Array;
  /** 1 where the barrier is pierced. */
  readonly shorted: Uint8Array;
}

/** More decades than any amplifier spans: nothing flows. */
const blocked = 20;

/** Curved borders across the map: on one side of each the barrier has a layer more or less. */
export function addBorders(canvas: Canvas, random: Random, borders: number): void {
  const { widthNm, heightNm } = canvas;
  for (let k = 0; k < borders; k++) {
    const angle = random.uniform() * 2 * Math.PI;
    const offset = (random.uniform() - 0.5) * 0.7 * Math.min(widthNm, heightNm);
    const step = k % 2 === 0 ? 1 : -1;
    const [wave, size, phase] = [widthNm * (0.2 + 0.4 * random.uniform()), 300 + 500 * random.uniform(), random.uniform() * 2 * Math.PI];
    eachPixel(canvas, undefined, (i, x, y) => {
      const [dx, dy] = [x - widthNm / 2, y - heightNm / 2];
      const across = dx * Math.cos(angle) + dy * Math.sin(angle);
      const along = -dx * Math.sin(angle) + dy * Math.cos(angle);
      if (across > offset + size * Math.sin((2 * Math.PI * along) / wave + phase)) canvas.layers[i]! += step;
    });
  }
}

/** Paraboloid domes that block the current. */
export function addBubbles(canvas: Canvas, random: Random, count: number, radiusNm: readonly [number, number], aspect: readonly [number, number]): void {
  for (let k = 0; k < count; k++) {
    // Many small, few large, as bubbles are.
    const radius = radiusNm[0] * (radiusNm[1] / radiusNm[0]) ** random.uniform() ** 1.5;
    const peak = radius * (aspect[0] + (aspect[1] - aspect[0]) * random.uniform());
    const [cx, cy] = somewhere(canvas, random);
    eachPixel(canvas, { cx, cy, radius }, (i, x, y) => {
      const q = 1 - ((x - cx) ** 2 + (y - cy) ** 2) / radius ** 2;
      if (q <= 0) return;
      canvas.reliefNm[i] = Math.max(canvas.reliefNm[i]!, peak * q);
      canvas.lossDecades[i] = blocked;
    });
  }
}

/** Uneven particles that block the current, and flat films that lower it. */
export function addParticles(canvas: Canvas, random: Random, particles: number, films: number): void {
  for (let k = 0; k < particles + films; k++) {
    const film = k >= particles;
    const radius = film ? 200 + 250 * random.uniform() : 60 + 180 * random.uniform();
    const peak = film ? 1.5 + 1.5 * random.uniform() : 8 + 25 * random.uniform();
    const loss = film ? 1 + random.uniform() : blocked;
    const lobes = Array.from({ length: 3 }, (_, n) => ({ size: 0.12 * random.normal(), phase: random.uniform() * 2 * Math.PI, n: n + 2 }));
    const [cx, cy] = somewhere(canvas, random);
    eachPixel(canvas, { cx, cy, radius: 1.6 * radius }, (i, x, y) => {
      const angle = Math.atan2(y - cy, x - cx);
      const edge = radius * lobes.reduce((sum, lobe) => sum + lobe.size * Math.cos(lobe.n * angle + lobe.phase), 1);
      const rho = Math.hypot(x - cx, y - cy) / edge;
      if (rho >= 1) return;
      canvas.reliefNm[i] = Math.max(canvas.reliefNm[i]!, peak * (1 - rho ** 6) * (film ? 1 : 0.85 + 0.15 * Math.cos(5 * angle)));
      canvas.lossDecades[i] = Math.max(canvas.lossDecades[i]!, loss);
    });
  }
}

/** Ridges along gently curved lines. */
export function addWrinkles(canvas: Canvas, random: Random, count: number): void {
  for (let k = 0; k < count; k++) {
    const [sigma, peak, length] = [30 + 25 * random.uniform(), 4 + 6 * random.uniform(), canvas.widthNm * (0.3 + 0.4 * random.uniform())];
    const [cx, cy] = somewhere(canvas, random);
    const angle = random.uniform() * Math.PI;
    const bend = (random.uniform() - 0.5) * 0.3;
    eachPixel(canvas, { cx, cy, radius: length }, (i, x, y) => {
      const [dx, dy] = [x - cx, y - cy];
      const along = dx * Math.cos(angle) + dy * Math.sin(angle);
      if (Math.abs(along) > length / 2) return;
      const across = -dx * Math.sin(angle) + dy * Math.cos(angle) - bend * (along ** 2 / length);
      const relief = peak * Math.exp(-(across ** 2) / (2 * sigma ** 2));
      if (relief < 0.02) return;
      canvas.reliefNm[i] = Math.max(canvas.reliefNm[i]!, relief);
      if (Math.abs(across) < 2 * sigma) canvas.lossDecades[i] = blocked;
    });
  }
}

/** Pits through the barrier. */
export function addPinholes(canvas: Canvas, random: Random, count: number): void {
  for (let k = 0; k < count; k++) {
    const radius = 15 + 20 * random.uniform();
    const depth = 1.5 + 1.5 * random.uniform();
    const [cx, cy] = somewhere(canvas, random);
    // At least the pixel it lies in, however coarse the map.
    const reach = Math.max(radius, 0.71 * Math.max(canvas.widthNm / canvas.columns, canvas.heightNm / canvas.rows));
    eachPixel(canvas, { cx, cy, radius: reach }, (i, x, y) => {
      if (Math.hypot(x - cx, y - cy) > reach || canvas.lossDecades[i]! > 0) return;
      canvas.reliefNm[i]! -= depth;
      canvas.shorted[i] = 1;
    });
  }
}

function somewhere(canvas: Canvas, random: Random): [number, number] {
  return [canvas.widthNm * random.uniform(), canvas.heightNm * random.uniform()];
}

/** Calls `paint` with index and centre of every pixel, or of those in the square around a disc. */
function eachPixel(canvas: Canvas, disc: { cx: number; cy: number; radius: number } | undefined, paint: (index: number, xNm: number, yNm: number) => void): void {
  const px = canvas.widthNm / canvas.columns;
  const py = canvas.heightNm / canvas.rows;
  const left = disc ? Math.max(0, Math.floor((disc.cx - disc.radius) / px)) : 0;
  const right = disc ? Math.min(canvas.columns - 1, Math.ceil((disc.cx + disc.radius) / px)) : canvas.columns - 1;
  const top = disc ? Math.max(0, Math.floor((disc.cy - disc.radius) / py)) : 0;
  const bottom = disc ? Math.min(canvas.rows - 1, Math.ceil((disc.cy + disc.radius) / py)) : canvas.rows - 1;
  for (let r = top; r <= bottom; r++) for (let c = left; c <= right; c++) paint(r * canvas.columns + c, (c + 0.5) * px, (r + 0.5) * py);
}
