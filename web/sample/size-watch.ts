import type { LitElement, ReactiveController } from 'lit';

/** Tells an element its own size: when it is connected, and whenever the size changes. */
export class SizeWatch implements ReactiveController {
  private readonly element: LitElement;
  private readonly tell: () => void;
  private timer: ReturnType<typeof setTimeout> | undefined;
  // A reply inside the observer's own turn that changes a height would be an error of the observer; it waits for the next turn.
  private readonly observer = new ResizeObserver(() => {
    clearTimeout(this.timer);
    this.timer = setTimeout(() => { this.tell(); });
  });

  /** @param tell reads the size it needs from the element. */
  constructor(element: LitElement, tell: () => void) {
    this.element = element;
    this.tell = tell;
    element.addController(this);
  }

  hostConnected(): void {
    this.tell();
    this.observer.observe(this.element);
  }

  hostDisconnected(): void {
    clearTimeout(this.timer);
    this.observer.disconnect();
  }
}
