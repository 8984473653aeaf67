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
  /** Shorts seen, and how many more the scan's lines will have missed; absent without a current. */
  readonly shorts?: { readonly seen: number; readonly expectedMissed: number } | undefined;
  /** Ground that could not be measured, and ground in band (or free of flaws) that is starved, rim or stray. */
  readonly unmeasuredM2: number;
  readonly setAsideM2: number;
  /** Whether the device's bias would break the barrier down, by the published field. */
  readonly breaksDown: boolean;
  /** Whether only the interval of the reference's density reaches the range that glows. */
  readonly mayGlow: boolean;
}

/** "40.7 µm² (95 %: 39.8–41.6) of 100 µm² is even barrier, within a factor of 3 at 4 V …". A given bias is printed as given, a proposed one to three digits. */
export function verdictSentence(input: VerdictInput): string {
  const { usable, surface } = input;
  const um2 = (m2: number): string => (m2 * 1e12).toPrecision(3).replace(/e\+?(-?\d+)$/, '·10^$1');
  if (usable.areaM2 === 0) return nothingLeft(input, um2);
  const area = `${um2(usable.areaM2)} µm² (95 %: ${um2(usable.low95M2)}–${um2(usable.high95M2)}) of ${um2(input.footprintM2)} µm²`;
  if (!input.hasCurrent) return `${area} is free of flaws in height; without a current map nothing is known of the barrier.`;
  const bias = input.biasV === undefined ? 'at the scan’s bias' : input.proposed ? `at ${Number(input.biasV.toPrecision(3))} V (proposed)` : `at ${Number(input.biasV.toPrecision(6))} V`;
  const what = surface === 'stack' ? 'carries an even current' : 'is even barrier';
  const glow = input.biasV === undefined ? '; not known to glow, as no density is known' : usable.knownToGlow ? '' : input.mayGlow ? '; it may glow: the density’s interval reaches the range' : '; even, but not known to glow';
  const { seen, expectedMissed } = input.shorts ?? { seen: 0, expectedMissed: 0 };
  const shorts = seen === 0 ? '' : `; ${seen} ${seen === 1 ? 'short' : 'shorts'} seen${expectedMissed >= 1 ? ` (about ${Math.round(expectedMissed)} more expected between the lines)` : ''}`;
  const caution = input.breaksDown ? '; caution: this bias puts more than hBN’s breakdown field on it' : '';
  const bound = surface === 'barrier' ? '; an upper bound, as a bare barrier was scanned' : '';
  return `${area} ${what}, within a factor of ${Number(input.bandFactor.toPrecision(3))} ${bias}${caution}${glow}${shorts}${bound}.`;
}

/** Nothing usable: that the ground is bad is said only where none is good, or could be. */
function nothingLeft({ hasCurrent, surface, footprintM2, setAsideM2, unmeasuredM2 }: VerdictInput, um2: (m2: number) => string): string {
  const good = !hasCurrent ? 'free of flaws in height' : surface === 'stack' ? 'of even current' : 'even barrier';
  const unmeasured = unmeasuredM2 > 0 ? `; ${um2(unmeasuredM2)} µm² could not be measured` : '';
  if (setAsideM2 === 0) return `Nothing of ${um2(footprintM2)} µm² is ${hasCurrent && surface === 'stack' ? 'usable' : unmeasuredM2 > 0 ? `known to be ${good}` : good}${unmeasured}.`;
  return `Nothing of ${um2(footprintM2)} µm² is usable: ${um2(setAsideM2)} µm² is ${good} but starved, in the rim or too small a patch${unmeasured}.`;
}
