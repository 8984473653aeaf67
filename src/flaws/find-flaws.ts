import { squaredDistance } from '../grid/distance.ts';
import type { Grid, MaskMap } from '../grid/maps.ts';
import { labelMap, pixelAreaM2 } from '../grid/maps.ts';
import { labelComponents } from '../grid/label-components.ts';
import { boxMean } from '../ground/flat-segments.ts';
import type { Ground } from '../ground/ground.ts';
import { filmMaxM2 } from '../ground/segment-levels.ts';
import { notice } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { classifyRaised } from './classify.ts';
import type { Classified } from './classify.ts';
import { findOpens, findShorts } from './find-spots.ts';
import { findRaised } from './find-raised.ts';
import { flawOf } from './flaw-of.ts';
import type { Flaw, Flaws, LayerSource } from './flaws.ts';
import { riseAboveGround } from './local-ground.ts';
import { addMask, countOf, keepBoth, pixelsOf, takeMask } from './mask-pixels.ts';
import { overPlanes } from './over-planes.ts';
import { partRegions } from './part-regions.ts';
import { measureRegions } from './measure.ts';
import type { Region } from './measure.ts';
import type { FlawsSection } from './recipe.ts';
import { thresholdsOf } from './thresholds.ts';
import { assumedTipM, tipGaps } from './tip-gaps.ts';

/** What the flaw stage needs from other sections of the recipe, in SI. */
export interface FlawScale {
  /** Thickness of one layer of the barrier, metres. */
  readonly layerM: number;
  /** Decades of current one layer costs at the scan's bias. */
  readonly layerDecades: number;
  /** How that is known; only handed on. */
  readonly layerFrom?: LayerSource;
  readonly shortMaxM2: number;
  readonly terraceMinM2: number;
}

/** A conducting pit of this depth counts as through the barrier, metres: the thinnest barrier worth building is 3 nm, and the probe's rounding keeps it from the bottom (our judgement). */
const pitM = 2.6e-9;

/**
 * Flaws stage: finds and measures bubbles, residue and wrinkles (raised, with missing or lowered current), shorts and opens (seen by current
 * alone), numbers them from 1 in the order shorts, raised, opens, and gives each a class with its reason.
 *
 * Only the footprint's own flaws count: what lies beyond it is left out, and a flaw across its edge is cut there.
 *
 * Height alone: raised regions only, by height. Current alone: shorts and opens only; what blocks the current is then an open spot or a thick
 * terrace, as nothing tells it from a bubble. Pixels where a quantity is NaN take no part in what is concluded from it.
 */
