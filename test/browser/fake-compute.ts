/** A computation for the page's tests: it answers when the test says so, and remembers what it was asked. */
import type { Compute, ComputeFacts, OpenReply, OnStage, PictureRequest, RecipeData, SampleSummary } from '../../workers/api.ts';
import { ComputeError } from '../../workers/api.ts';

/** One call of `appraise` that waits for its answer. */
export interface Asked {
  readonly run: number;
  readonly id: string;
  readonly recipe: RecipeData;
  readonly onStage: OnStage | undefined;
  readonly answer: (summary: SampleSummary) => void;
  readonly fail: (code: string, detail?: unknown) => void;
}

export class FakeCompute implements Compute {
  readonly asked: Asked[] = [];
  readonly aborted: number[] = [];
  readonly closed: string[] = [];
  readonly pictures: PictureRequest[] = [];
  readonly opened: (readonly string[])[] = [];
  reply: OpenReply = { samples: [], skipped: [], failed: [] };

  async facts(): Promise<ComputeFacts> {
    return createFacts();
  }

  async open(files: readonly { readonly name: string }[]): Promise<OpenReply> {
    this.opened.push(files.map(({ name }) => name));
    return this.reply;
  }

  async openDemo(): Promise<OpenReply> {
    return this.reply;
  }

  async close(id: string): Promise<void> {
    this.closed.push(id);
  }

  appraise(run: number, id: string, recipe: RecipeData, onStage?: OnStage): Promise<SampleSummary> {
    return new Promise((resolve, reject) => {
      this.asked.push({
        run, id, recipe, onStage, answer: resolve,
        fail: (code, detail) => { reject(new ComputeError(code, `it failed with ${code}.`, detail)); },
      });
    });
  }

  async abort(run: number): Promise<void> {
    this.aborted.push(run);
  }

  async picture(request: PictureRequest) {
    this.pictures.push(request);
    const { width, height } = request;
    return { width, height, rgba: new Uint8ClampedArray(4 * width * height).fill(200) };
  }

  async preview(): Promise<never> { throw new ComputeError('not-here', 'The test asks for no quick look.'); }
  async point(): Promise<never> { throw new ComputeError('not-here', 'The test asks for no point.'); }
  async cut(): Promise<never> { throw new ComputeError('not-here', 'The test asks for no cut.'); }
  async histogram(): Promise<never> { throw new ComputeError('not-here', 'The test asks for no histogram.'); }
  async resultNames(): Promise<readonly string[]> { return []; }
  async resultFile(): Promise<never> { throw new ComputeError('not-here', 'The test asks for no file.'); }

  /** The newest call for a sample. */
  last(id: string): Asked {
    const found = this.asked.filter((asked) => asked.id === id).at(-1);
    if (found === undefined) throw new Error(`${id} was not appraised`);
    return found;
  }
}

/** Lets everything happen that waits for nothing but its turn. */
export function settle(): Promise<void> {
  return new Promise((resolve) => { setTimeout(resolve); });
}

export function createFacts(): ComputeFacts {
  return {
    app: { name: 'evenglow', version: '0.0.0' }, defaultRecipe: {}, scale: ['#000000', '#ffffff'], hatchPeriod: 8, kernels: false,
    causes: [{ code: 1, cause: 'usable', fill: '#ffb454', ink: '#ffb454', hatch: 'none', hatchPath: '', hatchStroke: 0 }, { code: 9, cause: 'thick', fill: '#0072b2', ink: '#7cc0ea', hatch: 'diagonal', hatchPath: 'M0 0L8 8', hatchStroke: 1.5 }],
    fields: [
      { path: 'scan.channel', kind: 'choice', title: 'Channel', description: 'Role.', choices: ['height', 'current'] },
      { path: 'scan.widthUm', kind: 'number', title: 'Width', description: 'Full width.', unit: 'µm' },
      { path: 'scan.heightUm', kind: 'number', title: 'Height', description: 'Full height.', unit: 'µm', absent: 'square pixels' },
      { path: 'scan.heightUnit', kind: 'choice', title: 'Height unit', description: 'Unit.', choices: ['nm', 'um'] },
      { path: 'scan.currentUnit', kind: 'choice', title: 'Current unit', description: 'Unit.', choices: ['nA', 'relative'] },
      { path: 'scan.biasV', kind: 'number', title: 'Scan bias', description: 'Bias.', unit: 'V', min: -100, max: 100, absent: 'no thickness' },
    ],
  };
}

export function createSummary(id: string, usable: Partial<SampleSummary['usable']> = {}): SampleSummary {
  const areaUm2 = usable.areaUm2 ?? 40;
  return {
    id, name: id, verdict: '', surface: 'barrier', columns: 64, rows: 32, widthUm: 10, heightUm: 5, footprintUm2: 50, repairedUm2: 0,
    ledger: [{ code: 1, cause: 'usable', areaUm2, pixels: 10, share: areaUm2 / 50, assessed: true }, { code: 9, cause: 'thick', areaUm2: 50 - areaUm2, pixels: 10, share: 1 - areaUm2 / 50, assessed: true }],
    usable: { areaUm2, share: areaUm2 / 50, low95Um2: areaUm2 - 1, high95Um2: areaUm2 + 1, largestPatchUm2: areaUm2 / 2, knownToGlow: true, meaning: 'usable', ...usable },
    shorts: { seen: 0, expectedMissed: 0, crossedShare: 0.2 }, flaws: [], corrections: [], recipe: {}, sources: [], timings: {},
    maps: [{ name: 'height', unit: 'nm', low: 0, high: 5, least: -1, most: 9, log: false }, { name: 'current', unit: 'A', low: 1e-12, high: 1e-9, least: 0, most: 1e-8, log: true }],
    remarks: [{ code: 'a', message: 'A runner-up is close.' }],
  };
}
