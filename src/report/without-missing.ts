/**
 * A copy of a plain JSON value without anything that JSON cannot carry: properties that are NaN,
 * infinite or undefined are absent in the copy, minus zero becomes zero.
 *
 * A missing element of an array is refused with a RangeError, because leaving it out would shift
 * the others; result files therefore hold lists of objects, never of bare measurements.
 */
export function withoutMissing<T>(value: T): T {
  // The cast holds as long as callers type what may be missing as optional, or as a number they guarantee.
  return pruned(value) as T;
}

function pruned(value: unknown): unknown {
  if (typeof value === 'number') return value === 0 ? 0 : value;
  if (Array.isArray(value)) {
    return value.map((element: unknown, index) => {
      if (isMissing(element)) throw new RangeError(`element ${index} of a list in a result is missing`);
      return pruned(element);
    });
  }
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).filter(([, child]) => !isMissing(child));
  return Object.fromEntries(entries.map(([key, child]) => [key, pruned(child)]));
}

function isMissing(value: unknown): boolean {
  return value === undefined || (typeof value === 'number' && !Number.isFinite(value));
}
