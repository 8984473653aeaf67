/** Sentences about outlines, contacts and voltage drop. */
export const sheetSentences = {
  'sheet-not-converged': (d: { residual: string; iterations: number }) =>
    `The voltage drop did not settle (residual ${d.residual} after ${d.iterations} steps); starved ground is not assessed.`,
};
