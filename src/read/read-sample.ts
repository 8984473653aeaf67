/** One sample from its files: decoded, given roles, units and size, checked, in SI. */
import { scalarMap } from '../grid/maps.ts';
import type { Grid } from '../grid/maps.ts';
import { Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { decodeMaps } from './decode.ts';
import { footprintOf } from './footprint.ts';
import type { InputFile } from './input.ts';
import { mirrorMap } from './mirror.ts';
import { readOutlines } from './outlines.ts';
import type { SampleGroup } from './pairing.ts';
import type { ScanSection } from './recipe.ts';
import { assignRoles, candidatesOf } from './roles.ts';
import type { Candidate } from './roles.ts';
import type { Channel, Quantity, Sample } from './sample.ts';
import { settleStatements } from './settle-statements.ts';
import type { Settled } from './settle-statements.ts';
import { mergeStated, readSidecar } from './sidecar.ts';
import type { Stated } from './sidecar.ts';
import { sourceRecords } from './sources.ts';
import { toSi } from './to-si.ts';

/**
 * Reads a sample. `files` holds at least the files that `filesOf(group)` names; their bytes are not changed.
 * `sha256` gives the hexadecimal digest of a file's bytes.
 * A recipe value that is set wins over sidecar and manifest; `scan.surface` and `scan.biasOn` have defaults, so only a
 * value other than the default counts as set. Outlines are in the frame of the map after mirroring.
 * Channels come in this order: forward height, return height, then currents, the one at `scan.biasV`
 * first and else the largest |bias| first. Throws `Problem`: the first thing that makes the sample unusable,
 * and in one sentence everything that nothing states.
 */
export async function readSample(group: SampleGroup, files: readonly InputFile[], scan: ScanSection, sha256: (bytes: Uint8Array) => Promise<string>): Promise<Sample> {
  const find = (name: string): InputFile => {
    const file = files.find((offered) => offered.name === name);
    if (file === undefined) throw new Problem('file-absent', { sample: group.name, file: name, by: 'the sample' });
    return file;
  };
  const warnings: Notice[] = [...group.warnings];
  const { stated, by } = statements(group, find, warnings);

  const candidates: Candidate[] = [];
  for (const named of withSidecarRoles(group, stated, by)) {
    candidates.push(...candidatesOf(group.name, named, await decodeMaps(find(named.file))));
  }
  const lone = scan.channel ?? (stated.role === 'height' || stated.role === 'current' ? stated.role : undefined);
  const roles = assignRoles(group.name, candidates, lone);
  warnings.push(...roles.warnings);
  const settled = settleStatements(group.name, roles.maps, { stated, by }, scan);
  warnings.push(...settled.warnings);
  const { grid } = settled;

  const channels = settled.maps.map((map) => channelFrom(map, grid, scan));
  const outlines = group.outlines === undefined ? [] : readOutlines(find(group.outlines));
  const footprint = footprintOf(grid, outlines);
  if (!footprint.data.includes(1)) throw new Problem('footprint-empty', { sample: group.name, file: group.outlines ?? '' });

  const sources = await sourceRecords(group, (name) => find(name).bytes, sha256);
  return {
    name: group.name, grid, channels: inOrder(channels, scan),
    surface: scan.surface === 'stack' ? 'stack' : stated.surface ?? scan.surface,
    frame: { centreXM: scan.centreXUm * 1e-6, centreYM: scan.centreYUm * 1e-6, rotationDeg: scan.rotationDeg, slowUp: scan.slowUp },
    outlines, footprint, sources, warnings,
  };
}

/** Sidecar and manifest row as one set of statements, and the words for who stated them. */
function statements(group: SampleGroup, find: (name: string) => InputFile, warnings: Notice[]): { stated: Stated; by: string } {
  if (group.sidecar === undefined) return { stated: group.row?.stated ?? {}, by: group.row?.by ?? 'the sidecar' };
  const sidecar = readSidecar(find(group.sidecar));
  warnings.push(...sidecar.warnings);
  if (group.row === undefined) return { stated: sidecar.stated, by: `the sidecar ${group.sidecar}` };
  const stated = mergeStated(group.name, group.row, { by: group.sidecar, stated: sidecar.stated });
  return { stated, by: `${group.row.by} or ${group.sidecar}` };
}

/** A sidecar may say which of the group's files is which: `"height":"a.tif"`, `"current":"a.tif#2"`. */
function withSidecarRoles(group: SampleGroup, stated: Stated, by: string): SampleGroup['maps'] {
  if (group.row !== undefined) return group.maps;
  const references = (['height', 'current'] as const).flatMap((quantity) => {
    const cell = stated[quantity];
    if (cell === undefined) return [];
    const exact = group.maps.find((map) => map.file === cell);
    const parts = exact === undefined ? /^(.+)#(\d{1,4})$/.exec(cell) : null;
    const map = exact ?? group.maps.find((known) => known.file === parts?.[1]);
    if (map === undefined) throw new Problem('file-absent', { sample: group.name, file: cell, by });
    if (map.quantity !== undefined && map.quantity !== quantity) throw new Problem('role-disagreement', { file: map.file, byName: map.quantity, byFile: `${quantity} by ${by}` });
    return [{ ...map, quantity, ...(parts === null ? {} : { page: Number(parts[2]) }) }];
  });
  const named = new Set(references.map((map) => map.file));
  return [...group.maps.filter((map) => !named.has(map.file)), ...references];
}

function channelFrom(map: Settled, grid: Grid, scan: ScanSection): Channel {
  const { quantity, unit, decoded } = map;
  const onTip = scan.biasOn === 'tip' && quantity === 'current';
  const data = toSi(map.source, quantity, decoded.values, unit, onTip ? -1 : 1);
  mirrorMap(data, grid.columns, grid.rows, scan.flipX, scan.flipY);
  const biasV = map.biasV === undefined ? undefined : onTip && map.biasV !== 0 ? -map.biasV : map.biasV;
  return {
    quantity, direction: map.direction, source: map.source, values: scalarMap(grid, data),
    unit: quantity === 'height' ? 'm' : unit.unit === 'relative' ? 'relative' : 'A', readIn: unit.unit,
    ...(biasV === undefined || quantity === 'height' ? {} : { biasV }),
  };
}

function inOrder(channels: readonly Channel[], scan: ScanSection): Channel[] {
  const wanted = scan.biasV === undefined ? undefined : scan.biasOn === 'tip' ? -scan.biasV : scan.biasV;
  const rank: Readonly<Record<Quantity, number>> = { height: 0, current: 2 };
  const place = (channel: Channel) => rank[channel.quantity] + (channel.direction === 'return' ? 1 : 0);
  const distance = (channel: Channel) => (channel.biasV !== undefined && channel.biasV === wanted ? -Infinity : -Math.abs(channel.biasV ?? 0));
  return [...channels].sort((a, b) => place(a) - place(b) || (distance(a) < distance(b) ? -1 : distance(a) > distance(b) ? 1 : 0));
}

