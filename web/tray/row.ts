/** One sample of the tray. Sends `open-sample`, `cancel-run`, `retry`, `remove`, `undo-answer` {id}; the import form's events pass through. */
import { LitElement, html, nothing } from 'lit';
import type { Compute, ComputeFacts, SampleSummary } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import '../import/import-form.ts';
import '../ledger/ledger-bar.ts';
import { area, span, volts } from '../sample/format.ts';
import type { SampleState } from '../session/state.ts';
import { judge } from './requirement.ts';
import { rowStyles } from './row-styles.ts';
import './thumbnail.ts';
import { verdictMark } from './verdict-mark.ts';

export class TrayRow extends LitElement {
  static override properties = {
    sample: { attribute: false }, rank: { type: Number }, requiredUm2: { type: Number }, others: { type: Number }, facts: { attribute: false }, compute: { attribute: false },
  };

  declare sample: SampleState | undefined;
  declare rank: number | undefined;
  declare requiredUm2: number | undefined;
  /** Samples that ask for the same as this one. */
  declare others: number;
  declare facts: ComputeFacts | undefined;
  declare compute: Compute | undefined;

  static override styles = [controlStyles, rowStyles];

  constructor() {
    super();
    this.others = 0;
  }

  override render() {
    const { sample } = this;
    if (sample === undefined) return nothing;
    const { summary } = sample;
    return html`
      <article class=${summary === undefined ? 'plain' : 'opens'} @click=${this.clicked}>
        <span class="rank" aria-hidden="true">${this.rank ?? ''}</span>
        ${summary === undefined ? nothing : html`<eg-thumbnail .summary=${summary} .compute=${this.compute}></eg-thumbnail>`}
        <div class="middle">
          <div class="title">
            <h3><button class="open" aria-disabled=${summary === undefined} @click=${this.open}>${this.rank === undefined ? nothing : html`<span class="number">${this.rank} · </span>`}${sample.name}</button></h3>
            ${sample.demo === true ? html`<span class="note">invented</span>` : nothing}
          </div>
          ${summary === undefined ? nothing : this.result(summary)}
          ${this.state(sample)}
        </div>
        ${summary === undefined ? nothing : [this.usable(summary), this.verdict(summary)]}
      </article>
    `;
  }

  /** Puts the keyboard on the row. */
  override focus(): void {
    this.renderRoot.querySelector<HTMLElement>('.open')?.focus();
  }

  private result(summary: SampleSummary) {
    const { usable, reference, device, remarks } = summary;
    const facts = [
      ...(this.requiredUm2 === undefined ? [] : [`largest patch ${area(usable.largestPatchUm2)}`]),
      ...(reference?.layers === undefined ? [] : [`${reference.layers} layers`]),
      ...(device === undefined ? [] : [`${volts(device.biasV)}${device.proposed ? ' proposed' : ''}`]),
      ...(summary.surface === 'barrier' && usable.meaning === 'usable' ? ['bare barrier: an upper bound'] : []),
    ];
    return html`
      <eg-ledger-bar .compact=${true} .entries=${summary.ledger} .causes=${this.facts?.causes ?? []} .hatchPeriod=${this.facts?.hatchPeriod ?? 8}></eg-ledger-bar>
      <p class="facts">${facts.join(' · ')}</p>
      ${remarks.length === 0 ? nothing : html`
        <details><summary>${remarks.length === 1 ? '1 remark' : `${remarks.length} remarks`}</summary>
          <ul>${remarks.map(({ message }) => html`<li>${message}</li>`)}</ul>
        </details>`}
    `;
  }

  private usable({ usable, footprintUm2 }: SampleSummary) {
    return html`
      <div class="usable">
        <span class=${usable.knownToGlow ? 'big' : 'big even'}>${area(usable.areaUm2)}</span>
        <small>95 %: ${span(usable.low95Um2, usable.high95Um2)} µm²</small>
        <small>of ${area(footprintUm2)} ${usable.meaning === 'flaw-free' ? 'is free of flaws' : 'is usable'}</small>
      </div>
    `;
  }

  private verdict({ usable }: SampleSummary) {
    if (this.requiredUm2 === undefined) return html`<div class="verdict"><b>${area(usable.largestPatchUm2)}</b><small>in its largest patch</small></div>`;
    const { outcome, headline, detail } = judge(usable, this.requiredUm2);
    return html`<div class="verdict ${outcome}"><span class="mark">${verdictMark(outcome)}${headline}</span><small>${detail}</small>${usable.knownToGlow ? nothing : html`<small>${usable.meaning === 'flaw-free' ? 'from height alone' : 'not known to glow'}</small>`}</div>`;
  }

  /** What a sample without a final answer says of itself. */
  private state(sample: SampleState) {
    const { status, progress, error } = sample;
    switch (status) {
      case 'ready': return nothing;
      case 'waiting':
      case 'working': return html`
        <div class="work">
          ${progress === undefined
            ? html`<span>${status === 'waiting' ? 'waiting' : 'at work'}</span>`
            : html`<span>${progress.stage}</span><progress max=${progress.total} .value=${progress.done} aria-label=${`Progress of ${sample.name}`}></progress>`}
          <button class="plain" @click=${() => { this.send('cancel-run'); }}>Cancel</button>
        </div>`;
      case 'asking': return html`
        <eg-import-form .sample=${sample} .fields=${this.facts?.fields ?? []} .others=${this.others}>
          ${this.backButton(sample)}<button type="button" class="plain" @click=${() => { this.send('remove'); }}>Remove</button>
        </eg-import-form>`;
      case 'cancelled':
      case 'failed': return html`
        <p class="error">${status === 'cancelled' ? `Cancelled${sample.summary === undefined ? '' : '; what is shown is the last result'}.` : error?.message ?? 'It could not be appraised.'}</p>
        <div class="buttons">
          ${this.backButton(sample)}
          ${error?.code === 'files-not-open' ? nothing : html`<button @click=${() => { this.send('retry'); }}>${status === 'cancelled' ? 'Appraise' : 'Try again'}</button>`}
          <button @click=${() => { this.send('remove'); }}>Remove</button>
        </div>`;
    }
  }

  /** A wrong answer can be taken back where its consequence is seen. */
  private backButton({ history, at }: SampleState) {
    const label = history[at]?.label ?? '';
    return label === '' ? nothing : html`<button type="button" @click=${() => { this.send('undo-answer'); }}>Undo: ${label}</button>`;
  }

  private readonly clicked = (event: MouseEvent): void => {
    // What has a use of its own inside the row keeps it, and so does selecting a text.
    const inside = event.composedPath().slice(0, event.composedPath().indexOf(event.currentTarget!));
    const own = inside.some((target) => target instanceof Element && target.matches('button, a, input, select, label, summary, details, eg-import-form'));
    if (!own && getSelection()?.isCollapsed !== false) this.open();
  };

  private readonly open = (): void => {
    if (this.sample?.summary !== undefined) this.send('open-sample');
  };

  private send(name: string): void {
    this.dispatchEvent(new CustomEvent(name, { detail: { id: this.sample?.id }, bubbles: true, composed: true }));
  }
}

customElements.define('eg-tray-row', TrayRow);
