/** Map, switches, value scale, readout and cut together: what is seen of a sample's maps and how. */
import { LitElement, html, nothing } from 'lit';
import type { PropertyValues } from 'lit';
import type { Compute, ComputeFacts, CutRequest, FlawEntry, HistogramRequest, MapInfo, MapName, Picture, PictureRequest, PointValues, SampleSummary } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import type { Hand, PointUm } from '../hand/hand.ts';
import '../hand/hand-strip.ts';
import type { HandEdit } from '../hand/hand-strip.ts';
import type { HandDraft, HandPath } from '../hand/stage-drawing.ts';
import { area, sureness } from '../sample/format.ts';
import './cut-plot.ts';
import { Latest } from './latest.ts';
import './map-bar.ts';
import type { Tool } from './map-bar.ts';
import { mapPanelStyles } from './map-panel-styles.ts';
import './map-stage.ts';
import type { Cut, MapStage } from './map-stage.ts';
import { mapWords, rawTwin, switchMaps } from './map-words.ts';
import type { SwitchMap } from './map-words.ts';
import './readout.ts';
import { axisOf, canBeLog, firstLimits } from './value-axis.ts';
import type { Limits } from './value-axis.ts';
import './value-scale.ts';

const binCount = 256;
const cutPoints = 600;
/** A key held longer than this shows the raw map only while it is held. */
const holdMs = 350;

export class MapPanel extends LitElement {
  static override properties = {
    summary: { attribute: false }, facts: { attribute: false }, compute: { attribute: false }, isolated: { attribute: false }, flaw: { attribute: false }, bandFactor: { attribute: false }, hand: { attribute: false }, spots: { attribute: false }, repaired: { type: Boolean },
    map: { state: true }, raw: { state: true }, overlay: { state: true }, chosen: { state: true }, cut: { state: true }, cutting: { state: true },
    point: { state: true }, bins: { state: true }, profile: { state: true }, problem: { state: true }, draft: { state: true },
  };

  declare summary: SampleSummary;
  declare facts: ComputeFacts;
  declare compute: Compute;
  declare isolated: number | undefined;
  declare flaw: FlawEntry | undefined;
  declare bandFactor: number;
  /** The tool for correcting flaws that is in hand. */
  declare hand: Hand | undefined;
  /** Of ground picked by hand. */
  declare spots: readonly PointUm[];
  /** Mark what was repaired. */
  declare repaired: boolean;
  declare map: SwitchMap;
  declare raw: boolean;
  declare overlay: boolean;
  /** Limits that a person set, by map. */
  declare chosen: Readonly<Partial<Record<MapName, Limits>>>;
  declare cut: Cut | undefined;
  declare cutting: boolean;
  declare point: PointValues | undefined;
  declare bins: Uint32Array | undefined;
  declare profile: Float32Array | undefined;
  declare problem: string;
  declare draft: HandDraft;

  private rawSince = 0;
  private readonly histograms = new Latest<HistogramRequest, Uint32Array>((request) => this.compute.histogram(request), (request, bins) => { if (request.map === this.info.name) this.bins = bins; }, () => { this.bins = undefined; });
  private readonly cuts = new Latest<CutRequest, Float32Array>((request) => this.compute.cut(request), (_, values) => { this.profile = values; }, (_, error) => { this.problem = error instanceof Error ? error.message : String(error); });
  private histogramKey = '';
  private cutKey = '';

  static override styles = [controlStyles, mapPanelStyles];

  constructor() {
    super();
    this.map = 'current';
    this.raw = false;
    this.overlay = true;
    this.chosen = {};
    this.cutting = false;
    this.problem = '';
    this.bandFactor = 3;
    this.draft = { points: 0, enough: false };
    this.spots = [];
    this.repaired = false;
  }

  /** The map on show; the first there is when the wanted one is not. */
  get info(): MapInfo {
    const twin = this.raw ? rawTwin[this.map] : undefined;
    const find = (name: MapName | undefined): MapInfo | undefined => this.summary.maps.find((candidate) => candidate.name === name);
    return find(twin) ?? find(this.map) ?? this.summary.maps[0] ?? { name: 'height', unit: 'nm', low: 0, high: 1, least: 0, most: 1, log: false };
  }

  get limits(): Limits {
    return this.chosen[this.info.name] ?? firstLimits(this.info);
  }

