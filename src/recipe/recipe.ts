/**
 * The recipe: a small, versioned, plain JSON document. Everything shown is computed from
 * (source bytes, recipe). Each stage owns its section; this file only assembles them.
 */
import { z } from 'zod';
import { barrierSection } from '../barrier/recipe.ts';
import { correctionList, flawsSection } from '../flaws/recipe.ts';
import { groundSection } from '../ground/recipe.ts';
import { bandSection } from '../ledger/recipe.ts';
import { planSection } from '../plan/recipe.ts';
import { scanSection } from '../read/recipe.ts';
import { stackSection } from '../sheet/recipe.ts';

export const recipeFormat = 'evenglow-recipe';
export const recipeVersion = 1;

export const sections = {
  scan: scanSection,
  ground: groundSection,
  flaws: flawsSection,
  barrier: barrierSection,
  stack: stackSection,
  band: bandSection,
  plan: planSection,
} as const;

export const recipeSchema = z.strictObject({
  format: z.literal(recipeFormat),
  version: z.literal(recipeVersion),
  scan: scanSection.prefault({}),
  ground: groundSection.prefault({}),
  flaws: flawsSection.prefault({}),
  barrier: barrierSection.prefault({}),
  stack: stackSection.prefault({}),
  band: bandSection.prefault({}),
  plan: planSection.prefault({}),
  corrections: correctionList.default([]),
});

export type Recipe = z.output<typeof recipeSchema>;
