/** The area ledger as a bar: one segment per cause, as wide as its share of the footprint; the map's legend at once. */
import { LitElement, html, nothing, svg } from 'lit';
import type { PropertyValues } from 'lit';
import type { ComputeFacts, LedgerEntry } from '../../workers/api.ts';
import { area, ledgerFigure, percent } from '../sample/format.ts';
import { SizeWatch } from '../sample/size-watch.ts';
import { causeFill, hatchDefinitions } from './hatches.ts';
import { labelRow, leaderRoutes, leastWidths, segmentSpans } from './layout.ts';
import type { Span } from './layout.ts';
import { ledgerBarStyles } from './ledger-bar-styles.ts';
import { notAssessed, orderEntries } from './order.ts';
import type { OrderedEntry } from './order.ts';

/** Detail of the `isolate` event: the cause to show alone, or undefined for all again. */
export type IsolateEvent = CustomEvent<{ readonly code: number | undefined }>;

const tall = 36;
const low = 14;
const groupGap = 4;
const pairGap = 1;
const labelGap = 18;
const swatch = 12;
/** Distance between the levels of leader lines. */
const level = 4;

export class LedgerBar extends LitElement {
  static override properties = {
    entries: { attribute: false },
    causes: { attribute: false },
    hatchPeriod: { attribute: false },
    compact: { type: Boolean, reflect: true },
    isolated: { attribute: false },
    width: { state: true },
    shown: { state: true },
    walked: { state: true },
  };

  declare entries: readonly LedgerEntry[];
  declare causes: ComputeFacts['causes'];
  declare hatchPeriod: number;
  declare compact: boolean;
  declare isolated: number | undefined;
  declare width: number;
  /** Code under the pointer or with the focus: its share is spelt out. */
  declare shown: number | undefined;
  /** The one button that Tab reaches. */
  declare walked: number;
  protected readonly sizes = new SizeWatch(this, () => { this.width = this.clientWidth; });
  private pen: CanvasRenderingContext2D | null = null;

  static override styles = ledgerBarStyles;

  constructor() {
    super();
    this.entries = [];
    this.causes = [];
    this.hatchPeriod = 8;
    this.compact = false;
    this.width = 0;
    this.walked = 0;
  }


  override render() {
    const ordered = orderEntries(this.entries);
    const spans = this.spansOf(ordered);
    if (this.compact) return this.renderCompact(ordered, spans);
    const labels = ordered.map((entry) => `${entry.cause} ${this.areaText(entry)}`);
    const widths = labels.map((label) => swatch + 5 + this.textWidth(label));
    const places = labelRow(spans.map((span) => span.x), widths, this.width, labelGap);
    return html`
      <div class="bar">
        ${this.renderDrawing(ordered, spans, tall)}
        <ul aria-label="Ledger: ${ordered.length} causes, arrow keys walk, Enter shows one alone on the map" @keydown=${this.onKey}>
          ${ordered.map((entry, index) => this.renderButton(entry, index))}
        </ul>
      </div>
      ${places === undefined ? this.renderLegend(ordered) : this.renderLabels(ordered, spans, places)}
      <p class="detail" aria-hidden="true">${this.detail(ordered)}</p>`;
  }

  /** Positions go through the style object: the page's policy allows no style attributes. */
  override updated(_changed: PropertyValues): void {
    const spans = this.spansOf(orderEntries(this.entries));
    this.renderRoot.querySelectorAll<HTMLElement>('li').forEach((item, index) => {
      const span = spans[index];
      if (!span) return;
      item.style.setProperty('left', `${span.x}px`);
      item.style.setProperty('width', `${span.width}px`);
    });
  }

  private spansOf(ordered: readonly OrderedEntry[]): readonly Span[] {
    const gaps = ordered.map((entry, index) => {
      const before = ordered[index - 1];
      return before === undefined ? 0 : this.compact || before.group === entry.group ? pairGap : groupGap;
    });
    const shares = ordered.map((entry) => entry.share);
    return segmentSpans(shares, this.width, gaps, leastWidths(shares, this.width));
  }

  private renderCompact(ordered: readonly OrderedEntry[], spans: readonly Span[]) {
    const words = ordered.map((entry) => `${entry.cause} ${area(entry.areaUm2)}`).join(', ');
    return html`<div class="bar" role="img" title=${words} aria-label="Ledger: ${words === '' ? 'no area' : words}">${this.renderDrawing(ordered, spans, low)}</div>`;
  }

  private renderDrawing(ordered: readonly OrderedEntry[], spans: readonly Span[], height: number) {
    return html`<svg aria-hidden="true" width=${this.width} height=${height}>
      ${hatchDefinitions(this.causes, this.hatchPeriod)}
      ${ordered.map((entry, index) => {
        const span = spans[index] ?? { x: 0, width: 0 };
        return svg`<rect class=${this.segmentClass(entry)} x=${span.x} y="0" width=${span.width} height=${height} fill=${causeFill(entry.code, entry.cause)}></rect>`;
      })}
    </svg>`;
  }

  private segmentClass(entry: OrderedEntry): string {
    const dimmed = this.isolated !== undefined && this.isolated !== entry.code;
    return `segment ${entry.group}${dimmed ? ' dimmed' : ''}`;
  }