  override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has('hand')) this.toggleAttribute('inhand', this.hand !== undefined);
    if (this.hand) this.cutting = false;
    if (!changed.has('summary')) return;
    if (changed.get('summary')?.id !== this.summary.id) {
      this.chosen = {};
      this.cut = undefined;
      this.point = undefined;
    }
    if (!this.summary.maps.some(({ name }) => name === this.map)) this.map = switchMaps.find((map) => this.summary.maps.some(({ name }) => name === map)) ?? 'height';
    this.problem = '';
    this.histogramKey = '';
    this.cutKey = '';
  }

  override render() {
    const { info, limits, summary, cut } = this;
    const causes = this.isolated !== undefined ? [this.isolated] : this.overlay ? 'all' as const : 'none' as const;
    const length = cut?.toUm ? Math.hypot(cut.toUm[0] - cut.fromUm[0], cut.toUm[1] - cut.fromUm[1]) : 0;
    return html`
      <eg-map-bar .maps=${summary.maps.map(({ name }) => name)} .map=${this.map} .raw=${this.raw} .causes=${this.overlay} .cutting=${this.cutting} @tool=${(event: CustomEvent<Tool>) => { this.use(event.detail); }}></eg-map-bar>
      <div class="stage">
        <eg-map-stage .summary=${summary} .compute=${this.compute} .map=${info.name} .limits=${limits} .causes=${causes} .flaw=${this.flaw} .cut=${cut} .cutting=${this.cutting} .hand=${this.hand} .handFill=${this.handFill} .spots=${this.spots} ?repaired=${this.repaired}
          @hand-draft=${(event: CustomEvent<HandDraft>) => { this.draft = event.detail; }}
          @hand-path=${(event: CustomEvent<HandPath>) => { this.tell('hand-path', event.detail); }}
          @point=${(event: CustomEvent<PointValues | undefined>) => { this.point = event.detail ?? undefined; }}
          @flaw-select=${(event: CustomEvent) => { this.tell('flaw-select', event.detail); }}
          @picture=${() => { this.problem = ''; }}
          @map-problem=${(event: CustomEvent<{ message: string }>) => { this.problem = event.detail.message; }}
          @cut-point=${(event: CustomEvent<{ xUm: number; yUm: number }>) => { this.addCutPoint(event.detail.xUm, event.detail.yUm); }}
          @cut-line=${(event: CustomEvent<{ fromUm: readonly [number, number]; toUm: readonly [number, number] }>) => { this.cut = { fromUm: event.detail.fromUm, toUm: event.detail.toUm }; }}></eg-map-stage>
        ${this.overText(info)}
      </div>
      ${this.hand ? html`<eg-hand-strip .hand=${this.hand} .draft=${this.draft} @hand-edit=${(event: CustomEvent<HandEdit>) => { this.editHand(event.detail); }}></eg-hand-strip>` : nothing}
      <div class="foot">
        <eg-value-scale .map=${info} .summary=${summary} .limits=${limits} .colours=${this.facts.scale} .bins=${this.bins} .bandFactor=${this.bandFactor} @limits=${(event: CustomEvent<Limits>) => { this.setLimits(event.detail); }}></eg-value-scale>
        <div class="log"><button type="button" aria-label="Logarithmic scale" aria-pressed=${limits.log ? 'true' : 'false'} ?disabled=${!canBeLog(info)} title="Linear or logarithmic colours" @click=${() => { this.setLimits(firstLimits({ ...info, log: !limits.log })); }}>${limits.log ? 'log' : 'lin'}</button></div>
      </div>
      ${cut?.toUm ? html`<eg-cut-plot .values=${this.profile} .map=${info} .lengthUm=${length} .log=${limits.log} @remove-cut=${() => { this.cut = undefined; }}></eg-cut-plot>` : nothing}
      <div class="side">
        <eg-readout class="card" .point=${this.point} .maps=${summary.maps} .noiseNm=${summary.height?.noiseNm}></eg-readout>
        ${this.flaw ? this.flawCard(this.flaw) : nothing}
      </div>`;
  }

  override updated(): void {
    const { info, limits, cut, summary } = this;
    this.style.setProperty('--map-aspect', String(summary.widthUm / summary.heightUm));
    const axis = axisOf(info, limits.log);
    const histogram: HistogramRequest = { id: summary.id, map: info.name, low: axis.low, high: axis.high, log: axis.log, bins: binCount };
    const key = JSON.stringify(histogram);
    if (key !== this.histogramKey) {
      this.histogramKey = key;
      this.histograms.ask(histogram);
    }
    if (!cut?.toUm) return;
    const request: CutRequest = { id: summary.id, map: info.name, fromUm: cut.fromUm, toUm: cut.toUm, points: cutPoints };
    const asked = JSON.stringify(request);
    if (asked === this.cutKey) return;
    this.cutKey = asked;
    this.cuts.ask(request);
  }

  /** Brings a flaw to the middle of the map. */
  centreOn(flaw: FlawEntry): void {
    this.stage?.centreOn(flaw);
  }

  /** The map comes into sight, and the keyboard to it. */
  focusMap(): void {
    if (matchMedia('(max-width: 900px)').matches) this.scrollIntoView({ block: 'start' });
    this.stage?.focus();
  }

  /** What a quick look at another recipe needs to draw. */
  get glanceRequest(): PictureRequest | undefined {
    return this.stage?.glanceRequest;
  }

  /** Shows a quick look's picture in place of the map's own, which comes back without one. */
  glance(request: PictureRequest, picture: Picture | undefined): void {
    this.stage?.glance(request, picture);
  }

  /** A key pressed anywhere in the sample's place; true when it meant something here. */
  press(event: KeyboardEvent): boolean {
    if (event.ctrlKey || event.metaKey || event.altKey) return false;
    const key = event.key.toLowerCase();
    if (key === 'r') {
      if (event.repeat) return true;
      this.rawSince = event.timeStamp;
      this.use({ tool: 'raw' });
    } else if (key === 'c') this.use({ tool: 'causes' });
    else if (key === 'x') this.use({ tool: 'cut' });
    else if (key === 'escape' && this.hand) {
      if (!this.stage?.edit('cancel')) this.editHand('leave');
    } else if (key === 'escape' && (this.cutting || this.cut)) {
      this.cutting = false;
      this.cut = undefined;
    } else return ['+', '=', '-', '0'].includes(key) && (this.stage?.press(key) ?? false);
    return true;
  }

  /** Letting go of R after a long hold brings the other map back. */
  release(event: KeyboardEvent): void {
    if (event.key.toLowerCase() === 'r' && this.rawSince > 0 && event.timeStamp - this.rawSince > holdMs) this.use({ tool: 'raw' });
    if (event.key.toLowerCase() === 'r') this.rawSince = 0;
  }

  private use(tool: Tool): void {
    switch (tool.tool) {
      case 'map': this.map = tool.map; break;
      case 'raw': if (rawTwin[this.map]) this.raw = !this.raw; break;
      case 'causes': this.overlay = !this.overlay; break;
      case 'cut':
        this.cutting = !this.cutting;
        if (this.hand) this.editHand('leave');
        if (this.cutting || !this.cut?.toUm) this.cut = undefined;
        break;
      case 'fit': this.stage?.fit(); break;
      case 'in': this.stage?.zoom(1.4); break;
      case 'out': this.stage?.zoom(1 / 1.4); break;
    }
  }

  private editHand(what: HandEdit): void {
    if (what === 'leave') this.tell('hand-leave', undefined);
    else this.stage?.edit(what);
  }

  /** Colour of what the tool draws. */
  private get handFill(): string | undefined {
    const { hand } = this;
    const as = hand && 'as' in hand ? hand.as : undefined;
    return this.facts.causes.find(({ cause }) => cause === as)?.fill;
  }

  private tell(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail }));
  }

  private addCutPoint(xUm: number, yUm: number): void {
    if (!this.cut || this.cut.toUm) this.cut = { fromUm: [xUm, yUm], toUm: undefined };
    else if (xUm !== this.cut.fromUm[0] || yUm !== this.cut.fromUm[1]) {
      this.cut = { fromUm: this.cut.fromUm, toUm: [xUm, yUm] };
      this.cutting = false;
    }
  }

  private setLimits(limits: Limits): void {
    this.chosen = { ...this.chosen, [this.info.name]: limits };
  }

  private overText(info: MapInfo) {
    const text = this.problem !== '' ? this.problem
      : this.cutting ? (this.cut ? 'now the other end of the cut' : 'click the first end of the cut; Escape ends it')
      : info.name === 'rawHeight' || info.name === 'rawCurrent' ? `${mapWords[info.name]}, as in the file` : '';
    return text === '' ? nothing : html`<p class="say" role=${this.problem === '' ? 'note' : 'alert'}>${text}</p>`;
  }

  private flawCard(flaw: FlawEntry) {
    return html`<div class="card"><h3>selected flaw ${flaw.flaw} · ${flaw.cause}${flaw.other === undefined ? `, ${sureness(flaw)}` : ''}</h3><p>${flaw.reason}</p><p>${area(flaw.areaUm2)} at x ${flaw.xUm.toFixed(2)}, y ${flaw.yUm.toFixed(2)}\u00a0µm</p></div>`;
  }

  private get stage(): MapStage | null {
    return this.renderRoot.querySelector<MapStage>('eg-map-stage');
  }
}

customElements.define('eg-map-panel', MapPanel);
