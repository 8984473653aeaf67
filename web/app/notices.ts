/** What has to be said once: files that could not be used, a computation that was restarted. Sends `dismiss` {index?}. */
import { LitElement, css, html, nothing } from 'lit';
import type { SessionState } from '../session/state.ts';
import { controlStyles } from './controls.ts';

/** More than these are folded away. */
const shown = 4;

type Notice = SessionState['notices'][number];

export class Notices extends LitElement {
  static override properties = { notices: { attribute: false } };

  declare notices: SessionState['notices'];

  static override styles = [controlStyles, css`
    :host { display: block; }
    section { display: grid; gap: 0.4rem; padding: 0.75rem clamp(0.9rem, 2vw, 1.5rem); border-bottom: 1px solid var(--line); font-size: 0.9375rem; }
    ul { display: grid; gap: 0.3rem; margin: 0; padding: 0; list-style: none; }
    details ul { margin-top: 0.3rem; max-height: 14rem; overflow: auto; }
    li { display: flex; gap: 0.5rem; justify-content: space-between; align-items: baseline; border-left: 3px solid var(--bad); padding-left: 0.75rem; }
    li span { overflow-wrap: anywhere; }
    summary { cursor: pointer; color: var(--dim); }
    .all { justify-self: start; }
  `];

  constructor() {
    super();
    this.notices = [];
  }

  override render() {
    // The region stays on the page so that screen readers hear what is put into it.
    return html`
      <div role="status">
        ${this.notices.length === 0 ? nothing : html`
          <section aria-label="Notices">
            <ul>${this.notices.slice(0, shown).map((notice, i) => this.item(notice, i))}</ul>
            ${this.notices.length > shown ? html`
              <details><summary>${this.notices.length - shown} more</summary>
                <ul>${this.notices.slice(shown).map((notice, i) => this.item(notice, shown + i))}</ul>
              </details>` : nothing}
            ${this.notices.length > 1 ? html`<button class="plain all" @click=${() => { this.dismiss(undefined); }}>Dismiss all</button>` : nothing}
          </section>`}
      </div>
    `;
  }

  private item({ name, message }: Notice, index: number) {
    // Most sentences name their file already.
    return html`<li><span>${message.startsWith(name) ? message : html`<strong>${name}</strong>: ${message}`}</span>
      <button class="plain" aria-label=${`Dismiss what is said about ${name}`} @click=${() => { this.dismiss(index); }}>Dismiss</button></li>`;
  }

  private dismiss(index: number | undefined): void {
    this.dispatchEvent(new CustomEvent('dismiss', { detail: { index }, bubbles: true, composed: true }));
  }
}

customElements.define('eg-notices', Notices);
