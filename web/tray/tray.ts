/** The tray: all samples, ranked. Sends `require` {value}, `clear-demo`, `open-demo` and what its rows send; `answer` and `answer-pages` gain {ids} and {id, file}. */
import { LitElement, css, html, nothing } from 'lit';
import type { PropertyValues } from 'lit';
import { repeat } from 'lit/directives/repeat.js';
import type { Compute, ComputeFacts } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import type { AnswerDetail } from '../import/import-form.ts';
import type { PagesDetail } from '../import/pages-form.ts';
import { questionsOf } from '../import/questions.ts';
import type { SampleState } from '../session/state.ts';
import { groupHeading } from './group-heading.ts';
import { rankSamples } from './rank.ts';
import type { Group, RankedSample } from './rank.ts';
import './required-area.ts';
import { TrayRow } from './row.ts';

export class Tray extends LitElement {
  static override properties = { samples: { attribute: false }, requiredUm2: { type: Number }, facts: { attribute: false }, compute: { attribute: false } };

  declare samples: readonly SampleState[];
  declare requiredUm2: number | undefined;
  declare facts: ComputeFacts | undefined;
  declare compute: Compute | undefined;

  static override styles = [controlStyles, css`
    :host { display: block; max-width: 84rem; margin: 0 auto; padding: 1.25rem clamp(0.6rem, 2vw, 1.5rem) 2rem; }
    .top { display: flex; flex-wrap: wrap; gap: 0.75rem 2.5rem; align-items: center; justify-content: space-between; }
    .what { flex: 1 1 26rem; max-width: 58rem; margin: 0; color: var(--dim); }
    .what strong { font-weight: 500; color: var(--ink); }
    h2 { margin: 1.5rem 0 0.5rem; font-size: 0.9375rem; font-weight: 600; }
    h2 small { font-size: inherit; font-weight: 400; color: var(--dim); }
    ol { display: grid; gap: 0.5rem; margin: 0; padding: 0; list-style: none; }
    .keys { margin: 1.75rem 0 0; color: var(--dim); font-size: 0.8125rem; }
    kbd { padding: 0 0.3em; font: inherit; border: 1px solid var(--line); border-radius: 4px; }
    .empty { padding: 3rem 1.5rem; text-align: center; border: 2px dashed var(--line); border-radius: 12px; }
    @media (hover: none) { .keys { display: none; } }
  `];

  constructor() {
    super();
    this.samples = [];
  }

  override render() {
    const demo = this.samples.filter((sample) => sample.demo === true).length;
    return html`
      <div class="top">
        <p class="what">
          <strong>Evenglow reads conductive-probe scans of thin tunnel barriers and says how much of each can glow evenly, and what is in the way.</strong>
          ${demo > 0 ? html`${demo === this.samples.length ? 'These samples are invented; drop your own scans anywhere on the page.' : html`The samples marked “invented” are for a first look. <button class="plain" @click=${() => { this.send('clear-demo'); }}>Clear them</button>`}` : nothing}
          Nothing leaves this computer.
        </p>
        <eg-required-area .value=${this.requiredUm2}></eg-required-area>
      </div>
      ${this.samples.length === 0 ? this.empty() : nothing}
      <div @keydown=${this.keyed} @answer=${this.answered} @answer-pages=${this.pagesAnswered}>
        ${repeat(rankSamples(this.samples, this.requiredUm2), ({ name }) => name, (group) => this.group(group))}
      </div>
      ${this.samples.length === 0 ? nothing : html`<p class="keys"><kbd>↑</kbd> <kbd>↓</kbd> move between samples, <kbd>Home</kbd> <kbd>End</kbd> jump, <kbd>Enter</kbd> opens, <kbd>Ctrl</kbd> <kbd>O</kbd> opens files, <kbd>Ctrl</kbd> <kbd>V</kbd> pastes them.</p>`}
    `;
  }

  /** Puts the keyboard on a sample's row, where there is one. */
  async focusRow(id: string): Promise<void> {
    await this.updateComplete;
    const row = this.rows().find(({ sample }) => sample?.id === id);
    await row?.updateComplete;
    row?.focus();
  }

