/**
 * What the page may ask of the computation, declared apart from how it is done. Everything here is plain data that survives a worker's wire; the
 * page never holds a map: it asks for pictures, the values under a point, a cut, a histogram.
 *
 * Errors arrive as `ComputeError` with the code and detail of the problem. Lengths and areas carry their unit in the name.
 */

/** A file on offer: its bytes, or a browser's File, which the worker reads itself. */
export interface SourceFile {
  readonly name: string;
  readonly content: Uint8Array<ArrayBuffer> | Blob;
}

/** A recipe as plain JSON; the computation checks it and fills in defaults. */
export type RecipeData = Readonly<Record<string, unknown>>;

export interface Remark {
  readonly code: string;
  readonly message: string;
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

export interface LedgerEntry {
  readonly code: number;
  readonly cause: string;
  readonly areaUm2: number;
  readonly pixels: number;
  readonly share: number;
  readonly assessed: boolean;
}

export interface FlawEntry {
  readonly flaw: number;
  readonly cause: string;
  readonly confidence: number;
  readonly reason: string;
  readonly xUm: number;
  readonly yUm: number;
  readonly areaUm2: number;
  readonly diameterUm: number;
  /** Absent without a height map. */
  readonly peakNm?: number;
  readonly heightToRadius?: number;
  /** A person said what it is. */
  readonly byHand?: true;
  /** A point well inside it, by which corrections name it. In the lists of summaries only. */
  readonly insideUm?: readonly [x: number, y: number];
}

/** What a flaw can be. */
export const flawCauses = ['bubble', 'residue', 'wrinkle', 'short', 'open'] as const;
export type FlawCause = (typeof flawCauses)[number];

type PointUm = readonly [x: number, y: number];

/** One correction by hand, as the list `corrections` of a recipe holds it: places in µm from the map's lower-left corner, never numbers of flaws. */
export type Correction =
  | { readonly kind: 'reclassify'; readonly xUm: number; readonly yUm: number; readonly cause: FlawCause }
  | { readonly kind: 'dismiss'; readonly xUm: number; readonly yUm: number }
  | { readonly kind: 'merge' | 'split'; readonly pointsUm: readonly PointUm[] }
  | { readonly kind: 'paint'; readonly pointsUm: readonly PointUm[]; readonly widthUm: number; readonly cause: FlawCause }
  | { readonly kind: 'erase'; readonly pointsUm: readonly PointUm[]; readonly widthUm: number }
  | { readonly kind: 'polygon'; readonly pointsUm: readonly PointUm[]; readonly cause: FlawCause | 'none' };

/** Maps that a picture, a point or a cut can be asked of. `raw…` are as the file has them. */
export const mapNames = ['height', 'current', 'layers', 'thickness', 'glow', 'rawHeight', 'rawCurrent'] as const;
export type MapName = (typeof mapNames)[number];

export interface MapInfo {
  readonly name: MapName;
  /** Unit of the values that pictures and points speak in; empty for pure numbers. */
  readonly unit: string;
  /** Values that leave out the extreme half per cent on both sides: good limits for a first picture. */
  readonly low: number;
  readonly high: number;
  /** Smallest and largest value. */
  readonly least: number;
  readonly most: number;
  /** Logarithmic scale is natural (currents). */
  readonly log: boolean;
}

/** Everything about an appraised sample except its maps. */
export interface SampleSummary {
  readonly id: string;
  readonly name: string;
  readonly verdict: string;
  readonly surface: 'barrier' | 'stack';
  readonly columns: number;
  readonly rows: number;
  readonly widthUm: number;
  readonly heightUm: number;
  readonly footprintUm2: number;
  readonly ledger: readonly LedgerEntry[];
  readonly usable: {
    readonly areaUm2: number; readonly share: number; readonly low95Um2: number; readonly high95Um2: number; readonly largestPatchUm2: number;
    readonly knownToGlow: boolean; readonly meaning: 'usable' | 'flaw-free';
  };
  readonly repairedUm2: number;
  readonly height?: { readonly noiseNm: number; readonly tiltNm: number; readonly repairedPixels: number };
  readonly current?: {
    /** `A`, or `relative`: then the values ending in A are in the file's own unit. */
    readonly unit: string; readonly biasV?: number; readonly offsetA: number; readonly noiseA: number; readonly floorA: number; readonly saturationA?: number;
    readonly saturatedPixels: number; readonly repairedPixels: number; readonly wearDecades: number;
    /** Whether the wear is a loss large enough to be told from the barrier; smaller ones, and gains, are not. */
    readonly wearTold: boolean;
  };
  readonly ladder?: {
    readonly stepDecades: number; readonly stepSeDecades: number; readonly modelStepDecades?: number; readonly from: string;
    readonly rungs: readonly { readonly step: number; readonly layers?: number; readonly areaUm2: number; readonly medianLog10: number; readonly bound: string }[];
  };
  readonly reference?: { readonly layers?: number; readonly thicknessNm?: number; readonly medianA: number; readonly areaUm2: number; readonly shareOfUnflawed: number };
  readonly device?: { readonly biasV: number; readonly proposed: boolean; readonly medianNaPerUm2: number; readonly low95NaPerUm2: number; readonly high95NaPerUm2: number };
  /** Absent without a current: shorts do not show in height. */
  readonly shorts?: { readonly seen: number; readonly expectedMissed: number; readonly crossedShare: number };
  readonly flaws: readonly FlawEntry[];
  /** The recipe's corrections by hand in words, in their order. */
  readonly corrections: readonly string[];
  readonly maps: readonly MapInfo[];
  readonly remarks: readonly Remark[];
  /** Complete recipe as applied. */
  readonly recipe: RecipeData;
  readonly sources: readonly { readonly name: string; readonly sha256: string; readonly bytes: number }[];
  readonly timings: Readonly<Record<string, number>>;
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
  /** Size of a hatch's line in picture pixels: the screen's pixel ratio. */
  readonly pixelRatio: number;
}

/** RGBA, row-major, row 0 at the top. */
export interface Picture {
  readonly width: number;
  readonly height: number;
  readonly rgba: Uint8ClampedArray<ArrayBuffer>;
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
