/** The report's pictures: causes, height, current and glow, each with scale bar, colour scale and words. */
import type { Grid, ScalarMap } from '../grid/maps.ts';
import type { Appraised } from './appraised.ts';
import { decadeTicks, displayRange, linearTicks } from './display-range.ts';
import type { DisplayRange } from './display-range.ts';
import { barOrder, swatch } from './ledger-figure.ts';
import { markup } from './markup.ts';
import type { Markup } from './markup.ts';
import { currentText, figure, niceBelow, percent, plain, withUnit } from './numbers.ts';
import { causePicture, pngAddress, scalePicture, valuePicture } from './picture.ts';
import type { Picture } from './picture.ts';
import { toUm } from './units.ts';
import type { Verdict } from './verdict.ts';

interface ValueFigure {
  readonly title: string;
  readonly values: Float32Array;
  readonly ticks: (range: DisplayRange) => number[];
  readonly label: (value: number) => string;
  /** Ticks are round numbers and need fewer digits. */
  readonly tickLabel: (value: number) => string;
  readonly note: string;
}

const scaleWidth = 400;
const fewPixels = 128;

/** All pictures the sample has data for, as one grid of figures. */
export function reportFigures(appraised: Appraised, verdict: Verdict): Markup {
  const { sample: { grid }, ground: { height, current }, ledger } = appraised;
  const figures = [causeFigure(grid, ledger.codes.data, verdict)];
  if (current) {
    figures.push(valueFigure(grid, {
      title: 'Current', values: current.log10.data, ticks: ({ low, high }) => decadeTicks(low, high),
      label: (value) => currentText(10 ** value, current.unit), tickLabel: (value) => currentText(10 ** value, current.unit, 1),
      note: `Logarithmic scale${current.unit === 'relative' ? ', in the file’s own unit' : ''}${current.biasV === undefined ? '' : `, ${plain(current.biasV)}\u00a0V on the sample`}; offset removed, drift undone.`,
    }));
  }
  if (height) {
    figures.push(valueFigure(grid, {
      title: 'Height', values: inNm(height.levelled), ticks: ({ low, high }) => linearTicks(low, high),
      label: (value) => withUnit(value, 'nm'), tickLabel: (value) => `${plain(value)}\u00a0nm`, note: 'Levelled; ground near zero.',
    }));
  }
  if (current) {
    figures.push(valueFigure(grid, {
      title: 'Glow', values: ledger.glow.data, ticks: ({ low, high }) => linearTicks(low, high),
      label: (value) => figure(value, 2), tickLabel: plain, note: 'Expected emission relative to the median of usable ground (1).',
    }));
  }
  return markup`<div class="figures">${figures}</div>`;
}

function causeFigure(grid: Grid, codes: Uint8Array, verdict: Verdict): Markup {
  const present = barOrder(verdict.ledger.causes);
  const words = present.map(({ cause, share }) => `${cause} ${percent(share)}`).join(', ');
  const picture = causePicture(codes, grid, aspectOf(grid));
  const keys = present.map(({ cause }) => markup`<span>${swatch(cause)}${cause}</span>`);
  return markup`<figure>${frame(grid, picture, `Map of causes, ${sizeText(grid)}: ${words === '' ? 'no footprint' : words}.`)}<div class="keys">${keys}</div><figcaption><b>Causes.</b> Every pixel of the footprint is booked to one cause.</figcaption></figure>`;
}

function valueFigure(grid: Grid, { title, values, ticks, label, tickLabel, note }: ValueFigure): Markup {
  const range = displayRange(values);
  if (range === undefined) return markup`<figure><figcaption><b>${title}.</b> No value could be computed.</figcaption></figure>`;
  const picture = valuePicture(values, grid, range.low, range.high);
  const alt = `Map of ${title.toLowerCase()}, ${sizeText(grid)}, colours from ${label(range.low)} (dark blue) to ${label(range.high)} (yellow).`;
  return markup`<figure>${frame(grid, picture, alt)}${colourScale(range, ticks(range), tickLabel)}<figcaption><b>${title}.</b> ${note}${clippingText(range, label)}${missingText(range, values.length)}</figcaption></figure>`;
}

/** The picture in the map's own proportions with a scale bar under it; maps taller than wide are drawn narrower. */
function frame(grid: Grid, picture: Picture, alt: string): Markup {
  const aspect = aspectOf(grid);
  const widthUm = toUm(grid.columns * grid.pitchXM);
  const barUm = niceBelow(widthUm / 3);
  const few = Math.max(picture.width, picture.height) <= fewPixels ? ' few' : '';
  return markup`<div class="frame${few}" style="width:${(Math.min(1, aspect) * 100).toFixed(1)}%"><img src="${pngAddress(picture)}" alt="${alt}" width="${picture.width}" height="${picture.height}" style="aspect-ratio:${aspect.toFixed(5)};height:auto"><div class="bar" style="width:${((barUm / widthUm) * 100).toFixed(2)}%">${withUnit(barUm, 'µm', 1)}</div></div>`;
}

function colourScale({ low, high }: DisplayRange, ticks: readonly number[], label: (value: number) => string): Markup {
  const marks = ticks.map((tick) => {
    const x = high > low ? ((tick - low) / (high - low)) * scaleWidth : scaleWidth / 2;
    // Labels near the ends lean inwards so that none is cut off.
    const anchor = x < 28 ? 'start' : x > scaleWidth - 28 ? 'end' : 'middle';
    const lean = anchor === 'start' ? Math.max(0, x - 2) : anchor === 'end' ? Math.min(scaleWidth, x + 2) : x;
    return markup`<path d="M${x.toFixed(1)} 10v5" stroke="#1a2229"/><text x="${lean.toFixed(1)}" y="27" text-anchor="${anchor}">${label(tick)}</text>`;
  });
  return markup`<svg class="scale" viewBox="0 0 ${scaleWidth} 32" aria-hidden="true"><image href="${pngAddress(scalePicture())}" width="${scaleWidth}" height="10" preserveAspectRatio="none"/>${marks}</svg>`;
}

function clippingText({ low, high, clipsLow, clipsHigh }: DisplayRange, label: (value: number) => string): string {
  const ends = [clipsLow ? `below ${label(low)}` : '', clipsHigh ? `above ${label(high)}` : ''].filter((end) => end !== '');
  return ends.length > 0 ? ` Values ${ends.join(' and ')} have the end colour.` : '';
}

function missingText({ missingPixels }: DisplayRange, pixels: number): string {
  return missingPixels > 0 ? ` Light grey: no value (${percent(missingPixels / pixels)} of the map).` : '';
}

function sizeText(grid: Grid): string {
  return `${figure(toUm(grid.columns * grid.pitchXM))} by ${withUnit(toUm(grid.rows * grid.pitchYM), 'µm')}`;
}

function aspectOf(grid: Grid): number {
  return (grid.columns * grid.pitchXM) / (grid.rows * grid.pitchYM);
}

function inNm(map: ScalarMap): Float32Array {
  const nm = new Float32Array(map.data.length);
  for (let i = 0; i < nm.length; i++) nm[i] = map.data[i]! * 1e9;
  return nm;
}
