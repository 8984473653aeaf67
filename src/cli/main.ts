/** The command line: finds the command, turns problems into sentences and exit codes. */
import { parseArgs } from 'node:util';
import { Problem } from '../problems/problem.ts';
import { thisApp } from './app.ts';
import { appraiseCommand } from './appraise-command.ts';
import { barrierCommand } from './barrier-command.ts';
import type { Command } from './command.ts';
import { exitCodes, isUsageError } from './command.ts';
import { demoCommand } from './demo-command.ts';
import { helpOf, overview } from './help.ts';
import { ivCommand } from './iv-command.ts';
import { loadKernels } from './load-kernels.ts';
import type { Output } from './output.ts';
import { recipeCommand } from './recipe-command.ts';

export const commands: readonly Command[] = [appraiseCommand, barrierCommand, ivCommand, recipeCommand, demoCommand];

const processOutput: Output = {
  out: (text) => void process.stdout.write(text),
  err: (text) => void process.stderr.write(text),
  terminal: process.stderr.isTTY === true,
};

/**
 * Runs one command.
 *
 * @param argv arguments after the program's name.
 * @returns exit code: 0 good; 2 command line or recipe wrong; 3 some samples failed; 130 interrupted. A bug is thrown and becomes 70 in the launcher.
 */
export async function main(argv: readonly string[], output: Output = processOutput): Promise<number> {
  const [name, ...rest] = argv;
  if (name === undefined || name === '--help' || name === '-h' || name === 'help') {
    output.out(overview(commands));
    return name === undefined ? exitCodes.usage : exitCodes.good;
  }
  if (name === '--version') {
    output.out(`${thisApp().version}\n`);
    return exitCodes.good;
  }
  try {
    const command = commands.find((known) => known.name === name);
    if (!command) throw new Problem('command-unknown', { command: name, known: commands.map((known) => known.name).join(', ') });
    if (rest.includes('--help') || rest.includes('-h')) {
      output.out(helpOf(command));
      return exitCodes.good;
    }
    const { values, positionals } = parseArgs({ args: withNegatives(rest, command.options), options: command.options, allowPositionals: true, strict: true });
    await loadKernels();
    return await command.run({ values: values as Record<string, unknown>, positionals }, output);
  } catch (error) {
    if (error instanceof Problem) {
      output.err(`evenglow: ${error.message}\n`);
      return exitCodes.usage;
    }
    if (isUsageError(error)) {
      output.err(`evenglow ${name}: ${error.message.split(/[.\n]/)[0]}; see "evenglow ${name} --help".\n`);
      return exitCodes.usage;
    }
    throw error;
  }
}

/** `--bias-v -4` as a person writes it; the parser takes a value with a dash only as `--bias-v=-4`. */
function withNegatives(args: readonly string[], options: Command['options']): string[] {
  const out: string[] = [];
  for (const arg of args) {
    const last = out[out.length - 1];
    const takesValue = last?.startsWith('--') === true && options[last.slice(2)]?.type === 'string';
    if (takesValue && /^-[.\d]/.test(arg)) out[out.length - 1] = `${last}=${arg}`;
    else out.push(arg);
  }
  return out;
}
