/** The area that a device needs. Sends `require` {value}; an emptied field means that samples are not judged. */
import { LitElement, css, html, nothing } from 'lit';
import { controlStyles } from '../app/controls.ts';
import { typedNumber } from '../sample/format.ts';

export class RequiredArea extends LitElement {
  static override properties = { value: { type: Number }, wrong: { state: true } };

  declare value: number | undefined;
  declare wrong: boolean;

  static override styles = [controlStyles, css`
    :host { display: block; }
    label { display: flex; gap: 0.6rem; align-items: baseline; white-space: nowrap; }
    input { width: 6rem; text-align: right; }
    p { margin: 0.2rem 0 0; color: var(--bad); font-size: 0.8125rem; }
  `];

  constructor() {
    super();
    this.wrong = false;
  }

  override render() {
    return html`
      <label>A device needs <input inputmode="decimal" autocomplete="off" placeholder="any" .value=${this.value === undefined ? '' : String(this.value)}
        aria-invalid=${this.wrong} aria-describedby="wrong" @change=${this.changed}> µm²</label>
      ${this.wrong ? html`<p id="wrong" role="alert">Type an area above 0, or nothing.</p>` : nothing}
    `;
  }

  private readonly changed = (event: Event): void => {
    const text = (event.target as HTMLInputElement).value.trim();
    const value = text === '' ? undefined : typedNumber(text);
    this.wrong = value !== undefined && !(value > 0 && Number.isFinite(value));
    if (!this.wrong) this.dispatchEvent(new CustomEvent('require', { detail: { value }, bubbles: true, composed: true }));
  };
}

customElements.define('eg-required-area', RequiredArea);
