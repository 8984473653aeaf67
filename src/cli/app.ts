import { readFileSync } from 'node:fs';
import type { App } from '../report/appraised.ts';

/** Name and version of this program, from package.json. */
export function thisApp(): App {
  const text = readFileSync(new URL('../../package.json', import.meta.url), 'utf8');
  const { name, version } = JSON.parse(text) as { name: string; version: string };
  return { name, version };
}
