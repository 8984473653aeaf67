/** What fingers, mouse and wheel mean on the map. Stage points are CSS pixels from the stage's upper left corner. */
import type { StrokePhase } from '../hand/drawing.ts';

export interface GestureTarget {
  pan(dx: number, dy: number): void;
  zoom(factor: number, x: number, y: number): void;
  /** A double click. */
  twice(): void;
  clicked(x: number, y: number): void;
  hover(x: number, y: number): void;
  /** The pointer is no longer over the map; `finger`: because it was lifted. */
  leave(finger: boolean): void;
  /** A straight line dragged with Shift held; `done` with the last point. */
  line(fromX: number, fromY: number, toX: number, toY: number, done: boolean): void;
  /** Whether one pointer draws now instead of moving the map. */
  draws(): boolean;
  /** What that pointer does; `moved` once it is no mere click. A second finger cancels: then both move the map. */
  stroke(phase: StrokePhase, x: number, y: number, moved: boolean): void;
}

interface Held {
  x: number;
  y: number;
}

/** A press that moves no further than this is a click. */
const clickSlack = 4;

export class Gestures {
  private readonly held = new Map<number, Held>();
  private start: (Held & { readonly line: boolean }) | undefined;
  private moved = false;
  private drawing = false;
  private readonly element: HTMLElement;
  private readonly target: GestureTarget;

  constructor(element: HTMLElement, target: GestureTarget) {
    this.element = element;
    this.target = target;
    element.addEventListener('pointerdown', this.onDown);
    element.addEventListener('pointermove', this.onMove);
    element.addEventListener('pointerup', this.onUp);
    element.addEventListener('pointercancel', this.onCancel);
    element.addEventListener('pointerleave', (event) => { target.leave(event.pointerType === 'touch'); });
    element.addEventListener('dblclick', () => { target.twice(); });
    element.addEventListener('wheel', this.onWheel, { passive: false });
  }

  private readonly onDown = (event: PointerEvent): void => {
    // The wheel's own button moves the map whatever tool is in hand.
    if (event.button !== 0 && event.button !== 1) return;
    if (event.button === 1) event.preventDefault();
    const at = this.place(event);
    // A pointer that the browser does not know (a synthetic one) cannot be captured; the gesture works without.
    try { this.element.setPointerCapture(event.pointerId); } catch { /* not captured */ }
    this.held.set(event.pointerId, at);
    this.moved = this.held.size > 1;
    this.start = { ...at, line: event.shiftKey && this.held.size === 1 };
    if (this.drawing) this.target.stroke('cancel', at.x, at.y, false);
    this.drawing = this.held.size === 1 && event.button === 0 && !event.shiftKey && this.target.draws();
    if (this.drawing) this.target.stroke('start', at.x, at.y, false);
  };

  private readonly onMove = (event: PointerEvent): void => {
    const at = this.place(event);
    const before = this.held.get(event.pointerId);
    if (!before || !this.start) {
      this.target.hover(at.x, at.y);
      return;
    }
    if (!this.moved && Math.hypot(at.x - this.start.x, at.y - this.start.y) < clickSlack) return;
    if (!this.moved) {
      this.moved = true;
      before.x = this.start.x;
      before.y = this.start.y;
    }
    if (this.drawing) {
      // All places since the last frame, so that a quick stroke stays round.
      const every = event.getCoalescedEvents?.() ?? [];
      for (const one of every.length > 0 ? every : [event]) {
        const { x, y } = this.place(one);
        this.target.stroke('move', x, y, true);
      }
      return;
    }
    const other = [...this.held].find(([id]) => id !== event.pointerId)?.[1];
    if (other) {
      const was = Math.hypot(before.x - other.x, before.y - other.y);
      const is = Math.hypot(at.x - other.x, at.y - other.y);
      if (was > 0 && is > 0) this.target.zoom(is / was, (at.x + other.x) / 2, (at.y + other.y) / 2);
      this.target.pan((at.x - before.x) / 2, (at.y - before.y) / 2);
    } else if (this.start.line) this.target.line(this.start.x, this.start.y, at.x, at.y, false);
    else this.target.pan(at.x - before.x, at.y - before.y);
    this.held.set(event.pointerId, at);
  };

  private readonly onUp = (event: PointerEvent): void => {
    if (!this.held.delete(event.pointerId) || this.held.size > 0) return;
    const at = this.place(event);
    const { start, moved } = this;
    this.start = undefined;
    if (!start) return;
    if (this.drawing) {
      this.drawing = false;
      this.target.stroke('end', at.x, at.y, moved);
    } else if (event.button === 1) { /* It only moves. */ } else if (!moved) this.target.clicked(at.x, at.y);
    else if (start.line) this.target.line(start.x, start.y, at.x, at.y, true);
  };

  private readonly onCancel = (event: PointerEvent): void => {
    this.held.delete(event.pointerId);
    this.start = undefined;
    if (this.drawing) this.target.stroke('cancel', 0, 0, false);
    this.drawing = false;
  };

  private readonly onWheel = (event: WheelEvent): void => {
    event.preventDefault();
    const { x, y } = this.place(event);
    // Wheels that count in lines or pages give small numbers.
    const pixels = event.deltaY * (event.deltaMode === 1 ? 16 : event.deltaMode === 2 ? 400 : 1);
    this.target.zoom(Math.exp(-Math.max(-400, Math.min(400, pixels)) / 400), x, y);
  };

  private place(event: MouseEvent): Held {
    const { left, top } = this.element.getBoundingClientRect();
    return { x: event.clientX - left, y: event.clientY - top };
  }
}
