/** Where the flake ends on the map, for the thickness by the step at its edge. */
import type { EdgeGround } from '../barrier/edge-step.ts';
import type { Ground } from '../ground/ground.ts';
import { layerMask } from '../read/footprint.ts';
import type { Sample } from '../read/sample.ts';

/**
 * The barrier by its outline, or by the proposed one where none is drawn, and the injector by its outline. Undefined where no barrier outline is
 * known, without a height, and on a finished stack, whose edges are not the barrier's.
 */
export function edgeGround(sample: Sample, ground: Ground): EdgeGround | undefined {
  if (!ground.height || sample.surface === 'stack') return undefined;
  const outlines = sample.outlines.length > 0 ? sample.outlines : ground.footprintProposal ? [ground.footprintProposal.outline] : [];
  const has = (layer: string): boolean => outlines.some((outline) => outline.layer === layer);
  if (!has('barrier')) return undefined;
  return { barrier: layerMask(sample.grid, outlines, 'barrier').data, ...(has('injector') ? { injector: layerMask(sample.grid, outlines, 'injector').data } : {}) };
}
