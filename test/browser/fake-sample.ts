/** A small invented sample and a computation that answers from it at once, or when told to. */
import type { Compute, ComputeFacts, CutRequest, FlawEntry, HistogramRequest, LedgerEntry, MapInfo, Picture, PictureRequest, PointValues, PreviewRequest, SampleSummary } from '../../workers/api.ts';
import { factsOf } from '../../workers/facts.ts';
import type { SampleState } from '../../web/session/state.ts';

export const facts: ComputeFacts = factsOf({ name: 'evenglow', version: 'test' });

const areas: readonly (readonly [code: number, cause: string, areaUm2: number])[] = [
  [1, 'usable', 40.7], [2, 'unmeasured', 0], [3, 'bubble', 3.2], [4, 'residue', 1.1], [5, 'wrinkle', 1.9], [6, 'short', 0.01], [7, 'open', 0], [8, 'thin', 25], [9, 'thick', 27.6],
  [10, 'starved', 0], [11, 'rim', 0.49], [12, 'stray', 0],
];

export const ledger: readonly LedgerEntry[] = areas.map(([code, cause, areaUm2]) => ({ code, cause, areaUm2, pixels: Math.round(areaUm2 * 400), share: areaUm2 / 100, assessed: code !== 10 }));

export const flaws: readonly FlawEntry[] = [
  { flaw: 1, cause: 'bubble', confidence: 0.97, reason: 'smooth dome, h/R 0.13, no current: bubble', xUm: 2, yUm: 7, areaUm2: 0.42, diameterUm: 0.73, peakNm: 48, heightToRadius: 0.13 },
  { flaw: 2, cause: 'residue', confidence: 0.75, reason: 'flat, rough edge: residue', xUm: 8, yUm: 3, areaUm2: 0.9, diameterUm: 1.07, peakNm: 2.2, heightToRadius: 0.004 },
  { flaw: 3, cause: 'short', confidence: 0.55, reason: 'saturated spot: short', xUm: 5, yUm: 5, areaUm2: 0.001, diameterUm: 0.03 },
];

const map = (name: MapInfo['name'], unit: string, low: number, high: number, log = false): MapInfo => ({ name, unit, low, high, least: low - Math.abs(low) * 0.5, most: high * 1.5, log });

export const summary: SampleSummary = {
  id: 's1', name: 'flake 04', verdict: '40.7 µm² (95 %: 37.9–43.2) of 100 µm² is even barrier, within a factor of 3 at 4 V; an upper bound, as a bare barrier was scanned.',
  surface: 'barrier', columns: 200, rows: 200, widthUm: 10, heightUm: 10, footprintUm2: 100, ledger,
  usable: { areaUm2: 40.7, share: 0.407, low95Um2: 37.9, high95Um2: 43.2, largestPatchUm2: 22.4, knownToGlow: true, meaning: 'usable' },
  repairedUm2: 0, height: { noiseNm: 0.08, tiltNm: 38, repairedPixels: 7, levels: { formFrom: 'ground', order: 2, tiltNm: 37, bowNm: 2.1, lineRmsNm: 0.12, lineMostNm: 0.4, planesNm: [0, 0.333, 0.666], gapNm: 0.333 } },
  thresholds: { heightNm: 0.8, heightRuledBy: 'height', heightNoiseNm: 0.08, heightOverNoise: 10, dropDecades: 0.5, layerDecades: 0.8, layerFrom: 'map', dropLayers: 0.625, currentNoiseDecades: 0.05, dropOverNoise: 10 },
  current: { unit: 'A', biasV: 5.9, offsetA: 0, noiseA: 3e-14, floorA: 9e-14, saturatedPixels: 4, repairedPixels: 5, wearDecades: 0.28, wearTold: true, driftDecades: 0.28, driftSeDecades: 0.03, offsetFrom: 'blocked', offsetSeA: 1e-16, floorSeA: 3e-16, lagPx: 0 },
  ladder: { stepDecades: 0.8, stepSeDecades: 0.02, from: 'map', rungs: [
    { step: -1, layers: 11, areaUm2: 25, medianLog10: -9.2, bound: 'exact' }, { step: 0, layers: 12, areaUm2: 41, medianLog10: -10, bound: 'exact' },
    { step: 1, layers: 13, areaUm2: 20, medianLog10: -10.8, bound: 'exact' }, { step: 3, layers: 15, areaUm2: 7, medianLog10: -12.9, bound: 'at-least' } ] },
  reference: { layers: 12, thicknessNm: 4, medianA: 1e-10, areaUm2: 41, shareOfUnflawed: 0.45 },
  device: { biasV: 4, proposed: false, medianNaPerUm2: 6.3, low95NaPerUm2: 0.9, high95NaPerUm2: 40 },
  shorts: { seen: 6, expectedMissed: 19, crossedShare: 0.24 }, flaws, corrections: [],
  maps: [map('height', 'nm', -1, 20), map('current', 'A', 1e-12, 1e-9, true), { ...map('layers', '', 11, 15), least: 11, most: 15 }, map('thickness', 'nm', 3.7, 5), map('glow', '', 0, 2), map('rawHeight', 'nm', 300, 340), map('rawCurrent', 'A', 1e-12, 1e-9, true)],
  remarks: [{ code: 'a', message: 'First remark.' }, { code: 'b', message: 'Second remark.' }],
  recipe: { format: 'evenglow-recipe', version: 1, band: { factor: 3 } }, sources: [{ name: 'flake04.height.tif', sha256: '', bytes: 1 }], timings: {},
};

