/** Sentences about tunnelling models and thickness. */
export const barrierSentences = {
  'barrier-argument': (d: { name: string; value: string; reason: string }) => `${d.name}: ${d.value} ${d.reason}.`,
};
