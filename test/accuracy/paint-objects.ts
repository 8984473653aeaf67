/** What lies on the ground of a painted scene, in nm, and how each thing looks to height and current. */
import { seededRandom } from '../../src/stats/random.ts';
import { visitBox } from './paint-grid.ts';
import type { PaintGrid } from './paint-grid.ts';
import { starOutline } from './paint-layers.ts';

interface Placed {
  readonly xNm: number;
  readonly yNm: number;
}
export interface Bubble extends Placed {
  readonly kind: 'bubble';
  readonly radiusNm: number;
  readonly peakNm: number;
}
export const residueShapes = ['mesa', 'slab', 'lump', 'film'] as const;
export interface Residue extends Placed {
  readonly kind: 'residue';
  readonly shape: (typeof residueShapes)[number];
  readonly radiusNm: number;
  readonly peakNm: number;
  /** What it takes from the current; 9 blocks. */
  readonly decades: number;
  /** Seed of its outline. */
  readonly seed: string;
}
export interface Wrinkle extends Placed {
  readonly kind: 'wrinkle';
  readonly angle: number;
  readonly lengthNm: number;
  readonly sigmaNm: number;
  readonly peakNm: number;
  /** How far the heading swings, radians, over which length, and where it starts. */
  readonly swing: number;
  readonly swingNm: number;
  readonly phase: number;
}
export interface Pinhole extends Placed {
  readonly kind: 'pinhole';
  readonly radiusNm: number;
  readonly depthNm: number;
}
export type PaintedObject = Bubble | Residue | Wrinkle | Pinhole;

/** Standard deviations of its Gaussian section within which a wrinkle blocks. */
export const wrinkleBlocks = 1.5;
export const blockedDecades = 9;

/** Calls `visit` once for every pixel that an object changes, with its rise (negative for a pit) and what the current loses there, in decades. */
export function drawObject(grid: PaintGrid, object: PaintedObject, visit: (index: number, riseNm: number, lostDecades: number) => void): void {
  if (object.kind === 'wrinkle') return drawWrinkle(grid, object, visit);
  const reach = object.kind === 'residue' ? 1.7 * object.radiusNm : object.radiusNm;
  const outline = object.kind === 'residue' ? residueOutline(object) : () => 1;
  const lump = object.kind === 'residue' && object.shape === 'lump' ? lumps(object) : undefined;
  visitBox(grid, boxAround(object, reach), (index, x, y) => {
    const [dx, dy] = [x - object.xNm, y - object.yNm];
    const rho = Math.hypot(dx, dy) / (object.radiusNm * outline(Math.atan2(dy, dx)));
    if (rho >= 1) return;
    switch (object.kind) {
      case 'bubble':
        return visit(index, object.peakNm * (1 - rho * rho), blockedDecades);
      case 'pinhole':
        return visit(index, -object.depthNm, 0);
      case 'residue':
        return visit(index, object.peakNm * profile(object.shape, rho) * (lump ? lump(dx, dy) : 1), object.decades);
    }
  });
}

function boxAround({ xNm, yNm }: Placed, reach: number) {
  return { fromX: xNm - reach, toX: xNm + reach, fromY: yNm - reach, toY: yNm + reach };
}

/** Share of the peak over the relative radius. */
function profile(shape: Residue['shape'], rho: number): number {
  switch (shape) {
    case 'mesa':
      return Math.sqrt(1 - rho ** 3);
    case 'slab':
      return Math.min(1, 0.6 + 4 * (1 - rho));
    case 'lump':
      return 0.35 + 0.65 * (1 - rho ** 2);
    case 'film':
      return Math.min(1, 0.45 + 2.5 * (1 - rho));
  }
}

/** Slabs have straight edges, the others a star's outline. */
function residueOutline({ shape, seed }: Residue): (angle: number) => number {
  const random = seededRandom(`${seed} outline`);
  if (shape !== 'slab') return starOutline(random, 0.28);
  const corners = 4 + random.integer(3);
  const first = 2 * Math.PI * random.uniform();
  const flat = 0.8 + 0.4 * random.uniform();
  return (angle) => {
    const turn = ((angle - first) * corners) / (2 * Math.PI);
    const within = ((turn - Math.floor(turn) - 0.5) * 2 * Math.PI) / corners;
    return (flat * Math.cos(Math.PI / corners)) / Math.cos(within) + (1 - flat) * 0.5 * Math.cos(2 * (angle - first));
  };
}

/** Uneven tops: a few bumps and dents as wide as the lump's radius. */
function lumps({ seed, radiusNm }: Residue): (dx: number, dy: number) => number {
  const random = seededRandom(`${seed} top`);
  const waves = Array.from({ length: 3 }, () => ({ kx: (2.2 / radiusNm) * random.normal(), ky: (2.2 / radiusNm) * random.normal(), phase: 2 * Math.PI * random.uniform() }));
  return (dx, dy) => {
    let sum = 1;
    for (const { kx, ky, phase } of waves) sum += 0.14 * Math.cos(kx * dx + ky * dy + phase);
    return sum;
  };
}

/** Points every few nanometres along a wrinkle's crest. */
export function crestOf({ xNm, yNm, angle, lengthNm, swing, swingNm, phase }: Wrinkle, stepNm: number): { xNm: number; yNm: number }[] {
  const points: { xNm: number; yNm: number }[] = [];
  for (const direction of [-1, 1]) {
    let [x, y] = [xNm, yNm];
    for (let along = 0; along <= lengthNm / 2; along += stepNm) {
      if (along > 0 || direction === 1) points.push({ xNm: x, yNm: y });
      const heading = angle + swing * Math.sin((2 * Math.PI * direction * along) / swingNm + phase);
      x += direction * stepNm * Math.cos(heading);
      y += direction * stepNm * Math.sin(heading);
    }
  }
  return points;
}

function drawWrinkle(grid: PaintGrid, wrinkle: Wrinkle, visit: (index: number, riseNm: number, lostDecades: number) => void): void {
  const { sigmaNm, peakNm } = wrinkle;
  const nearest = new Map<number, number>();
  const reach = 4 * sigmaNm;
  for (const point of crestOf(wrinkle, sigmaNm / 4)) {
    visitBox(grid, boxAround(point, reach), (index, x, y) => {
      const squared = (x - point.xNm) ** 2 + (y - point.yNm) ** 2;
      const known = nearest.get(index);
      if (squared < reach * reach && (known === undefined || squared < known)) nearest.set(index, squared);
    });
  }
  const blocks = (wrinkleBlocks * sigmaNm) ** 2;
  for (const [index, squared] of nearest) visit(index, peakNm * Math.exp(-squared / (2 * sigmaNm * sigmaNm)), squared < blocks ? blockedDecades : 0);
}
