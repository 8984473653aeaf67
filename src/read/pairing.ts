/** Which files make up which sample: by manifest rows first, then by name. */
import { Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { parseCompanion, parseMapName, splitExtension } from './file-name.ts';
import type { NamedMap } from './file-name.ts';
import { isManifest, readManifest } from './manifest.ts';
import type { Manifest, ManifestRow } from './manifest.ts';
import { looksLikeMatrix } from './matrix.ts';
import type { Direction, Quantity } from './sample.ts';
import type { Stated } from './sidecar.ts';

/** A file on offer. */
export interface OfferedFile {
  /** File name without its folder. */
  readonly name: string;
  /** True when the person named the file itself; files found in a folder are false or absent. */
  readonly explicit?: boolean;
  /** The bytes of text files (see `wantsContent`); without them a text is taken for what its name says. */
  readonly bytes?: Uint8Array;
}

/** A map file of a sample and what its name or the manifest says about it. */
export interface GroupMap {
  readonly file: string;
  readonly quantity?: Quantity;
  readonly direction?: Direction;
  readonly biasV?: number;
  /** Number of the map within its file, from 1; absent means all. */
  readonly page?: number;
}

export interface SampleGroup {
  readonly name: string;
  readonly maps: readonly GroupMap[];
  readonly iv?: string;
  readonly outlines?: string;
  readonly sidecar?: string;
  /** What the manifest's row states, and where. */
  readonly row?: { readonly by: string; readonly stated: Stated };
  /** Remarks about the manifest, given to its samples. */
  readonly warnings: readonly Notice[];
}

export interface Grouping {
  readonly samples: readonly SampleGroup[];
  /** Files found in folders that no sample uses, with the reason in words. */
  readonly skipped: readonly { readonly name: string; readonly reason: string }[];
  /** Files named explicitly, or manifest rows, that cannot be used: `name` is the sample's or the file's. */
  readonly failed: readonly { readonly name: string; readonly problem: Problem }[];
}

const mapExtensions = ['tif', 'tiff', 'gtiff', 'npy', 'csv', 'tsv', 'txt', 'dat', 'asc', 'xyz'];
const textExtensions = ['csv', 'tsv', 'txt', 'dat', 'asc', 'xyz'];

/** Whether grouping needs the bytes of a file: texts may be maps, manifests or notes. */
export function wantsContent(name: string): boolean {
  return textExtensions.includes(splitExtension(name).extension);
}

/** Names of all files of a group, each once: what `readSample` needs. */
export function filesOf(group: SampleGroup): string[] {
  const names = [...group.maps.map((map) => map.file), group.sidecar, group.iv, group.outlines];
  return [...new Set(names.filter((name) => name !== undefined))];
}

/**
 * Groups files into samples, in the order of their names. A text whose first header is `sample` is a
 * manifest; its rows name files. All other files pair by name. Nothing throws: what cannot be used is
 * in `skipped`, or in `failed` when it was named explicitly or by a manifest.
 */
export function groupInputs(files: readonly OfferedFile[]): Grouping {
  const sorted = [...files].sort((a, b) => (a.name < b.name ? -1 : a.name > b.name ? 1 : 0));
  const grouping = new Gathering(sorted);
  const manifests = sorted.filter((file) => file.bytes !== undefined && wantsContent(file.name) && isManifest(file.bytes));
  for (const file of manifests) grouping.addManifest(file);
  for (const file of sorted) if (!manifests.includes(file)) grouping.addByName(file);
  return grouping.finish();
}

interface Draft { maps: GroupMap[]; files: OfferedFile[]; iv?: string; outlines?: string; sidecar?: string; row?: NonNullable<SampleGroup['row']>; warnings: readonly Notice[] }

class Gathering {
  private readonly names: ReadonlySet<string>;
  private readonly drafts = new Map<string, Draft>();
  private readonly companions: { file: OfferedFile; sample: string; kind: 'iv' | 'outlines' | 'sidecar' }[] = [];
  private readonly claimed = new Set<string>();
  private readonly skipped: { name: string; reason: string }[] = [];
  private readonly failed: { name: string; problem: Problem }[] = [];

  constructor(files: readonly OfferedFile[]) {
    this.names = new Set(files.map((file) => file.name));
  }

  addManifest(file: OfferedFile): void {
    try {
      const manifest = readManifest({ name: file.name, bytes: file.bytes! });
      for (const row of manifest.rows) this.addRow(manifest, row);
    } catch (error) {
      if (!(error instanceof Problem)) throw error;
      this.failed.push({ name: file.name, problem: error });
    }
  }

  private addRow(manifest: Manifest, row: ManifestRow): void {
    try {
      if (row.stated instanceof Problem) throw row.stated;
      const { stated, sample, line } = row;
      const by = `${manifest.file} line ${line}`;
      if (this.drafts.has(sample)) throw new Problem('manifest-sample', { file: manifest.file, line, reason: `sample ${sample} is in another manifest too; rename one` });
      const draft: Draft = { maps: [], files: [], row: { by, stated }, warnings: manifest.warnings };
      for (const quantity of ['height', 'current'] as const) {
        const cell = stated[quantity];
        if (cell === undefined) continue;
        const { file, page } = pageReference(this.names, cell);
        const { direction, biasV } = parseMapName(file);
        draft.maps.push({ file, quantity, ...(direction ? { direction } : {}), ...(biasV === undefined ? {} : { biasV }), ...(page === undefined ? {} : { page }) });
      }
      if (draft.maps.length === 0) throw new Problem('sample-no-map', { sample });
      if (stated.iv !== undefined) draft.iv = plainName(stated.iv);
      if (stated.outlines !== undefined) draft.outlines = plainName(stated.outlines);
      for (const name of [...draft.maps.map((map) => map.file), draft.iv, draft.outlines]) {
        if (name === undefined) continue;
        if (!this.names.has(name)) throw new Problem('file-absent', { sample, file: name, by });
        this.claimed.add(name);
      }
      this.drafts.set(sample, draft);
    } catch (error) {
      if (!(error instanceof Problem)) throw error;
      this.failed.push({ name: row.sample, problem: error });
    }
  }

  addByName(file: OfferedFile): void {
    if (this.claimed.has(file.name)) return;
    const { base, extension } = splitExtension(file.name);
    const companion = parseCompanion(file.name);
    if (companion !== undefined) {
      this.companions.push({ file, ...companion, sample: companion.sample === '' ? lonelyName : companion.sample });
    } else if (extension === 'json') {
      this.companions.push({ file, kind: 'sidecar', sample: base });
    } else if (extension === 'geojson') {
      this.refuse(file, 'outlines are called NAME.outlines.geojson after their sample');
    } else if (!mapExtensions.includes(extension) && file.explicit !== true) {
      this.refuse(file, 'not a format Evenglow reads');
    } else {
      this.addMap(file, parseMapName(file.name));
    }
  }

  private addMap(file: OfferedFile, named: NamedMap): void {
    if (named.quantity === undefined && file.explicit !== true && file.bytes !== undefined && wantsContent(file.name) && !looksLikeMatrix(file.bytes)) {
      this.refuse(file, 'text that is not a matrix of numbers');
      return;
    }
    const { sample: given, ...said } = named;
    const sample = given === '' ? lonelyName : given;
    const draft = this.drafts.get(sample) ?? { maps: [], files: [], warnings: [] };
    draft.maps.push({ file: file.name, ...said });
    draft.files.push(file);
    this.drafts.set(sample, draft);
  }

  private refuse(file: OfferedFile, reason: string): void {
    if (file.explicit === true) this.failed.push({ name: file.name, problem: new Problem('file-unpaired', { file: file.name, reason }) });
    else this.skipped.push({ name: file.name, reason });
  }

  finish(): Grouping {
    for (const { file, sample, kind } of this.companions) {
      const draft = this.drafts.get(sample);
      if (draft === undefined) this.refuse(file, `no map belongs to a sample called ${sample}`);
      else if (draft[kind] === undefined) draft[kind] = file.name;
      else this.refuse(file, `sample ${sample} already has ${draft[kind]}`);
    }
    for (const [name, draft] of this.drafts) this.dropStrays(name, draft);
    const samples = [...this.drafts].flatMap(([name, { files: _, ...draft }]): SampleGroup[] => apart(name, draft));
    return { samples: samples.sort((a, b) => (a.name < b.name ? -1 : 1)), skipped: this.skipped, failed: this.failed };
  }

  /** `S.tif` beside `S.height.tif` and `S.current.tif` is a picture or a spare, not a third channel. */
  private dropStrays(name: string, draft: Draft): void {
    if (!draft.files.some((file) => parseMapName(file.name).quantity !== undefined)) return;
    for (const file of draft.files) {
      if (parseMapName(file.name).quantity !== undefined) continue;
      draft.maps = draft.maps.filter((map) => map.file !== file.name);
      this.refuse(file, `its name gives no role while other files give the channels of sample ${name}`);
    }
  }
}

/**
 * `S.tif` and `S.npy` without a word about their roles are two looks at one thing rather than two channels: each becomes a sample, called by its
 * whole file name. With a sidecar, which may say which is which, they stay together.
 */
function apart(name: string, draft: Omit<SampleGroup, 'name'>): SampleGroup[] {
  const files = new Set(draft.maps.map((map) => map.file));
  if (files.size < 2 || draft.sidecar !== undefined || draft.row !== undefined || draft.maps.some((map) => map.quantity !== undefined)) return [{ name, ...draft }];
  return draft.maps.map((map) => ({ ...draft, name: map.file, maps: [map] }));
}

/** Name of a sample whose files are called just `height.tif` and `current.tif`. */
const lonelyName = 'sample';

/** `file.tif#2` is the second map of file.tif, unless a file is really called that. */
function pageReference(names: ReadonlySet<string>, cell: string): { file: string; page?: number } {
  const name = plainName(cell);
  const parts = names.has(name) ? null : /^(.+)#(\d{1,4})$/.exec(name);
  return parts === null ? { file: name } : { file: parts[1]!, page: Number(parts[2]) };
}

/** Manifests name files beside them; a leading "./" says the same. */
function plainName(cell: string): string {
  return cell.replace(/^\.[/\\]/, '');
}
