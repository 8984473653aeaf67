/** The Sample place: verdict and ledger on top, the map with as much room as there is, the chapters beside it. */
import { LitElement, html, nothing } from 'lit';
import type { PropertyValues } from 'lit';
import type { Compute, ComputeFacts, FlawEntry, SampleSummary } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import { asSpots, drawn, mergeFlaws } from '../hand/hand.ts';
import type { Hand, NamedCorrection } from '../hand/hand.ts';
import type { HandPath } from '../hand/stage-drawing.ts';
import '../ledger/ledger-bar.ts';
import type { IsolateEvent } from '../ledger/ledger-bar.ts';
import '../map/map-panel.ts';
import type { MapPanel } from '../map/map-panel.ts';
import { isBusy } from '../session/actions/appraise.ts';
import { correctionsOf, recipeOf, spotsOf, valueAt, withValue } from '../session/recipe.ts';
import type { SampleState } from '../session/state.ts';
import './chapter-flaws.ts';
import './chapter-glow.ts';
import './chapter-ground.ts';
import './chapter-scan.ts';
import type { CorrectionEvent, FlawSelectEvent, HandEvent, MarkRepairedEvent, RecipePreviewEvent } from './events.ts';
import { effectOf, noEffect } from './effect.ts';
import type { Effect } from './effect.ts';
import { Glance } from './glance.ts';
import { chapterOfChange } from './knobs.ts';
import type { ChapterName } from './knobs.ts';
import './progress-line.ts';
import { samplePlaceStyles } from './sample-place-styles.ts';
import './verdict-line.ts';
import type { VerdictLine } from './verdict-line.ts';

export class SamplePlace extends LitElement {
  static override properties = {
    sample: { attribute: false }, facts: { attribute: false }, compute: { attribute: false }, isolated: { state: true }, flaw: { state: true }, touched: { state: true }, hand: { state: true }, repaired: { state: true },
  };

  declare sample: SampleState;
  declare facts: ComputeFacts | undefined;
  declare compute: Compute;
  /** Cause shown alone on the map. */
  declare isolated: number | undefined;
  /** Number of the selected flaw. */
  declare flaw: number | undefined;
  /** Chapter of the last change of the recipe. */
  declare touched: ChapterName | undefined;
  /** The tool for correcting flaws that is in hand. */
  declare hand: Hand | undefined;
  /** Repaired pixels are marked on the map. */
  declare repaired: boolean;
  private readonly glance = new Glance(() => this.compute, () => this.panel, () => { this.requestUpdate(); });

  static override styles = [controlStyles, samplePlaceStyles];

  override connectedCallback(): void {
    super.connectedCallback();
    addEventListener('keydown', this.onKey);
    addEventListener('keyup', this.onRelease);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    removeEventListener('keydown', this.onKey);
    removeEventListener('keyup', this.onRelease);
  }

  override willUpdate(changed: PropertyValues<this>): void {
    const before = changed.get('sample');
    if (!before) return;
    if (before.id !== this.sample.id) {
      this.isolated = undefined;
      this.flaw = undefined;
      this.touched = undefined;
      this.hand = undefined;
      this.repaired = false;
      this.glance.end();
      return;
    }
    // A look ends with the result that it foresaw, and with one that does not come.
    if (before.summary !== this.sample.summary || !isBusy(this.sample)) this.glance.end();
    const [from, to] = [recipeOf(before), recipeOf(this.sample)];
    if (from !== to) this.touched = chapterOfChange(from, to);
    // Flaws are numbered anew by every appraisal.
    if (before.summary !== this.sample.summary) {
      if (this.hand?.tool === 'merge') this.hand = undefined;
      if (this.flaw !== undefined) this.flaw = sameFlaw(before.summary, this.flaw, this.sample.summary, correctionsOf(to).at(-1)?.kind === 'split');
      const entry = this.sample.summary?.ledger.find(({ code }) => code === this.isolated);
      if (!entry || entry.areaUm2 === 0) this.isolated = undefined;
    }
  }