  private renderButton(entry: OrderedEntry, index: number) {
    const pressed = this.isolated === entry.code;
    const show = () => { this.shown = entry.code; };
    const hide = () => { this.shown = undefined; };
    return html`<li><button type="button" tabindex=${index === this.walked ? 0 : -1} aria-pressed=${pressed ? 'true' : 'false'}
      aria-label="${entry.cause}, ${area(entry.areaUm2)}, ${percent(entry.share)}"
      @click=${() => this.isolate(pressed ? undefined : entry.code)}
      @focus=${() => { this.walked = index; show(); }} @blur=${hide} @pointerenter=${show} @pointerleave=${hide}></button></li>`;
  }

  /** Each label under its segment, or joined to it by a line; lines of labels that moved run on levels of their own and never cross. */
  private renderLabels(ordered: readonly OrderedEntry[], spans: readonly Span[], places: readonly number[]) {
    const pair = ordered.flatMap((entry, index) => (entry.group === 'uneven' ? [index] : []));
    const first = spans[pair[0] ?? -1];
    const last = spans[pair[1] ?? -1];
    const routes = leaderRoutes(spans, places, swatch / 2);
    const base = first && last ? 6 : 1;
    const top = base + 3 + level * (1 + Math.max(0, ...routes.map((route) => route?.level ?? 0)));
    return html`<svg class="labels" aria-hidden="true" width=${this.width} height=${top + 16}>
      ${first && last ? svg`<path class="bracket" d="M${first.x + 0.5} 2V6H${last.x + last.width - 0.5}V2"></path>` : nothing}
      ${ordered.map((entry, index) => {
        const x = places[index] ?? 0;
        const route = routes[index];
        return svg`<g class=${this.labelClass(entry)}>
          ${route ? svg`<path class="leader" d="M${route.from} ${entry.group === 'uneven' ? base : 1}V${base + level * (route.level + 1)}H${route.to}V${top}"></path>` : nothing}
          <rect x=${x} y=${top + 1} width=${swatch} height=${swatch} rx="2" fill=${causeFill(entry.code, entry.cause)}></rect>
          <text x=${x + swatch + 5} y=${top + 12}><tspan class="cause">${entry.cause}</tspan> <tspan class="area">${this.areaText(entry)}</tspan></text>
        </g>`;
      })}
    </svg>`;
  }

  private renderLegend(ordered: readonly OrderedEntry[]) {
    return html`<div class="legend" aria-hidden="true">${ordered.map((entry) => html`
      <span class=${this.labelClass(entry)} @click=${() => this.isolate(this.isolated === entry.code ? undefined : entry.code)}>
        <svg width="18" height="12"><rect width="18" height="12" rx="2" fill=${causeFill(entry.code, entry.cause)}></rect></svg>
        <b>${entry.cause}</b> ${this.areaText(entry)}
      </span>`)}</div>`;
  }

  private labelClass(entry: OrderedEntry): string {
    const off = this.isolated !== undefined && this.isolated !== entry.code && this.shown !== entry.code;
    return `${this.shown === entry.code ? 'shown' : ''}${off ? ' off' : ''}`;
  }

  private detail(ordered: readonly OrderedEntry[]) {
    const entry = ordered.find(({ code }) => code === (this.shown ?? this.isolated));
    if (entry) {
      const more = this.isolated === entry.code ? 'alone on the map; Escape shows all' : 'click or Enter shows it alone on the map';
      return html`<b>${entry.cause}</b> ${area(entry.areaUm2)}, ${percent(entry.share)} of the footprint · ${more}`;
    }
    const out = ordered.filter(({ group }) => group === 'uneven');
    const sum = out.reduce((total, { areaUm2 }) => total + areaUm2, 0);
    const missing = notAssessed(this.entries);
    return [
      'areas in µm²', ...(out.length > 1 ? [`thick and thin together ${area(sum)} out of band`] : []), ...(missing.length > 0 ? [`not assessed: ${missing.join(', ')}`] : []),
    ].join(' · ');
  }

  private readonly onKey = (event: KeyboardEvent): void => {
    const buttons = [...this.renderRoot.querySelectorAll('button')];
    const last = buttons.length - 1;
    const steps: Readonly<Record<string, number>> = { ArrowRight: 1, ArrowDown: 1, ArrowLeft: -1, ArrowUp: -1, Home: -last, End: last };
    const step = steps[event.key];
    if (event.key === 'Escape' && this.isolated !== undefined) this.isolate(undefined);
    else if (step !== undefined) {
      this.walked = Math.min(last, Math.max(0, this.walked + step));
      buttons[this.walked]?.focus();
    } else return;
    event.preventDefault();
    event.stopPropagation();
  };

  private isolate(code: number | undefined): void {
    this.dispatchEvent(new CustomEvent('isolate', { detail: { code }, bubbles: true, composed: true }));
  }

  private areaText({ areaUm2 }: OrderedEntry): string {
    return ledgerFigure(areaUm2, this.entries.reduce((total, entry) => total + entry.areaUm2, 0));
  }

  private textWidth(text: string): number {
    this.pen ??= document.createElement('canvas').getContext('2d');
    if (!this.pen) return text.length * 8;
    this.pen.font = `600 13px ${getComputedStyle(this).fontFamily}`;
    return Math.ceil(this.pen.measureText(text).width);
  }
}

customElements.define('eg-ledger-bar', LedgerBar);
