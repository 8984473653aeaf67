/** Which versions of Node can run Evenglow. Written so that much older ones still parse it. */

/** What the build tool supports; `engines` in package.json says the same. */
export const nodeNeeded = '20.19 or newer (on the 22 line 22.12 or newer)';

/**
 * A sentence when this version of Node is too old, else nothing.
 * @param {string} version such as `20.19.0` or `v20.19.0`
 * @returns {string | undefined}
 */
export function nodeTooOld(version) {
  const parts = version.replace(/^v/, '').split('.');
  const major = Number(parts[0]);
  const minor = Number(parts[1]);
  if (major > 22 || (major === 22 && minor >= 12) || (major === 20 && minor >= 19)) return undefined;
  return 'Evenglow needs Node ' + nodeNeeded + '; this is Node ' + version.replace(/^v/, '') + '. Install a newer Node and run the command again.';
}
