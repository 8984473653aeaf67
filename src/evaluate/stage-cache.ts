/** Results of stages, kept by key and bounded in bytes. */

/** Least recently used results are dropped first once the kept ones exceed the limit. */
export class StageCache {
  private readonly entries = new Map<string, { value: unknown; bytes: number }>();
  private readonly limitBytes: number;
  private total = 0;

  constructor(limitBytes: number) {
    this.limitBytes = limitBytes;
  }

  /** Bytes of the maps kept now. */
  get bytes(): number {
    return this.total;
  }

  /** The result under a key, computed when it is not there. A result larger than the whole limit is handed on but not kept. */
  take<T>(key: string, compute: () => T): T {
    const known = this.entries.get(key);
    if (known) {
      this.entries.delete(key);
      this.entries.set(key, known);
      return known.value as T;
    }
    const value = compute();
    const bytes = mapBytes(value);
    if (bytes <= this.limitBytes) {
      this.entries.set(key, { value, bytes });
      this.total += bytes;
      for (const [oldest, entry] of this.entries) {
        if (this.total <= this.limitBytes) break;
        this.entries.delete(oldest);
        this.total -= entry.bytes;
      }
    }
    return value;
  }

  clear(): void {
    this.entries.clear();
    this.total = 0;
  }
}

/** Bytes of all typed arrays reachable through plain objects, arrays and ndarrays. */
export function mapBytes(value: unknown): number {
  const seen = new Set<unknown>();
  const visit = (at: unknown): number => {
    if (typeof at !== 'object' || at === null || seen.has(at)) return 0;
    seen.add(at);
    if (ArrayBuffer.isView(at)) {
      if (seen.has(at.buffer)) return 0;
      seen.add(at.buffer);
      return at.buffer.byteLength;
    }
    let sum = 0;
    for (const inner of Object.values(at)) sum += visit(inner);
    return sum;
  };
  return visit(value);
}
