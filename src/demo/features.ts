/** What lies on an invented flake. */
import type { Random } from '../stats/random.ts';
import type { Canvas } from './canvas.ts';
import { eachPixel, somewhere } from './canvas.ts';

/** More decades than any amplifier spans: nothing flows. */
const blocked = 20;

/**
 * Paraboloid domes, slightly oval, that block the current. Many small, few large, as bubbles are; height over radius scatters by a factor around
 * `aspect` (about 0.11 under one layer; Khestanova et al., Nat. Commun. 7, 12587, 2016; thicker skins scatter more).
 */
export function addBubbles(canvas: Canvas, random: Random, count: number, radiusNm: readonly [number, number], aspect: number): void {
  const sizes = Array.from({ length: count }, () => radiusNm[0] * (radiusNm[1] / radiusNm[0]) ** random.uniform() ** 1.5).sort((a, b) => b - a);
  // The largest first, while there is room.
  for (const radius of sizes) {
    const peak = radius * aspect * Math.exp(0.15 * random.normal());
    const stretch = 1 + 0.12 * random.uniform();
    const angle = random.uniform() * Math.PI;
    const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
    const outer = radius * stretch;
    const [cx, cy] = somewhere(canvas, random, outer + clearNm);
    canvas.placed.push({ kind: 'bubble', xNm: cx, yNm: cy, radiusNm: radius });
    eachPixel(canvas, { cx, cy, radius: outer }, (i, x, y) => {
      const u = ((x - cx) * cos + (y - cy) * sin) / stretch;
      const v = ((y - cy) * cos - (x - cx) * sin) * stretch;
      const q = 1 - (u * u + v * v) / radius ** 2;
      if (q <= 0) return;
      canvas.reliefNm[i] = Math.max(canvas.reliefNm[i]!, peak * q);
      canvas.lossDecades[i] = blocked;
    });
  }
}

/** Ground left free around a bubble or particle. */
const clearNm = 60;

/** Rough particles that block the current, and flat films of 1–3 nm that lower it: what transfer leaves behind. */
export function addResidue(canvas: Canvas, random: Random, particles: number, films: number): void {
  for (let k = 0; k < particles + films; k++) {
    // Films first: they need the most room.
    const film = k < films;
    const radius = film ? 250 + 350 * random.uniform() : 60 + 180 * random.uniform();
    const peak = film ? 1 + 2 * random.uniform() : 8 + 40 * random.uniform() ** 2;
    const loss = film ? 0.7 + 1.1 * random.uniform() : blocked;
    const lobes = Array.from({ length: 3 }, (_, n) => ({ size: (0.22 / (n + 2)) * random.normal(), phase: random.uniform() * 2 * Math.PI, n: n + 2 }));
    const bumps = Array.from({ length: 3 }, () => ({ kx: (6 * random.normal()) / radius, ky: (6 * random.normal()) / radius, phase: random.uniform() * 2 * Math.PI }));
    const rough = film ? 0.02 : 0.05;
    const [cx, cy] = somewhere(canvas, random, 1.2 * radius + clearNm);
    canvas.placed.push({ kind: film ? 'film' : 'particle', xNm: cx, yNm: cy, radiusNm: radius });
    eachPixel(canvas, { cx, cy, radius: 1.6 * radius }, (i, x, y) => {
      const angle = Math.atan2(y - cy, x - cx);
      const edge = radius * lobes.reduce((sum, lobe) => sum + lobe.size * Math.cos(lobe.n * angle + lobe.phase), 1);
      const rho = Math.hypot(x - cx, y - cy) / edge;
      if (rho >= 1) return;
      const top = bumps.reduce((sum, bump) => sum + rough * Math.cos(bump.kx * (x - cx) + bump.ky * (y - cy) + bump.phase), 1);
      canvas.reliefNm[i] = Math.max(canvas.reliefNm[i]!, peak * top * (1 - rho ** 6));
      canvas.lossDecades[i] = Math.max(canvas.lossDecades[i]!, loss);
    });
  }
}

/** Ridges along gently curved lines; they block as far as they stand off. */
export function addWrinkles(canvas: Canvas, random: Random, count: number): void {
  for (let k = 0; k < count; k++) {
    const [sigma, peak, length] = [30 + 25 * random.uniform(), 4 + 6 * random.uniform(), canvas.widthNm * (0.3 + 0.4 * random.uniform())];
    const [cx, cy] = [canvas.widthNm * random.uniform(), canvas.heightNm * random.uniform()];
    const angle = random.uniform() * Math.PI;
    const bend = (random.uniform() - 0.5) * 0.3;
    const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
    eachPixel(canvas, { cx, cy, radius: length / 2 }, (i, x, y) => {
      const [dx, dy] = [x - cx, y - cy];
      const along = dx * cos + dy * sin;
      if (Math.abs(along) > length / 2) return;
      const across = -dx * sin + dy * cos - bend * (along ** 2 / length);
      if (Math.abs(across) > 4 * sigma) return;
      canvas.reliefNm[i] = Math.max(canvas.reliefNm[i]!, peak * Math.exp(-(across ** 2) / (2 * sigma ** 2)));
      if (Math.abs(across) < 2 * sigma) canvas.lossDecades[i] = blocked;
    });
  }
}

/** Pits through the barrier: `count` anywhere, and `trail` of them near one straight line, as a scratch or a sharp fold leaves them. */
export function addPinholes(canvas: Canvas, random: Random, count: number, trail: number): void {
  const angle = random.uniform() * Math.PI;
  const [tx, ty] = [canvas.widthNm * (0.35 + 0.3 * random.uniform()), canvas.heightNm * (0.35 + 0.3 * random.uniform())];
  for (let k = 0; k < count + trail; k++) {
    const radius = 15 + 20 * random.uniform();
    const depth = 1.5 + 1.5 * random.uniform();
    const along = (random.uniform() - 0.5) * 0.8 * canvas.widthNm;
    const across = 120 * random.normal();
    const [cx, cy] = k < count
      ? somewhere(canvas, random, radius + clearNm)
      : [tx + along * Math.cos(angle) - across * Math.sin(angle), ty + along * Math.sin(angle) + across * Math.cos(angle)];
    // At least the pixel it lies in, however coarse the map.
    const reach = Math.max(radius, 0.71 * Math.max(canvas.widthNm / canvas.columns, canvas.heightNm / canvas.rows));
    let pierced = false;
    eachPixel(canvas, { cx, cy, radius: reach }, (i, x, y) => {
      if (Math.hypot(x - cx, y - cy) > reach || canvas.lossDecades[i]! > 0 || canvas.shorted[i] === 1) return;
      canvas.reliefNm[i]! -= depth;
      canvas.shorted[i] = 1;
      pierced = true;
    });
    if (pierced) canvas.placed.push({ kind: 'pinhole', xNm: cx, yNm: cy, radiusNm: radius });
  }
}
