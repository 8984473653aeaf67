/** Role and direction from the words of a page's or channel's name. */
import type { Direction, Quantity } from './sample.ts';

export interface ChannelWords {
  readonly quantity?: Quantity;
  readonly direction?: Direction;
}

/**
 * What a channel's name says: "Current retrace" is a current on the return scan. A name that speaks
 * of both quantities says nothing; single letters count only when they are the whole name.
 */
export function channelWords(name: string): ChannelWords {
  const words = name.toLowerCase().split(/[^a-z]+/).filter((word) => word !== '');
  const has = (...known: string[]) => words.some((word) => known.includes(word));
  const only = words.length === 1 ? words[0] : undefined;
  const height = has('height', 'topo', 'topography') || only === 'z';
  const current = has('current') || only === 'i';
  const back = has('return', 'retrace', 'backward');
  return {
    ...(height !== current ? { quantity: height ? 'height' : 'current' } : {}),
    ...(back ? { direction: 'return' } : {}),
  };
}
