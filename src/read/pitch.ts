/** The size of a map's pixels from everything that is stated about it; disagreement is an error, silence is not filled by guessing. */
import { notice, Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import { largestPitchM } from './decoded-map.ts';
import type { PitchStatement } from './decoded-map.ts';

/** Full size of the map in µm along each axis, as somebody stated it. */
export interface SizeStatement {
  /** Who stated it, in words that fit "by …" ("the sidecar S.json", "scan.widthUm"). */
  readonly by: string;
  readonly widthUm?: number | undefined;
  readonly heightUm?: number | undefined;
}

export interface PitchAnswer {
  /** Pixel pitch in metres; absent when nothing states it. */
  readonly pitch?: { readonly xM: number; readonly yM: number };
  readonly warnings: readonly Notice[];
}

export interface PitchQuestion {
  readonly file: string;
  readonly columns: number;
  readonly rows: number;
  readonly pitches: readonly PitchStatement[];
  readonly sidecar?: SizeStatement | undefined;
  readonly recipe: SizeStatement;
}

/** Below this nothing is a pixel; a bare scale in metres is not taken for µm. */
const smallestPitchM = 1e-12;
/** Statements that differ by no more than this share agree. */
const tolerance = 0.01;

/**
 * Pitch of one map. Our own tag, the sidecar and resolution tags must agree within 1 %; the recipe wins over
 * all but our tag, which it must not contradict. A bare pixel scale counts as µm when another
 * statement agrees with it, or when there is none and it lies below 10 µm (with a remark). Width alone
 * means square pixels. Throws `size-disagreement`.
 */
export function resolvePitch(question: PitchQuestion): PitchAnswer {
  const { file, columns, rows, recipe } = question;
  const warnings: Notice[] = [];
  const tag = fileStatement(question, 'tag', 'its own description');
  const resolution = fileStatement(question, 'resolution', 'its resolution tags');
  const sidecar = isStated(question.sidecar) ? question.sidecar : undefined;
  const certain = [tag, sidecar, resolution].filter((statement) => statement !== undefined);

  if (isStated(recipe)) {
    if (tag !== undefined) refuse(file, tag, recipe, `leave out ${recipe.by}, or correct the file`);
    for (const other of certain) warnings.push(...overridden(file, recipe, other));
  } else {
    const way = tag === undefined ? 'correct the wrong one, or decide with --set scan.widthUm' : 'correct the wrong one';
    for (const [i, first] of certain.entries()) {
      for (const second of certain.slice(i + 1)) refuse(file, first, second, way);
    }
  }
  // One axis from the recipe must not be mixed with the other axis of a statement that it overrides.
  const usable = [recipe, ...certain.filter((statement) => differing(recipe, statement) === undefined)];
  let widthUm = usable.find((statement) => statement.widthUm !== undefined)?.widthUm;
  let heightUm = usable.find((statement) => statement.heightUm !== undefined)?.heightUm;

  const scale = scaleStatement(question);
  if (scale !== undefined) {
    const said: SizeStatement = { by: 'the statements above', widthUm, heightUm };
    if (!isStated(said)) {
      if (scale.plausible) {
        warnings.push(notice('size-assumed', { file, pitchXUm: short(scale.x), pitchYUm: short(scale.y) }));
        ({ widthUm, heightUm } = scale.sizes[0]!);
      }
    } else {
      const agreeing = scale.sizes.find((size) => differing(said, size) === undefined);
      if (agreeing !== undefined) {
        widthUm ??= agreeing.widthUm;
        heightUm ??= agreeing.heightUm;
      } else if (scale.plausible && isStated(recipe)) {
        warnings.push(...overridden(file, recipe, scale.sizes[0]!));
      } else if (scale.plausible) {
        for (const other of certain) refuse(file, scale.sizes[0]!, other, 'correct the wrong one, or decide with --set scan.widthUm');
      }
    }
  }
  const xM = widthUm === undefined ? undefined : (widthUm * 1e-6) / columns;
  const yM = heightUm === undefined ? undefined : (heightUm * 1e-6) / rows;
  if (xM === undefined && yM === undefined) return { warnings };
  return { pitch: { xM: (xM ?? yM)!, yM: (yM ?? xM)! }, warnings };
}

/** Whether two lengths agree within 1 %. */
export function agree(a: number, b: number): boolean {
  return Math.abs(a - b) <= tolerance * Math.max(Math.abs(a), Math.abs(b));
}

function isStated(statement: SizeStatement | undefined): statement is SizeStatement {
  return statement?.widthUm !== undefined || statement?.heightUm !== undefined;
}

function fileStatement(question: PitchQuestion, by: 'tag' | 'resolution', words: string): SizeStatement | undefined {
  const found = question.pitches.find((pitch) => pitch.by === by);
  if (found === undefined || found.by === 'scale') return undefined;
  return { by: words, widthUm: found.xM * 1e6 * question.columns, heightUm: found.yM * 1e6 * question.rows };
}

/** The bare scale as it would be in µm, nm, m and mm; only the first is ever assumed, the others can only be confirmed. */
function scaleStatement(question: PitchQuestion): { x: number; y: number; plausible: boolean; sizes: SizeStatement[] } | undefined {
  const found = question.pitches.find((pitch) => pitch.by === 'scale');
  if (found === undefined || found.by !== 'scale') return undefined;
  const { x, y } = found;
  const inRange = [x, y].every((side) => side * 1e-6 < largestPitchM && side * 1e-6 >= smallestPitchM);
  const sizes = [1, 1e-3, 1e6, 1e3].map((perUnit) => ({
    by: 'its pixel scale', widthUm: x * perUnit * question.columns, heightUm: y * perUnit * question.rows,
  }));
  return { x, y, plausible: found.plain && inRange, sizes };
}

type Axis = 'widthUm' | 'heightUm';

function differing(a: SizeStatement, b: SizeStatement): Axis | undefined {
  return (['widthUm', 'heightUm'] as const).find((axis) => a[axis] !== undefined && b[axis] !== undefined && !agree(a[axis], b[axis]));
}

const axisWords: Readonly<Record<Axis, string>> = { widthUm: 'wide', heightUm: 'high' };

function refuse(file: string, first: SizeStatement, second: SizeStatement, way: string): void {
  const axis = differing(first, second);
  if (axis === undefined) return;
  throw new Problem('size-disagreement', {
    file, axis: axisWords[axis], first: first.by, firstUm: short(first[axis]!), second: second.by, secondUm: short(second[axis]!), way,
  });
}

function overridden(file: string, used: SizeStatement, other: SizeStatement): Notice[] {
  const axis = differing(used, other);
  if (axis === undefined) return [];
  return [notice('size-overridden', {
    file, axis: axisWords[axis], first: used.by, firstUm: short(used[axis]!), second: other.by, secondUm: short(other[axis]!),
  })];
}

function short(value: number): string {
  return String(Number(value.toPrecision(5)));
}
