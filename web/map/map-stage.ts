/** The map itself: a canvas of the screen's pixels that asks the computation for exactly the part in sight. */
import { LitElement, html } from 'lit';
import type { PropertyValues } from 'lit';
import type { Compute, FlawEntry, MapName, Picture, PictureRequest, SampleSummary } from '../../workers/api.ts';
import { nearPixels, strokePixels } from '../hand/drawing.ts';
import type { StrokePhase } from '../hand/drawing.ts';
import type { Hand, PointUm } from '../hand/hand.ts';
import { StageDrawing } from '../hand/stage-drawing.ts';
import { SizeWatch } from '../sample/size-watch.ts';
import { coloursOf, drawMap, sizeCanvas } from './draw-map.ts';
import { Gestures } from './gestures.ts';
import type { GestureTarget } from './gestures.ts';
import { mapStageStyles } from './map-stage-styles.ts';
import { stageLabel } from './map-words.ts';
import { StagePictures } from './stage-pictures.ts';
import { StagePoints } from './stage-points.ts';
import type { Limits } from './value-axis.ts';
import { centreView, fitView, keyMove, panView, toSample, toSampleAnywhere, visiblePart, zoomView } from './view.ts';
import type { Size, View } from './view.ts';

export interface Cut {
  readonly fromUm: readonly [number, number];
  readonly toUm: readonly [number, number] | undefined;
}

/** A selected flaw is brought to at least this many stage pixels. */
const flawPixels = 36;

export class MapStage extends LitElement implements GestureTarget {
  static override properties = {
    summary: { attribute: false }, compute: { attribute: false }, map: { attribute: false }, limits: { attribute: false }, causes: { attribute: false },
    flaw: { attribute: false }, cut: { attribute: false }, cutting: { type: Boolean, reflect: true }, hand: { attribute: false }, handFill: { attribute: false }, spots: { attribute: false },
    repaired: { type: Boolean },
  };

  declare summary: SampleSummary;
  declare compute: Compute;
  declare map: MapName;
  declare limits: Limits;
  declare causes: PictureRequest['causes'];
  declare flaw: FlawEntry | undefined;
  declare cut: Cut | undefined;
  /** Clicks set the ends of a cut. */
  declare cutting: boolean;
  /** The tool for correcting flaws, and the colour of what it draws. */
  declare hand: Hand | undefined;
  declare handFill: string | undefined;
  /** Of ground picked by hand. */
  declare spots: readonly PointUm[] | undefined;
  /** Mark what was repaired. */
  declare repaired: boolean | undefined;

  private readonly pencil = new StageDrawing((type, detail) => { this.send(type, detail); }, () => { this.refresh(); });
  private view: View | undefined;
  /** Whether the whole map is to stay in sight when the stage changes its size. */
  private whole = true;
  private stage: Size = { width: 0, height: 0 };
  private cross: { readonly xUm: number; readonly yUm: number } | undefined;
  private frame = 0;
  /** Where the second end of a cut would be. */
  private aimed: readonly [number, number] | undefined;
  protected readonly sizes = new SizeWatch(this, () => { this.onSize(); });
  private readonly pictures = new StagePictures((request) => this.compute.picture(request), (request, picture) => { this.hold(request, picture); }, (error) => { this.fail(error); });
  private readonly points = new StagePoints((id, xUm, yUm) => this.compute.point(id, xUm, yUm), (values, clicked) => {
    this.send('point', values);
    if (clicked) this.send('flaw-select', { flaw: values.flaw?.flaw });
  }, (error) => { this.fail(error); });

  static override styles = mapStageStyles;

  override render() {
    return html`<canvas tabindex="0" role="application" aria-roledescription="map" class=${this.pencil.now ? 'drawing' : ''}
      aria-label=${stageLabel(this.map, this.pencil.now?.kind)} @keydown=${this.onKey}></canvas>`;
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    cancelAnimationFrame(this.frame);
    this.pictures.forget();
    this.points.forget();
  }

  override firstUpdated(): void {
    new Gestures(this.canvas, this);
    this.onSize();
  }

