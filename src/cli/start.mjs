/** `npm start`: sets a fresh clone up, builds the page and serves it on this computer only. */
import { projectRoot, say, setUp } from './setup/set-up.mjs';

setUp().then(async () => {
  const { build } = await import('vite');
  await build({ root: `${projectRoot}web`, logLevel: 'warn' });
  const { register } = await import('tsx/esm/api');
  register({ tsconfig: `${projectRoot}tsconfig.json` });
  const { serveUntilStopped } = await import('./serve/serve.ts');
  await serveUntilStopped(`${projectRoot}dist`, process.env);
}).catch((error) => {
  say(error && error.stack ? error.stack : String(error));
  process.exit(1);
});
