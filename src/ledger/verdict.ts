/** The verdict as one sentence. */
import type { Usable } from './ledger.ts';

export interface VerdictInput {
  readonly usable: Usable;
  readonly footprintM2: number;
  readonly surface: 'barrier' | 'stack';
  readonly bandFactor: number;
  readonly biasV?: number | undefined;
  readonly proposed?: boolean | undefined;
  readonly hasCurrent: boolean;
  /** Shorts seen, and how many more the scan's lines will have missed. */
  readonly shorts: { readonly seen: number; readonly expectedMissed: number };
  /** Whether only the interval of the reference's density reaches the range that glows. */
  readonly mayGlow: boolean;
}

/** "40.7 µm² (95 %: 39.8–41.6) of 100.0 µm² is even barrier, ×/÷3 at 4.0 V …". */
export function verdictSentence(input: VerdictInput): string {
  const { usable, surface } = input;
  if (usable.areaM2 === 0) return `Nothing of ${(input.footprintM2 * 1e12).toPrecision(3)} µm² is ${input.hasCurrent ? (surface === 'stack' ? 'usable' : 'even barrier') : 'free of flaws in height'}.`;
  const um2 = (m2: number): string => (m2 * 1e12).toPrecision(3).replace(/e\+?(-?\d+)$/, '·10^$1');
  const area = `${um2(usable.areaM2)} µm² (95 %: ${um2(usable.low95M2)}–${um2(usable.high95M2)}) of ${um2(input.footprintM2)} µm²`;
  if (!input.hasCurrent) return `${area} is free of flaws in height; without a current map nothing is known of the barrier.`;
  const bias = input.biasV === undefined ? 'at the scan’s bias' : `at ${input.biasV.toFixed(1)} V${input.proposed ? ' (proposed)' : ''}`;
  const what = surface === 'stack' ? 'carries an even current' : 'is even barrier';
  const glow = input.biasV === undefined ? '; not known to glow, as no density is known' : usable.knownToGlow ? '' : input.mayGlow ? '; it may glow: the density’s interval reaches the range' : '; even, but not known to glow';
  const { seen, expectedMissed } = input.shorts;
  const shorts = seen === 0 ? '' : `; ${seen} ${seen === 1 ? 'short' : 'shorts'} seen${expectedMissed >= 1 ? `, about ${Math.round(expectedMissed)} more expected` : ''}`;
  const bound = surface === 'barrier' ? '; an upper bound, as a bare barrier was scanned' : '';
  return `${area} ${what}, ×/÷${Number(input.bandFactor.toPrecision(3))} ${bias}${glow}${shorts}${bound}.`;
}
