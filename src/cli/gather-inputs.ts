/** From paths on the command line to groups of files, one per sample. */
import { readFile, readdir, stat } from 'node:fs/promises';
import { basename, dirname, join, resolve } from 'node:path';
import { Problem } from '../problems/problem.ts';
import { isManifest } from '../read/manifest.ts';
import { groupInputs, wantsContent } from '../read/pairing.ts';
import type { OfferedFile, SampleGroup } from '../read/pairing.ts';

/** A sample to appraise and the folder its files lie in. */
export interface GatheredSample {
  readonly directory: string;
  readonly group: SampleGroup;
}

export interface Gathered {
  /** Sorted by name. */
  readonly samples: readonly GatheredSample[];
  readonly skipped: readonly { readonly name: string; readonly reason: string }[];
  readonly failed: readonly { readonly name: string; readonly problem: Problem }[];
}

/** Texts larger than this are not looked into for grouping: no manifest or note is. */
const lookIntoBytes = 256 * 2 ** 20;

/**
 * Reads folders (without subfolders), finds manifests and groups files by sample, folder by folder. Files that stand
 * beside an explicitly named map and describe it (sidecar, outlines, I–V curves) come along. Nothing throws for a single wrong path.
 */
export async function gatherInputs(paths: readonly string[]): Promise<Gathered> {
  const named = new Map<string, Set<string>>();
  const folders = new Set<string>();
  const failed: { name: string; problem: Problem }[] = [];
  for (const path of paths) {
    try {
      const info = await stat(path);
      if (info.isDirectory()) folders.add(resolve(path));
      else add(named, dirname(resolve(path)), basename(path));
    } catch (error) {
      failed.push({ name: basename(path), problem: unreadable(path, error) });
    }
  }
  const samples: GatheredSample[] = [];
  const skipped: { name: string; reason: string }[] = [];
  for (const directory of new Set([...folders, ...named.keys()])) {
    try {
      const found = await gatherFolder(directory, folders.has(directory), named.get(directory) ?? new Set());
      samples.push(...found.samples.map((group) => ({ directory, group })));
      skipped.push(...found.skipped);
      failed.push(...found.failed);
      if (folders.has(directory) && found.samples.length === 0 && found.failed.length === 0) failed.push({ name: basename(directory), problem: new Problem('input-none', { path: directory }) });
    } catch (error) {
      failed.push({ name: basename(directory), problem: error instanceof Problem ? error : unreadable(directory, error) });
    }
  }
  samples.sort((a, b) => compare(a.group.name, b.group.name) || compare(a.directory, b.directory));
  return { samples, skipped, failed };
}

async function gatherFolder(directory: string, whole: boolean, explicit: ReadonlySet<string>) {
  const entries = await readdir(directory, { withFileTypes: true });
  const present = entries.filter((entry) => !entry.isDirectory() && !entry.name.startsWith('.')).map((entry) => entry.name);
  const manifests = new Set<string>();
  const offered: OfferedFile[] = [];
  for (const name of new Set([...present, ...explicit])) {
    const file = await offer(directory, name, explicit.has(name));
    offered.push(file);
    if (explicit.has(name) && file.bytes && isManifest(file.bytes)) manifests.add(name);
  }
  // Beside a named manifest the folder's maps are on offer, but not its other manifests.
  const others = whole ? [] : offered.filter((file) => file.bytes && !manifests.has(file.name) && isManifest(file.bytes));
  const wanted = whole || manifests.size > 0
    ? offered.filter((file) => !others.includes(file))
    : offered.filter((file) => file.explicit === true || isCompanion(file.name, explicit) || isDescribed(file.name, explicit));
  const grouping = groupInputs(wanted);
  if (whole || manifests.size === 0) return grouping;
  // Named manifests use the folder's files; what else lies there was not asked for.
  const asked = (group: SampleGroup): boolean => group.row !== undefined || group.maps.some((map) => explicit.has(map.file));
  return { samples: grouping.samples.filter(asked), skipped: [], failed: grouping.failed };
}

async function offer(directory: string, name: string, explicit: boolean): Promise<OfferedFile> {
  const file = { name, ...(explicit ? { explicit } : {}) };
  if (!wantsContent(name)) return file;
  const path = join(directory, name);
  const { size } = await stat(path);
  return size > lookIntoBytes ? file : { ...file, bytes: new Uint8Array(await readFile(path)) };
}

/** Whether a file describes one of the named maps: it starts with the same sample name and is a sidecar, outlines or curves. */
function isCompanion(name: string, explicit: ReadonlySet<string>): boolean {
  const stem = /^(.*?)(\.json|\.outlines\.geojson|\.iv\.csv)$/i.exec(name)?.[1];
  if (stem === undefined || stem === '') return false;
  return [...explicit].some((map) => map.startsWith(stem) && /^[._-]/.test(map.slice(stem.length)));
}

/** Whether a named sidecar describes the file: naming `S.json` asks for the maps of S. */
function isDescribed(name: string, explicit: ReadonlySet<string>): boolean {
  return [...explicit].some((file) => {
    const stem = /^(.+)\.json$/i.exec(file)?.[1];
    return stem !== undefined && name.startsWith(stem) && /^[._-]/.test(name.slice(stem.length));
  });
}

function add(map: Map<string, Set<string>>, key: string, value: string): void {
  const set = map.get(key) ?? new Set();
  set.add(value);
  map.set(key, set);
}

function unreadable(path: string, error: unknown): Problem {
  const code = error instanceof Error && 'code' in error ? error.code : undefined;
  if (code === 'ENOENT') return new Problem('input-absent', { path });
  return new Problem('input-unreadable', { path, reason: error instanceof Error ? error.message : String(error) });
}

function compare(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
