/** What stands above a group of the tray, and by what it is ranked. */
import { isRanked } from './rank.ts';
import type { Group, GroupName } from './rank.ts';

const titles: Readonly<Record<GroupName, string>> = {
  asking: 'Your answer is needed',
  glows: 'Even, and known to glow',
  even: 'Even, but not known to glow',
  'flaw-free': 'Free of flaws, from height alone',
  'at-work': 'At work',
  failed: 'Not appraised',
};

export function groupHeading({ name, rows }: Group, requiredUm2: number | undefined): { readonly title: string; readonly how: string } {
  if (name === 'even' && rows.length > 1) return { title: titles[name], how: `${rows.length}, not ranked by area: each against a reference of its own` };
  if (!isRanked(name)) return { title: titles[name], how: String(rows.length) };
  const by = requiredUm2 === undefined ? 'by largest patch' : 'by the required area, then by usable area';
  return { title: titles[name], how: rows.length === 1 ? '1' : `${rows.length}, ranked ${by}` };
}
