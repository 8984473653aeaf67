/** The reference terrace and the densities of all terraces, which depend on each other once a layer count is known. */
import { layersAt } from './anchor.ts';
import type { Anchor } from './anchor.ts';
import { chooseReference } from './reference.ts';
import type { Candidate, ReferenceChoice, ReferenceRule } from './reference.ts';

/**
 * Gives each uncensored terrace its density at the device's bias and chooses the reference by them.
 *
 * - No known layer count: a terrace's thickness follows from its own current.
 * - The ladder's first terrace counted (`firstLayers`): every terrace's count follows from its place on the ladder.
 * - `barrier.referenceLayers` = N: by definition the reference has N layers, so every terrace's count depends on which one is the reference. Each terrace
 *   is tried as the one with N layers, the others lying whole ladder steps from it; it stands when under this very reading it is the reference (the largest
 *   terrace whose density reaches the range). Of readings that stand the one with the largest terrace is taken. If none stands, N is taken as the
 *   count of the most common terrace, which then is the reference; a terrace that its reading would prefer is kept as `outranking`.
 *
 * All densities returned, and so all remarks, belong to the one reading that was taken.
 *
 * @param plain terraces without densities; @param biasV device bias, absent when it is to be proposed: then no densities.
 * @returns `choice` undefined where there is no reference.
 */
export function chooseAnchored(plain: readonly Candidate[], rule: ReferenceRule, anchor: Anchor | undefined, biasV: number | undefined): ReferenceChoice | undefined {
  const common = chooseReference(plain, rule);
  if (!anchor || biasV === undefined || !common) return common;
  const { knownLayers: known, firstLayers } = anchor;
  if (firstLayers !== undefined) return chooseReference(plain.map((candidate) => withDensity(candidate, anchor, biasV, layersAt(firstLayers, candidate.step))), rule);
  if (known === undefined) return chooseReference(plain.map((candidate) => withDensity(candidate, anchor, biasV, undefined)), rule);

  const reading = (held: Candidate): ReferenceChoice =>
    chooseReference(plain.map((candidate) => withDensity(candidate, anchor, biasV, layersAt(known, candidate.step - held.step))), rule)!;
  for (const held of [...plain].sort((a, b) => b.areaM2 - a.areaM2)) {
    if (held.bound !== 'exact') continue;
    const choice = reading(held);
    if (choice.chosen.step === held.step && choice.reaches === true) return choice;
  }
  const choice = reading(common.chosen);
  if (choice.chosen.step === common.chosen.step) return choice;
  const chosen = withDensity(common.chosen, anchor, biasV, known);
  return { ...common, chosen, ...(chosen.density ? { inRange: false, reaches: false } : {}), outranking: choice.chosen };
}

function withDensity(candidate: Candidate, anchor: Anchor, biasV: number, layers: number | undefined): Candidate {
  const density = candidate.bound === 'exact' ? anchor.density(10 ** candidate.medianLog10, biasV, layers) : undefined;
  return density ? { ...candidate, density } : candidate;
}
