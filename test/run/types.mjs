/** Checks the types of every realm, each with the library it may use. Prints what is wrong; code 1 when anything is. */
import { spawnSync } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { projectRoot } from '../../src/cli/setup/set-up.mjs';

/** Folder of each realm's tsconfig.json. */
const realms = ['.', 'src/cli', 'workers', 'web', 'test', 'test/browser'];

const compiler = join(projectRoot, 'node_modules/typescript/bin/tsc');
let wrong = 0;
for (const realm of realms) {
  // A realm without a source yet is no error, but tsc takes it for one.
  if (!holdsTypeScript(join(projectRoot, realm === '.' ? 'src' : realm))) continue;
  const done = spawnSync(process.execPath, [compiler, '-p', realm, '--pretty', 'false'], { cwd: projectRoot, stdio: 'inherit' });
  if (done.status !== 0) wrong++;
}
process.exitCode = wrong > 0 ? 1 : 0;

/** @param {string} folder */
function holdsTypeScript(folder) {
  return readdirSync(folder, { recursive: true }).some((name) => String(name).endsWith('.ts'));
}
