/** Asks which maps of a file are the height and the current. Sends `answer-pages` {height, current}: numbers from 1, one may be absent. */
import { LitElement, css, html, nothing } from 'lit';
import { controlStyles } from '../app/controls.ts';
import type { PagesQuestion } from './questions.ts';

export interface PagesDetail {
  readonly height?: number;
  readonly current?: number;
}

const quantities = ['height', 'current'] as const;

export class PagesForm extends LitElement {
  static override properties = { question: { attribute: false }, complaint: { state: true } };

  declare question: PagesQuestion | undefined;
  declare complaint: string;

  static override styles = [controlStyles, css`
    form { display: flex; flex-wrap: wrap; gap: 0.75rem 1.25rem; align-items: end; }
    label { display: grid; gap: 0.2rem; font-size: 0.875rem; min-width: 9rem; }
    p { flex-basis: 100%; margin: 0; color: var(--bad); }
  `];

  constructor() {
    super();
    this.complaint = '';
  }

  override render() {
    if (this.question === undefined) return nothing;
    const { file, pages } = this.question;
    return html`
      <form @submit=${this.submit} aria-label=${`Maps of ${file}`}>
        ${quantities.map((quantity) => html`
          <label>${quantity === 'height' ? 'Height map' : 'Current map'}
            <select name=${quantity}>
              <option value="">none</option>
              ${Array.from({ length: pages }, (_, i) => html`<option value=${i + 1}>map ${i + 1} of ${pages}</option>`)}
            </select>
          </label>`)}
        <button class="main">Appraise</button>
        <slot></slot>
        ${this.complaint === '' ? nothing : html`<p role="alert">${this.complaint}</p>`}
      </form>
    `;
  }

  private readonly submit = (event: SubmitEvent): void => {
    event.preventDefault();
    const [height, current] = quantities.map((quantity) => Number(this.renderRoot.querySelector<HTMLSelectElement>(`[name="${quantity}"]`)?.value ?? 0));
    if (!height && !current) this.complaint = 'Choose at least one map.';
    else if (height === current) this.complaint = 'One map cannot be both.';
    else {
      this.complaint = '';
      const detail: PagesDetail = { ...(height ? { height } : {}), ...(current ? { current } : {}) };
      this.dispatchEvent(new CustomEvent('answer-pages', { detail, bubbles: true, composed: true }));
    }
  };
}

customElements.define('eg-pages-form', PagesForm);
