/** What the flaws stage hands on: labelled regions with measurements, a class and its reason. */
import type { LabelMap } from '../grid/maps.ts';
import type { Notice } from '../problems/problem.ts';

export const flawCauses = ['bubble', 'residue', 'wrinkle', 'short', 'open'] as const;
export type FlawCause = (typeof flawCauses)[number];

/** One flaw, measured. Lengths in metres, areas in m², volume in m³; NaN where a quantity does not apply. */
export interface Flaw {
  /** Number in the label map, counted from 1. */
  readonly flaw: number;
  readonly cause: FlawCause;
  /** 0.5 (could as well be another class) to 1 (certain). */
  readonly confidence: number;
  /** One phrase in words: what was seen and why that class. */
  readonly reason: string;
  /** Area-weighted centre (x right, y up, origin lower-left). */
  readonly xM: number;
  readonly yM: number;
  readonly pixels: number;
  readonly areaM2: number;
  /** Length of the outline. */
  readonly boundaryM: number;
  /** Diameter of the circle of the same area. */
  readonly diameterM: number;
  /** Full axes of the ellipse with the same second moments; angle of the long one against +x, degrees in (−90, 90]. */
  readonly longM: number;
  readonly shortM: number;
  readonly angleDeg: number;
  /** Above the surrounding ground. */
  readonly peakM: number;
  readonly meanM: number;
  readonly volumeM3: number;
  readonly heightToRadius: number;
  /** Median log10 of the current inside (A, or the file's unit), NaN where no current. */
  readonly log10Current: number;
  readonly touchesEdge: boolean;
  /** How a raised flaw was told from what touches it (`Region.kind`); absent for spots, and where nobody looked. */
  readonly kind?: 'blob' | 'ridge' | 'dome';
  /** A person said what it is. */
  readonly byHand?: true;
}

/** The limits that were in force on this map, and what they are worth against its noise. */
export interface FlawThresholds {
  /** Rise that starts a flaw, metres, the larger of the stated height and the stated multiple of the noise; absent without a height. */
  readonly startM?: number;
  readonly ruledBy?: 'height' | 'noise';
  /** Standard deviation of the height's pixel noise, metres. */
  readonly noiseM?: number;
  /** Fall of the current that makes a rise a flaw, decades; absent without a current. */
  readonly dropDecades?: number;
  /** Decades that one layer costs, and how that is known. */
  readonly layerDecades?: number;
  readonly layerFrom?: LayerSource;
  /** Robust standard deviation of the log current's noise from pixel to pixel where it is above the floor and not saturated, decades; absent where nothing is. */
  readonly noiseDecades?: number;
}

/** Where a layer's worth in decades comes from: the map's own ladder, the tunnelling model, or nothing better than a decade. */
export type LayerSource = 'map' | 'model' | 'assumed';

export interface Flaws {
  /** Shape [rows, columns]; the number of the flaw a pixel belongs to, 0 for none. */
  readonly labels: LabelMap;
  readonly list: readonly Flaw[];
  readonly warnings: readonly Notice[];
  /** Absent where no flaws were sought. */
  readonly thresholds?: FlawThresholds;
  /** Height above the local ground, metres, pixel by pixel; absent without a height. With `drop` it lets a corrected region be measured again. */
  readonly rise?: Float32Array;
  /** Decades of current lost against the surrounding ground, pixel by pixel; absent where height and current were not both there. */
  readonly drop?: Float32Array;
  /** Only where there are corrections by hand: how many there are, and how many of them met something. */
  readonly corrections?: { readonly given: number; readonly applied: number };
}
