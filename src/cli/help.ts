/** Help texts, laid out from the commands' own declarations. */
import type { Command } from './command.ts';

/** The overview: what the program does and its commands. */
export function overview(commands: readonly Command[]): string {
  const width = Math.max(...commands.map((command) => command.name.length));
  return [
    'Evenglow turns height and current maps of a thin tunnel barrier into an area ledger:',
    'how much of the stack can glow evenly, what is in the way, and what to do next.',
    '',
    'Usage: evenglow <command> …',
    '',
    ...commands.map((command) => `  ${command.name.padEnd(width)}  ${command.summary}`),
    '',
    '"evenglow <command> --help" explains a command. All work stays on this computer.',
    '',
  ].join('\n');
}

/** The help of one command. */
export function helpOf(command: Command): string {
  const options = Object.entries(command.optionText);
  const width = Math.max(0, ...options.map(([option]) => option.length));
  return [
    command.summary,
    '',
    ...command.usage.map((line, k) => `${k === 0 ? 'Usage: ' : '       '}${line}`),
    '',
    ...options.flatMap(([option, text]) => wrapped(text, 96 - width).map((line, k) => `  ${(k === 0 ? option : '').padEnd(width)}  ${line}`)),
    ...command.notes.flatMap((note) => ['', ...wrapped(note, 100)]),
    '',
  ].join('\n');
}

function wrapped(text: string, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    if (line !== '' && line.length + 1 + word.length > width) {
      lines.push(line);
      line = word;
    } else {
      line = line === '' ? word : `${line} ${word}`;
    }
  }
  return [...lines, line];
}
