/** Tells an element its own size: at once, and whenever it changes. */

export class SizeWatch {
  private readonly element: HTMLElement;
  private readonly tell: () => void;
  private timer: ReturnType<typeof setTimeout> | undefined;
  // A reply inside the observer's own turn that changes a height would be an error of the observer; it waits for the next turn.
  private readonly observer = new ResizeObserver(() => {
    clearTimeout(this.timer);
    this.timer = setTimeout(() => { this.tell(); });
  });

  /** @param tell reads the size it needs from the element. */
  constructor(element: HTMLElement, tell: () => void) {
    this.element = element;
    this.tell = tell;
  }

  start(): void {
    this.tell();
    this.observer.observe(this.element);
  }

  stop(): void {
    clearTimeout(this.timer);
    this.observer.disconnect();
  }
}
