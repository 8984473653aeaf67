/** Draws how many objects of what size lie where. */
import type { Random } from '../../src/stats/random.ts';
import type { PaintGrid } from './paint-grid.ts';
import type { Bubble, PaintedObject, Pinhole, Residue, Wrinkle } from './paint-objects.ts';
import { blockedDecades, crestOf } from './paint-objects.ts';

type Range = readonly [low: number, high: number];

/** Numbers are for 100 µm² and scaled by the map's area. */
export interface Population {
  readonly bubbles: Range;
  readonly bubbleRadiusNm: Range;
  readonly heightToRadius: Range;
  /** More bubbles are laid, touching where they must, until they cover this share of the map. */
  readonly bubbleCover?: number;
  readonly residues: Range;
  readonly wrinkles: Range;
  readonly pinholes: Range;
}

/** Share of bubbles that are laid against another one. */
const touchingShare = 0.1;

export function populate(random: Random, grid: PaintGrid, population: Population, seed: string): PaintedObject[] {
  const draw = drawer(random);
  const areaShare = (grid.widthNm * grid.heightNm) / 1e8;
  const number = ([low, high]: Range): number => {
    const wanted = draw.between(low, high + 1 - 1e-9) * areaShare;
    return Math.floor(wanted) + (areaShare < 1 && random.uniform() < wanted % 1 ? 1 : 0);
  };
  const wrinkles = Array.from({ length: number(population.wrinkles) }, () => drawWrinkle(draw, grid));
  const bubbles = drawBubbles(draw, grid, population, number(population.bubbles));
  const residues = Array.from({ length: number(population.residues) }, (_, k) => drawResidue(draw, grid, bubbles, `${seed} residue ${k}`));
  const pinholes = drawPinholes(draw, grid, [...wrinkles, ...bubbles, ...residues], number(population.pinholes));
  return [...residues, ...wrinkles, ...bubbles, ...pinholes];
}

interface Drawer {
  readonly random: Random;
  readonly between: (low: number, high: number) => number;
  /** Even in the logarithm. */
  readonly evenLog: (range: Range) => number;
}

function drawer(random: Random): Drawer {
  const between = (low: number, high: number): number => low + (high - low) * random.uniform();
  return { random, between, evenLog: ([low, high]) => Math.exp(between(Math.log(low), Math.log(high))) };
}

function drawBubbles(draw: Drawer, grid: PaintGrid, population: Population, count: number): Bubble[] {
  const bubbles: Bubble[] = [];
  let covered = 0;
  const aim = (population.bubbleCover ?? 0) * grid.widthNm * grid.heightNm;
  for (let tries = 0; tries < 20_000 && (bubbles.length < count || covered < aim); tries++) {
    const radiusNm = draw.evenLog(population.bubbleRadiusNm);
    const bubble: Bubble = { kind: 'bubble', ...placeOf(draw, grid, radiusNm, bubbles), radiusNm, peakNm: radiusNm * draw.evenLog(population.heightToRadius) };
    // Touching bubbles may run into each other by a tenth of their radii.
    if (bubbles.some((other) => Math.hypot(other.xNm - bubble.xNm, other.yNm - bubble.yNm) < 0.9 * (other.radiusNm + radiusNm))) continue;
    bubbles.push(bubble);
    covered += Math.PI * radiusNm * radiusNm * insideShare(grid, bubble);
  }
  return bubbles;
}

/** Anywhere, over the map's edges too, or against a bubble that is there. */
function placeOf({ random, between }: Drawer, grid: PaintGrid, radiusNm: number, others: readonly Bubble[]): { xNm: number; yNm: number } {
  if (others.length > 0 && random.uniform() < touchingShare) {
    const other = others[random.integer(others.length)]!;
    const angle = 2 * Math.PI * random.uniform();
    const distance = (other.radiusNm + radiusNm) * between(0.9, 1.02);
    const [xNm, yNm] = [other.xNm + distance * Math.cos(angle), other.yNm + distance * Math.sin(angle)];
    if (xNm > 0 && yNm > 0 && xNm < grid.widthNm && yNm < grid.heightNm) return { xNm, yNm };
  }
  return { xNm: between(-0.5 * radiusNm, grid.widthNm + 0.5 * radiusNm), yNm: between(-0.5 * radiusNm, grid.heightNm + 0.5 * radiusNm) };
}

