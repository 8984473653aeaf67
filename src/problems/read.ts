/** Sentences about files, units, sizes and pairing. */
export const readSentences = {
  'file-unrecognised': (d: { file: string }) => `${d.file} is not a format Evenglow reads.`,
};
