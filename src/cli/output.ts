/** Where a command writes: results to one stream, progress to the other. */

export interface Output {
  /** Results. */
  readonly out: (text: string) => void;
  /** Progress, remarks and errors. */
  readonly err: (text: string) => void;
  /** True when progress may be redrawn in place. */
  readonly terminal: boolean;
}

/** A bar on a terminal, one plain line per finished sample elsewhere. */
export class Progress {
  private readonly output: Output;
  private readonly total: number;
  private done = 0;

  constructor(output: Output, total: number) {
    this.output = output;
    this.total = total;
  }

  /** A stage of a sample has begun; shown on a terminal only. */
  at(sample: string, stage: string): void {
    if (this.output.terminal) this.draw(`${sample}: ${stage}`);
  }

  /** A sample is finished, with a word about how. */
  finished(sample: string, word: string): void {
    this.done++;
    if (this.output.terminal) {
      this.output.err('\r\u001b[2K');
      if (this.done < this.total) this.draw(`${sample}: ${word}`);
    } else {
      this.output.err(`[${this.done}/${this.total}] ${sample}: ${word}\n`);
    }
  }

  private draw(text: string): void {
    const width = 24;
    const full = Math.round((width * this.done) / Math.max(1, this.total));
    this.output.err(`\r\u001b[2K${'█'.repeat(full)}${'·'.repeat(width - full)} ${this.done}/${this.total} ${text}`);
  }
}
