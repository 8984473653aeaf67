/** Values of all channels under the cursor, in a fixed place. */
import { LitElement, css, html } from 'lit';
import type { MapInfo, MapName, PointValues } from '../../workers/api.ts';
import { confidenceWord, fixed, mapValue } from '../sample/format.ts';
import { mapWords } from './map-words.ts';

export class Readout extends LitElement {
  static override properties = { point: { attribute: false }, maps: { attribute: false } };

  declare point: PointValues | undefined;
  declare maps: readonly MapInfo[];

  static override styles = css`
    :host { display: block; font-size: 13px; line-height: 1.5; font-variant-numeric: tabular-nums; }
    h3 { margin: 0 0 4px; font-size: 12px; font-weight: 500; color: var(--dim, #8fa0af); }
    dl { display: grid; grid-template-columns: auto 1fr; gap: 1px 12px; margin: 0; }
    dt { color: var(--dim, #8fa0af); white-space: nowrap; }
    dd { margin: 0; text-align: right; white-space: nowrap; }
    .booked { color: var(--glow-soft, #ffd9a0); font-weight: 600; }
    .note { margin: 4px 0 0; color: var(--dim, #8fa0af); min-height: 1.5em; }
    @media (max-width: 1100px) { dl { grid-template-columns: auto 1fr auto 1fr; } }
  `;

  override render() {
    const { point } = this;
    const marks = point ? [...(point.saturated ? ['saturated'] : []), ...(point.atFloor ? ['at the floor'] : []), ...(point.repaired ? ['repaired'] : [])] : [];
    return html`
      <h3>under the cursor</h3>
      <dl>
        <dt>x</dt><dd>${point ? `${fixed(point.xUm, 2)}\u00a0µm` : '–'}</dd>
        <dt>y</dt><dd>${point ? `${fixed(point.yUm, 2)}\u00a0µm` : '–'}</dd>
        ${this.maps.map(({ name, unit }) => html`<dt>${mapWords[name]}</dt><dd>${this.valueText(name, unit)}</dd>`)}
        <dt>booked as</dt><dd class="booked">${point?.cause ?? '–'}</dd>
      </dl>
      <p class="note">${[...(point?.flaw ? [`flaw ${point.flaw.flaw}: ${point.flaw.cause}, ${confidenceWord(point.flaw.confidence)}`] : []), ...marks].join(' · ')}</p>`;
  }

  private valueText(name: MapName, unit: string): string {
    const value = this.point?.values[name];
    return name === 'layers' ? (value === undefined ? '–' : String(value)) : mapValue(value, unit);
  }
}

customElements.define('eg-readout', Readout);
