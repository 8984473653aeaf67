/** One setting of the recipe: number with or without a slider, choice, or flag; with its default, its reset and its hint. */
import { LitElement, css, html, nothing } from 'lit';
import type { PropertyValues } from 'lit';
import type { FieldInfo } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import type { RecipeChange, RecipePreview } from './events.ts';
import { plain, typedNumber } from './format.ts';
import { refusal, stepLabel } from './knobs.ts';
import type { Slider } from './knobs.ts';

const sliderSteps = 400;
/** Keys that move a slider. */
const sliderKeys = /^(Arrow|Page|Home$|End$)/;

export class Knob extends LitElement {
  static override properties = {
    field: { attribute: false }, slider: { attribute: false }, value: { attribute: false }, found: { attribute: false },
    live: { type: Boolean }, look: { attribute: false }, meaning: { attribute: false }, topic: { attribute: false }, draft: { state: true }, problem: { state: true },
  };

  declare field: FieldInfo;
  declare slider: Slider | undefined;
  /** As in the sparse recipe; undefined: by default. */
  declare value: number | string | boolean | undefined;
  /** What is used while the field is absent, where the appraisal found it: "5.9 V". */
  declare found: string | undefined;
  /** Every place of a held slider is told, not only the last. */
  declare live: boolean;
  /** Where a held handle would lead, in words; shown while it is this one. */
  declare look: string;
  /** What a value means on this map, in words. */
  declare meaning: ((value: number) => string) | undefined;
  /** Where the method page explains it. */
  declare topic: string | undefined;
  /** Number on a slider that is still held. */
  declare draft: number | undefined;
  declare problem: string;
  /** A key that moves the slider is down: its release is the handle's. */
  private keyDown = false;
  /** What the slider was left at while a key was down. */
  private waiting: number | undefined;

  static override styles = [controlStyles, css`
    :host { display: block; padding: 5px 0; font-size: 0.875rem; }
    .row { display: grid; grid-template-columns: minmax(0, 1fr) auto 1.4rem; gap: 2px 8px; align-items: center; }
    label { line-height: 1.3; }
    .control { display: flex; gap: 8px; align-items: center; min-width: 0; }
    input[type='text'] { width: 4.2rem; padding: 0.1rem 0.4rem; text-align: right; font-size: 0.875rem; }
    select { padding: 0.1rem 0.3rem; font-size: 0.875rem; max-width: 100%; }
    input[type='range'] { grid-column: 1 / 3; width: 100%; accent-color: var(--glow, #ffb454); padding: 0; margin: 0; background: none; border: 0; }
    .unit { min-width: 1.6rem; color: var(--dim, #8fa0af); white-space: nowrap; }
    .reset { padding: 0; width: 1.4rem; height: 1.6rem; line-height: 1; }
    .changed label { color: var(--glow-soft, #ffd9a0); }
    .hint { margin: 1px 0 0; color: var(--dim, #8fa0af); font-size: 0.78rem; line-height: 1.4; }
    .meaning { margin: 1px 0 0; font-size: 0.8125rem; line-height: 1.4; }
    .look { color: var(--glow-soft, #ffd9a0); }
    .how { padding: 0 0.15rem; font-size: inherit; }
    .problem { margin: 2px 0 0; color: var(--bad, #ff9a76); font-size: 0.8125rem; }
  `];

  constructor() {
    super();
    this.problem = '';
    this.live = false;
    this.look = '';
  }

