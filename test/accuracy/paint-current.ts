/** What the probe would read on each count of layers, and what the finished device would carry there. */
import { wkbModel } from '../../src/barrier/model/wkb.ts';
import type { Random } from '../../src/stats/random.ts';
import type { Kind } from './paint-kinds.ts';

export const saturationA = 1e-8;
export const leastA = 1e-13;
/** A pinhole carries twice what the amplifier can show. */
export const pinholeA = 2e-8;
export const deviceBiasV = 4;
const contactM2 = 17e-18;
const layerM = 0.333e-9;
const barrier = { heightEv: 2.5, massRatio: 0.5 };
/** The recipe's range of densities that glow, A/m². */
const glows = [100, 30_000] as const;
/** Less is not told from the floor well enough to carry a band. */
const quantifiedA = 7e-13;
/** The contact's area is known to a decade: half of one either way, and a third more for the variation within a terrace. */
const areaSpread = 1.33 * Math.sqrt(10);
const layerCounts = [9, 10, 11, 12, 13, 14, 15] as const;

export interface LayerCurrents {
  /** Log10 of the probe's current on so many layers, A. */
  readonly probe: (layers: number) => number;
  /** Log10 of the device's density there, up to a constant. */
  readonly device: (layers: number) => number;
  /** Whether the smooth variation belongs to the device's density: no where the currents come from a model, because it is then the contact's. */
  readonly variationCounts: boolean;
  /** Layers of the terrace that should be the most common one. */
  readonly reference: number;
}

/**
 * Currents of a scene. With a factor per layer the most common terrace carries near 0.1 nA. Its density lies far above what glows at any contact area
 * that the recipe thinks possible; that of a terrace a little over the floor may not, and then the ledger would take that one as its reference. Draws with
 * such a terrace are drawn again, so that "the most common terrace" is the reference by every reading.
 */
export function layerCurrents(random: Random, kind: Kind): LayerCurrents {
  if (kind.perLayer === 'model') {
    const density = (layers: number, biasV: number): number => wkbModel.density({ ...barrier, thicknessM: layers * layerM }, biasV);
    const glowing = [11, 12, 13].filter((layers) => density(layers, deviceBiasV) >= glows[0] && density(layers, deviceBiasV) <= glows[1]);
    const probe = layerCounts.map((layers) => Math.log10(density(layers, kind.biasV) * contactM2));
    const device = layerCounts.map((layers) => Math.log10(density(layers, deviceBiasV)));
    return {
      probe: (layers) => probe[layers - layerCounts[0]]!,
      device: (layers) => device[layers - layerCounts[0]]!,
      variationCounts: false,
      reference: glowing[random.integer(glowing.length)]!,
    };
  }
  const [low, high] = kind.perLayer;
  const reference = 11 + random.integer(3);
  for (;;) {
    const decades = Math.log10(low) + (Math.log10(high) - Math.log10(low)) * random.uniform();
    const middle = -10 + 0.25 * (2 * random.uniform() - 1);
    const probe = (layers: number): number => middle - (layers - reference) * decades;
    const ambiguous = layerCounts.some((layers) => 10 ** probe(layers) > quantifiedA && 10 ** probe(layers) < areaSpread * glows[1] * contactM2);
    if (!ambiguous) return { probe, device: probe, variationCounts: true, reference };
  }
}
