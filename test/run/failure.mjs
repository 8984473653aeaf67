/** Turns what a failed test threw into the lines a person needs: the message and where in our files. */

/**
 * @param {unknown} error as node:test reports it: the thrown value is its cause
 * @param {string} root the project's folder, left out of what is printed
 * @returns {string}
 */
export function describeFailure(error, root) {
  const thrown = causeOf(error);
  if (!(thrown instanceof Error) && !isErrorLike(thrown)) return String(thrown);
  const message = String(thrown.message);
  const stack = typeof thrown.stack === 'string' ? thrown.stack.split('\n') : [];
  const own = stack.filter((line) => /^\s+at /.test(line) && !/node:|node_modules/.test(line)).slice(0, 6);
  return [message.trimEnd(), ...own.map((line) => line.trim().replace('file://', '').replace(root, ''))].join('\n');
}

/**
 * @param {unknown} error
 * @returns {unknown}
 */
function causeOf(error) {
  if (typeof error === 'object' && error !== null && 'code' in error && error.code === 'ERR_TEST_FAILURE' && 'cause' in error && error.cause) {
    return error.cause;
  }
  return error;
}

/**
 * Errors from another process arrive as plain objects.
 * @param {unknown} value
 * @returns {value is { message: string, stack?: string }}
 */
function isErrorLike(value) {
  return typeof value === 'object' && value !== null && 'message' in value;
}
