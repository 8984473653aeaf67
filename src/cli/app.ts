import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { App } from '../report/appraised.ts';
import { root } from './root.ts';

/** Name and version of this program, from package.json. */
export function thisApp(): App {
  const text = readFileSync(join(root, 'package.json'), 'utf8');
  const { name, version } = JSON.parse(text) as { name: string; version: string };
  return { name, version };
}
