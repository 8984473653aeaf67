/** Sentences about corrections by hand. */
export const correctionSentences = {
  'correction-idle': (d: { number: number; what: string; xUm: number; yUm: number; why: keyof typeof whys }) =>
    `Correction ${d.number} (${d.what}) ${whys[d.why]} and changes nothing; take it out of the recipe's corrections, or set it anew.`,
};

const whys = {
  'no-flaw': 'meets no flaw',
  'too-few': 'meets fewer than two flaws',
  'not-parted': 'goes right across no flaw',
  'no-ground': 'covers no pixel of the footprint',
} as const;
