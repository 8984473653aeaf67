/** Stands beside the map while a tool is in hand: what to do now, and the ways out for those without a keyboard. */
import { LitElement, css, html, nothing } from 'lit';
import { controlStyles } from '../app/controls.ts';
import type { Hand } from './hand.ts';
import { drawingKind, hintOf, leastSpots } from './hand.ts';
import type { HandDraft } from './stage-drawing.ts';

/** Detail of the `hand-edit` event; `leave` puts the tool away. */
export type HandEdit = 'back' | 'finish' | 'leave';

export class HandStrip extends LitElement {
  static override properties = { hand: { attribute: false }, draft: { attribute: false } };

  declare hand: Hand;
  declare draft: HandDraft;

  static override styles = [controlStyles, css`
    :host { display: flex; flex-wrap: wrap; gap: 4px 8px; align-items: center; padding: 5px 10px; background: var(--panel, #141b21); border: 1px solid var(--line, #25313b); border-left: 3px solid var(--glow, #ffb454); border-radius: 7px; font-size: 0.8125rem; }
    p { flex: 1 1 12rem; margin: 0; line-height: 1.35; }
    button { padding: 0.1rem 0.6rem; font-size: 0.8125rem; }
    button:disabled { opacity: 0.5; cursor: default; }
    /* Buttons that come and go must not move the map under a finger. */
    @media (max-width: 900px) { :host { box-sizing: border-box; min-height: 3.4rem; } :host([corners]) { min-height: 5.6rem; align-content: flex-start; } }
    @media (pointer: coarse) { button { padding: 0.35rem 0.8rem; } }
  `];

  override willUpdate(): void {
    this.toggleAttribute('corners', ['corners', 'places'].includes(drawingKind(this.hand) ?? ''));
  }

  override render() {
    const { points, enough } = this.draft;
    const kind = drawingKind(this.hand);
    const corners = kind === 'corners';
    const places = kind === 'places';
    return html`
      <p role="status">${hintOf(this.hand)}</p>
      ${points > 0 && (corners || places) ? html`<button type="button" title="Backspace" @click=${() => { this.send('back'); }}>${corners ? 'back a corner' : 'take last out'}</button>` : nothing}
      ${places ? html`<button type="button" class="main" ?disabled=${!enough} @click=${() => { this.send('finish'); }}>${enough ? `level by these ${points}` : `${points} of ${leastSpots}`}</button>` : nothing}
      ${enough && corners ? html`<button type="button" class="main" @click=${() => { this.send('finish'); }}>close outline</button>` : nothing}
      <button type="button" title="Escape" aria-keyshortcuts="Escape" @click=${() => { this.send('leave'); }}>${this.hand.tool === 'brush' || this.hand.tool === 'outline' ? 'done' : 'cancel'}</button>`;
  }

  private send(detail: HandEdit): void {
    this.dispatchEvent(new CustomEvent('hand-edit', { detail }));
  }
}

customElements.define('eg-hand-strip', HandStrip);
