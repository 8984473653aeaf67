/** Samples as read and appraisals as last made, kept while they fit into a number of bytes. */
import { mapBytes } from '../src/evaluate/stage-cache.ts';
import type { Sample } from '../src/read/sample.ts';
import type { Appraised } from '../src/report/appraised.ts';

export interface Kept {
  readonly sample: Sample;
  /** Recipe section the sample was read by, as text. */
  readonly scan: string;
  readonly readMs: number;
  readonly appraised?: Appraised;
}

/** The least recently used are dropped first; the newest stays whatever its size, because it is what is being looked at. */
export class KeptAppraisals {
  private readonly entries = new Map<string, { readonly kept: Kept; readonly bytes: number }>();
  private readonly limitBytes: number;
  private total = 0;

  constructor(limitBytes: number) {
    this.limitBytes = limitBytes;
  }

  get bytes(): number {
    return this.total;
  }

  get(id: string): Kept | undefined {
    const entry = this.entries.get(id);
    if (!entry) return undefined;
    this.entries.delete(id);
    this.entries.set(id, entry);
    return entry.kept;
  }

  set(id: string, kept: Kept): void {
    this.delete(id);
    const bytes = mapBytes([kept.sample, kept.appraised]);
    this.entries.set(id, { kept, bytes });
    this.total += bytes;
    for (const oldest of this.entries.keys()) {
      if (this.total <= this.limitBytes || oldest === id) break;
      this.delete(oldest);
    }
  }

  delete(id: string): void {
    this.total -= this.entries.get(id)?.bytes ?? 0;
    this.entries.delete(id);
  }
}
