/** The kinds of scene: the family of invented scans with known truth, and recipes that are harder in one respect each. */
import type { Population } from './paint-populate.ts';

export interface Kind {
  readonly name: string;
  /** What the kind is there for, in words. */
  readonly about: string;
  readonly columns: number;
  readonly rows: number;
  readonly widthNm: number;
  readonly heightNm: number;
  readonly population: Population;
  /** Factor by which the current falls per layer; `model` takes the currents of the stated barrier. */
  readonly perLayer: readonly [low: number, high: number] | 'model';
  readonly biasV: number;
  readonly whiteNm: number;
  readonly lineNm: number;
  readonly floorNoiseA: number;
  /** Decades that the tip loses from the first line to the last. */
  readonly wearDecades?: readonly [low: number, high: number];
  /** Time constant of the amplifier in pixels along the row. */
  readonly lagPx?: readonly [low: number, high: number];
}

const family: Kind = {
  name: 'family',
  about: 'bubbles, residue, wrinkles and pinholes on terraces of 9 to 15 layers',
  columns: 512, rows: 512, widthNm: 10_000, heightNm: 10_000,
  population: { bubbles: [20, 60], bubbleRadiusNm: [40, 400], heightToRadius: [0.11, 0.15], residues: [5, 15], wrinkles: [2, 5], pinholes: [4, 10] },
  perLayer: [12, 26], biasV: 4,
  whiteNm: 0.08, lineNm: 0.45, floorNoiseA: 3e-14,
};

const like = (name: string, about: string, changes: Partial<Kind>): Kind => ({ ...family, name, about, ...changes });

/** Maps without any object: what is reported on them is invented. */
const nothing: Population = { bubbles: [0, 0], bubbleRadiusNm: [40, 400], heightToRadius: [0.11, 0.15], residues: [0, 0], wrinkles: [0, 0], pinholes: [0, 0] };

export const kinds: readonly Kind[] = [
  family,
  like('wide', 'pixels taller than wide: 512 × 384 over 10 µm × 10 µm', { rows: 384 }),
  like('flat', 'pixels wider than tall: 400 × 512 over 10 µm × 6 µm', { columns: 400, heightNm: 6000 }),
  like('noisy', 'twice the height noise, line offsets and floor noise', { whiteNm: 0.16, lineNm: 0.9, floorNoiseA: 6e-14 }),
  like('worn', 'the tip loses half a decade down the scan', { wearDecades: [0.45, 0.55] }),
  like('lag', 'the amplifier smears the current over 1 to 3 pixels', { lagPx: [1, 3] }),
  like('crowded', 'bubbles on two fifths of the map', { population: { ...family.population, bubbleCover: 0.4, bubbleRadiusNm: [60, 700] } }),
  like('skins', 'bubbles from flat to steep, h/R 0.03 to 0.3', { population: { ...family.population, heightToRadius: [0.03, 0.3] } }),
  like('gentle', 'the current falls by 6 per layer only', { perLayer: [6, 6] }),
  like('model', 'currents of the stated barrier at 5.9 V through 17 nm²', { perLayer: 'model', biasV: 5.9 }),
  like('clean', 'no flaw at all', { population: nothing }),
];

export function kindOf(name: string): Kind {
  const kind = kinds.find((known) => known.name === name);
  if (!kind) throw new RangeError(`no kind of scene is called ${name}; there are ${kinds.map((known) => known.name).join(', ')}`);
  return kind;
}

/** The same kind on a part of the area at the same pitch, for tests and for large numbers of scenes. */
export function sized(kind: Kind, share: number): Kind {
  return {
    ...kind, columns: Math.round(kind.columns * share), rows: Math.round(kind.rows * share), widthNm: kind.widthNm * share, heightNm: kind.heightNm * share,
  };
}
