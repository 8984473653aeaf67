/** Sentences about maps and what can be concluded from them. */
export const appraisalSentences = {
  'map-all-missing': (d: { file: string; quantity: string }) => `${d.file}: every ${d.quantity} value is missing; export the channel again.`,
};
