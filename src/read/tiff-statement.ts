/**
 * Our own statement in a TIFF's ImageDescription (tag 270): JSON such as
 * `{"evenglow":1,"quantity":"height","unit":"nm","pitchUnit":"um"}`.
 * It makes the GeoTIFF pixel scale a statement in µm and the values' unit certain.
 */
import { Problem } from '../problems/problem.ts';
import type { Direction } from './sample.ts';

/** Version of the statement that is written; newer ones are refused. */
export const statementVersion = 1;

export interface TiffStatement {
  /** What the values are: `height`, `current`, or the name of a result (`causes`, `thickness`, `glow`). */
  readonly quantity: string;
  /** Unit of the values (`nm`, `A`, `relative`); absent for codes and numbers. */
  readonly unit?: string;
  /** Unit of the GeoTIFF pixel scale and tie point. */
  readonly pitchUnit: 'um';
  readonly direction?: Direction;
  readonly biasV?: number;
}

/** The text for tag 270. Keys are in a fixed order, so equal statements give equal bytes. */
export function writeStatement(statement: TiffStatement): string {
  return JSON.stringify({
    evenglow: statementVersion, quantity: statement.quantity, unit: statement.unit, pitchUnit: statement.pitchUnit,
    direction: statement.direction, biasV: statement.biasV,
  });
}

/**
 * Reads our statement from the text of tag 270; undefined when the text is not ours.
 * Throws `tiff-statement` when it is ours but newer, or a field has a wrong type or value.
 */
export function parseStatement(file: string, text: string): TiffStatement | undefined {
  const json = jsonObject(text);
  if (json === undefined || !('evenglow' in json)) return undefined;
  const refuse = (reason: string) => new Problem('tiff-statement', { file, reason });
  const { evenglow, quantity, unit, pitchUnit, direction, biasV } = json;
  if (typeof evenglow !== 'number') throw refuse('has no version number; write the file again');
  if (evenglow > statementVersion) throw refuse(`has version ${evenglow}, this program knows up to ${statementVersion}; update Evenglow to read it`);
  if (typeof quantity !== 'string') throw refuse('names no quantity; write the file again');
  if (unit !== undefined && typeof unit !== 'string') throw refuse('has a unit that is not a word; write the file again');
  if (pitchUnit !== 'um') throw refuse(`gives the pixel scale in ${JSON.stringify(pitchUnit)}, only "um" is known; write the scale in µm`);
  if (direction !== undefined && direction !== 'forward' && direction !== 'return') throw refuse(`has the direction ${JSON.stringify(direction)}; use "forward" or "return"`);
  if (biasV !== undefined && (typeof biasV !== 'number' || !Number.isFinite(biasV))) throw refuse('has a bias that is not a number; write the file again');
  return {
    quantity, pitchUnit,
    ...(unit === undefined ? {} : { unit }),
    ...(direction === undefined ? {} : { direction }),
    ...(biasV === undefined ? {} : { biasV }),
  };
}

/** The object in a description that is JSON, whoever wrote it; undefined otherwise. */
export function jsonObject(text: string): Readonly<Record<string, unknown>> | undefined {
  if (!text.trimStart().startsWith('{')) return undefined;
  try {
    const value: unknown = JSON.parse(text);
    return typeof value === 'object' && value !== null && !Array.isArray(value) ? value as Record<string, unknown> : undefined;
  } catch {
    return undefined;
  }
}
