/** The method page: how ground and flaws are found, formula, source and limits of each. Loaded when it is first wanted. Sends `back`. */
import { LitElement, css, html, nothing } from 'lit';
import type { PropertyValues } from 'lit';
import type { FieldInfo } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import { plain } from '../sample/format.ts';
import type { Topic } from './topic.ts';
import { currentTopics } from './topics-current.ts';
import { flawTopics } from './topics-flaws.ts';
import { heightTopics } from './topics-height.ts';

const groups: readonly { readonly title: string; readonly topics: readonly Topic[] }[] = [
  { title: 'Height', topics: heightTopics }, { title: 'Current', topics: currentTopics }, { title: 'Flaws', topics: flawTopics },
];

export const topicIds: readonly string[] = groups.flatMap(({ topics }) => topics.map(({ id }) => id));

export class MethodPlace extends LitElement {
  static override properties = { topic: {}, fields: { attribute: false } };

  /** Where the page opens. */
  declare topic: string;
  /** Settings, for their titles and defaults. */
  declare fields: readonly FieldInfo[];

  static override styles = [controlStyles, css`
    :host { display: grid; grid-template-columns: 15rem minmax(0, 46rem); gap: 0 3rem; padding: 1.25rem clamp(0.9rem, 2vw, 1.5rem) 4rem; line-height: 1.55; }
    nav { position: sticky; top: 1rem; align-self: start; max-height: calc(100dvh - 2rem); overflow: auto; font-size: 0.875rem; }
    nav h2 { margin: 0.9rem 0 0.2rem; font-size: 0.8125rem; font-weight: 600; color: var(--dim, #8fa0af); }
    nav ul { margin: 0; padding: 0; list-style: none; }
    nav li button { padding: 0.1rem 0; font-size: inherit; text-align: left; white-space: normal; }
    nav [aria-current] { color: var(--glow-soft, #ffd9a0); }
    h1 { margin: 0 0 0.4rem; font-size: 1.375rem; font-weight: 500; }
    section { padding: 0.4rem 0 0.9rem; border-top: 1px solid var(--line, #25313b); scroll-margin-top: 0.5rem; }
    section:focus { outline: none; }
    section:focus h2 { color: var(--glow, #ffb454); }
    section h2 { margin: 0.7rem 0 0.2rem; font-size: 1.0625rem; font-weight: 600; color: var(--glow-soft, #ffd9a0); }
    p, ul { margin: 0.4rem 0; }
    table { margin: 0.4rem 0; border-collapse: collapse; font-size: 0.875rem; }
    th { font-weight: 500; text-align: left; color: var(--dim, #8fa0af); }
    th, td { padding: 0.1rem 1.2rem 0.1rem 0; }
    .formula { margin: 0.3rem 0; padding: 0.3rem 0.7rem; background: var(--panel, #141b21); border-left: 3px solid var(--edge, #5a6b79); font-size: 0.9375rem; overflow-wrap: anywhere; }
    .small { color: var(--dim, #8fa0af); font-size: 0.875rem; }
    .small b { font-weight: 600; color: var(--ink, #dfe6ec); }
    @media (max-width: 900px) { :host { display: block; } nav { position: static; max-height: none; margin-bottom: 1rem; } nav ul { display: flex; flex-wrap: wrap; gap: 0 1rem; } }
  `];

  constructor() {
    super();
    this.topic = '';
    this.fields = [];
  }

  override render() {
    return html`
      <nav aria-label="Topics">
        ${this.renderBack()}
        ${groups.map(({ title, topics }) => html`<h2>${title}</h2><ul>${topics.map((topic) => html`
          <li><button type="button" class="plain" aria-current=${topic.id === this.topic ? 'true' : nothing} @click=${() => { this.goTo(topic.id); }}>${topic.title}</button></li>`)}</ul>`)}
      </nav>
      <article>
        <h1>How ground and flaws are found</h1>
        <p class="small">Formula, source and limits of every step. Numbers that a setting steers are given with its default; the others are fixed.</p>
        ${groups.map(({ topics }) => topics.map((topic) => this.renderTopic(topic)))}
        ${this.renderBack()}
      </article>`;
  }

  override updated(changed: PropertyValues<this>): void {
    if (changed.has('topic')) this.show(this.topic);
  }

  private renderBack() {
    return html`<button type="button" @click=${() => { this.dispatchEvent(new CustomEvent('back', { bubbles: true, composed: true })); }}>← back to the sample</button>`;
  }

  private renderTopic({ id, title, what, formulas, sources, limits, settings }: Topic) {
    return html`
      <section id=${id} tabindex="-1" aria-label=${title}>
        <h2>${title}</h2>
        ${what}
        ${formulas?.map((formula) => html`<p class="formula">${formula}</p>`)}
        <p class="small"><b>Limits.</b> ${limits}</p>
        ${sources ? html`<p class="small"><b>${sources.length > 1 ? 'Sources' : 'Source'}.</b> ${sources.join(' ')}</p>` : nothing}
        ${this.renderSettings(settings ?? [])}
      </section>`;
  }

  private renderSettings(paths: readonly string[]) {
    const known = paths.flatMap((path) => this.fields.filter((field) => field.path === path));
    if (known.length === 0) return nothing;
    return html`<p class="small"><b>Settings.</b> ${known.map(({ title, fallback, absent, unit }, k) => html`${k > 0 ? '; ' : ''}${title}: ${fallback === undefined ? absent ?? 'none' : typeof fallback === 'boolean' ? (fallback ? 'on' : 'off') : typeof fallback === 'number' ? `${plain(fallback)}${unit === undefined ? '' : `\u00a0${unit}`}` : fallback}`)}.</p>`;
  }

  private goTo(id: string): void {
    if (id === this.topic) this.show(id);
    else this.topic = id;
  }

  /** Not by the address: the page has none for its places. */
  private show(id: string): void {
    const section = this.renderRoot.querySelector<HTMLElement>(`section#${CSS.escape(id)}`);
    section?.scrollIntoView({ block: 'start' });
    section?.focus({ preventScroll: true });
  }
}

customElements.define('eg-method-place', MethodPlace);
