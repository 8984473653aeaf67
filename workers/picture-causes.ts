/** Causes drawn over a map so that it still shows through. */
import { appearanceByCode, hatchPeriod, isHatchInk } from '../src/report/appearance.ts';
import type { PictureRequest } from './api.ts';
import type { Area, Span } from './picture-area.ts';

/** Share of a cause's colour in the mixture with the map: its ground, its hatch, and what is dimmed towards black. */
export const causeMix = { fill: 0.4, ink: 0.8, dim: 0.6 } as const;

const outside = 0;
const usable = 1;

/** How a code is drawn: not at all, dimmed, or as a table of colours, one entry of the hatch's period per screen pixel. */
type Look = 'clear' | 'dim' | { readonly colours: Uint8Array; readonly mix: Float32Array };

/**
 * `all`: every cause but usable, ground outside the footprint dimmed. A list of codes: those in their colours, everything else dimmed. Where the
 * picture reduces the map, a pixel takes the most common cause under it. Hatches keep their size on the screen and move with the map.
 */
export function drawCauses(rgba: Uint8ClampedArray, codes: Uint8Array, columns: number, area: Area, request: PictureRequest): void {
  const looks = looksOf(request.causes);
  const { across, down, width, height } = area;
  const phaseX = hatchPhases(across, request.left, width, request.pixelRatio);
  const phaseY = hatchPhases(down, request.top, height, request.pixelRatio);
  const reduced = across.scale > 1 || down.scale > 1;
  const counts = new Uint32Array(appearanceByCode.length);
  for (let y = 0, at = 0; y < height; y++) {
    const row = down.nearest[y]!;
    for (let x = 0; x < width; x++, at += 4) {
      if (rgba[at + 3] === 0) continue;
      const code = reduced ? mostCommon(codes, columns, across, down, x, y, counts) : codes[row * columns + across.nearest[x]!]!;
      const look = looks[code] ?? 'clear';
      if (look === 'clear') continue;
      if (look === 'dim') {
        for (let k = 0; k < 3; k++) rgba[at + k] = rgba[at + k]! * (1 - causeMix.dim);
        continue;
      }
      const cell = phaseY[y]! * hatchPeriod + phaseX[x]!;
      const mix = look.mix[cell]!;
      for (let k = 0; k < 3; k++) rgba[at + k] = (1 - mix) * rgba[at + k]! + mix * look.colours[3 * cell + k]!;
    }
  }
}

function looksOf(causes: PictureRequest['causes']): Look[] {
  return appearanceByCode.map((_, code): Look => {
    if (causes === 'none') return 'clear';
    if (causes === 'all') return code === outside ? 'dim' : code === usable ? 'clear' : painted(code);
    return causes.includes(code) ? painted(code) : 'dim';
  });
}

function painted(code: number): Look {
  const { fill, ink, hatch } = appearanceByCode[code]!;
  const cells = hatchPeriod * hatchPeriod;
  const colours = new Uint8Array(3 * cells);
  const mix = new Float32Array(cells);
  for (let cell = 0; cell < cells; cell++) {
    const isInk = isHatchInk(hatch, cell % hatchPeriod, Math.floor(cell / hatchPeriod));
    colours.set(channels(isInk ? ink : fill), 3 * cell);
    mix[cell] = isInk ? causeMix.ink : causeMix.fill;
  }
  return { colours, mix };
}

/** Place within the hatch's period of each picture column or row, counted from the map's own corner. */
function hatchPhases(span: Span, start: number, length: number, pixelRatio: number): Uint8Array {
  const origin = Math.round(start / span.scale);
  return Uint8Array.from({ length }, (_, i) => {
    const unit = Math.floor((i + origin) / pixelRatio) % hatchPeriod;
    return unit < 0 ? unit + hatchPeriod : unit;
  });
}

function mostCommon(codes: Uint8Array, columns: number, across: Span, down: Span, x: number, y: number, counts: Uint32Array): number {
  counts.fill(0);
  for (let r = down.from[y]!, bottom = down.to[y]!; r < bottom; r++) {
    for (let i = r * columns + across.from[x]!, end = r * columns + across.to[x]!; i < end; i++) counts[codes[i]!]!++;
  }
  let best = 0;
  for (let code = 1; code < counts.length; code++) if (counts[code]! > counts[best]!) best = code;
  return best;
}

function channels(colour: string): [number, number, number] {
  const value = Number.parseInt(colour.slice(1), 16);
  return [value >> 16, (value >> 8) & 255, value & 255];
}
