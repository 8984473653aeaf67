/** Chapter Scan: what was scanned, and what the files do not say about it. */
import { html } from 'lit';
import { Chapter } from './chapter.ts';
import { scanFinding } from './findings.ts';
import { figure, plain } from './format.ts';

export class ChapterScan extends Chapter {
  readonly chapter = 'scan';
  readonly heading = 'Scan';

  finding(): string {
    return scanFinding(this.summary);
  }

  override found(path: string): string | undefined {
    const { current, widthUm, heightUm, heightUnit, currentUnit } = this.summary;
    if (path === 'scan.biasV') return current?.biasV === undefined ? undefined : plain(current.biasV);
    if (path === 'scan.widthUm') return figure(widthUm, 4);
    if (path === 'scan.heightUm') return figure(heightUm, 4);
    if (path === 'scan.heightUnit') return heightUnit;
    if (path === 'scan.currentUnit') return currentUnit;
    return undefined;
  }

  override belowKnobs() {
    return html`
      <p class="caution">A scan can itself break the barrier down. Set a current limit before the bias is raised; your laboratory’s rules hold, and only trained staff change the bias.</p>
      <h3>Files</h3>
      <p class="note">${this.summary.sources.map(({ name }) => name).join(', ')}</p>`;
  }
}

customElements.define('eg-chapter-scan', ChapterScan);
