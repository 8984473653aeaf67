/** Chapter Ground: what levelling and conditioning found, ground picked by hand, and how both are steered. */
import { css, html, nothing } from 'lit';
import type { Hand } from '../hand/hand.ts';
import { leastSpots } from '../hand/hand.ts';
import { spotsOf } from '../session/recipe.ts';
import type { Spot } from '../session/recipe.ts';
import { Chapter } from './chapter.ts';
import { groundFinding } from './findings.ts';
import { counted, fixed } from './format.ts';
import { groundFacts, loweredWords } from './ground-facts.ts';

export class ChapterGround extends Chapter {
  static override properties = { ...Chapter.properties, hand: { attribute: false }, marked: { type: Boolean } };

  /** The tool in hand. */
  declare hand: Hand | undefined;
  /** Repaired pixels are marked on the map. */
  declare marked: boolean;
  readonly chapter = 'ground';
  readonly heading = 'Ground';

  static override styles = [...Chapter.styles, css`
    dl { display: grid; grid-template-columns: minmax(7.5rem, auto) 1fr; gap: 4px 12px; margin: 6px 0 10px; font-size: 0.8125rem; line-height: 1.4; }
    dt { color: var(--dim, #8fa0af); }
    dd { margin: 0; font-variant-numeric: tabular-nums; }
    dd span { display: block; color: var(--dim, #8fa0af); }
    dt button { padding: 0; font-size: inherit; text-align: left; white-space: normal; }
    label.switch { display: inline-flex; gap: 8px; align-items: center; font-size: 0.875rem; }
    .row { display: flex; flex-wrap: wrap; gap: 6px; align-items: center; margin: 4px 0; }
    .row button { padding: 0.15rem 0.6rem; font-size: 0.8125rem; }
    button[aria-pressed='true'] { background: var(--raised, #1b252d); border-color: var(--glow, #ffb454); color: var(--glow-soft, #ffd9a0); }
    ol { margin: 4px 0; padding-left: 1.8em; max-height: 9rem; overflow: auto; font-size: 0.8125rem; font-variant-numeric: tabular-nums; }
    li button { font-size: inherit; }
    @media (pointer: coarse) { .row button { padding: 0.35rem 0.7rem; } }
  `];

  finding(): string {
    return groundFinding(this.summary);
  }

  override topic(): string {
    return 'form';
  }

  override alsoChanged(): string {
    const count = spotsOf(this.recipe).length;
    return count === 0 ? '' : `${count} spots by hand`;
  }

  override meaning(path: string): ((value: number) => string) | undefined {
    const levels = this.summary.height?.levels;
    return path === 'ground.order' && levels?.formFrom === 'spots' ? (order) => loweredWords(order, levels) : undefined;
  }

  override aboveKnobs() {
    const repaired = (this.summary.height?.repairedPixels ?? 0) + (this.summary.current?.repairedPixels ?? 0);
    return html`
      <dl>${groundFacts(this.summary).map(({ name, value, note, topic }) => html`
        <dt><button type="button" class="plain" title="How this is done" @click=${() => { this.tell('how', { topic }); }}>${name}</button></dt><dd>${value}${note === undefined ? nothing : html`<span>${note}</span>`}</dd>`)}</dl>
      ${repaired === 0 ? nothing : html`<label class="switch"><input type="checkbox" .checked=${this.marked} @change=${(event: Event) => { this.tell('mark-repaired', { on: (event.target as HTMLInputElement).checked }); }}> mark repaired pixels on the map, in pink</label>`}
      ${this.summary.height ? this.renderSpots() : nothing}`;
  }

  private renderSpots() {
    const spots = spotsOf(this.recipe);
    const picking = this.hand?.tool === 'spots';
    return html`
      <h3>Ground picked by hand</h3>
      <p class="note">${spots.length === 0 ? `Where the automatic ground goes wrong, click ${leastSpots} or more places of bare, even ground; the form is then fitted to the height there.` : `The form is fitted to ${counted(spots.length, 'spot')}; line offsets stay.`}</p>
      ${spots.length === 0 ? nothing : html`<ol>${spots.map((spot, index) => html`
        <li>x ${fixed(spot.xUm, 2)}, y ${fixed(spot.yUm, 2)} µm ${spots.length > leastSpots ? html`<button type="button" class="plain" aria-label="Take spot ${index + 1} out" @click=${() => { this.use(spots.filter((_, k) => k !== index), `spot ${index + 1} taken out`); }}>take out</button>` : nothing}</li>`)}</ol>`}
      <div class="row">
        <button type="button" aria-pressed=${picking ? 'true' : 'false'} @click=${() => { this.tell('hand', { hand: picking ? undefined : { tool: 'spots', from: spots.map(({ xUm, yUm }) => [xUm, yUm] as const) } satisfies Hand }); }}>${spots.length === 0 ? 'pick ground by hand' : 'add or take out on the map'}</button>
        ${spots.length === 0 ? nothing : html`<button type="button" @click=${() => { this.use([], 'automatic ground'); }}>back to automatic</button>`}
      </div>`;
  }

  private use(spots: readonly Spot[], label: string): void {
    this.tell('spots', { spots, label });
  }
}

customElements.define('eg-chapter-ground', ChapterGround);