  override updated(changed: PropertyValues<this>): void {
    const before = changed.get('samples');
    if (!changed.has('samples') || before === undefined || before.length === 0) return;
    const known = new Set(before.map(({ id }) => id));
    const arrived = this.samples.find(({ id, demo }) => demo !== true && !known.has(id));
    // What somebody has just brought should not have to be looked for.
    if (arrived) this.rows().find(({ sample }) => sample?.id === arrived.id)?.scrollIntoView({ block: 'nearest' });
  }

  override willUpdate(): void {
    const { activeElement } = this.renderRoot as ShadowRoot;
    if (activeElement instanceof TrayRow && activeElement.sample !== undefined) void this.keepFocus(activeElement.sample.id);
  }

  /** A row that moved or changed its group, or a button that went with its run, takes the keyboard away: the row gets it back. */
  private async keepFocus(id: string): Promise<void> {
    await this.updateComplete;
    await this.rows().find(({ sample }) => sample?.id === id)?.updateComplete;
    if (document.activeElement === document.body || document.activeElement === null) await this.focusRow(id);
  }

  private group(group: Group) {
    const { title, how } = groupHeading(group, this.requiredUm2);
    return html`
      <section aria-label=${title}>
        <h2>${title} <small>${how}</small></h2>
        <ol>${repeat(group.rows, ({ sample }) => sample.id, (row) => this.row(row))}</ol>
      </section>
    `;
  }

  private row({ sample, rank }: RankedSample) {
    return html`<li><eg-tray-row .sample=${sample} .rank=${rank} .requiredUm2=${this.requiredUm2} .others=${this.askingLike(sample).length - 1} .facts=${this.facts} .compute=${this.compute}></eg-tray-row></li>`;
  }

  private empty() {
    return html`
      <div class="empty">
        <p>Drop height and current maps here, or a folder of them.</p>
        <button @click=${() => { this.send('open-demo'); }}>Show the invented samples</button>
      </div>
    `;
  }

  /** The sample and all others that ask the same questions; only itself when it asks for none. */
  private askingLike(sample: SampleState): SampleState[] {
    if (sample.status !== 'asking' || sample.error === undefined) return [sample];
    const asked = JSON.stringify(questionsOf(sample.error));
    return this.samples.filter((other) => other.status === 'asking' && other.error !== undefined && JSON.stringify(questionsOf(other.error)) === asked);
  }

  private rows(): TrayRow[] {
    return [...this.renderRoot.querySelectorAll<TrayRow>('eg-tray-row')];
  }

  private readonly keyed = (event: KeyboardEvent): void => {
    if (event.altKey || event.ctrlKey || event.metaKey || event.shiftKey) return;
    const [target] = event.composedPath();
    // Fields of the import form use these keys themselves.
    if (target instanceof Element && target.matches('input, select, textarea')) return;
    const rows = this.rows();
    const at = rows.findIndex((row) => row === rowOf(event));
    const next = new Map([['ArrowDown', at + 1], ['ArrowUp', at - 1], ['Home', 0], ['End', rows.length - 1]]).get(event.key);
    if (at < 0 || next === undefined) return;
    event.preventDefault();
    rows[Math.min(Math.max(next, 0), rows.length - 1)]?.focus();
  };

  private readonly answered = (event: Event): void => {
    event.stopPropagation();
    const sample = rowOf(event)?.sample;
    if (sample === undefined) return;
    const detail = (event as CustomEvent<AnswerDetail>).detail;
    this.send('answer-samples', { ...detail, ids: (detail.forAll ? this.askingLike(sample) : [sample]).map(({ id }) => id) });
  };

  private readonly pagesAnswered = (event: Event): void => {
    event.stopPropagation();
    const sample = rowOf(event)?.sample;
    const question = sample?.error === undefined ? undefined : questionsOf(sample.error).find(({ kind }) => kind === 'pages');
    if (sample === undefined || question?.kind !== 'pages') return;
    this.send('answer-sample-pages', { id: sample.id, file: question.file, pages: (event as CustomEvent<PagesDetail>).detail });
  };

  private send(name: string, detail: unknown = undefined): void {
    this.dispatchEvent(new CustomEvent(name, { detail, bubbles: true, composed: true }));
  }
}

function rowOf(event: Event): TrayRow | undefined {
  return event.composedPath().find((target) => target instanceof TrayRow);
}

customElements.define('eg-tray', Tray);
