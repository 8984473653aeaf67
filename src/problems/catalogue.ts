import { appraisalSentences } from './appraisal.ts';
import { barrierSentences } from './barrier.ts';
import { commandSentences } from './command.ts';
import { correctionSentences } from './corrections.ts';
import { groundSentences } from './ground.ts';
import { readSentences } from './read.ts';
import { recipeSentences } from './recipe.ts';
import { sheetSentences } from './sheet.ts';

/** Code → sentence from its typed detail. One file per part of the chain; codes are unique across all. */
export const catalogue = {
  ...readSentences,
  ...recipeSentences,
  ...appraisalSentences,
  ...groundSentences,
  ...correctionSentences,
  ...barrierSentences,
  ...sheetSentences,
  ...commandSentences,
} as const;
