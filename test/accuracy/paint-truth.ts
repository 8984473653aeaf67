/** What a scene really is. */
import type { Grid } from '../../src/grid/maps.ts';
import { codeOf } from '../../src/ledger/book-causes.ts';
import type { PaintedObject } from './paint-objects.ts';

/** A round thing that is counted one by one, in metres on the map's own frame but with y from the top. */
export interface RoundObject {
  readonly kind: 'bubble' | 'pinhole';
  readonly xM: number;
  readonly topM: number;
  readonly radiusM: number;
}

export interface Truth {
  readonly grid: Grid;
  /** Cause codes, row-major: noise-free, a dropped line is no cause. */
  readonly codes: Uint8Array;
  readonly rounds: readonly RoundObject[];
  /** Surface without scan errors and noise, nm, up to a plane. */
  readonly cleanNm: ArrayLike<number>;
  readonly layers: Uint8Array;
  readonly whiteNm: number;
  readonly wearDecades: number;
  readonly lagPx: number;
  /** 1 where the ground itself saturates the amplifier: a short does not show there. */
  readonly saturatedGround: Uint8Array;
}

export interface BookTruth {
  /** Kind of the object on a pixel that takes from the current or shorts; the one that is tested first where several lie. */
  readonly things: Uint8Array;
  readonly missing: Uint8Array;
  /** Log10 of the device's density over the reference's. */
  readonly relative: ArrayLike<number>;
  readonly bandFactor: number;
}

const thingCodes = { pinhole: codeOf('short'), bubble: codeOf('bubble'), residue: codeOf('residue'), wrinkle: codeOf('wrinkle') } as const;
const inOrder = [thingCodes.pinhole, thingCodes.bubble, thingCodes.residue, thingCodes.wrinkle];

/** Puts an object's code on a pixel unless one that is tested earlier lies there. */
export function claim(things: Uint8Array, index: number, kind: PaintedObject['kind']): void {
  const code = thingCodes[kind];
  const there = things[index]!;
  if (there === 0 || inOrder.indexOf(code) < inOrder.indexOf(there)) things[index] = code;
}

/** Codes in the ledger's order of test, for a map that is all footprint. */
export function truthCodes({ things, missing, relative, bandFactor }: BookTruth): Uint8Array {
  const band = Math.log10(bandFactor);
  const [usable, unmeasured, thin, thick] = [codeOf('usable'), codeOf('unmeasured'), codeOf('thin'), codeOf('thick')];
  return things.map((thing, i) => {
    if (thing !== 0) return thing;
    if (missing[i] === 1) return unmeasured;
    return relative[i]! > band ? thin : relative[i]! < -band ? thick : usable;
  });
}

export function roundsOf(objects: readonly PaintedObject[]): RoundObject[] {
  return objects.flatMap((object) => (object.kind === 'bubble' || object.kind === 'pinhole'
    ? [{ kind: object.kind, xM: object.xNm * 1e-9, topM: object.yNm * 1e-9, radiusM: object.radiusNm * 1e-9 }]
    : []));
}
