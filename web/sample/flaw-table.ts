/** The flaws as a table: sortable, linked with the map through the selected flaw. */
import { LitElement, css, html, nothing } from 'lit';
import type { PropertyValues } from 'lit';
import type { FlawEntry } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import { figure, fixed, heightFigure, sureness } from './format.ts';
import { sortFlaws } from './sort-flaws.ts';
import type { FlawColumn } from './sort-flaws.ts';

const firstRows = 200;
const columns: readonly { readonly column: FlawColumn; readonly title: string; readonly number: boolean }[] = [
  { column: 'flaw', title: 'flaw', number: false }, { column: 'cause', title: 'what', number: false }, { column: 'confidence', title: 'how sure', number: false },
  { column: 'areaUm2', title: 'area µm²', number: true }, { column: 'peakNm', title: 'peak nm', number: true }, { column: 'heightToRadius', title: 'h/R', number: true },
];

export class FlawTable extends LitElement {
  static override properties = { flaws: { attribute: false }, selected: { attribute: false }, noiseNm: { attribute: false }, column: { state: true }, ascending: { state: true }, all: { state: true } };

  declare flaws: readonly FlawEntry[];
  declare selected: number | undefined;
  /** Of the height. */
  declare noiseNm: number | undefined;
  declare column: FlawColumn;
  declare ascending: boolean;
  declare all: boolean;

  static override styles = [controlStyles, css`
    :host { display: block; font-size: 0.78rem; }
    .scroll { max-height: 17rem; overflow: auto; border: 1px solid var(--line, #25313b); border-radius: 6px; }
    table { width: 100%; border-collapse: collapse; font-variant-numeric: tabular-nums; }
    th { position: sticky; top: 0; z-index: 1; padding: 0; background: var(--panel, #141b21); text-align: left; font-weight: 500; }
    th button { width: 100%; padding: 4px 5px; border: 0; background: none; color: var(--dim, #8fa0af); font-size: inherit; text-align: inherit; }
    th.number button, td.number { text-align: right; }
    th[aria-sort] button { color: var(--ink, #dfe6ec); }
    td { padding: 2px 5px; border-top: 1px solid var(--line, #25313b); white-space: nowrap; }
    tbody tr { cursor: pointer; }
    tbody tr:hover td, tr[aria-current] td { background: var(--raised, #1b252d); }
    tr[aria-current] td:first-child { box-shadow: inset 3px 0 var(--glow, #ffb454); }
    .sure { white-space: normal; }
    .figure { color: var(--dim, #8fa0af); }
    td button { padding: 0 4px; border: 0; background: none; font-size: inherit; }
    .reason td { border-top: 0; max-width: 0; padding: 0 8px 3px; overflow: hidden; text-overflow: ellipsis; color: var(--dim, #8fa0af); }
    .reason.whole td { padding-bottom: 6px; white-space: normal; }
    tr:has(+ .reason:hover) td { background: var(--raised, #1b252d); }
    .more { margin-top: 6px; font-size: 0.8125rem; }
  `];

  constructor() {
    super();
    this.flaws = [];
    this.column = 'areaUm2';
    this.ascending = false;
    this.all = false;
  }

  override render() {
    const sorted = sortFlaws(this.flaws, this.column, this.ascending);
    const beyond = this.selected !== undefined && sorted.findIndex(({ flaw }) => flaw === this.selected) >= firstRows;
    const shown = this.all || beyond ? sorted : sorted.slice(0, firstRows);
    return html`
      <div class="scroll" tabindex="-1"><table>
        <thead><tr>${columns.map(({ column, title, number }) => html`
          <th scope="col" class=${number ? 'number' : ''} aria-sort=${column === this.column ? (this.ascending ? 'ascending' : 'descending') : nothing}>
            <button type="button" @click=${() => { this.sortBy(column, number); }}>${title}${column === this.column ? (this.ascending ? ' ▴' : ' ▾') : ''}</button></th>`)}</tr></thead>
        <tbody>${shown.map((flaw) => this.renderRow(flaw))}</tbody>
      </table></div>
      ${shown.length < sorted.length ? html`<button type="button" class="more" @click=${() => { this.all = true; }}>show all ${sorted.length}</button>` : nothing}`;
  }

  override updated(changed: PropertyValues<this>): void {
    if (!changed.has('selected') || this.selected === undefined) return;
    const row = this.renderRoot.querySelector<HTMLElement>('tr[aria-current]');
    const scroll = this.renderRoot.querySelector<HTMLElement>('.scroll');
    if (!row || !scroll) return;
    // Only the table scrolls, not the page around it; the row may hide under the sticky head.
    const head = 28;
    const top = row.offsetTop - head;
    const bottom = row.offsetTop + row.offsetHeight + 24;
    if (top < scroll.scrollTop) scroll.scrollTop = top;
    else if (bottom > scroll.scrollTop + scroll.clientHeight) scroll.scrollTop = bottom - scroll.clientHeight;
  }

  private renderRow(flaw: FlawEntry) {
    const selected = flaw.flaw === this.selected;
    return html`
      <tr aria-current=${selected ? 'true' : nothing} @click=${() => { this.select(selected ? undefined : flaw.flaw); }}>
        <td><button type="button" aria-label="flaw ${flaw.flaw}, ${flaw.cause}: show on the map" aria-pressed=${selected ? 'true' : 'false'}>${flaw.flaw}</button></td>
        <td>${flaw.other === undefined ? flaw.cause : `${flaw.cause} or ${flaw.other}`}</td><td class="sure">${flaw.other === undefined ? sureness(flaw) : 'ambiguous'} ${flaw.byHand ? '' : html`<span class="figure">${fixed(flaw.confidence, 2)}</span>`}</td>
        <td class="number">${figure(flaw.areaUm2)}</td><td class="number">${heightFigure(flaw.peakNm, this.noiseNm)}</td><td class="number">${figure(flaw.heightToRadius, 2)}</td>
      </tr>
      <tr class="reason ${selected ? 'whole' : ''}"><td colspan=${columns.length} title=${selected ? nothing : flaw.reason} @click=${() => { this.select(selected ? undefined : flaw.flaw); }}>${flaw.reason}</td></tr>`;
  }

  private sortBy(column: FlawColumn, number: boolean): void {
    // Words from A on, the least sure first, numbers from the largest down.
    this.ascending = column === this.column ? !this.ascending : !number;
    this.column = column;
  }

  private select(flaw: number | undefined): void {
    this.dispatchEvent(new CustomEvent('flaw-select', { detail: { flaw }, bubbles: true, composed: true }));
  }
}

customElements.define('eg-flaw-table', FlawTable);
