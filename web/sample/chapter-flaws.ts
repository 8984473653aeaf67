/** Chapter Flaws: what counts as a flaw, and the list of those found. */
import { html, nothing } from 'lit';
import { Chapter } from './chapter.ts';
import { flawsFinding } from './findings.ts';
import { fixed } from './format.ts';
import './flaw-table.ts';

export class ChapterFlaws extends Chapter {
  static override properties = { ...Chapter.properties, selected: { attribute: false } };

  declare selected: number | undefined;
  readonly chapter = 'flaws';
  readonly heading = 'Flaws';

  finding(): string {
    return flawsFinding(this.summary);
  }

  override aboveKnobs() {
    const { height, flaws } = this.summary;
    const threshold = this.value('flaws.heightNm');
    const times = height && height.noiseNm > 0 && typeof threshold === 'number' ? threshold / height.noiseNm : undefined;
    return html`
      ${flaws.length > 0 ? html`<eg-flaw-table .flaws=${flaws} .selected=${this.selected}></eg-flaw-table>` : nothing}
      ${times === undefined ? nothing : html`<p class="note">A flaw starts at ${fixed(times, 1)} × this map’s noise.</p>`}`;
  }
}

customElements.define('eg-chapter-flaws', ChapterFlaws);
