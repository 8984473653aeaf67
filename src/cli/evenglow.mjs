#!/usr/bin/env node
/** The command `evenglow`: sets a fresh clone up, loads the command line, bundled where that is possible, and hands over to it. */
import { projectRoot, setUp } from './setup/set-up.mjs';

setUp().then(async () => {
  process.env['EVENGLOW_ROOT'] = projectRoot;
  const { entryOf } = await import('./setup/bundle.mjs');
  const { main } = await import(await entryOf(projectRoot, 'main'));
  process.exitCode = await main(process.argv.slice(2));
}).catch((error) => {
  // main() turns every foreseen problem into a sentence itself; what arrives here is a bug.
  process.stderr.write(`evenglow: unexpected error, please report it.\n${error && error.stack ? error.stack : error}\n`);
  process.exitCode = 70;
});
