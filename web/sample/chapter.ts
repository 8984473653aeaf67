/** What all chapters share: the finding first, then a fold with the knobs and the effect of the last change. */
import { LitElement, css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { FieldInfo, Preview, RecipeData, SampleSummary } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import { valueAt } from '../session/recipe.ts';
import { effectStyles, noEffect } from './effect.ts';
import type { Effect } from './effect.ts';
import { lookFinding } from './findings.ts';
import './knob.ts';
import { changedPaths, knobsOf, liveChapters } from './knobs.ts';
import type { ChapterName } from './knobs.ts';

export abstract class Chapter extends LitElement {
  static override properties = { summary: { attribute: false }, fields: { attribute: false }, recipe: { attribute: false }, effect: { attribute: false }, look: { attribute: false }, open: { type: Boolean } };

  declare summary: SampleSummary;
  declare fields: readonly FieldInfo[];
  /** Sparse recipe in force. */
  declare recipe: RecipeData;
  /** "This returned 0.3 µm²." when the last change was made here. */
  declare effect: Effect;
  /** Where a held handle would lead. */
  declare look: Preview | undefined;
  declare open: boolean;

  static override styles = [controlStyles, effectStyles, css`
    :host { display: block; border-bottom: 1px solid var(--line, #25313b); }
    summary { display: grid; grid-template-columns: 1fr auto; gap: 2px 12px; padding: 12px 16px; cursor: pointer; list-style: none; }
    summary::-webkit-details-marker { display: none; }
    summary:hover { background: var(--panel, #141b21); }
    summary:focus-visible { outline: 2px solid var(--focus, #7cc0ea); outline-offset: -3px; }
    h2 { margin: 0; font-size: 0.9375rem; font-weight: 600; color: var(--glow-soft, #ffd9a0); }
    h2::before { content: '▸'; display: inline-block; width: 1.1em; margin-left: -0.2em; color: var(--dim, #8fa0af); }
    details[open] h2::before { content: '▾'; }
    .count { color: var(--dim, #8fa0af); font-size: 0.8125rem; align-self: center; }
    .finding { grid-column: 1 / -1; margin: 0; font-size: 0.9375rem; line-height: 1.45; }
    .body { padding: 0 16px 14px; max-width: 38rem; }
    .finding { max-width: 62ch; }
    .effect { grid-column: 1 / -1; margin: 0; font-size: 0.875rem; }
    .how { padding-left: 0; font-size: 0.8125rem; }
    .note { margin: 6px 0; color: var(--dim, #8fa0af); font-size: 0.8125rem; line-height: 1.45; }
    .caution { margin: 6px 0; padding: 6px 10px; border-left: 3px solid var(--bad, #ff9a76); background: var(--panel, #141b21); font-size: 0.8125rem; line-height: 1.45; }
    h3 { margin: 14px 0 2px; font-size: 0.8125rem; font-weight: 600; color: var(--dim, #8fa0af); }
  `];

  constructor() {
    super();
    this.effect = noEffect;
    this.open = false;
  }

  abstract readonly chapter: ChapterName;
  abstract readonly heading: string;
  abstract finding(): string;
  /** What stands between the finding and the knobs. */
  aboveKnobs(): TemplateResult | typeof nothing {
    return nothing;
  }
  /** What follows the knobs. */
  belowKnobs(): TemplateResult | typeof nothing {
    return nothing;
  }
  /** What else was changed here besides knobs: "3 by hand". */
  alsoChanged(): string {
    return '';
  }
  /** What a value of a field means on this map, in words. */
  meaning(_path: string): ((value: number) => string) | undefined {
    return undefined;
  }
  /** Where the method page explains this chapter. */
  topic(): string | undefined {
    return undefined;
  }
  /** What the appraisal uses where a field is absent. */
  found(_path: string): string | undefined {
    return undefined;
  }

  override render() {
    const changed = changedPaths(this.chapter, this.fields, this.recipe).length;
    const count = [changed === 0 ? '' : `${changed} changed`, this.alsoChanged()].filter((part) => part !== '').join(', ');
    return html`
      <details ?open=${this.open} @toggle=${(event: Event) => { this.open = (event.target as HTMLDetailsElement).open; }}>
        <summary>
          <h2>${this.heading}</h2><span class="count">${count === '' ? 'all by default' : count}</span>
          <p class="finding">${this.finding()}</p>
          <p class="effect ${this.effect.tone}" role="status">${this.effect.words}</p>
        </summary>
        ${this.open ? this.renderBody() : nothing}
      </details>`;
  }

  /** Made only while it is looked into: all knobs of all chapters at once would hold up the page. */
  private renderBody() {
    return html`
      <div class="body">
        ${this.topic() === undefined ? nothing : html`<button type="button" class="plain how" @click=${() => { this.tell('how', { topic: this.topic() }); }}>how this is done</button>`}
        ${this.aboveKnobs()}
        ${knobsOf(this.chapter, this.fields).map(({ field, plan }) => html`<eg-knob .field=${field} .slider=${plan.slider} .value=${this.given(field.path)} .found=${this.found(field.path)}
          ?live=${liveChapters.includes(this.chapter)} .look=${this.look ? lookFinding(this.look) : ''} .meaning=${this.meaning(field.path)} .topic=${plan.topic}></eg-knob>`)}
        ${this.belowKnobs()}
      </div>`;
  }

  /** From the recipe in force, else the default. */
  protected value(path: string): unknown {
    return valueAt(this.recipe, path) ?? this.fields.find((field) => field.path === path)?.fallback;
  }

  protected tell(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }

  private given(path: string): number | string | boolean | undefined {
    const value = valueAt(this.recipe, path);
    return typeof value === 'number' || typeof value === 'string' || typeof value === 'boolean' ? value : undefined;
  }
}
