/** What a file's name says: sample, role, direction, bias. */
import type { Direction, Quantity } from './sample.ts';

export interface NamedMap {
  /** The name without role, direction, bias and extension; empty for a file called just `height.tif`. */
  readonly sample: string;
  readonly quantity?: Quantity;
  readonly direction?: Direction;
  readonly biasV?: number;
}

const quantityWords: Readonly<Record<string, Quantity>> = {
  height: 'height', topo: 'height', topography: 'height', z: 'height', current: 'current', i: 'current',
};
const directionWords: Readonly<Record<string, Direction>> = { return: 'return', retrace: 'return', forward: 'forward', trace: 'forward' };

/** File name without its extension, and the extension in lower case without the point ('' when there is none). */
export function splitExtension(name: string): { base: string; extension: string } {
  const parts = /^(.+)\.([A-Za-z][A-Za-z0-9]{0,7})$/.exec(name);
  return parts === null ? { base: name, extension: '' } : { base: parts[1]!, extension: parts[2]!.toLowerCase() };
}

/**
 * Reads `S.height`, `S_topo`, `S-i.return`, `S.current.5V`, `S.current.-2.5V` and the like, words in any order
 * at the name's end, parted by `.`, `_` or `-`. A bias follows `.` or `_` only, because a `-` before it could
 * be its sign. Without a word for the quantity nothing is taken off: the whole name is the sample's.
 */
export function parseMapName(name: string): NamedMap {
  const { base } = splitExtension(name);
  let rest = base;
  let quantity: Quantity | undefined;
  let direction: Direction | undefined;
  let biasV: number | undefined;
  for (;;) {
    const bias = /^(.*?)[._]([+-]?\d+(?:\.\d+)?)(m?)V$/.exec(rest);
    if (bias !== null && biasV === undefined) {
      biasV = Number(bias[2]) * (bias[3] === 'm' ? 1e-3 : 1);
      rest = bias[1]!;
      continue;
    }
    const parts = /^(?:(.*)[._-])?([A-Za-z]+)$/.exec(rest);
    const word = parts?.[2]?.toLowerCase() ?? '';
    if (quantity === undefined && Object.hasOwn(quantityWords, word)) quantity = quantityWords[word];
    else if (direction === undefined && Object.hasOwn(directionWords, word)) direction = directionWords[word];
    else break;
    rest = parts?.[1] ?? '';
    if (rest === '') break;
  }
  if (quantity === undefined) return { sample: base };
  return {
    sample: rest, quantity,
    ...(direction === undefined ? {} : { direction }),
    ...(biasV === undefined ? {} : { biasV }),
  };
}

/** The sample of `S.iv.csv` or `S.outlines.geojson` (also with `_` or `-`), undefined for other names. */
export function parseCompanion(name: string): { sample: string; kind: 'iv' | 'outlines' } | undefined {
  const parts = /^(?:(.+)[._-])?(?:(iv)\.csv|(outlines)\.(?:geojson|json))$/i.exec(name);
  if (parts === null) return undefined;
  return { sample: parts[1] ?? '', kind: parts[2] === undefined ? 'outlines' : 'iv' };
}
