/** What the map's stage has in hand: makes a drawing for the tool and says what comes of it. */
import type { HandScene } from './draw-hand.ts';
import { Drawing } from './drawing.ts';
import type { Hand, PointUm } from './hand.ts';
import { drawingKind } from './hand.ts';

/** Detail of the `hand-draft` event. */
export interface HandDraft {
  readonly points: number;
  /** Whether the path could end now. */
  readonly enough: boolean;
}

/** Detail of the `hand-path` event. */
export interface HandPath {
  readonly pointsUm: readonly PointUm[];
}

export class StageDrawing {
  /** The path that is being drawn; undefined while no tool that draws is in hand. */
  now: Drawing | undefined;
  private hand: Hand | undefined;
  private readonly tell: (type: 'hand-draft' | 'hand-path', detail: HandDraft | HandPath) => void;
  private readonly changed: () => void;

  constructor(tell: StageDrawing['tell'], changed: () => void) {
    this.tell = tell;
    this.changed = changed;
  }

  take(hand: Hand | undefined): void {
    const former = this.now;
    this.hand = hand;
    const kind = hand && drawingKind(hand);
    this.now = kind && new Drawing(kind, (pointsUm) => { this.tell('hand-path', { pointsUm }); }, () => {
      this.sayDraft();
      this.changed();
    }, hand.tool === 'spots' ? hand.from : []);
    // Another width or cause: what is still computed stays in sight.
    if (this.now && former?.kind === kind) this.now.settling = former?.settling ?? [];
    this.sayDraft();
  }

  /** Takes the last point back, ends the path, or drops it; false when there is none. */
  edit(what: 'back' | 'finish' | 'cancel'): boolean {
    if (!this.now || this.now.points.length === 0) return false;
    this.now[what]();
    return true;
  }

  /** Whether a held pointer draws. */
  get isHeld(): boolean {
    return this.now !== undefined && this.now.kind !== 'corners' && this.now.kind !== 'places';
  }

  /** @param fill colour of what is drawn. */
  scene(fill: string | undefined): HandScene | undefined {
    return this.now && { drawing: this.now, widthUm: this.hand?.tool === 'brush' ? this.hand.widthUm : undefined, fill };
  }

  private sayDraft(): void {
    this.tell('hand-draft', { points: this.now?.points.length ?? 0, enough: this.now?.isEnough ?? false });
  }
}
