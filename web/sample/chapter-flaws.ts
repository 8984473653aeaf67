/** Chapter Flaws: correcting by hand, the list of those found, and what counts as a flaw. */
import { html, nothing } from 'lit';
import type { ComputeFacts } from '../../workers/api.ts';
import type { Hand } from '../hand/hand.ts';
import '../hand/hand-tools.ts';
import { correctionsOf } from '../session/recipe.ts';
import { Chapter } from './chapter.ts';
import { flawsFinding } from './findings.ts';
import { fixed } from './format.ts';
import './flaw-table.ts';

export class ChapterFlaws extends Chapter {
  static override properties = { ...Chapter.properties, selected: { attribute: false }, hand: { attribute: false }, facts: { attribute: false } };

  declare selected: number | undefined;
  /** The tool in hand. */
  declare hand: Hand | undefined;
  declare facts: ComputeFacts;
  readonly chapter = 'flaws';
  readonly heading = 'Flaws';

  finding(): string {
    return flawsFinding(this.summary);
  }

  override alsoChanged(): string {
    const count = correctionsOf(this.recipe).length;
    return count === 0 ? '' : `${count} by hand`;
  }

  override aboveKnobs() {
    const { height, flaws, corrections, recipe, widthUm } = this.summary;
    const threshold = this.value('flaws.heightNm');
    const times = height && height.noiseNm > 0 && typeof threshold === 'number' ? threshold / height.noiseNm : undefined;
    const stale = JSON.stringify(correctionsOf(recipe)) !== JSON.stringify(correctionsOf(this.recipe));
    return html`
      <eg-hand-tools .flaw=${flaws.find(({ flaw }) => flaw === this.selected)} .hand=${this.hand} .corrections=${corrections} .stale=${stale}
        .causes=${this.facts.causes} .hatchPeriod=${this.facts.hatchPeriod} .mapUm=${widthUm}></eg-hand-tools>
      ${flaws.length > 0 ? html`<eg-flaw-table .flaws=${flaws} .selected=${this.selected}></eg-flaw-table>` : nothing}
      ${times === undefined ? nothing : html`<p class="note">A flaw starts at ${fixed(times, 1)} × this map’s noise.</p>`}`;
  }
}

customElements.define('eg-chapter-flaws', ChapterFlaws);
