/** The ledger as a bar: one segment per cause, as wide as its share of the footprint, in its colour and hatch. */
import type { Cause } from '../ledger/ledger.ts';
import { causeAppearance, hatchPath, hatchPeriod } from './appearance.ts';
import { Markup, markup } from './markup.ts';
import { figure, percent } from './numbers.ts';

export interface LedgerShare {
  readonly cause: Cause;
  readonly areaUm2: number;
  readonly share: number;
  readonly assessed: boolean;
}

export interface BarSize {
  readonly width: number;
  readonly height: number;
  readonly labels: boolean;
}

/** The pattern definitions that bars and swatches of one document refer to; put it once at the document's start. */
export function hatchDefinitions(): Markup {
  const patterns = Object.entries(causeAppearance).map(([cause, { fill, ink, hatch }]) => {
    const { d, strokeWidth } = hatchPath[hatch];
    const lines = d === '' ? markup`` : strokeWidth === undefined
      ? markup`<path d="${d}" fill="${ink}"/>`
      : markup`<path d="${d}" fill="none" stroke="${ink}" stroke-width="${strokeWidth}"/>`;
    return markup`<pattern id="hatch-${cause}" width="${hatchPeriod}" height="${hatchPeriod}" patternUnits="userSpaceOnUse"><rect width="${hatchPeriod}" height="${hatchPeriod}" fill="${fill}"/>${lines}</pattern>`;
  });
  return markup`<svg class="definitions" width="0" height="0" aria-hidden="true"><defs>${patterns}</defs></svg>`;
}

/** Usable first, then what costs most; ties in the order of the codes. Causes without area are left out. */
export function barOrder<Row extends LedgerShare>(rows: readonly Row[]): Row[] {
  const usable = rows.filter((row) => row.cause === 'usable' && row.areaUm2 > 0);
  const rest = rows.filter((row) => row.cause !== 'usable' && row.areaUm2 > 0);
  return [...usable, ...rest.sort((a, b) => b.areaUm2 - a.areaUm2)];
}

/**
 * The bar as inline SVG in units of its own, about as many as it will have CSS pixels, so that hatches keep
 * their size. With labels, segments wide enough to carry theirs are named underneath; the others are found
 * in the table beside it.
 */
export function ledgerBar(rows: readonly LedgerShare[], { width: barWidth, height, labels }: BarSize): Markup {
  const segments: Markup[] = [];
  let x = 0;
  let labelEnd = -Infinity;
  for (const { cause, areaUm2, share } of barOrder(rows)) {
    const width = share * barWidth;
    segments.push(markup`<rect x="${place(x)}" y="0" width="${place(width)}" height="${height}" fill="url(#hatch-${cause})"/>`);
    if (x > 0) segments.push(markup`<path d="M${place(x)} 0V${height}" stroke="#fff" stroke-width="1"/>`);
    const area = figure(areaUm2);
    // About seven units per letter at this size; a label may run past its own segment only where nothing follows.
    const labelWidth = (cause.length + area.length + 2) * 7.5;
    if (labels && labelWidth <= width && x >= labelEnd) {
      segments.push(markup`<text x="${place(x)}" y="${height + 20}" font-size="14"><tspan font-weight="600">${cause}</tspan> <tspan class="dim">${area}</tspan></text>`);
      labelEnd = x + labelWidth;
    }
    x += width;
  }
  const words = barOrder(rows).map(({ cause, share }) => `${cause} ${percent(share)}`).join(', ');
  return markup`<svg class="ledger-bar" viewBox="0 0 ${barWidth} ${labels ? height + 26 : height}" role="img" aria-label="Area ledger: ${words === '' ? 'no area' : words}">${segments}<rect x="0.5" y="0.5" width="${barWidth - 1}" height="${height - 1}" fill="none" stroke="#9aa4ad"/></svg>`;
}

/** A small square in the cause's colour and hatch. */
export function swatch(cause: Cause): Markup {
  return markup`<svg class="swatch" viewBox="0 0 24 16" aria-hidden="true"><rect x="0.5" y="0.5" width="23" height="15" fill="url(#hatch-${cause})" stroke="#9aa4ad"/></svg>`;
}

function place(value: number): number {
  return Number(value.toFixed(2));
}
