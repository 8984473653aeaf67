/** A path while it is drawn on the map, by pointer or by keys. Points are µm in the sample's frame. */
import { leastSpots } from './hand.ts';
import type { DrawingKind, PointUm } from './hand.ts';

export type StrokePhase = 'start' | 'move' | 'end' | 'cancel';

/** Corners closer than this on the stage are one; strokes keep a point every so many stage pixels. */
export const nearPixels = 8;
export const strokePixels = 1.5;
/** A recipe takes no more points in one path. */
const mostPoints = 10_000;
const mostPlaces = 1000;

export class Drawing {
  readonly kind: DrawingKind;
  private path: PointUm[] = [];
  /** Where the next point would be. */
  aimed: PointUm | undefined;
  /** Finished paths whose result is not on show yet. */
  settling: readonly (readonly PointUm[])[] = [];
  private held = false;
  private readonly onPath: (path: readonly PointUm[]) => void;
  private readonly onChange: () => void;

  /** @param onPath takes a finished path; @param onChange is told whenever something looks different; @param from what is there already. */
  constructor(kind: DrawingKind, onPath: (path: readonly PointUm[]) => void, onChange: () => void, from: readonly PointUm[] = []) {
    this.kind = kind;
    this.path = [...from];
    this.onPath = onPath;
    this.onChange = onChange;
  }

  get points(): readonly PointUm[] {
    return this.path;
  }

  /** Whether the path could end now. */
  get isEnough(): boolean {
    return this.path.length >= { stroke: 1, line: 2, corners: 3, places: leastSpots }[this.kind];
  }

  /** A held pointer, for strokes and lines. `moved`: it is no mere click; `leastUm`: nearer points say nothing new. */
  pointer(phase: StrokePhase, at: PointUm, moved: boolean, leastUm: number): void {
    if (phase === 'start') {
      this.held = true;
      if (this.kind === 'stroke') this.path = [at];
      else if (this.path.length === 0) this.path = [at];
      this.aimed = at;
    } else if (!this.held) return;
    else if (phase === 'cancel') this.clear();
    else if (phase === 'move') this.drag(at, leastUm);
    else this.letGo(at, moved, leastUm);
    this.onChange();
  }

  /** The pointer is over a place without being held. */
  aim(at: PointUm | undefined): void {
    this.aimed = at;
    this.onChange();
  }

  /**
   * Sets a point by a click or a key. The first corner again closes an outline, the last point again ends a path that has enough.
   *
   * @param nearUm two places this close are the same.
   */
  add(at: PointUm, nearUm: number): void {
    const [first, last] = [this.path[0], this.path.at(-1)];
    this.aimed = at;
    if (this.kind === 'places') this.toggle(at, nearUm);
    else if (last && near(last, at, nearUm)) this.finish();
    else if (this.kind === 'corners' && this.isEnough && first && near(first, at, nearUm)) this.finish();
    else if (this.path.length < mostPoints) {
      this.path = [...this.path, at];
      if (this.kind === 'line' && this.isEnough) this.finish();
    }
    this.onChange();
  }

  /** The nearest place within reach goes; where there is none, one is set. */
  private toggle(at: PointUm, nearUm: number): void {
    const distance = ([x, y]: PointUm): number => Math.hypot(x - at[0], y - at[1]);
    const nearest = this.path.reduce<PointUm | undefined>((best, point) => (best && distance(best) <= distance(point) ? best : point), undefined);
    if (nearest && distance(nearest) <= nearUm) this.path = this.path.filter((point) => point !== nearest);
    else if (this.path.length < mostPlaces) this.path = [...this.path, at];
  }

  /** Takes the last point back; false when there is none. */
  back(): boolean {
    if (this.path.length === 0) return false;
    this.path = this.path.slice(0, -1);
    this.onChange();
    return true;
  }

  /** Ends the path where it has enough points. */
  finish(): void {
    if (!this.isEnough) return;
    const path = this.path;
    this.clear();
    this.settling = [...this.settling, path];
    this.onPath(path);
    this.onChange();
  }

  /** Drops what has been drawn of the path; false when there is nothing. */
  cancel(): boolean {
    if (this.path.length === 0) return false;
    this.clear();
    this.onChange();
    return true;
  }

  /** The result of finished paths is on show. */
  settled(): void {
    this.settling = [];
  }

  private clear(): void {
    this.path = [];
    this.held = false;
  }

  private drag(at: PointUm, leastUm: number): void {
    this.aimed = at;
    if (this.kind === 'stroke' && this.path.length < mostPoints && !near(this.path.at(-1)!, at, leastUm)) this.path.push(at);
  }

  private letGo(at: PointUm, moved: boolean, leastUm: number): void {
    this.held = false;
    if (this.kind === 'stroke') {
      if (moved) this.drag(at, leastUm);
      this.finish();
    } else if (moved || this.path.length > 1 || !near(this.path[0]!, at, leastUm)) {
      this.path = [this.path[0]!, at];
      this.finish();
    }
  }
}

function near(a: PointUm, b: PointUm, withinUm: number): boolean {
  return Math.hypot(a[0] - b[0], a[1] - b[1]) <= withinUm;
}
