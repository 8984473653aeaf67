import type { App } from '../src/report/appraised.ts';

/** Name and version as package.json states them (a test compares); a worker cannot read that file. */
export const thisApp: App = { name: 'evenglow', version: '0.2.0' };