  override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has('cut')) this.aimed = undefined;
    if (changed.has('hand')) this.pencil.take(this.hand);
    if (changed.has('summary')) this.pencil.now?.settled();
    const before = changed.get('summary');
    if (before === undefined || !changed.has('summary')) return;
    this.pictures.again();
    if (before.id === this.summary.id && before.columns === this.summary.columns && before.rows === this.summary.rows) return;
    this.pictures.held = undefined;
    this.cross = undefined;
    this.whole = true;
    this.onSize();
  }

  override updated(): void {
    this.refresh();
  }

  /** Brings a flaw to the middle, large enough to be seen. */
  centreOn({ xUm, yUm, diameterUm }: FlawEntry): void {
    if (!this.view) return;
    const scale = Math.min(flawPixels / Math.max(diameterUm, 1e-9), fitView(this.summary, this.stage).scale * 8);
    this.show(centreView(this.view, xUm, this.summary.heightUm - yUm, scale, this.summary, this.stage));
  }

  /** What to ask of a quick look at another recipe. */
  get glanceRequest(): PictureRequest | undefined {
    return this.pictures.glance;
  }

  /** Shows a picture of a quick look; none: the map's own comes back. */
  glance(request: PictureRequest, picture: Picture | undefined): void {
    this.pictures.look(picture !== undefined);
    if (picture) this.hold(request, picture);
    this.refresh();
  }

  /** The keyboard goes to the map, to draw on it. */
  override focus(): void {
    this.canvas.focus({ preventScroll: true });
  }

  /** Of the path that is being drawn; false when there is none. */
  edit(what: 'back' | 'finish' | 'cancel'): boolean {
    return this.pencil.edit(what);
  }

  draws(): boolean {
    return this.pencil.isHeld;
  }

  stroke(phase: StrokePhase, x: number, y: number, moved: boolean): void {
    if (this.view) this.pencil.now?.pointer(phase, this.anywhere(x, y), moved, strokePixels / this.view.scale);
  }

  twice(): void {
    if (!this.pencil.now) this.fit();
  }

  fit(): void {
    this.whole = true;
    this.view = fitView(this.summary, this.stage);
    this.refresh();
  }

  pan(dx: number, dy: number): void {
    if (this.view) this.show(panView(this.view, dx, dy, this.summary, this.stage));
  }

  zoom(factor: number, x = this.stage.width / 2, y = this.stage.height / 2): void {
    if (this.view) this.show(zoomView(this.view, factor, x, y, this.summary, this.stage));
  }

  hover(x: number, y: number): void {
    this.points.isOver = true;
    const place = this.place(x, y);
    if (this.cross) {
      this.cross = undefined;
      this.refresh();
    }
    if (place) this.points.ask(this.summary.id, place, 'hover');
    this.pencil.now?.aim(this.anywhere(x, y));
    if (!this.cutting || !this.cut || this.cut.toUm) return;
    this.aimed = place && [place.xUm, place.yUm];
    this.refresh();
  }

  /** A finger always leaves: what it tapped stays. */
  leave(finger: boolean): void {
    this.points.isOver = false;
    this.pencil.now?.aim(undefined);
    if (!finger) this.send('point', undefined);
  }

  clicked(x: number, y: number): void {
    const place = this.place(x, y);
    if (this.pencil.now) this.pencil.now.add(this.anywhere(x, y), nearPixels / (this.view?.scale ?? 1));
    if (!place || this.pencil.now) return;
    if (this.cutting) this.send('cut-point', place);
    else this.points.ask(this.summary.id, place, 'click');
  }

  line(fromX: number, fromY: number, toX: number, toY: number, done: boolean): void {
    const from = this.place(fromX, fromY);
    const to = this.place(toX, toY);
    if (from && to) this.send('cut-line', { fromUm: [from.xUm, from.yUm], toUm: [to.xUm, to.yUm], done });
  }

  /** Zoom and movement by keys; true when the key meant something. */
  press(key: string): boolean {
    const move = keyMove(key, this.pencil.now ? 12 : 60);
    if (move) this.pan(...move);
    else if (key === '+' || key === '=') this.zoom(1.4);
    else if (key === '-') this.zoom(1 / 1.4);
    else if (key === '0') this.fit();
    else return false;
    this.readMiddle();
    if (this.cross) this.pencil.now?.aim([this.cross.xUm, this.cross.yUm]);
    return true;
  }

  private readonly onKey = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (this.pencil.now && event.key === 'Enter') this.setMiddle();
    else if (!(event.key === 'Backspace' && this.edit('back')) && !this.press(event.key)) return;
    event.preventDefault();
    event.stopPropagation();
  };

  /** A point in the middle, where the cross is. */
  private setMiddle(): void {
    this.readMiddle();
    if (this.cross) this.pencil.now?.add([this.cross.xUm, this.cross.yUm], this.pencil.now.kind === 'places' ? nearPixels / (this.view?.scale ?? 1) : 0);
  }

  private anywhere(x: number, y: number): PointUm {
    return this.view ? toSampleAnywhere(this.view, x, y, this.summary) : [0, 0];
  }

  /** Without a pointer the values in the middle are read out. */
  private readMiddle(): void {
    const place = this.place(this.stage.width / 2, this.stage.height / 2);
    if (!place) return;
    this.cross = place;
    this.points.ask(this.summary.id, place, 'cross');
    this.refresh();
  }

  private place(x: number, y: number) {
    return this.view && toSample(this.view, x, y, this.summary);
  }

  private show(view: View): void {
    this.whole = false;
    this.view = view;
    this.refresh();
  }

  private onSize(): void {
    this.stage = { width: this.clientWidth, height: this.clientHeight };
    if (this.stage.width === 0 || this.stage.height === 0 || !this.summary) return;
    if (this.whole || !this.view) this.view = fitView(this.summary, this.stage);
    else this.view = panView(this.view, 0, 0, this.summary, this.stage);
    this.refresh();
  }

  /** Draws what is at hand and asks for what is wanted, if it differs. */
  private refresh(): void {
    cancelAnimationFrame(this.frame);
    this.frame = requestAnimationFrame(() => { this.draw(); });
    const part = this.view && visiblePart(this.view, this.summary, this.stage, devicePixelRatio);
    if (!part || !this.limits) return;
    const { low, high, log } = this.limits;
    this.pictures.want({
      id: this.summary.id, map: this.map, ...part.part, width: part.picture.width, height: part.picture.height, low, high, log,
      causes: this.causes, pixelRatio: devicePixelRatio, ...(this.flaw ? { flaw: this.flaw.flaw } : {}), ...(this.repaired ? { repaired: true } : {}),
    });
  }

  private hold(request: PictureRequest, picture: Picture): void {
    if (request.id !== this.summary.id) return;
    this.pictures.hold(request, picture);
    this.send('picture', { map: request.map });
    this.refresh();
  }

  private draw(): void {
    const canvas = this.canvas;
    const pen = canvas.getContext('2d');
    if (!pen || !this.view || this.stage.width === 0) return;
    sizeCanvas(canvas, this.stage, devicePixelRatio);
    drawMap(pen, {
      extent: this.summary, stage: this.stage, pixelRatio: devicePixelRatio, view: this.view, picture: this.pictures.held, flaw: this.flaw, cut: this.cut && { fromUm: this.cut.fromUm, toUm: this.cut.toUm ?? this.aimed }, cross: this.cross,
      ...(this.spots && this.pencil.now?.kind !== 'places' ? { spots: this.spots } : {}), hand: this.pencil.scene(this.handFill),
      colours: coloursOf(this),
    });
  }

  private get canvas(): HTMLCanvasElement {
    return this.renderRoot.querySelector('canvas') ?? document.createElement('canvas');
  }

  private fail(error: unknown): void {
    this.send('map-problem', { message: error instanceof Error ? error.message : String(error) });
  }

  private send(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail }));
  }
}

customElements.define('eg-map-stage', MapStage);
