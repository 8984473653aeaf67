/** Chapter Flaws: correcting by hand, the list of those found, and what counts as a flaw. */
import { html, nothing } from 'lit';
import type { ComputeFacts } from '../../workers/api.ts';
import type { Hand } from '../hand/hand.ts';
import '../hand/hand-tools.ts';
import { correctionsOf } from '../session/recipe.ts';
import { Chapter } from './chapter.ts';
import { flawsFinding } from './findings.ts';
import './flaw-table.ts';
import { dropMeaning, heightMeaning, layersMeaning, noiseMeaning } from './threshold-words.ts';

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

  override topic(): string {
    return 'thresholds';
  }

  override meaning(path: string): ((value: number) => string) | undefined {
    const { thresholds, ladder } = this.summary;
    const now = (of: string): number => Number(this.value(of));
    switch (thresholds && path) {
      case 'flaws.heightNm': return (nm) => heightMeaning(nm, now('flaws.heightNoise'), thresholds!);
      case 'flaws.heightNoise': return (times) => noiseMeaning(times, now('flaws.heightNm'), thresholds!);
      case 'flaws.dropDecades': return (decades) => (thresholds!.dropDecades === undefined ? '' : dropMeaning(decades, thresholds!, ladder));
      case 'flaws.shortLayers': return (layers) => layersMeaning(layers, thresholds!);
      default: return undefined;
    }
  }

  override aboveKnobs() {
    const { flaws, corrections, recipe, widthUm, height } = this.summary;
    const stale = JSON.stringify(correctionsOf(recipe)) !== JSON.stringify(correctionsOf(this.recipe));
    return html`
      <eg-hand-tools .flaw=${flaws.find(({ flaw }) => flaw === this.selected)} .hand=${this.hand} .corrections=${corrections} .stale=${stale}
        .causes=${this.facts.causes} .hatchPeriod=${this.facts.hatchPeriod} .mapUm=${widthUm} .noiseNm=${height?.noiseNm}></eg-hand-tools>
      ${flaws.length > 0 ? html`<eg-flaw-table .flaws=${flaws} .noiseNm=${height?.noiseNm} .selected=${this.selected}></eg-flaw-table>
        <p class="note">h/R is a flaw’s peak height over the radius of a circle of its area: how steep it is. Decades are powers of ten of the current: lower by 2 decades is a hundredth.</p>` : nothing}`;
  }
}

customElements.define('eg-chapter-flaws', ChapterFlaws);
