/** A small picture of a sample's current (or height) with the causes over it. */
import { LitElement, css, html } from 'lit';
import type { Compute, MapInfo, Picture, PictureRequest, SampleSummary } from '../../workers/api.ts';

/** Longer side in CSS pixels. */
const side = 96;
/** More pixels than this per CSS pixel are not seen at this size. */
const finest = 2;

export class Thumbnail extends LitElement {
  static override properties = { summary: { attribute: false }, compute: { attribute: false } };

  declare summary: SampleSummary | undefined;
  declare compute: Compute | undefined;

  static override styles = css`
    :host { display: grid; place-items: center; width: 6rem; height: 6rem; }
    canvas { max-width: 100%; max-height: 100%; border-radius: 5px; background: var(--raised); }
  `;

  override render() {
    const name = this.summary?.name ?? '';
    return html`<canvas role="img" aria-label=${name === '' ? 'No picture yet' : `Map of ${name} with its causes`} width="96" height="96"></canvas>`;
  }

  override updated(changed: ReadonlyMap<PropertyKey, unknown>): void {
    if (changed.has('summary') || changed.has('compute')) void this.draw();
  }

  private async draw(): Promise<void> {
    const { summary, compute } = this;
    const request = summary === undefined ? undefined : thumbnailRequest(summary, Math.min(finest, Math.max(1, devicePixelRatio)));
    if (request === undefined || compute === undefined) return;
    try {
      const picture = await compute.picture(request);
      // A newer result draws its own.
      if (this.summary === summary) paint(this.renderRoot.querySelector('canvas'), picture);
    } catch {
      // The picture is an ornament of the row: without it the row still says everything.
    }
  }
}

/** What to ask for: the whole map, its longer side `side` CSS pixels long; undefined when the sample has no map. */
export function thumbnailRequest({ id, maps, columns, rows, widthUm, heightUm }: SampleSummary, pixelRatio: number): PictureRequest | undefined {
  const map: MapInfo | undefined = maps.find(({ name }) => name === 'current') ?? maps.find(({ name }) => name === 'height') ?? maps[0];
  if (map === undefined) return undefined;
  const longest = Math.max(widthUm, heightUm);
  const size = (um: number): number => Math.max(1, Math.round((side * pixelRatio * um) / longest));
  return {
    id, map: map.name, left: 0, top: 0, columns, rows, width: size(widthUm), height: size(heightUm),
    low: map.low, high: map.high, log: map.log, causes: 'all', pixelRatio,
  };
}

function paint(canvas: HTMLCanvasElement | null, { width, height, rgba }: Picture): void {
  if (canvas === null) return;
  canvas.width = width;
  canvas.height = height;
  canvas.getContext('2d')?.putImageData(new ImageData(rgba, width, height), 0, 0);
}

customElements.define('eg-thumbnail', Thumbnail);
