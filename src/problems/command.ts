/** Sentences about the command line. */
export const commandSentences = {
  'command-unknown': (d: { command: string; known: string }) => `"${d.command}" is not a command; choose one of ${d.known}.`,
  'command-surplus': (d: { command: string; surplus: string }) => `${d.command} takes no argument "${d.surplus}"; see "evenglow ${d.command} --help".`,
  'option-number': (d: { option: string; value: string }) => `${d.option}: "${d.value}" is not a number.`,
  'option-absent': (d: { command: string; option: string }) => `${d.command} needs ${d.option}; see "evenglow ${d.command} --help".`,
  'option-conflict': (d: { command: string; first: string; second: string }) => `${d.command}: ${d.first} and ${d.second} exclude each other; give one.`,
  'option-value': (d: { option: string; value: string; expected: string }) => `${d.option}: "${d.value}" is not ${d.expected}.`,
  'input-absent': (d: { path: string }) => `${d.path}: there is no such file or folder.`,
  'input-unreadable': (d: { path: string; reason: string }) => `${d.path} cannot be read (${d.reason}).`,
  'input-none': (d: { path: string }) => `${d.path} holds no map that Evenglow reads; see "evenglow appraise --help" for how files are named.`,
  'output-unwritable': (d: { path: string; reason: string }) => `${d.path} cannot be written (${d.reason}); choose another folder with --out.`,
  'demo-differs': (d: { path: string; others: number }) =>
    `${d.path} is there already and differs${d.others > 0 ? `, and so ${d.others === 1 ? 'does 1 more file' : `do ${d.others} more files`}` : ''}, so nothing was written; choose another folder, or replace with --force.`,
  'demo-unwritable': (d: { path: string; reason: string }) => `${d.path} cannot be written (${d.reason}); choose another folder.`,
};
