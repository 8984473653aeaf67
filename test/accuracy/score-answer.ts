/** What is scored: the answer of a program about a sample, ours or the baseline's. */
import type { Appraisal } from '../../src/evaluate/appraisal.ts';
import type { FlawCause } from '../../src/flaws/flaws.ts';

export interface Answer {
  /** Cause codes, row-major. */
  readonly codes: ArrayLike<number>;
  /** Number of the flaw on a pixel, 0 for none, and the cause of each number (index 0 unused). */
  readonly flawLabels: ArrayLike<number>;
  readonly flawCauses: readonly (FlawCause | undefined)[];
  /** Levelled height, nm; NaN where none. */
  readonly levelledNm: ArrayLike<number>;
  readonly wearDecades: number;
  /** Time constant of the amplifier that was undone, pixels; absent where it is not looked for. */
  readonly lagPx?: number;
  /** 95 % interval of the usable share; absent where none is given. */
  readonly interval?: readonly [low: number, high: number];
}

export function answerOf({ ground, flaws, ledger }: Appraisal): Answer {
  const lagPx = lagOf(ground.current);
  return {
    codes: ledger.codes.data,
    flawLabels: flaws.labels.data,
    flawCauses: [undefined, ...flaws.list.map(({ cause }) => cause)],
    levelledNm: ground.height!.levelled.data.map((value) => value * 1e9),
    wearDecades: ground.current?.wearDecades ?? 0,
    ...(lagPx === undefined ? {} : { lagPx }),
    interval: [ledger.usable.low95M2 / ledger.footprintM2, ledger.usable.high95M2 / ledger.footprintM2],
  };
}

function lagOf(current: object | undefined): number | undefined {
  return current && 'lagPx' in current && typeof current.lagPx === 'number' ? current.lagPx : undefined;
}