/** About which share of a disc lies on the map, for the cover only. */
function insideShare(grid: PaintGrid, { xNm, yNm, radiusNm }: Bubble): number {
  const along = (centre: number, length: number): number => (Math.min(length, centre + radiusNm) - Math.max(0, centre - radiusNm)) / (2 * radiusNm);
  return along(xNm, grid.widthNm) * along(yNm, grid.heightNm);
}

function drawResidue(draw: Drawer, grid: PaintGrid, bubbles: readonly Bubble[], seed: string): Residue {
  const { random, between } = draw;
  const film = random.uniform() < 0.5;
  const radiusNm = between(60, 300);
  const kind = random.uniform();
  const shape = film ? (kind < 0.6 ? 'mesa' : 'film') : kind < 0.5 ? 'mesa' : kind < 0.8 ? 'slab' : 'lump';
  for (let tries = 0; ; tries++) {
    const place = { xNm: grid.widthNm * random.uniform(), yNm: grid.heightNm * random.uniform() };
    const hidden = bubbles.some((bubble) => Math.hypot(bubble.xNm - place.xNm, bubble.yNm - place.yNm) < bubble.radiusNm);
    if (hidden && tries < 100) continue;
    return { kind: 'residue', shape, ...place, radiusNm, seed, ...(film ? { peakNm: between(1, 4), decades: between(1, 2.4) } : { peakNm: between(6, 38), decades: blockedDecades }) };
  }
}

function drawWrinkle({ random, between }: Drawer, grid: PaintGrid): Wrinkle {
  return {
    kind: 'wrinkle', xNm: between(0.25, 0.75) * grid.widthNm, yNm: between(0.25, 0.75) * grid.heightNm, angle: Math.PI * random.uniform(),
    lengthNm: between(2000, 7800) * Math.min(1, Math.sqrt((grid.widthNm * grid.heightNm) / 1e8)), sigmaNm: between(25, 60), peakNm: between(2.2, 11.5),
    swing: between(0, 0.6), swingNm: between(1800, 6000), phase: 2 * Math.PI * random.uniform(),
  };
}

/** Pinholes lie on open ground: under a bubble nobody would see them. */
function drawPinholes({ random, between }: Drawer, grid: PaintGrid, others: readonly PaintedObject[], count: number): Pinhole[] {
  const crests = others.flatMap((other) => (other.kind === 'wrinkle' ? crestOf(other, other.sigmaNm).map((point) => ({ ...point, reach: 3 * other.sigmaNm })) : []));
  const discs = others.flatMap((other) => (other.kind === 'wrinkle' ? [] : [{ xNm: other.xNm, yNm: other.yNm, reach: other.radiusNm * (other.kind === 'residue' ? 1.7 : 1) }]));
  const taken = [...crests, ...discs];
  const pinholes: Pinhole[] = [];
  for (let tries = 0; tries < 2000 && pinholes.length < count; tries++) {
    const pinhole: Pinhole = { kind: 'pinhole', xNm: grid.widthNm * random.uniform(), yNm: grid.heightNm * random.uniform(), radiusNm: between(16, 39), depthNm: between(1, 2.9) };
    const free = taken.every(({ xNm, yNm, reach }) => Math.hypot(xNm - pinhole.xNm, yNm - pinhole.yNm) > reach + 2 * pinhole.radiusNm);
    if (free && pinholes.every((other) => Math.hypot(other.xNm - pinhole.xNm, other.yNm - pinhole.yNm) > 200)) pinholes.push(pinhole);
  }
  return pinholes;
}