  override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has('value') || changed.has('field')) {
      this.draft = undefined;
      this.problem = '';
    }
  }

  override render() {
    const { field } = this;
    const changed = this.isChanged;
    return html`
      <div class="row ${changed ? 'changed' : ''}">
        <label for="control">${field.title}</label>
        <div class="control">${this.renderControl()}</div>
        ${changed ? html`<button type="button" class="plain reset" title="Back to the default (${this.defaultText()})" aria-label="${field.title} back to the default" @click=${() => { this.send(undefined); }}>↺</button>` : html`<span></span>`}
        ${this.renderSlider()}
      </div>
      ${this.problem === '' ? nothing : html`<p class="problem" role="alert">${this.problem}</p>`}
      ${this.renderMeaning()}
      <p class="hint" id="hint">${field.description} <span class="default">Default: ${this.defaultText()}.</span>${this.topic === undefined ? nothing : html`
        <button type="button" class="plain how" aria-label="${field.title}: how this is done" @click=${() => { this.tell('how', { topic: this.topic }); }}>how</button>`}</p>`;
  }

  private renderMeaning() {
    const now = this.draft ?? this.value ?? this.field.fallback;
    const words = typeof now === 'number' ? this.meaning?.(now) ?? '' : '';
    return html`
      ${words === '' ? nothing : html`<p class="meaning">${words}</p>`}
      ${this.draft === undefined || this.look === '' ? nothing : html`<p class="meaning look">${this.look}</p>`}`;
  }

  private get isChanged(): boolean {
    return this.value !== undefined && this.value !== this.field.fallback;
  }

  private defaultText(): string {
    const { fallback, absent, unit } = this.field;
    if (fallback === undefined) return absent ?? 'none';
    if (typeof fallback === 'boolean') return fallback ? 'on' : 'off';
    return typeof fallback === 'number' ? `${plain(fallback)}${unit === undefined ? '' : `\u00a0${unit}`}` : fallback;
  }

  private renderControl() {
    const { field, value } = this;
    const now = value ?? field.fallback;
    switch (field.kind) {
      case 'flag':
        return html`<input id="control" type="checkbox" .checked=${now === true} aria-describedby="hint" @change=${(event: Event) => { this.send((event.target as HTMLInputElement).checked); }}>`;
      case 'choice':
        return html`<select id="control" aria-describedby="hint" .value=${String(now ?? '')} @change=${(event: Event) => { this.send((event.target as HTMLSelectElement).value || undefined); }}>
          ${field.fallback === undefined ? html`<option value="" ?selected=${now === undefined}>${this.found === undefined ? 'not set' : `from the file: ${this.found}`}</option>` : nothing}
          ${(field.choices ?? []).map((choice) => html`<option value=${choice} ?selected=${choice === now}>${choice}</option>`)}
        </select>`;
      case 'word':
        return html`<input id="control" type="text" aria-describedby="hint" .value=${String(now ?? '')} @change=${(event: Event) => { this.send((event.target as HTMLInputElement).value.trim() || undefined); }}>`;
      case 'number':
        return this.renderNumber(typeof now === 'number' ? now : undefined);
    }
  }

  private renderNumber(now: number | undefined) {
    const shown = this.draft ?? now;
    const { field } = this;
    return html`
      <input id="control" type="text" inputmode="decimal" autocomplete="off" placeholder=${this.found ?? '–'} aria-describedby="hint" aria-invalid=${this.problem === '' ? 'false' : 'true'}
        .value=${shown === undefined ? '' : plain(shown)} @change=${this.onTyped}>
      ${field.unit === undefined ? nothing : html`<span class="unit">${field.unit}</span>`}`;
  }

  private renderSlider() {
    const { slider, field, value } = this;
    if (slider === undefined) return nothing;
    const now = value ?? field.fallback;
    const shown = this.draft ?? (typeof now === 'number' ? now : undefined);
    return html`<input type="range" min="0" max=${sliderSteps} aria-label="${field.title}, slider" aria-valuetext=${this.withUnit(shown)} .value=${String(this.toSlider(shown, slider))}
      @input=${(event: Event) => { this.onSlide(this.fromSlider(event, slider)); }} @change=${(event: Event) => { this.onLeft(this.fromSlider(event, slider)); }}
      @pointerdown=${this.onTaken} @keydown=${this.onKeyDown} @keyup=${this.onKeyUp} @blur=${this.onKeyUp}>`;
  }

  private readonly onTaken = (): void => {
    if (this.live) this.tell('recipe-take', undefined);
  };

  private readonly onKeyDown = (event: KeyboardEvent): void => {
    // Tab passes by and takes nothing.
    if (!this.keyDown && sliderKeys.test(event.key)) this.onTaken();
    this.keyDown = true;
  };

  private onSlide(value: number): void {
    this.draft = value;
    if (this.live && refusal(this.field, value) === undefined) this.tell('recipe-preview', { path: this.field.path, value } satisfies RecipePreview);
  }

  /** A key that is held makes many places of one movement. */
  private onLeft(value: number): void {
    if (this.keyDown) this.waiting = value;
    else this.commit(value);
  }

  private readonly onKeyUp = (): void => {
    this.keyDown = false;
    const value = this.waiting;
    this.waiting = undefined;
    if (value !== undefined) this.commit(value);
  };

  private withUnit(value: number | undefined): string {
    return value === undefined ? 'not given' : `${plain(value)} ${this.field.unit ?? ''}`.trim();
  }

  private toSlider(value: number | undefined, { from, to, log }: Slider): number {
    if (value === undefined) return 0;
    const share = log ? Math.log(value / from) / Math.log(to / from) : (value - from) / (to - from);
    return Math.round(Math.min(1, Math.max(0, share)) * sliderSteps);
  }

  /** Two significant digits on a logarithmic slider, whole steps on an even one. */
  private fromSlider(event: Event, { from, to, log, step }: Slider): number {
    const share = Number((event.target as HTMLInputElement).value) / sliderSteps;
    const exact = log ? from * (to / from) ** share : from + share * (to - from);
    const round = log ? Number(exact.toPrecision(2)) : exact;
    return step === undefined ? round : Number((Math.round(round / step) * step).toPrecision(6));
  }

  private readonly onTyped = (event: Event): void => {
    const text = (event.target as HTMLInputElement).value;
    if (text.trim() === '') this.send(undefined);
    else this.commit(typedNumber(text));
  };

  private commit(value: number): void {
    this.problem = refusal(this.field, value) ?? '';
    this.draft = undefined;
    if (this.problem === '') this.send(value);
  }

  /** Nothing is sent when nothing changes; the default is sent as "not given". */
  private send(value: number | string | boolean | undefined): void {
    const sparse = value === this.field.fallback ? undefined : value;
    if (sparse === this.value || (sparse === undefined && !this.isChanged)) {
      // The handle came back to where it was.
      if (this.live) this.tell('recipe-preview', { path: this.field.path, value: undefined } satisfies RecipePreview);
      return;
    }
    const detail: RecipeChange = { path: this.field.path, value: sparse, label: stepLabel(this.field, sparse === undefined && value !== undefined ? value : sparse) };
    this.tell('recipe-change', detail);
  }

  private tell(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }
}

customElements.define('eg-knob', Knob);
