/** The colour scale under the map: colours with two handles on them, a histogram above, ticks below (in layers for a current). */
import { LitElement, html, nothing } from 'lit';
import type { PropertyValues } from 'lit';
import type { MapInfo, SampleSummary } from '../../workers/api.ts';
import { mapValue, tickText } from '../sample/format.ts';
import { SizeWatch } from '../sample/size-watch.ts';
import { axisOf, layerTicks, referenceMark, roundTicks, shareOf, valueAt } from './value-axis.ts';
import type { Axis, Limits } from './value-axis.ts';
import { paintHistogram, paintScale } from './paint-scale.ts';
import { placeLabels } from './place-labels.ts';
import { valueScaleStyles } from './value-scale-styles.ts';

/** Detail of the `limits` event. */

/** Width of a digit at the ticks' size, a little generous. */
const letterWidth = 7.2;

interface ShownTick {
  readonly share: number;
  readonly text: string;
  readonly title: string;
  readonly weight: number;
  readonly look: string;
}

/** Handles come no closer than this share of the axis. */
const leastSpan = 0.01;

export class ValueScale extends LitElement {
  static override properties = {
    map: { attribute: false }, summary: { attribute: false }, limits: { attribute: false }, colours: { attribute: false }, bins: { attribute: false }, bandFactor: { attribute: false },
    width: { state: true },
  };

  declare map: MapInfo;
  declare summary: SampleSummary;
  declare limits: Limits;
  /** Colours low to high. */
  declare colours: readonly string[];
  /** Counts over the axis, even steps of share. */
  declare bins: Uint32Array | undefined;
  declare bandFactor: number;
  declare width: number;
  protected readonly sizes = new SizeWatch(this, () => { this.width = this.clientWidth; });

  static override styles = valueScaleStyles;

  constructor() {
    super();
    this.width = 0;
    this.bandFactor = 3;
  }


  get axis(): Axis {
    return axisOf(this.map, this.limits.log);
  }

  override render() {
    const { axis } = this;
    const mark = referenceMark(axis, this.map, this.summary, this.bandFactor);
    return html`
      <canvas class="bins" aria-hidden="true"></canvas>
      <div class="line" @pointerdown=${this.onLine}>
        <canvas class="colours" aria-hidden="true"></canvas>
        ${mark && mark.to > mark.from ? html`<span class="mark" title=${mark.label}></span>` : ''}
        ${(['low', 'high'] as const).map((end) => this.renderHandle(end))}
      </div>
      ${this.renderTicks(this.valueTicks(axis), '')}
      ${this.isCurrent ? this.renderTicks(this.rungTicks(axis), 'layers') : ''}`;
  }

  private get isCurrent(): boolean {
    return (this.map.name === 'current' || this.map.name === 'rawCurrent') && this.summary.ladder !== undefined;
  }

  /** The two limits, which always show, and round values where there is room. */
  private valueTicks(axis: Axis): readonly ShownTick[] {
    const { limits, map } = this;
    const limit = (value: number): ShownTick => ({ share: shareOf(axis, value), text: mapValue(value, map.unit), title: '', weight: 2, look: 'limit' });
    const round = roundTicks(axis, map.name === 'layers').map(({ share, value }): ShownTick => ({ share, text: tickText(value, map.unit), title: '', weight: 1, look: 'round' }));
    return [limit(limits.low), limit(limits.high), ...round];
  }

  private rungTicks(axis: Axis): readonly ShownTick[] {
    return layerTicks(axis, this.summary.ladder).map(({ share, value, label = '', reference }): ShownTick => (
      { share, text: label, title: mapValue(value, this.map.unit), weight: reference ? 2 : 1, look: reference ? 'rung reference' : 'rung' }));
  }

  private renderTicks(ticks: readonly ShownTick[], kind: string) {
    const lefts = placeLabels(ticks.map(({ share, text, weight }) => ({ x: share * this.width, width: text.length * letterWidth + 2, weight })), this.width, 6);
    return html`<div class="ticks ${kind}" aria-hidden=${kind === '' ? 'true' : 'false'}>${ticks.map(({ text, title, look }, index) => {
      const left = lefts[index];
      return left === undefined ? nothing : html`<span class="tick ${look}" data-left=${left} title=${title}>${text}</span>`;
    })}</div>`;
  }

