/**
 * How causes look: one colour and one hatch each, so that they can be told apart in print, in grey
 * and with any colour vision. Plain data: the page gets it over the wire.
 *
 * Colours are those of Okabe & Ito, Color Universal Design (2008): orange #E69F00, sky blue #56B4E9,
 * bluish green #009E73, yellow #F0E442, blue #0072B2, vermillion #D55E00, reddish purple #CC79A7;
 * usable ground keeps the product's amber, and what has no colour of its own is grey.
 */
import { causes } from '../ledger/ledger.ts';
import type { Cause } from '../ledger/ledger.ts';

/** Line patterns; `diagonal` falls to the right (\), `counter-diagonal` rises (/). */
export type Hatch =
  | 'none' | 'diagonal' | 'counter-diagonal' | 'cross-diagonal' | 'level' | 'upright' | 'grid' | 'dots' | 'checks' | 'zigzag' | 'plus';

export interface Appearance {
  /** Ground colour, `#rrggbb`. */
  readonly fill: string;
  /** Colour of the hatch's lines. */
  readonly ink: string;
  readonly hatch: Hatch;
}

/** Hatches repeat after this many units in both directions (pixels of a picture, units of a drawing). */
export const hatchPeriod = 8;

export const causeAppearance: Readonly<Record<Cause, Appearance>> = {
  outside: { fill: '#ffffff', ink: '#ffffff', hatch: 'none' },
  usable: { fill: '#ffb454', ink: '#ffb454', hatch: 'none' },
  unmeasured: { fill: '#eceff1', ink: '#9aa4ad', hatch: 'cross-diagonal' },
  bubble: { fill: '#56b4e9', ink: '#0b4f7d', hatch: 'dots' },
  residue: { fill: '#e69f00', ink: '#6b4400', hatch: 'upright' },
  wrinkle: { fill: '#cc79a7', ink: '#6d2a50', hatch: 'level' },
  short: { fill: '#d55e00', ink: '#d55e00', hatch: 'none' },
  open: { fill: '#20262b', ink: '#9fb0bd', hatch: 'grid' },
  thin: { fill: '#f0e442', ink: '#8a8216', hatch: 'counter-diagonal' },
  thick: { fill: '#0072b2', ink: '#7cc0ea', hatch: 'diagonal' },
  starved: { fill: '#009e73', ink: '#7fd6bb', hatch: 'checks' },
  rim: { fill: '#b8c0c7', ink: '#5c6870', hatch: 'zigzag' },
  stray: { fill: '#ffe3b8', ink: '#a86a10', hatch: 'plus' },
};

/** The same as a list in the order of the cause codes. */
export const appearanceByCode: readonly Appearance[] = causes.map((cause) => causeAppearance[cause]);

/** Whether the hatch's line covers the picture's pixel (x, y); repeats every `hatchPeriod` pixels. */
export function isHatchInk(hatch: Hatch, x: number, y: number): boolean {
  const u = x % hatchPeriod;
  const v = y % hatchPeriod;
  const falling = (u - v + hatchPeriod) % hatchPeriod < 2;
  const rising = (u + v) % hatchPeriod < 2;
  switch (hatch) {
    case 'none': return false;
    case 'diagonal': return falling;
    case 'counter-diagonal': return rising;
    case 'cross-diagonal': return (u - v + hatchPeriod) % hatchPeriod < 1 || (u + v) % hatchPeriod < 1;
    case 'level': return v >= 3 && v < 5;
    case 'upright': return u >= 3 && u < 5;
    case 'grid': return v === 3 || u === 3;
    case 'dots': return (u < 2 && v < 2) || (u >= 4 && u < 6 && v >= 4 && v < 6);
    case 'checks': return u < 4 === v < 4;
    case 'zigzag': return Math.abs(Math.abs(u - 4) + 2 - v) < 1;
    case 'plus': return (u === 4 && v >= 2 && v <= 6) || (v === 4 && u >= 2 && u <= 6);
  }
}

/** The same lines as an SVG path over one period, and whether the path is filled or stroked (with what width). */
export const hatchPath: Readonly<Record<Hatch, { readonly d: string; readonly strokeWidth?: number }>> = {
  none: { d: '' },
  diagonal: { d: 'M-2-2L10 10M-2 6L2 10M6-2L10 2', strokeWidth: 1.5 },
  'counter-diagonal': { d: 'M-2 10L10-2M-2 2L2-2M6 10L10 6', strokeWidth: 1.5 },
  'cross-diagonal': { d: 'M-1-1L9 9M-1 9L9-1', strokeWidth: 0.8 },
  level: { d: 'M0 4H8', strokeWidth: 2 },
  upright: { d: 'M4 0V8', strokeWidth: 2 },
  grid: { d: 'M3.5 0V8M0 3.5H8', strokeWidth: 1 },
  dots: { d: 'M.4 2a1.4 1.4 0 1 0 2.8 0a1.4 1.4 0 1 0-2.8 0M4.4 6a1.4 1.4 0 1 0 2.8 0a1.4 1.4 0 1 0-2.8 0' },
  checks: { d: 'M0 0H4V4H0ZM4 4H8V8H4Z' },
  zigzag: { d: 'M0 6L4 2L8 6', strokeWidth: 1.2 },
  plus: { d: 'M4.5 2V7M2 4.5H7', strokeWidth: 1 },
};
