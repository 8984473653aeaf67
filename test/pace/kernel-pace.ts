/** Each kernel against its plain-TypeScript twin, through the function that the chain calls: copies in and out included. */
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { ensureKernels, kernelsFile } from '../../src/cli/setup/kernels.mjs';
import { projectRoot, say } from '../../src/cli/setup/set-up.mjs';
import type { Appraisal } from '../../src/evaluate/appraisal.ts';
import { evaluate } from '../../src/evaluate/evaluate.ts';
import { dilate, nearestAdmitted, riseAboveGround } from '../../src/flaws/local-ground.ts';
import { squaredDistance } from '../../src/grid/distance.ts';
import { labelComponents } from '../../src/grid/label-components.ts';
import { greyOpening } from '../../src/grid/opening.ts';
import { fitForm } from '../../src/ground/fit-form.ts';
import { subtractForm } from '../../src/ground/form.ts';
import { lineDifferencesSolved } from '../../src/ground/lines.ts';
import { compileKernels, installKernels, removeKernels } from '../../src/kernels/installed.ts';
import { causes } from '../../src/ledger/ledger.ts';
import type { InputFile } from '../../src/read/input.ts';
import { groupInputs } from '../../src/read/pairing.ts';
import { readSample } from '../../src/read/read-sample.ts';
import { sha256 } from '../../src/read/sha256.ts';
import { checkRecipe, defaultRecipe } from '../../src/recipe/parse-recipe.ts';
import { drawPicture } from '../../workers/picture.ts';
import { timed, timesOf } from './times.ts';
import type { Times } from './times.ts';

/** A kernel that gains less than this end to end is not worth a second version of the same thing. */
export const leastGain = 1.3;

export interface KernelPace {
  readonly name: string;
  readonly plain: Times;
  readonly kernel: Times;
  /** Of the shortest times. */
  readonly gain: number;
}

const warmUps = 3;

/** Times every kernel on one scan's own maps, plain and kernel in turns `repeats` times, so that both meet the same moods of the machine; last the whole chain, a third as often. */
export async function kernelPace(files: readonly InputFile[], repeats: number): Promise<KernelPace[]> {
  ensureKernels(projectRoot, say);
  const compiled = await compileKernels(await readFile(join(projectRoot, kernelsFile)));
  const [group] = groupInputs(files.map(({ name }) => ({ name }))).samples;
  if (!group) throw new Error('the painted files make no sample');
  const recipe = checkRecipe({ ...defaultRecipe(), stack: { biasV: 4 } });
  const sample = await readSample(group, files, recipe.scan, sha256);
  const appraise = (): Appraisal => evaluate(sample, recipe);
  const work = [...partsOf(appraise()).map((part) => [...part, repeats] as const), ['the chain from ground to ledger', appraise, Math.ceil(repeats / 3)] as const];
  try {
    return work.map(([name, run, times]) => {
      const ms: { plain: number[]; kernel: number[] } = { plain: [], kernel: [] };
      for (let repeat = -warmUps; repeat < times; repeat++) {
        removeKernels();
        const plain = timed(() => void run());
        installKernels(compiled);
        const kernel = timed(() => void run());
        if (repeat < 0) continue;
        ms.plain.push(plain);
        ms.kernel.push(kernel);
      }
      const [plain, kernel] = [timesOf(ms.plain), timesOf(ms.kernel)];
      return { name, plain, kernel, gain: plain.minMs / kernel.minMs };
    });
  } finally {
    installKernels(compiled);
  }
}

/** The calls of the chain that a kernel serves, on maps such as the chain gives them. */
function partsOf(appraisal: Appraisal): (readonly [name: string, run: () => unknown])[] {
  const { sample: { grid }, ground: { height, current }, flaws, ledger } = appraisal;
  if (!height || !current) throw new Error('the painted scan lacks a map');
  const { columns, rows, pitchXM: pitchX, pitchYM: pitchY } = grid;
  const levelled = height.levelled.data;
  const log10 = current.log10.data;
  const flawed = flaws.labels.data;
  const usable = causes.indexOf('usable');
  const flawMask = Uint8Array.from(flawed, (label) => (label > 0 ? 1 : 0));
  const groundMask = flawMask.map((flaw) => 1 - flaw);
  const usableMask = ledger.codes.data.map((code) => (code === usable ? 1 : 0));
  // As wide as a spot that is still a short, see flaws/find-spots.ts.
  const window = 2 * Math.ceil(Math.sqrt(0.02e-12 / (pitchX * pitchY)) / 2) + 3;
  const form = fitForm(levelled, columns, rows, 2, () => true);
  const floorLog = Math.log10(current.floorA);
  const picture = { id: '', map: 'height', left: 0, top: 0, columns, rows, width: columns, height: rows, pixelRatio: 1, low: -1, high: 20, log: false, causes: 'none' } as const;
  return [
    ['form subtracted', () => subtractForm(levelled, form, columns, rows)],
    ['line medians, height', () => lineDifferencesSolved(levelled, columns, rows, (i) => Math.abs(levelled[i]!) < 1e-9)],
    ['line medians, current', () => lineDifferencesSolved(log10, columns, rows, (i) => log10[i]! > floorLog, 0.15)],
    ['rise above ground', () => riseAboveGround(levelled, columns, rows, 1e-9)],
    ['opening', () => greyOpening(log10, columns, rows, window, window)],
    ['growing a mask', () => dilate(flawMask, columns, rows, 3)],
    ['nearest ground', () => nearestAdmitted(groundMask, columns, rows)],
    ['labels of flaws', () => labelComponents(flawMask, columns, rows, 8)],
    ['labels of usable ground', () => labelComponents(usableMask, columns, rows, 4)],
    ['distances in flaws', () => squaredDistance(flawMask, columns, rows, { pitchX, pitchY })],
    ['distances in usable ground', () => squaredDistance(usableMask, columns, rows, { pitchX, pitchY, outsideIsBackground: true })],
    ['colours of a picture', () => drawPicture(appraisal, picture)],
  ];
}