  /** Positions go through the style object: the page's policy allows no style attributes. */
  override updated(_changed: PropertyValues): void {
    const { axis } = this;
    const place = (element: HTMLElement | null, share: number): void => element?.style.setProperty('left', `${100 * share}%`);
    place(this.renderRoot.querySelector('.handle.low'), shareOf(axis, this.limits.low));
    place(this.renderRoot.querySelector('.handle.high'), shareOf(axis, this.limits.high));
    this.renderRoot.querySelectorAll<HTMLElement>('.tick').forEach((tick) => { tick.style.setProperty('left', `${tick.dataset['left'] ?? '0'}px`); });
    const mark = referenceMark(axis, this.map, this.summary, this.bandFactor);
    const box = this.renderRoot.querySelector<HTMLElement>('.mark');
    if (mark && box) {
      place(box, mark.from);
      box.style.setProperty('width', `${100 * (mark.to - mark.from)}%`);
    }
    const low = shareOf(axis, this.limits.low);
    const high = shareOf(axis, this.limits.high);
    paintScale(this.renderRoot.querySelector('.colours'), this.colours, low, high);
    paintHistogram(this.renderRoot.querySelector('.bins'), this.bins, low, high, getComputedStyle(this).getPropertyValue('--dim').trim() || '#8fa0af');
  }

  private renderHandle(end: 'low' | 'high') {
    const value = this.limits[end];
    return html`<button type="button" role="slider" class="handle ${end}" aria-label="${end === 'low' ? 'Darkest' : 'Brightest'} colour at" aria-orientation="horizontal"
      aria-valuemin="0" aria-valuemax="100" aria-valuenow=${Math.round(100 * shareOf(this.axis, value))} aria-valuetext=${mapValue(value, this.map.unit)}
      @pointerdown=${(event: PointerEvent) => { this.onDrag(event, end); }} @keydown=${(event: KeyboardEvent) => { this.onKey(event, end); }}
      @dblclick=${() => { this.send({ ...this.limits, [end]: this.map[end] }); }}></button>`;
  }

  private onDrag(event: PointerEvent, end: 'low' | 'high'): void {
    event.preventDefault();
    event.stopPropagation();
    const handle = event.currentTarget as HTMLElement;
    handle.focus();
    try { handle.setPointerCapture(event.pointerId); } catch { /* a synthetic pointer cannot be captured */ }
    const move = (next: PointerEvent): void => { this.moveTo(end, this.shareAt(next.clientX)); };
    const up = (): void => {
      handle.removeEventListener('pointermove', move);
      handle.removeEventListener('pointerup', up);
      handle.removeEventListener('pointercancel', up);
    };
    handle.addEventListener('pointermove', move);
    handle.addEventListener('pointerup', up);
    handle.addEventListener('pointercancel', up);
  }

  /** A press on the colours brings the nearer handle. */
  private readonly onLine = (event: PointerEvent): void => {
    const share = this.shareAt(event.clientX);
    const { axis } = this;
    this.moveTo(Math.abs(share - shareOf(axis, this.limits.low)) < Math.abs(share - shareOf(axis, this.limits.high)) ? 'low' : 'high', share);
  };

  private onKey(event: KeyboardEvent, end: 'low' | 'high'): void {
    const steps: Readonly<Record<string, number>> = { ArrowRight: 0.01, ArrowUp: 0.01, ArrowLeft: -0.01, ArrowDown: -0.01, PageUp: 0.1, PageDown: -0.1 };
    const step = steps[event.key];
    if (event.key === 'Home') this.moveTo(end, 0);
    else if (event.key === 'End') this.moveTo(end, 1);
    else if (step !== undefined) this.moveTo(end, shareOf(this.axis, this.limits[end]) + step);
    else return;
    event.preventDefault();
    event.stopPropagation();
  }

  private moveTo(end: 'low' | 'high', share: number): void {
    const { axis, limits } = this;
    const kept = end === 'low'
      ? Math.min(Math.max(0, share), shareOf(axis, limits.high) - leastSpan)
      : Math.max(Math.min(1, share), shareOf(axis, limits.low) + leastSpan);
    this.send({ ...limits, [end]: valueAt(axis, kept) });
  }

  private shareAt(clientX: number): number {
    const { left, width } = this.getBoundingClientRect();
    return width > 0 ? (clientX - left) / width : 0;
  }

  private send(limits: Limits): void {
    this.dispatchEvent(new CustomEvent('limits', { detail: limits }));
  }
}

customElements.define('eg-value-scale', ValueScale);
