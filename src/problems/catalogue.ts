import { appraisalSentences } from './appraisal.ts';
import { barrierSentences } from './barrier.ts';
import { commandSentences } from './command.ts';
import { correctionSentences } from './corrections.ts';
import { groundSentences } from './ground.ts';
import { ivSentences } from './iv.ts';
import { readSentences } from './read.ts';
import { recipeSentences } from './recipe.ts';
import { sheetSentences } from './sheet.ts';
import { thicknessSentences } from './thickness.ts';

/** Code → sentence from its typed detail. One file per part of the chain; codes are unique across all. */
export const catalogue = {
  ...readSentences,
  ...recipeSentences,
  ...appraisalSentences,
  ...groundSentences,
  ...correctionSentences,
  ...barrierSentences,
  ...sheetSentences,
  ...ivSentences,
  ...thicknessSentences,
  ...commandSentences,
} as const;
