#!/usr/bin/env node
/** The command `evenglow`: sets a fresh clone up, lets Node read TypeScript, and hands over to main.ts. */
import { projectRoot, setUp } from './setup/set-up.mjs';

setUp().then(async () => {
  const { register } = await import('tsx/esm/api');
  // Named, or the tsconfig.json of the folder it is called from would be read.
  register({ tsconfig: `${projectRoot}tsconfig.json` });
  const { main } = await import('./main.ts');
  process.exitCode = await main(process.argv.slice(2));
}).catch((error) => {
  // main() turns every foreseen problem into a sentence itself; what arrives here is a bug.
  process.stderr.write(`evenglow: unexpected error, please report it.\n${error && error.stack ? error.stack : error}\n`);
  process.exitCode = 70;
});
