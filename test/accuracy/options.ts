/** The options of `npm run accuracy`. */
import { availableParallelism } from 'node:os';
import { parseArgs } from 'node:util';
import { kindOf } from './paint-kinds.ts';

export const usage = `npm run accuracy [-- OPTIONS]
  --quick        a tenth of the scenes
  --kind NAME    scenes of one kind only
  --scenes N     so many scenes of each kind
  --seed N       another set of scenes (default 8128); "fresh" draws one
  --shared       the scenes beside the project instead of painted ones
  --worst        then every scene with its confusion counts, the worst first
  --jobs N       threads (default 2)`;

export const defaultSeed = '8128';

export interface Options {
  readonly quick: boolean;
  readonly kind?: string;
  readonly scenes?: number;
  readonly seed: string;
  readonly shared: boolean;
  readonly worst: boolean;
  readonly jobs: number;
}

/** @throws Error with a sentence for a wrong option. */
export function readOptions(args: readonly string[]): Options | undefined {
  const { values } = parseArgs({ args: [...args], options: {
    quick: { type: 'boolean', default: false }, kind: { type: 'string' }, scenes: { type: 'string' }, seed: { type: 'string', default: defaultSeed },
    shared: { type: 'boolean', default: false }, worst: { type: 'boolean', default: false }, jobs: { type: 'string' }, help: { type: 'boolean', default: false },
  } });
  if (values.help) return undefined;
  if (values.kind !== undefined && values.kind !== 'interval') kindOf(values.kind);
  return {
    quick: values.quick, shared: values.shared, worst: values.worst,
    ...(values.kind === undefined ? {} : { kind: values.kind }),
    ...(values.scenes === undefined ? {} : { scenes: wholeNumber('scenes', values.scenes) }),
    seed: values.seed === 'fresh' ? String(Date.now()) : values.seed,
    jobs: values.jobs === undefined ? Math.min(2, availableParallelism()) : wholeNumber('jobs', values.jobs),
  };
}

function wholeNumber(name: string, text: string): number {
  const value = Number(text);
  if (!Number.isInteger(value) || value < 1) throw new RangeError(`--${name} ${text} is not a whole number from 1 on`);
  return value;
}
