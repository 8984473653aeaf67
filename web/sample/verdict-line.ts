/** The verdict as a sentence, its area large and glowing; interval, largest patch and remarks below. */
import { LitElement, css, html, nothing } from 'lit';
import type { Preview, SampleSummary } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import { effectStyles, noEffect } from './effect.ts';
import type { Effect } from './effect.ts';
import { verdictRest } from './findings.ts';
import { area, counted, span } from './format.ts';

export class VerdictLine extends LitElement {
  static override properties = { summary: { attribute: false }, effect: { attribute: false }, look: { attribute: false }, open: { state: true } };

  declare summary: SampleSummary;
  declare effect: Effect;
  /** Where a held handle would lead. */
  declare look: Preview | undefined;
  declare open: boolean;

  static override styles = [controlStyles, effectStyles, css`
    :host { display: block; }
    h1 { margin: 0; font-size: 1.1875rem; font-weight: 400; line-height: 1.3; text-wrap: pretty; }
    .area { margin-right: 0.25em; color: var(--glow, #ffb454); font-size: 2.125rem; font-weight: 600; line-height: 1.1; white-space: nowrap; text-shadow: 0 0 22px rgb(255 180 84 / 0.35); }
    .more { margin: 2px 0 0; color: var(--dim, #8fa0af); font-size: 0.875rem; }
    /* A look lies over the result, whose room it keeps: nothing may move under a held handle. */
    .now { display: grid; }
    .now > div { grid-area: 1 / 1; }
    .under { visibility: hidden; }
    .more button { font-size: inherit; }
    ul { margin: 6px 0 0; padding: 8px 12px 8px 28px; background: var(--panel, #141b21); border: 1px solid var(--line, #25313b); border-radius: 7px; font-size: 0.875rem; max-height: 11rem; overflow: auto; }
    li { margin: 2px 0; }
    @media (max-width: 760px) { h1 { font-size: 1.0625rem; } .area { display: block; font-size: 2.5rem; } }
  `];

  constructor() {
    super();
    this.effect = noEffect;
    this.open = false;
  }

  override render() {
    const { usable, verdict, remarks } = this.summary;
    const rest = verdictRest(verdict);
    const facts = [
      `95 %: ${span(usable.low95Um2, usable.high95Um2)} µm²`, `largest patch ${area(usable.largestPatchUm2)}`,
      ...(rest.remarks === '' ? [] : [rest.remarks]),
    ];
    return html`
      <div class="now">
        <div class=${this.look ? 'under' : ''}>
          <h1><span class="area">${area(usable.areaUm2)}</span> ${rest.what}</h1>
          <p class="more">${facts.join(' · ')}
            ${remarks.length === 0 ? nothing : html` · <button type="button" class="plain" aria-expanded=${this.open ? 'true' : 'false'} aria-controls="remarks" @click=${() => { this.open = !this.open; }}>${counted(remarks.length, 'remark')}</button>`}
            ${this.effect.words === '' ? nothing : html`<span class="effect ${this.effect.tone}" role="status">${this.effect.words}</span>`}</p>
        </div>
        ${this.look ? this.renderLook(this.look) : nothing}
      </div>
      ${this.open ? html`<ul id="remarks">${remarks.map((remark) => html`<li>${remark.message}</li>`)}</ul>` : nothing}`;
  }

  /** The area is that of the ledger below; interval and patch of another recipe would say nothing. */
  private renderLook({ usableUm2 }: Preview) {
    const { footprintUm2, usable } = this.summary;
    return html`
      <div class="look">
        <h1><span class="area">${area(usableUm2)}</span> of ${area(footprintUm2)} would be ${usable.meaning === 'usable' ? 'usable' : 'free of flaws in height'}</h1>
        <p class="more">a quick look; letting go of the handle computes the result</p>
      </div>`;
  }

  /** Whether there were remarks to close. */
  closeRemarks(): boolean {
    if (!this.open) return false;
    this.open = false;
    return true;
  }
}

customElements.define('eg-verdict-line', VerdictLine);
