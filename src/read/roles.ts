/** Which of the decoded maps is the height, which the current, on which scan and at which bias. */
import { notice, Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import type { DecodedMap } from './decoded-map.ts';
import type { GroupMap } from './pairing.ts';
import type { Direction, Quantity } from './sample.ts';
import { knownUnit } from './units.ts';

/** One map of a sample before its role is known. */
export interface Candidate {
  readonly file: string;
  /** File, and page where there are several. */
  readonly source: string;
  /** What name or manifest say. */
  readonly named: GroupMap;
  readonly decoded: DecodedMap;
  /** Maps in the same file. */
  readonly pages: number;
}

/** A map with its role; `quantity` is absent only for a lone map about which nothing says it. */
export interface RoledMap extends Candidate {
  readonly quantity?: Quantity;
  readonly direction: Direction;
  readonly biasV?: number;
}

/** Candidates of one file: the page that the name asks for, or all. Throws `page-absent`. */
export function candidatesOf(sample: string, named: GroupMap, maps: readonly DecodedMap[]): Candidate[] {
  const { file, page } = named;
  if (page !== undefined && (page < 1 || page > maps.length)) throw new Problem('page-absent', { sample, file, page, pages: maps.length });
  return maps
    .map((decoded, i): Candidate => ({ file, source: sourceName(file, i, maps.length, decoded.label), named, decoded, pages: page === undefined ? maps.length : 1 }))
    .filter((_, i) => page === undefined || i === page - 1);
}

/**
 * Roles of all maps. A name or manifest decides; else what the file says (our tag, a page's name, the unit);
 * else, for a lone map, `lone`. In a file where some pages have a role, the others are left out with a remark.
 * Throws `role-disagreement`, `role-unknown-pages`, `role-twice`.
 */
export function assignRoles(sample: string, candidates: readonly Candidate[], lone: Quantity | undefined): { maps: RoledMap[]; warnings: Notice[] } {
  const all = candidates.map(roleOf);
  const known = all.filter((map) => map.quantity !== undefined);
  if (known.length === 0) {
    const [first] = all;
    if (first === undefined) throw new Problem('sample-no-map', { sample });
    if (all.length > 1) throw new Problem('role-unknown-pages', { file: first.file, pages: all.length, example: first.file });
    return { maps: [lone === undefined ? first : { ...first, quantity: lone }], warnings: [] };
  }
  refuseTwins(sample, known);
  const warnings = all.filter((map) => map.quantity === undefined).map((map) => notice('channel-ignored', { source: map.source, file: map.file }));
  return { maps: known, warnings };
}

function roleOf(candidate: Candidate): RoledMap {
  const { named, decoded, pages } = candidate;
  const inside = decoded.quantity ?? (decoded.unit === undefined ? undefined : knownUnit(decoded.unit.word)?.quantity);
  if (pages === 1 && named.quantity !== undefined && decoded.quantity !== undefined && named.quantity !== decoded.quantity) {
    throw new Problem('role-disagreement', { file: candidate.source, byName: named.quantity, byFile: decoded.quantity });
  }
  // In a file of several maps the name speaks for those pages that say nothing themselves.
  const quantity = pages === 1 ? named.quantity ?? inside : inside ?? named.quantity;
  const biasV = named.biasV ?? decoded.biasV;
  return {
    ...candidate,
    ...(quantity === undefined ? {} : { quantity }),
    direction: named.direction ?? decoded.direction ?? 'forward',
    ...(biasV === undefined ? {} : { biasV }),
  };
}

function refuseTwins(sample: string, maps: readonly RoledMap[]): void {
  for (const [i, first] of maps.entries()) {
    const second = maps.slice(i + 1).find((other) => other.quantity === first.quantity && other.direction === first.direction
      && (first.quantity === 'height' || other.biasV === first.biasV));
    if (second === undefined) continue;
    throw new Problem('role-twice', { sample, first: first.source, second: second.source, role: `${first.direction === 'return' ? 'return ' : ''}${first.quantity}` });
  }
}

function sourceName(file: string, index: number, pages: number, label: string): string {
  if (pages === 1) return file;
  return `${file}#${index + 1}${label === '' ? '' : ` (${label.slice(0, 40)})`}`;
}
