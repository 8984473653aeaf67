/** Sentences about the command line. */
export const commandSentences = {
  'command-unknown': (d: { command: string; known: string }) => `"${d.command}" is not a command; choose one of ${d.known}.`,
};
