import assert from 'node:assert/strict';
import { Problem } from '../../src/problems/problem.ts';

/** The problem that `run` throws; fails when it throws anything else or nothing. */
export async function refused(run: () => unknown): Promise<Problem> {
  try {
    await run();
  } catch (error) {
    assert.ok(error instanceof Problem, error instanceof Error ? error.stack : String(error));
    assert.match(error.message, /\.$/);
    return error;
  }
  assert.fail('nothing was refused');
}

export function textBytes(text: string): Uint8Array {
  return new TextEncoder().encode(text);
}
