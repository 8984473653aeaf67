import type { Classified } from './classify.ts';
import type { Flaw } from './flaws.ts';
import type { Region } from './measure.ts';

/** A measured region with its class, as flaw number `number` of the label map. */
export function flawOf(region: Region, number: number, classified: Classified): Flaw {
  return {
    flaw: number,
    cause: classified.cause,
    confidence: classified.confidence,
    reason: classified.reason,
    xM: region.xM,
    yM: region.yM,
    pixels: region.pixels,
    areaM2: region.areaM2,
    boundaryM: region.boundaryM,
    diameterM: region.diameterM,
    longM: region.longM,
    shortM: region.shortM,
    angleDeg: region.angleDeg,
    peakM: region.peakM,
    meanM: region.meanM,
    volumeM3: region.volumeM3,
    heightToRadius: region.peakM / (region.diameterM / 2),
    log10Current: region.log10Current,
    touchesEdge: region.touchesEdge,
    ...(region.kind ? { kind: region.kind } : {}),
  };
}