export function findFlaws(ground: Ground, grid: Grid, footprint: MaskMap, section: FlawsSection, scale: FlawScale): Flaws {
  const { columns, rows } = grid;
  const count = columns * rows;
  const warnings: Notice[] = [];
  const current = ground.current;
  const thresholds = thresholdsOf(ground, section, { decades: scale.layerDecades, from: scale.layerFrom });
  const { startM = Number.NaN, noiseM = Number.NaN } = thresholds;
  if (thresholds.ruledBy === 'noise') warnings.push(notice('threshold-raised', { statedNm: section.heightNm, usedNm: startM * 1e9, noiseNm: noiseM * 1e9, times: section.heightNoise }));
  const films = current && { maxPixels: filmMaxM2 / pixelAreaM2(grid), told: ground.layers?.planes };
  const planes = ground.height && overPlanes(ground.height, columns, rows, current?.floor.data, scale.terraceMinM2 / pixelAreaM2(grid), scale.layerM, films);
  const rise = planes && riseAboveGround(planes.over, columns, rows, startM);
  const log10 = current?.log10.data;

  const smooth = rise && boxMean(rise, columns, rows, 1);
  const raised = rise && smooth && findRaised({
    columns, rows, rise, smooth, onPlane: planes.onPlane, startM,
    ...(current && log10 ? { log10, floorLog10: Math.log10(current.floorA), floor: current.floor.data, saturated: current.saturated.data } : {}),
    edgeShare: section.edgeShare, dropDecades: section.dropDecades, minPixels: section.minPixels,
    layerM: scale.layerM, layerDecades: scale.layerDecades,
  });
  const raisedMask = raised?.mask ?? new Uint8Array(count);
  if (raised && raised.conductingPixels > 0) {
    warnings.push(notice('bumps-conduct', { areaUm2: raised.conductingPixels * pixelAreaM2(grid) * 1e12 }));
  }
  let shorts: Uint8Array = new Uint8Array(count);
  let opens: Uint8Array = new Uint8Array(count);
  if (current && log10) {
    const input = {
      columns, rows, log10, pixelAreaM2: pixelAreaM2(grid), saturated: current.saturated.data, floor: current.floor.data, raised: raisedMask,
      ...(rise ? { rise, onPlane: planes.onPlane, noiseM, lost: ground.height!.repaired.data } : {}), shortDecades: section.shortLayers * scale.layerDecades, layerDecades: scale.layerDecades, layerM: scale.layerM,
      shortMaxM2: scale.shortMaxM2, terraceMinM2: scale.terraceMinM2, minPixels: section.minPixels, pitM,
    };
    shorts = findShorts(input);
    const found = findOpens(input);
    opens = found.opens;
    addMask(raisedMask, found.belongToRaised);
  }
  takeMask(raisedMask, shorts);
  for (const mask of [raisedMask, shorts, opens]) keepBoth(mask, footprint.data);

  if (rise) {
    const gapPixels = countOf(tipGaps(raisedMask, rise, columns, rows, grid.pitchXM, grid.pitchYM, assumedTipM));
    if (gapPixels > 0) warnings.push(notice('tip-gaps', { areaUm2: gapPixels * pixelAreaM2(grid) * 1e12, tipNm: assumedTipM * 1e9 }));
  }
  const labels = new Uint32Array(count);
  const list: Flaw[] = [];
  const shared = {
    columns, rows, pitchXM: grid.pitchXM, pitchYM: grid.pitchYM,
    ...(rise ? { rise } : {}), ...(current && log10 ? { log10, floor: current.floor.data } : {}), ...(raised?.drop ? { drop: raised.drop } : {}),
  };
  const add = (found: Numbered, classify: (region: Region) => Classified): void => {
    if (found.count === 0) return;
    const offset = list.length;
    for (const region of measureRegions({ ...shared, ...found })) list.push(flawOf(region, offset + region.label, classify(region)));
    addLabels(labels, found, offset);
  };
  const spots = (mask: Uint8Array): Numbered => {
    const found = labelComponents(mask, columns, rows, 8);
    const pixels = pixelsOf(mask);
    return { labels: found.labels, count: found.count, pixels, distance2: pixels.length === 0 ? new Float32Array(0) : squaredDistance(mask, columns, rows, { pitchX: grid.pitchXM, pitchY: grid.pitchYM }) };
  };
  add(spots(shorts), (region) => classifyShort(region, rise !== undefined));
  if (rise && smooth) {
    add(partRegions({
      columns, rows, pitchXM: grid.pitchXM, pitchYM: grid.pitchYM, mask: raisedMask, rise: smooth, noiseM: ground.height!.noiseM / 3, minPixels: Math.max(6, section.minPixels), byHeight: raised?.byHeight,
    }), classifyRaised);
  }
  add(spots(opens), () => ({ cause: 'open', confidence: 0.8, reason: 'no current, and nothing in the height explains it: open' }));
  return { labels: labelMap(grid, labels), list, warnings, thresholds, ...(rise ? { rise } : {}), ...(raised?.drop ? { drop: raised.drop } : {}) };
}

/** Things found, numbered from 1. */
interface Numbered {
  readonly labels: Uint32Array;
  readonly count: number;
  /** Pixels that hold all labelled ones, in raster order. */
  readonly pixels: Int32Array;
  readonly distance2: Float32Array;
  readonly kind?: Uint8Array;
}

/** Takes over labels, each `offset` higher. */
function addLabels(labels: Uint32Array, added: Numbered, offset: number): void {
  for (const i of added.pixels) if (added.labels[i]! > 0) labels[i] = offset + added.labels[i]!;
}

function classifyShort(region: Region, hasHeight: boolean): Classified {
  const pit = hasHeight && region.meanM < -0.5e-9;
  const height = !hasHeight ? '' : pit ? `, ${(-region.meanM * 1e9).toFixed(1)} nm pit` : ', no pit in the height';
  return { cause: 'short', confidence: !hasHeight ? 0.8 : pit ? 1 : 0.7, reason: `current far above its surroundings${height}: short` };
}
