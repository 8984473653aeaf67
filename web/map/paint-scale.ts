/** Draws the colours and the histogram of the value scale. */

/** Colours between the shares `low` and `high` of the axis, the end colours beyond, dimmed there. */
export function paintScale(canvas: HTMLCanvasElement | null, colours: readonly string[], low: number, high: number): void {
  const pen = sized(canvas);
  if (!pen || colours.length === 0) return;
  const { width, height } = pen.canvas;
  for (let x = 0; x < width; x++) {
    const share = (x + 0.5) / width;
    const position = Math.min(1, Math.max(0, (share - low) / Math.max(1e-9, high - low)));
    pen.fillStyle = colours[Math.round(position * (colours.length - 1))] ?? '#000000';
    pen.globalAlpha = share < low || share > high ? 0.55 : 1;
    pen.fillRect(x, 0, 1, height);
  }
}

/** Counts as bars from the bottom; the root of the count, so that small populations show beside large ones. */
export function paintHistogram(canvas: HTMLCanvasElement | null, bins: Uint32Array | undefined, low: number, high: number, colour: string): void {
  const pen = sized(canvas);
  if (!pen || !bins || bins.length === 0) return;
  const { width, height } = pen.canvas;
  const most = Math.sqrt(bins.reduce((top, count) => Math.max(top, count), 0));
  if (most === 0) return;
  pen.fillStyle = colour;
  bins.forEach((count, index) => {
    const share = (index + 0.5) / bins.length;
    pen.globalAlpha = share < low || share > high ? 0.3 : 0.75;
    const tall = (Math.sqrt(count) / most) * height;
    const from = Math.round((index / bins.length) * width);
    pen.fillRect(from, height - tall, Math.max(1, Math.round(((index + 1) / bins.length) * width) - from), tall);
  });
}

/** A cleared pen on a canvas of the screen's pixels; undefined when it has no size. */
function sized(canvas: HTMLCanvasElement | null): CanvasRenderingContext2D | undefined {
  if (!canvas) return undefined;
  const width = Math.round(canvas.clientWidth * devicePixelRatio);
  const height = Math.round(canvas.clientHeight * devicePixelRatio);
  if (width === 0 || height === 0) return undefined;
  canvas.width = width;
  canvas.height = height;
  return canvas.getContext('2d') ?? undefined;
}
