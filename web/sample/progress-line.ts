/** What the computation is at, and the way to stop it. */
import { LitElement, css, html } from 'lit';
import type { SampleState } from '../session/state.ts';
import { controlStyles } from '../app/controls.ts';

export class ProgressLine extends LitElement {
  static override properties = { progress: { attribute: false } };

  declare progress: SampleState['progress'];

  static override styles = [controlStyles, css`
    :host { display: flex; gap: 12px; align-items: center; font-size: 0.875rem; }
    progress { flex: 1; max-width: 22rem; height: 6px; appearance: none; border: 0; border-radius: 3px; overflow: hidden; background: var(--line, #25313b); }
    progress::-webkit-progress-bar { background: var(--line, #25313b); }
    progress::-webkit-progress-value { background: var(--glow, #ffb454); transition: width 150ms; }
    progress::-moz-progress-bar { background: var(--glow, #ffb454); }
    .stage { min-width: 8em; color: var(--dim, #8fa0af); }
    button { padding: 0 0.7rem; font-size: 0.875rem; }
    @media (prefers-reduced-motion: reduce) { progress::-webkit-progress-value { transition: none; } }
  `];

  override render() {
    const { progress } = this;
    return html`
      <span class="stage" role="status">working: ${progress?.stage ?? 'waiting'}</span>
      <progress aria-label="Stages done" max=${progress?.total ?? 1} .value=${progress?.done ?? 0}></progress>
      <button type="button" @click=${() => this.dispatchEvent(new CustomEvent('cancel', { bubbles: true, composed: true }))}>Cancel</button>`;
  }
}

customElements.define('eg-progress-line', ProgressLine);
