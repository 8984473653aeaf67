/** Units, bias and the common grid of a sample's maps; everything that nothing states is asked for in one sentence. */
import type { Grid } from '../grid/maps.ts';
import { notice, Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { agree, resolvePitch } from './pitch.ts';
import type { ScanSection } from './recipe.ts';
import type { RoledMap } from './roles.ts';
import type { Quantity } from './sample.ts';
import type { Stated } from './sidecar.ts';
import { resolveUnit } from './unit-of-channel.ts';
import type { GivenUnit } from './unit-of-channel.ts';
import { unitOption } from './units.ts';
import type { KnownUnit } from './units.ts';

/** A map about which everything is known. */
export interface Settled extends Omit<RoledMap, 'quantity'> {
  readonly quantity: Quantity;
  readonly unit: KnownUnit;
}

/** What sidecar and manifest state, and the words for them. */
export interface Statements {
  readonly stated: Stated;
  readonly by: string;
}

type Pitch = { readonly xM: number; readonly yM: number };

/**
 * Settles all maps of a sample. Throws `grid-mismatch` when shapes differ or pitches differ by more than 1 %,
 * `bias-disagreement`, `statements-missing` naming every role, unit and size that nothing states with the options that supply them,
 * and what `resolveUnit` and `resolvePitch` throw.
 */
export function settleStatements(sample: string, maps: readonly RoledMap[], statements: Statements, scan: ScanSection): { maps: Settled[]; grid: Grid; warnings: Notice[] } {
  const warnings: Notice[] = [];
  const missing = new Missing();
  checkShapes(sample, maps);
  const currents = maps.filter((map) => map.quantity === 'current' && map.direction === 'forward').length;
  const settled: Settled[] = [];
  for (const map of maps) {
    const { quantity } = map;
    if (quantity === undefined) {
      missing.add(`whether ${map.source} is a height or a current`, '--set scan.channel=height|current');
      if (scan.heightUnit === undefined && scan.currentUnit === undefined && map.decoded.unit === undefined) {
        missing.add('its unit', `${unitOption('height')} or ${unitOption('current')}`);
      }
      continue;
    }
    const { unit, warnings: remarks } = resolveUnit({ file: map.source, quantity, stated: map.decoded.unit, ...givenUnits(quantity, statements, scan) });
    warnings.push(...remarks);
    if (unit === undefined) missing.add(`the unit of ${map.source}`, unitOption(quantity));
    else settled.push({ ...withBias(map, currents, statements, scan, warnings), quantity, unit });
  }
  const pitch = commonPitch(sample, maps, statements, scan, warnings);
  if (pitch === undefined) missing.add('the size of the map', '--set scan.widthUm=10');
  if (pitch === undefined || missing.any()) throw missing.problem(sample);
  const { columns, rows } = maps[0]!.decoded;
  return { maps: settled, grid: { columns, rows, pitchXM: pitch.xM, pitchYM: pitch.yM }, warnings };
}

/** Gathers what nothing states, so that a person is asked once. */
class Missing {
  private readonly what: string[] = [];
  private readonly options: string[] = [];

  add(what: string, option: string): void {
    this.what.push(what);
    if (!this.options.includes(option)) this.options.push(option);
  }

  any(): boolean {
    return this.what.length > 0;
  }

  problem(sample: string): Problem {
    return new Problem('statements-missing', { sample, what: listed(this.what), options: listed(this.options) });
  }
}

function listed(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}

function givenUnits(quantity: Quantity, { stated, by }: Statements, scan: ScanSection): { sidecar?: GivenUnit; recipe?: GivenUnit } {
  const key = quantity === 'height' ? 'heightUnit' : 'currentUnit';
  const inSidecar = stated[key];
  const inRecipe = scan[key];
  return {
    ...(inSidecar === undefined ? {} : { sidecar: { by, word: inSidecar } }),
    ...(inRecipe === undefined ? {} : { recipe: { by: `scan.${key}`, word: inRecipe } }),
  };
}

/**
 * The bias of a current map. With several forward currents their names (or tags) tell them apart, a sidecar speaks for those that say nothing, and
 * `scan.biasV` only says which comes first. A single one's name, its tag and sidecar or manifest must agree within 1 %, as sizes must;
 * the recipe wins over all of them, with a remark. Throws `bias-disagreement`.
 */
function withBias(map: RoledMap, currents: number, { stated, by }: Statements, scan: ScanSection, warnings: Notice[]): RoledMap {
  if (map.quantity !== 'current') return map;
  const toldApart = currents > 1 && map.biasV !== undefined;
  const said = [
    { by: 'its name', biasV: map.named.biasV }, { by: 'its own description', biasV: map.decoded.biasV }, ...(toldApart ? [] : [{ by, biasV: stated.biasV }]),
  ].filter((statement): statement is { by: string; biasV: number } => statement.biasV !== undefined);
  const [first] = said;
  const asked = toldApart ? undefined : scan.biasV;
  const biasV = asked ?? first?.biasV;
  if (biasV === undefined || first === undefined) return biasV === undefined ? map : { ...map, biasV };
  const other = said.find((statement) => !agree(statement.biasV, biasV));
  if (other !== undefined) {
    if (asked === undefined) throw new Problem('bias-disagreement', { file: map.source, first: first.by, firstV: first.biasV, second: other.by, secondV: other.biasV });
    warnings.push(notice('bias-overridden', { file: map.source, statedV: other.biasV, usedV: biasV, by: other.by }));
  }
  return { ...map, biasV };
}

function checkShapes(sample: string, maps: readonly RoledMap[]): void {
  const [first, ...others] = maps;
  for (const other of others) {
    const a = first!.decoded;
    const b = other.decoded;
    if (a.columns === b.columns && a.rows === b.rows) continue;
    throw new Problem('grid-mismatch', {
      sample, first: first!.source, second: other.source, firstSize: `${a.columns} × ${a.rows} pixels`, secondSize: `${b.columns} × ${b.rows} pixels`,
    });
  }
}

/** One pitch for all: a map that states none lies on the grid of those that do. */
function commonPitch(sample: string, maps: readonly RoledMap[], { stated, by }: Statements, scan: ScanSection, warnings: Notice[]): Pitch | undefined {
  let common: { pitch: Pitch; source: string } | undefined;
  for (const map of maps) {
    const { columns, rows, pitches } = map.decoded;
    const answer = resolvePitch({
      file: map.source, columns, rows, pitches,
      sidecar: { by, widthUm: stated.widthUm, heightUm: stated.heightUm },
      recipe: { by: scan.widthUm === undefined ? 'scan.heightUm' : 'scan.widthUm', widthUm: scan.widthUm, heightUm: scan.heightUm },
    });
    warnings.push(...answer.warnings);
    if (answer.pitch === undefined) continue;
    common ??= { pitch: answer.pitch, source: map.source };
    if (!agree(common.pitch.xM, answer.pitch.xM) || !agree(common.pitch.yM, answer.pitch.yM)) {
      throw new Problem('grid-mismatch', { sample, first: common.source, second: map.source, firstSize: pixelWords(common.pitch), secondSize: pixelWords(answer.pitch) });
    }
  }
  return common?.pitch;
}

function pixelWords(pitch: Pitch): string {
  return `${Number((pitch.xM * 1e9).toPrecision(5))} × ${Number((pitch.yM * 1e9).toPrecision(5))} nm per pixel`;
}
