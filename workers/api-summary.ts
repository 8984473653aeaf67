/** What is told of an appraised sample: areas, flaws, ground, maps. Plain data; a part of `api.ts`, which is what others import. */
/** A recipe as plain JSON; the computation checks it and fills in defaults. */
export type RecipeData = Readonly<Record<string, unknown>>;

export interface Remark {
  readonly code: string;
  readonly message: string;
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
  /** What an ambiguous one could as well be. */
  readonly other?: string;
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

/** Pixels to the right and down the picture, and what was moved back. */
export interface ShiftSummary {
  readonly rightPx: number;
  readonly rightSePx: number;
  readonly downPx: number;
  readonly downSePx: number;
  readonly undoneRightPx: number;
  readonly undoneDownPx: number;
}

/** What levelling took out of the height. */
export interface LevelsSummary {
  /** `ground`: found automatically; `spots`: picked by hand. */
  readonly formFrom: 'ground' | 'spots';
  readonly order: number;
  readonly spotsUsed?: number;
  readonly tiltNm: number;
  readonly bowNm: number;
  /** Absent when lines keep their offsets. */
  readonly lineRmsNm?: number;
  readonly lineMostNm?: number;
  /** Heights of the terraces taken as parallel planes, from the lowest. */
  readonly planesNm: readonly number[];
  /** Height of one step of the current's ladder; absent without one. */
  readonly gapNm?: number;
}

/** Roughness of the flawless ground and what levelling took of it. */
export interface TextureSummary {
  readonly sqNm: number;
  readonly sqInsideTerracesNm?: number;
  readonly sqCorrectedNm?: number;
  readonly levellingBiasShare?: number;
  readonly correlationNm?: number;
  readonly noEstimate?: string;
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
  /** Units that the maps were read in, as the recipe spells them. */
  readonly heightUnit?: string;
  readonly currentUnit?: string;
  readonly footprintUm2: number;
  readonly ledger: readonly LedgerEntry[];
  readonly usable: {
    readonly areaUm2: number; readonly share: number; readonly low95Um2: number; readonly high95Um2: number; readonly largestPatchUm2: number;
    readonly knownToGlow: boolean; readonly meaning: 'usable' | 'flaw-free';
  };
  readonly repairedUm2: number;
  readonly height?: {
    readonly noiseNm: number; readonly tiltNm: number; readonly repairedPixels: number;
    readonly levels?: LevelsSummary;
  };
  readonly texture?: TextureSummary;
  /** What the return scan showed; absent without one. */
  readonly returned?: {
    readonly heightNoiseNm?: number; readonly heightShift?: ShiftSummary; readonly currentNoiseA?: number; readonly lagPx?: number; readonly driftDecades?: number; readonly currentShift?: ShiftSummary;
  };
  /** Limits that the flaws stage used. */
  readonly thresholds?: ThresholdsInForce;
  readonly current?: {
    /** `A`, or `relative`: then the values ending in A are in the file's own unit. */
    readonly unit: string; readonly biasV?: number; readonly offsetA: number; readonly noiseA: number; readonly floorA: number; readonly saturationA?: number;
    readonly saturatedPixels: number; readonly repairedPixels: number; readonly wearDecades: number;
    /** Whether the wear is a loss large enough to be told from the barrier; smaller ones, and gains, are not. */
    readonly wearTold: boolean;
    readonly offsetSeA?: number;
    /** How the offset was found: `given`, `outside`, `blocked`, `peak`, `assumed`. */
    readonly offsetFrom?: string;
    readonly floorSeA?: number;
    /** Step between readings of a coarsely digitised current. */
    readonly stepA?: number;
    /** Trend of the log current from first to last line, whatever its cause; absent where the map cannot tell. */
    readonly driftDecades?: number;
    readonly driftSeDecades?: number;
    /** Amplifier's time constant that was undone; 0 for none. */
    readonly lagPx: number;
    readonly lagSePx?: number;
    /** Against the height; absent where the maps do not tell. */
    readonly shift?: ShiftSummary;
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

/** The limits that the flaws stage used, and what they mean on this map; absent parts have no meaning here. */
export interface ThresholdsInForce {
  /** Rise that starts a flaw, and which of the two limits made it. */
  readonly heightNm?: number;
  readonly heightRuledBy?: 'height' | 'noise';
  readonly heightNoiseNm?: number;
  readonly heightOverNoise?: number;
  readonly dropDecades?: number;
  /** Decades that one layer costs, and how that is known. */
  readonly layerDecades?: number;
  readonly layerFrom?: 'map' | 'model' | 'assumed';
  readonly dropLayers?: number;
  readonly currentNoiseDecades?: number;
  readonly dropOverNoise?: number;
}