  override render() {
    const { sample, facts } = this;
    const { summary, status } = sample;
    const working = status === 'working' || status === 'waiting';
    if (!summary || !facts) return this.renderWithout(working);
    const effect = working ? noEffect : effectOf(sample, summary);
    return html`
      <div class="top ${working ? 'stale' : ''}">
        <div class="headline">
          <eg-verdict-line class="result" .summary=${summary} .effect=${this.touched === undefined ? effect : noEffect} .look=${this.glance.now}></eg-verdict-line>
          ${this.renderSteps()}
        </div>
        <eg-ledger-bar class="result" .entries=${this.glance.now?.ledger ?? summary.ledger} .causes=${facts.causes} .hatchPeriod=${facts.hatchPeriod} .isolated=${this.isolated}
          @isolate=${(event: IsolateEvent) => { this.isolated = event.detail.code; }}></eg-ledger-bar>
        ${working ? html`<eg-progress-line .progress=${sample.progress}></eg-progress-line>` : nothing}
        ${this.renderError()}
      </div>
      <div class="main ${working ? 'stale' : ''}" @recipe-take=${this.onTake} @recipe-preview=${this.onPreview} @recipe-change=${() => { this.glance.stop(); }}
        @mark-repaired=${(event: MarkRepairedEvent) => { this.repaired = event.detail.on; }} @flaw-select=${(event: FlawSelectEvent) => { this.selectFlaw(event.detail.flaw, true); }}
        @hand=${(event: HandEvent) => { this.take(event.detail.hand); }} @correction=${this.onCorrection}>
        <eg-map-panel class="result" .summary=${summary} .facts=${facts} .compute=${this.compute} .isolated=${this.isolated} .flaw=${this.selected} .bandFactor=${this.bandFactor(summary)} .hand=${this.hand} .spots=${spotsOf(recipeOf(sample)).map(({ xUm, yUm }) => [xUm, yUm])} ?repaired=${this.repaired}
          @hand-path=${(event: CustomEvent<HandPath>) => { this.onPath(event.detail); }} @hand-leave=${() => { this.hand = undefined; }}
          @flaw-select=${(event: FlawSelectEvent) => { event.stopPropagation(); this.selectFlaw(event.detail.flaw, false); }}></eg-map-panel>
        <div class="chapters">${this.renderChapters(summary, facts, effect)}</div>
      </div>`;
  }

  private renderChapters(summary: SampleSummary, facts: ComputeFacts, effect: Effect) {
    const { fields } = facts;
    const recipe = recipeOf(this.sample);
    const of = (chapter: ChapterName): Effect => (this.touched === chapter ? effect : noEffect);
    const look = this.glance.now;
    return html`
      <eg-chapter-scan .summary=${summary} .fields=${fields} .recipe=${recipe} .effect=${of('scan')}></eg-chapter-scan>
      <eg-chapter-ground .summary=${summary} .fields=${fields} .recipe=${recipe} .effect=${of('ground')} .hand=${this.hand} ?marked=${this.repaired}></eg-chapter-ground>
      <eg-chapter-flaws .summary=${summary} .fields=${fields} .recipe=${recipe} .effect=${of('flaws')} .look=${look} .selected=${this.flaw} .hand=${this.hand} .facts=${facts}></eg-chapter-flaws>
      <eg-chapter-glow .summary=${summary} .fields=${fields} .recipe=${recipe} .effect=${of('glow')} .look=${look}></eg-chapter-glow>`;
  }

  /** The step that each button would undo or redo is named on it. */
  private renderSteps() {
    const { history, at } = this.sample;
    const back = at > 0 ? history[at]?.label : undefined;
    const forth = history[at + 1]?.label;
    return html`<div class="steps ${back === undefined && forth === undefined ? 'none' : ''}">
      <button type="button" ?disabled=${back === undefined} aria-keyshortcuts="Control+Z" title="Ctrl+Z" @click=${() => { this.send('undo'); }}>${back === undefined ? 'Undo' : `Undo: ${back}`}</button>
      <button type="button" ?disabled=${forth === undefined} aria-keyshortcuts="Control+Shift+Z" title="Ctrl+Shift+Z" @click=${() => { this.send('redo'); }}>${forth === undefined ? 'Redo' : `Redo: ${forth}`}</button>
    </div>`;
  }

  private renderError() {
    const { error, status } = this.sample;
    if (status === 'cancelled') return html`<p class="error">Cancelled; what is shown is the last result. <button type="button" @click=${() => { this.send('retry'); }}>Run again</button></p>`;
    return status === 'failed' && error ? html`<p class="error" role="alert">${error.message} What is shown is the last result.</p>` : nothing;
  }

  private renderWithout(working: boolean) {
    const { status, error, progress } = this.sample;
    if (working || !this.facts) return html`<div class="empty"><eg-progress-line .progress=${progress}></eg-progress-line></div>`;
    if (status === 'asking') return nothing;
    return html`<div class="empty">
      ${status === 'cancelled' ? html`<p class="error">Cancelled.</p>` : error ? html`<p class="error" role="alert">${error.message}</p>` : nothing}
      <button type="button" @click=${() => { this.send('retry'); }}>Run again</button>
      <button type="button" @click=${() => { this.send('leave'); }}>Back to the tray</button>
    </div>`;
  }

  private get selected(): FlawEntry | undefined {
    return this.sample.summary?.flaws.find(({ flaw }) => flaw === this.flaw);
  }

  private bandFactor(summary: SampleSummary): number {
    const factor = valueAt(summary.recipe, 'band.factor');
    return typeof factor === 'number' ? factor : 3;
  }

  private selectFlaw(flaw: number | undefined, centre: boolean): void {
    if (this.hand?.tool === 'merge') {
      this.mergeWith(this.hand.first, flaw);
      return;
    }
    this.flaw = flaw;
    if (centre && this.selected) this.panel?.centreOn(this.selected);
    else if (!centre && flaw !== undefined) this.renderRoot.querySelector('eg-chapter-flaws')?.toggleAttribute('open', true);
  }

