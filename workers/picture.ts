/** Draws part of a map as RGBA: values in the colour scale, causes over them, one flaw outlined. */
import { colouredMap } from '../src/kernels/colour-map.ts';
import type { Appraised } from '../src/report/appraised.ts';
import { cividis, cividisLength } from '../src/report/cividis.ts';
import type { Picture, PictureRequest } from './api.ts';
import { failure } from './errors.ts';
import type { MapView } from './map-view.ts';
import { viewFor } from './map-view.ts';
import { drawCauses } from './picture-causes.ts';
import { drawMarks } from './picture-marks.ts';
import { drawOutline } from './picture-outline.ts';
import { areaOf } from './picture-area.ts';
import type { Area } from './picture-area.ts';

/** Missing values: a grey that is not on the colour scale's way from blue to yellow. */
export const missingColour = [74, 85, 96] as const;

const scale = Uint8Array.from(Array.from({ length: cividisLength }, (_, index) => cividis(index)).flat());

/**
 * The picture that is asked for. Where it magnifies, a pixel shows the one map pixel under its centre; where it reduces, the mean of the values
 * present under it (of amperes, not of their logarithm). Values outside the limits take the end colours; missing ones are slate; beside the map the
 * picture is transparent. On a logarithmic scale values that are not positive are drawn as lowest.
 *
 * @param codes causes to draw instead of the appraisal's own.
 * @throws ComputeError `map-absent`, `request-value`.
 */
export function drawPicture(appraised: Appraised, request: PictureRequest, codes: Uint8Array = appraised.ledger.codes.data): Picture {
  const view = viewFor(appraised, request.map);
  const area = areaOf(request, view.columns, view.rows);
  const rgba = coloursOf(view, area, request);
  const { labels } = appraised.flaws;
  if (request.causes !== 'none') drawCauses(rgba, codes, view.columns, area, request);
  if (request.repaired === true) drawMarks(rgba, repairedOf(appraised, request.map), view.columns, area);
  if (request.flaw !== undefined) drawOutline(rgba, labels.data, view.columns, area, request.flaw, request.pixelRatio);
  return { width: area.width, height: area.height, rgba };
}

/** What was repaired of the map's own quantity; of both for maps that follow from both. */
function repairedOf({ ground: { height, current } }: Appraised, map: PictureRequest['map']): readonly Uint8Array[] {
  const ofHeight = height && map !== 'current' && map !== 'rawCurrent' ? [height.repaired.data] : [];
  const ofCurrent = current && map !== 'height' && map !== 'rawHeight' ? [current.repaired.data] : [];
  return [...ofHeight, ...ofCurrent];
}

function coloursOf(view: MapView, area: Area, { low, high, log }: PictureRequest): Uint8ClampedArray<ArrayBuffer> {
  const from = log ? Math.log(low) : low;
  const span = (log ? Math.log(high) : high) - from;
  if (!(span >= 0) || !Number.isFinite(from) || !Number.isFinite(span)) throw failure('request-value', 'the limits of the colours are empty, or not positive on a logarithmic scale');
  // With equal limits everything but what lies below is highest.
  const perUnit = (cividisLength - 1) / (span > 0 ? span : Number.MIN_VALUE);
  // A logarithm would have to agree with the language's own to the bit: no kernel takes that on.
  const byKernel = !log && view.data instanceof Float32Array && view.missing === undefined
    ? colouredMap(view.data, view.columns, area.across, area.down, { factor: view.factor, from, perUnit, scale, missing: missingColour })
    : undefined;
  return byKernel ?? colouredPlainly(view, area, from, perUnit, log);
}

/** The same in plain TypeScript, on both scales. */
function colouredPlainly(view: MapView, area: Area, from: number, perUnit: number, log: boolean): Uint8ClampedArray<ArrayBuffer> {
  const { data, columns, factor, missing } = view;
  const { across, down, width, height } = area;
  const rgba = new Uint8ClampedArray(width * height * 4);
  for (let y = 0, at = 0; y < height; y++) {
    const top = down.from[y]!;
    const bottom = down.to[y]!;
    for (let x = 0; x < width; x++, at += 4) {
      const left = across.from[x]!;
      const right = across.to[x]!;
      if (top >= bottom || left >= right) continue;
      let sum = 0;
      let count = 0;
      for (let r = top; r < bottom; r++) {
        for (let i = r * columns + left, end = r * columns + right; i < end; i++) {
          const value = data[i]!;
          if (value === missing || Number.isNaN(value)) continue;
          sum += value;
          count++;
        }
      }
      rgba[at + 3] = 255;
      if (count === 0) {
        rgba[at] = missingColour[0];
        rgba[at + 1] = missingColour[1];
        rgba[at + 2] = missingColour[2];
        continue;
      }
      const mean = (sum / count) * factor;
      const position = log ? (mean > 0 ? Math.log(mean) - from : Number.NEGATIVE_INFINITY) : mean - from;
      const entry = 3 * Math.round(Math.min(cividisLength - 1, Math.max(0, position * perUnit || 0)));
      rgba[at] = scale[entry]!;
      rgba[at + 1] = scale[entry + 1]!;
      rgba[at + 2] = scale[entry + 2]!;
    }
  }
  return rgba;
}
