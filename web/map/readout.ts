/** Values of all channels under the cursor, in a fixed place. */
import { LitElement, css, html } from 'lit';
import type { MapInfo, MapName, PointValues } from '../../workers/api.ts';
import { fixed, heightText, mapValue, sureness } from '../sample/format.ts';
import { mapWords } from './map-words.ts';

export class Readout extends LitElement {
  static override properties = { point: { attribute: false }, maps: { attribute: false }, noiseNm: { attribute: false } };

  declare point: PointValues | undefined;
  declare maps: readonly MapInfo[];
  /** Of the height. */
  declare noiseNm: number | undefined;

  static override styles = css`
    :host { display: block; font-size: 13px; line-height: 1.5; font-variant-numeric: tabular-nums; }
    h3 { margin: 0 0 4px; font-size: 12px; font-weight: 500; color: var(--dim, #8fa0af); }
    dl { display: grid; gap: 1px 16px; margin: 0; }
    div { display: flex; gap: 12px; justify-content: space-between; }
    dt { color: var(--dim, #8fa0af); white-space: nowrap; }
    dd { margin: 0; text-align: right; white-space: nowrap; }
    .booked { color: var(--glow-soft, #ffd9a0); font-weight: 600; }
    .note { margin: 4px 0 0; color: var(--dim, #8fa0af); min-height: 1.5em; }
    @media (max-width: 900px) { dl { grid-template-columns: repeat(auto-fill, minmax(9.2rem, 1fr)); } .note { min-height: 0; } }
  `;

  override render() {
    const { point } = this;
    const marks = point ? [...(point.saturated ? ['saturated'] : []), ...(point.atFloor ? ['at the floor'] : []), ...(point.repaired ? ['repaired'] : [])] : [];
    return html`
      <h3>under the cursor</h3>
      <dl>
        ${this.pair('x', point ? `${fixed(point.xUm, 2)}\u00a0µm` : '–')}
        ${this.pair('y', point ? `${fixed(point.yUm, 2)}\u00a0µm` : '–')}
        ${this.maps.map(({ name, unit }) => this.pair(mapWords[name], this.valueText(name, unit)))}
        ${this.pair('booked as', point?.cause ?? '–', 'booked')}
      </dl>
      <p class="note">${[...(point?.flaw ? [`flaw ${point.flaw.flaw}: ${point.flaw.cause}, ${sureness(point.flaw)}`] : []), ...marks].join(' · ')}</p>`;
  }

  private pair(word: string, value: string, look = '') {
    return html`<div><dt>${word}</dt><dd class=${look}>${value}</dd></div>`;
  }

  private valueText(name: MapName, unit: string): string {
    const value = this.point?.values[name];
    if (name === 'height') return heightText(value, this.noiseNm);
    return name === 'layers' ? (value === undefined ? '–' : String(value)) : mapValue(value, unit);
  }
}

customElements.define('eg-readout', Readout);
