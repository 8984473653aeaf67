/** Which limits are in force on a map, and what they mean against its noise. */
import type { Ground } from '../ground/ground.ts';
import { pixelNoise } from '../ground/noise.ts';
import type { FlawThresholds, LayerSource } from './flaws.ts';
import type { FlawsSection } from './recipe.ts';

/**
 * The rise that starts a flaw is the larger of the stated height and the stated multiple of the height's noise: on a rough or noisy surface the
 * stated rise would be noise itself. The noise of the log current is measured where neither floor nor saturation hides it, from differences between
 * neighbours (`pixelNoise`).
 *
 * @param layer decades that a layer costs at the scan's bias, and how that is known.
 */
export function thresholdsOf({ height, current }: Ground, section: FlawsSection, layer: { readonly decades: number; readonly from?: LayerSource | undefined }): FlawThresholds {
  return {
    ...(height ? heightLimit(section.heightNm * 1e-9, section.heightNoise, height.noiseM) : {}),
    ...(current ? {
      dropDecades: section.dropDecades, layerDecades: layer.decades, ...(layer.from ? { layerFrom: layer.from } : {}), ...noiseOf(current),
    } : {}),
  };
}

function heightLimit(statedM: number, times: number, noiseM: number): Pick<Required<FlawThresholds>, 'startM' | 'ruledBy' | 'noiseM'> {
  // A map that is too small for a noise has none.
  const leastM = times * (Number.isNaN(noiseM) ? 0 : noiseM);
  return { startM: Math.max(statedM, leastM), ruledBy: leastM > statedM ? 'noise' : 'height', noiseM };
}

function noiseOf(current: NonNullable<Ground['current']>): Pick<FlawThresholds, 'noiseDecades'> {
  const [rows, columns] = current.log10.shape as [number, number];
  const { data: floor } = current.floor;
  const { data: saturated } = current.saturated;
  const noiseDecades = pixelNoise(current.log10.data, columns, rows, (i) => floor[i] === 0 && saturated[i] === 0);
  return Number.isNaN(noiseDecades) ? {} : { noiseDecades };
}
