/**
 * What the page may ask of the computation, declared apart from how it is done. Everything here is plain data that survives a worker's wire; the
 * page never holds a map: it asks for pictures, the values under a point, a cut, a histogram.
 *
 * Errors arrive as `ComputeError` with the code and detail of the problem. Lengths and areas carry their unit in the name.
 */
import type { FlawCause, FlawEntry, LedgerEntry, MapName, RecipeData, SampleSummary, ThresholdsInForce } from './api-summary.ts';

export * from './api-summary.ts';

/** A file on offer: its bytes, or a browser's File, which the worker reads itself. */
export interface SourceFile {
  readonly name: string;
  readonly content: Uint8Array<ArrayBuffer> | Blob;
}

/** What can be told about an input before it is appraised. */
export interface OpenedSample {
  /** Stable for one session; files of the same names open as new samples. */
  readonly id: string;
  readonly name: string;
  /** Names of the files that make it up. */
  readonly files: readonly string[];
}

export interface OpenReply {
  readonly samples: readonly OpenedSample[];
  readonly skipped: readonly { readonly name: string; readonly reason: string }[];
  readonly failed: readonly { readonly name: string; readonly message: string }[];
}

/** Part of a map in pixels (fractions allowed), drawn into a picture of `width` × `height`. */
export interface PictureRequest {
  readonly id: string;
  readonly map: MapName;
  readonly left: number;
  readonly top: number;
  readonly columns: number;
  readonly rows: number;
  readonly width: number;
  readonly height: number;
  readonly low: number;
  readonly high: number;
  readonly log: boolean;
  /** Draw the causes over the map: all but usable, or only the named codes (the rest of the map is dimmed then). */
  readonly causes: 'none' | 'all' | readonly number[];
  /** Outline one flaw. */
  readonly flaw?: number;
  /** Mark the pixels that were repaired in the map. */
  readonly repaired?: boolean;
  /** Size of a hatch's line in picture pixels: the screen's pixel ratio. */
  readonly pixelRatio: number;
}

/** RGBA, row-major, row 0 at the top. */
export interface Picture {
  readonly width: number;
  readonly height: number;
  readonly rgba: Uint8ClampedArray<ArrayBuffer>;
}

/** A recipe to be looked at while a handle moves. Its sections `scan` and `ground` do not count: the ground is that of the last appraisal. */
export interface PreviewRequest {
  readonly id: string;
  readonly recipe: RecipeData;
  /** The part of the map on show. */
  readonly picture?: PictureRequest;
}

/** Near what the recipe would give: the result on show, moved by what a look at every `everyPx`-th pixel in each direction shows otherwise than the same look at the recipe in force; not to be kept. */
export interface Preview {
  readonly everyPx: number;
  readonly ledger: readonly LedgerEntry[];
  readonly usableUm2: number;
  readonly flaws: Readonly<Record<FlawCause, number>>;
  readonly thresholds?: ThresholdsInForce;
  readonly picture?: Picture;
}

export interface PointValues {
  readonly xUm: number;
  readonly yUm: number;
  readonly column: number;
  readonly row: number;
  /** Value per map, absent where missing. */
  readonly values: Readonly<Partial<Record<MapName, number>>>;
  readonly cause: string;
  readonly saturated: boolean;
  readonly atFloor: boolean;
  readonly repaired: boolean;
  readonly flaw?: FlawEntry;
}

/** Straight cut between two points in micrometres (origin lower left). */
export interface CutRequest {
  readonly id: string;
  readonly map: MapName;
  readonly fromUm: readonly [number, number];
  readonly toUm: readonly [number, number];
  readonly points: number;
}

export interface HistogramRequest {
  readonly id: string;
  readonly map: MapName;
  readonly low: number;
  readonly high: number;
  readonly log: boolean;
  readonly bins: number;
}

/** One setting of the recipe as a form shows it. */
export interface FieldInfo {
  /** `band.factor`. */
  readonly path: string;
  readonly kind: 'number' | 'choice' | 'flag' | 'word';
  readonly title: string;
  readonly description: string;
  readonly unit?: string;
  readonly min?: number;
  readonly max?: number;
  readonly integer?: boolean;
  readonly choices?: readonly string[];
  readonly fallback?: number | string | boolean;
  /** What happens when the value is absent. */
  readonly absent?: string;
}

/** What does not change while the program runs, but for `kernels`. */
export interface ComputeFacts {
  readonly app: { readonly name: string; readonly version: string };
  readonly causes: readonly { readonly code: number; readonly cause: string; readonly fill: string; readonly ink: string; readonly hatch: string; readonly hatchPath: string; readonly hatchStroke: number }[];
  readonly hatchPeriod: number;
  readonly fields: readonly FieldInfo[];
  readonly defaultRecipe: RecipeData;
  /** Colours of the value scale, `#rrggbb`, low to high. */
  readonly scale: readonly string[];
  /** Whether compiled kernels compute now; they are loaded beside the first calls. Results are the same without them. */
  readonly kernels: boolean;
}

/** Progress of one call: the stage that begins, and how many of all are done. */
export interface StageProgress {
  readonly stage: string;
  readonly done: number;
  readonly total: number;
}

export type OnStage = (progress: StageProgress) => void;

/** The computation. Every call is asynchronous, in-process or behind a worker. `run` numbers a call so that `abort` can name it. */
export interface Compute {
  facts(): Promise<ComputeFacts>;
  /** Groups files into samples and keeps them; nothing is decoded yet. */
  open(files: readonly SourceFile[]): Promise<OpenReply>;
  /** The invented samples, painted when they are appraised. */
  openDemo(): Promise<OpenReply>;
  close(id: string): Promise<void>;
  /** Reads (once) and appraises a sample. Rejects with code `aborted` after an abort. */
  appraise(run: number, id: string, recipe: RecipeData, onStage?: OnStage): Promise<SampleSummary>;
  abort(run: number): Promise<void>;
  picture(request: PictureRequest): Promise<Picture>;
  /** A quick look at a recipe; changes nothing of what the other calls answer. */
  preview(request: PreviewRequest): Promise<Preview>;
  point(id: string, xUm: number, yUm: number): Promise<PointValues>;
  /** Values along a cut, NaN where missing. */
  cut(request: CutRequest): Promise<Float32Array<ArrayBuffer>>;
  histogram(request: HistogramRequest): Promise<Uint32Array<ArrayBuffer>>;
  /** Names of the result files of an appraised sample, as the command line writes them. */
  resultNames(id: string): Promise<readonly string[]>;
  /** One result file. */
  resultFile(id: string, name: string): Promise<Uint8Array<ArrayBuffer>>;
}

/** A problem that crossed the wire: one sentence with its code and typed detail. */
export class ComputeError extends Error {
  override readonly name = 'ComputeError';
  readonly code: string;
  readonly detail: unknown;

  constructor(code: string, message: string, detail?: unknown) {
    super(message);
    this.code = code;
    this.detail = detail;
  }
}
