/** Correcting flaws by hand, in the chapter Flaws: the selected flaw with what can be said of it, tools that draw, and the corrections made so far. */
import { LitElement, html, nothing, svg } from 'lit';
import type { PropertyValues } from 'lit';
import { flawCauses } from '../../workers/api.ts';
import type { ComputeFacts, FlawEntry } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import { causeFill, hatchDefinitions } from '../ledger/hatches.ts';
import { area, counted, fixed, heightText, plain, sureness, typedNumber, withUnit } from '../sample/format.ts';
import type { DrawnAs, Hand, NamedCorrection } from './hand.ts';
import { dismissFlaw, firstWidthUm, setCause } from './hand.ts';
import { handToolsStyles } from './hand-tools-styles.ts';

const drawnAs: readonly DrawnAs[] = [...flawCauses, 'none'];

export class HandTools extends LitElement {
  static override properties = {
    flaw: { attribute: false }, hand: { attribute: false }, corrections: { attribute: false }, stale: { type: Boolean }, causes: { attribute: false }, hatchPeriod: { attribute: false }, mapUm: { attribute: false }, noiseNm: { attribute: false },
    as: { state: true }, widthUm: { state: true }, problem: { state: true },
  };

  declare flaw: FlawEntry | undefined;
  /** The tool in hand. */
  declare hand: Hand | undefined;
  /** In words, in the order in which they are applied. */
  declare corrections: readonly string[];
  /** The words are not those of the recipe in force. */
  declare stale: boolean;
  declare causes: ComputeFacts['causes'];
  declare hatchPeriod: number;
  /** Width of the map. */
  declare mapUm: number;
  /** Of the height. */
  declare noiseNm: number | undefined;
  declare as: DrawnAs;
  /** Of the brush, as typed; undefined: what suits the map. */
  declare widthUm: number | undefined;
  declare problem: string;

  static override styles = [controlStyles, handToolsStyles];

  constructor() {
    super();
    this.corrections = [];
    this.as = 'residue';
    this.problem = '';
  }

  override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has('mapUm') && changed.get('mapUm') !== undefined) this.widthUm = undefined;
  }

  override render() {
    return html`
      <svg class="unseen" aria-hidden="true" width="0" height="0">${hatchDefinitions(this.causes, this.hatchPeriod)}</svg>
      ${this.flaw ? this.renderFlaw(this.flaw) : html`<p class="note">Pick a flaw on the map or in the list to say what it is, to merge or to split it.</p>`}
      ${this.renderDrawing()}
      ${this.corrections.length > 0 ? this.renderCorrections() : nothing}`;
  }

  private renderFlaw(flaw: FlawEntry) {
    const { tool } = this.hand ?? {};
    return html`
      <section aria-label="Selected flaw">
        <h3>Flaw ${flaw.flaw} is</h3>
        <div class="choice" role="group" aria-label="Flaw ${flaw.flaw} is">${flawCauses.map((cause) => html`
          <button type="button" aria-pressed=${cause === flaw.cause ? 'true' : 'false'} @click=${() => { this.correct(setCause(flaw, cause)); }}>${this.swatch(cause)}${cause}</button>`)}</div>
        <p class="reason">${flaw.byHand || flaw.other !== undefined ? '' : `${sureness(flaw)} · `}${flaw.reason}</p>
        <p class="measures">${[
          area(flaw.areaUm2), `${withUnit(flaw.diameterUm, 'µm')} across`, ...(flaw.peakNm === undefined ? [] : [`${heightText(flaw.peakNm, this.noiseNm)} high`]),
          `x\u00a0${fixed(flaw.xUm, 2)}, y\u00a0${fixed(flaw.yUm, 2)}\u00a0µm`].join(' · ')}</p>
        <div class="row">
          <button type="button" @click=${() => { this.correct(dismissFlaw(flaw)); }}>no flaw</button>
          <button type="button" aria-pressed=${tool === 'merge' ? 'true' : 'false'} @click=${() => { this.take(tool === 'merge' ? undefined : { tool: 'merge', first: flaw }); }}>merge with …</button>
          <button type="button" aria-pressed=${tool === 'split' ? 'true' : 'false'} @click=${() => { this.take(tool === 'split' ? undefined : { tool: 'split' }); }}>split …</button>
        </div>
      </section>`;
  }

  private renderDrawing() {
    const { tool } = this.hand ?? {};
    return html`
      <section aria-label="Draw flaws">
        <h3>Draw on the map as</h3>
        <div class="choice" role="group" aria-label="Draw as">${drawnAs.map((as) => html`
          <button type="button" aria-pressed=${as === this.as ? 'true' : 'false'} @click=${() => { this.drawAs(as); }}>${as === 'none' ? html`<span class="clear"></span>no flaw` : html`${this.swatch(as)}${as}`}</button>`)}</div>
        <div class="row">
          <button type="button" aria-pressed=${tool === 'brush' ? 'true' : 'false'} @click=${() => { this.take(tool === 'brush' ? undefined : this.brush()); }}>brush</button>
          <label>width <input type="text" inputmode="decimal" autocomplete="off" .value=${plain(this.width)} aria-invalid=${this.problem === '' ? 'false' : 'true'} @change=${this.onWidth}> µm</label>
          <button type="button" aria-pressed=${tool === 'outline' ? 'true' : 'false'} @click=${() => { this.take(tool === 'outline' ? undefined : { tool: 'outline', as: this.as }); }}>outline</button>
        </div>
        ${this.problem === '' ? nothing : html`<p class="problem" role="alert">${this.problem}</p>`}
      </section>`;
  }

  private renderCorrections() {
    return html`
      <details>
        <summary>${counted(this.corrections.length, 'correction')} by hand</summary>
        <ol>${this.corrections.map((words, index) => html`
          <li><span>${words}</span><button type="button" class="plain" ?disabled=${this.stale} aria-label="Take out: ${words}" @click=${() => { this.send('correction-out', { index, label: 'correction taken out' }); }}>take out</button></li>`)}</ol>
      </details>`;
  }

  private swatch(cause: string) {
    const code = this.causes.find((look) => look.cause === cause)?.code ?? 0;
    return html`<svg class="swatch" aria-hidden="true" width="12" height="12">${svg`<rect width="12" height="12" rx="2" fill=${causeFill(code, cause)}></rect>`}</svg>`;
  }

  private get width(): number {
    return this.widthUm ?? firstWidthUm(this.mapUm);
  }

  private brush(): Hand {
    return { tool: 'brush', as: this.as, widthUm: this.width };
  }

  private drawAs(as: DrawnAs): void {
    this.as = as;
    this.renew();
  }

  private readonly onWidth = (event: Event): void => {
    const typed = typedNumber((event.target as HTMLInputElement).value);
    this.problem = typed > 0 && typed <= 1e6 ? '' : 'Type the brush’s width in µm, above 0, such as 0.2.';
    if (this.problem !== '') return;
    this.widthUm = typed;
    this.renew();
  };

  /** The tool in hand goes on with another cause or width. */
  private renew(): void {
    if (this.hand?.tool === 'brush') this.take(this.brush());
    else if (this.hand?.tool === 'outline') this.take({ tool: 'outline', as: this.as });
  }

  private take(hand: Hand | undefined): void {
    this.send('hand', { hand });
  }

  private correct(correction: NamedCorrection): void {
    this.send('correction', correction);
  }

  private send(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }
}

customElements.define('eg-hand-tools', HandTools);