export function sampleState(more: Partial<SampleState> = {}): SampleState {
  return { id: 's1', name: 'flake 04', files: ['flake04.height.tif'], status: 'ready', summary, history: [{ recipe: { format: 'evenglow-recipe', version: 1 }, label: '' }], at: 0, run: 1, ...more };
}

export interface FakeCompute extends Compute {
  readonly pictures: PictureRequest[];
  readonly cuts: CutRequest[];
  readonly histograms: HistogramRequest[];
  readonly previews: PreviewRequest[];
  /** While true, quick looks wait for `answerPreview`. */
  holdPreviews: boolean;
  /** Answers the quick look that waits. */
  answerPreview(): void;
  /** While true, pictures wait for `answer`. */
  hold: boolean;
  /** Answers the picture that waits. */
  answer(): void;
}

/** Its pictures are red left of the map's middle and blue right of it. Flaw 1 covers the map left of 3 µm. */
export function fakeCompute(): FakeCompute {
  let release: (() => void) | undefined;
  let releasePreview: (() => void) | undefined;
  const unused = () => Promise.reject(new Error('not part of this test'));
  const compute: FakeCompute = {
    pictures: [], cuts: [], histograms: [], previews: [], hold: false, holdPreviews: false,
    answerPreview: () => { releasePreview?.(); },
    preview: async (request) => {
      compute.previews.push(request);
      if (compute.holdPreviews) await new Promise<void>((resolve) => { releasePreview = resolve; });
      const height = Number((request.recipe['flaws'] as Record<string, unknown> | undefined)?.['heightNm'] ?? 0.8);
      return {
        everyPx: 2, usableUm2: 40 + height, flaws: { bubble: 1, residue: 2, wrinkle: 0, short: 0, open: 0 },
        ledger: ledger.map((entry) => (entry.cause === 'usable' ? { ...entry, areaUm2: 40 + height } : entry)),
        ...(request.picture ? { picture: halves(request.picture) } : {}),
      };
    },
    answer: () => { release?.(); },
    facts: async () => facts, open: unused, openDemo: unused, close: async () => undefined, appraise: unused, abort: async () => undefined, resultNames: unused, resultFile: unused,
    picture: async (request) => {
      compute.pictures.push(request);
      if (compute.hold) await new Promise<void>((resolve) => { release = resolve; });
      return halves(request);
    },
    point: async (_id, xUm, yUm): Promise<PointValues> => ({
      xUm, yUm, column: Math.floor(xUm * 20), row: 199 - Math.floor(yUm * 20), values: { height: 3.41, current: 1.18e-10, layers: 12, thickness: 4 }, cause: xUm < 3 ? 'bubble' : 'usable',
      saturated: false, atFloor: xUm < 3, repaired: false, ...(xUm < 3 ? { flaw: flaws[0]! } : {}),
    }),
    cut: async (request) => {
      compute.cuts.push(request);
      return Float32Array.from({ length: request.points }, (_, i) => (i < 10 ? Number.NaN : 1e-10 * (1 + i / request.points)));
    },
    histogram: async (request) => {
      compute.histograms.push(request);
      return Uint32Array.from({ length: request.bins }, (_, i) => i);
    },
  };
  return compute;
}

function halves({ left, columns, width, height }: PictureRequest): Picture {
  const rgba = new Uint8ClampedArray(width * height * 4);
  for (let i = 0; i < width * height; i++) {
    const column = left + (((i % width) + 0.5) * columns) / width;
    rgba.set(column < 100 ? [255, 0, 0, 255] : [0, 0, 255, 255], 4 * i);
  }
  return { width, height, rgba };
}

/** Puts an element on the page in a box of the given size and waits until it has drawn. */
export async function mount<Element extends HTMLElement>(element: Element, width: number, height?: number): Promise<Element> {
  const box = document.createElement('div');
  box.className = 'mounted';
  box.style.setProperty('width', `${width}px`);
  if (height !== undefined) {
    box.style.setProperty('height', `${height}px`);
    element.style.setProperty('height', '100%');
  }
  box.append(element);
  document.body.append(box);
  await settled();
  return element;
}

export function unmountAll(): void {
  document.querySelectorAll('.mounted').forEach((box) => { box.remove(); });
}

/** Updates and answers have had their turn; frames are not waited for, as a page in the background draws none. */
export async function settled(): Promise<void> {
  for (let i = 0; i < 4; i++) await new Promise<void>((resolve) => { setTimeout(resolve, 5); });
}