  private mergeWith(first: FlawEntry, picked: number | undefined): void {
    const second = this.sample.summary?.flaws.find(({ flaw }) => flaw === picked);
    if (!second || second.flaw === first.flaw) return;
    this.hand = undefined;
    this.correct(mergeFlaws(first, second));
  }

  private take(hand: Hand | undefined): void {
    const goes = hand !== undefined && hand.tool !== this.hand?.tool;
    this.hand = hand;
    if (goes) void this.updateComplete.then(() => { this.panel?.focusMap(); });
  }

  /** A line splits once; brush and outline stay in hand. */
  private onPath({ pointsUm }: HandPath): void {
    if (this.hand?.tool === 'spots') {
      this.hand = undefined;
      this.tell('spots', { spots: asSpots(pointsUm), label: `ground by ${pointsUm.length} spots` });
      return;
    }
    const correction = this.hand && drawn(this.hand, pointsUm);
    if (this.hand?.tool === 'split') this.hand = undefined;
    if (correction) this.correct(correction);
  }

  /** What is no flaw any more cannot stay selected. */
  private readonly onCorrection = ({ detail }: CorrectionEvent): void => {
    if (detail.correction.kind === 'dismiss') this.flaw = undefined;
  };

  private correct(detail: NamedCorrection): void {
    this.tell('correction', detail);
  }

  private tell(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }

  /** While a run is under way the result on show is not the one that the handle started from. */
  private readonly onPreview = ({ detail: { path, value } }: RecipePreviewEvent): void => {
    if (value === undefined) this.glance.end();
    else if (this.sample.summary && !isBusy(this.sample)) this.glance.look(this.sample.id, withValue(recipeOf(this.sample), path, value));
  };

  private readonly onTake = (): void => {
    if (this.sample.summary && !isBusy(this.sample)) this.glance.take(this.sample.id, recipeOf(this.sample));
  };

  private readonly onKey = (event: KeyboardEvent): void => {
    if (this.hidden || event.defaultPrevented || isTyping(event)) return;
    if ((event.ctrlKey || event.metaKey) && !event.altKey && event.key.toLowerCase() === 'z') this.step(event.shiftKey ? 'redo' : 'undo');
    else if (event.key === 'Escape' && this.renderRoot.querySelector<VerdictLine>('eg-verdict-line')?.closeRemarks()) { /* closed */ }
    else if (event.key === 'Escape' && this.isolated !== undefined && !this.hand) this.isolated = undefined;
    else if (this.panel?.press(event)) { /* the map took it */ }
    else if (event.key === 'Escape' && this.flaw !== undefined) this.flaw = undefined;
    else return;
    event.preventDefault();
  };

  private readonly onRelease = (event: KeyboardEvent): void => {
    this.panel?.release(event);
  };

  private step(name: 'undo' | 'redo'): void {
    const { at, history } = this.sample;
    if (name === 'undo' ? at > 0 : history[at + 1] !== undefined) this.send(name);
  }

  private get panel(): MapPanel | null {
    return this.renderRoot.querySelector<MapPanel>('eg-map-panel');
  }

  private send(type: 'undo' | 'redo' | 'leave' | 'retry'): void {
    this.dispatchEvent(new CustomEvent(type, { bubbles: true, composed: true }));
  }
}

/** Where text is typed, keys are letters; a slider or a box to tick is no such place. */
function isTyping(event: KeyboardEvent): boolean {
  const [target] = event.composedPath();
  if (target instanceof HTMLSelectElement || target instanceof HTMLTextAreaElement) return true;
  return target instanceof HTMLInputElement && !['range', 'checkbox', 'radio', 'button'].includes(target.type);
}

/**
 * The flaw of a new appraisal that is a flaw of the one before: the one at the same inner point, else the nearest of those that are new and lie within its radius, or
 * within its diameter where it has been split, for the parts of a long one lie far from its middle. Undefined when there is none.
 */
function sameFlaw(before: SampleSummary | undefined, flaw: number, after: SampleSummary | undefined, split: boolean): number | undefined {
  const old = before?.flaws.find((candidate) => candidate.flaw === flaw);
  if (!before || !old || !after) return undefined;
  const inner = ({ insideUm, xUm, yUm }: FlawEntry): string => (insideUm ?? [xUm, yUm]).join(' ');
  const same = after.flaws.find((candidate) => inner(candidate) === inner(old));
  if (same) return same.flaw;
  const known = new Set(before.flaws.map(inner));
  const distance = ({ xUm, yUm }: FlawEntry): number => Math.hypot(xUm - old.xUm, yUm - old.yUm);
  const reachUm = split ? old.diameterUm : old.diameterUm / 2;
  const near = after.flaws.filter((candidate) => !known.has(inner(candidate)) && distance(candidate) < reachUm);
  return near.sort((a, b) => distance(a) - distance(b))[0]?.flaw;
}

customElements.define('eg-sample-place', SamplePlace);
