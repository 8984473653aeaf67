/** The pictures of the map's stage: asked for once each, the newest held; and those of a quick look at another recipe, drawn in their place. */
import type { Picture, PictureRequest } from '../../workers/api.ts';
import { imageOf } from './draw-map.ts';
import type { HeldPicture } from './draw-map.ts';
import { Latest } from './latest.ts';

/** Pixels of a quick look's picture at most: what a tenth of a second allows. */
const glancePixels = 400_000;

export class StagePictures {
  held: HeldPicture | undefined;
  private wantedKey = '';
  private wanted: PictureRequest | undefined;
  private looks = false;
  private readonly asked: Latest<PictureRequest, Picture>;

  constructor(ask: (request: PictureRequest) => Promise<Picture>, onPicture: (request: PictureRequest, picture: Picture) => void, onFailure: (error: unknown) => void) {
    // While a quick look is on show, the map's own picture would be of what was before it.
    this.asked = new Latest(ask, (request, picture) => { if (!this.looks) onPicture(request, picture); }, (_, error) => { onFailure(error); });
  }

  /** Asks for a picture if it is another than the last. */
  want(request: PictureRequest): void {
    const key = JSON.stringify(request);
    if (key === this.wantedKey) return;
    this.wantedKey = key;
    this.wanted = request;
    this.asked.ask(request);
  }

  /** A quick look begins: the map's own pictures wait until it ends. */
  look(begins: boolean): void {
    if (!begins) this.again();
    this.looks = begins;
  }

  /** What is wanted next is asked for even if it is the same as before. Ends a quick look. */
  again(): void {
    this.looks = false;
    this.wantedKey = '';
  }

  hold({ left, top, columns, rows }: PictureRequest, picture: Picture): void {
    this.held = { image: imageOf(picture), part: { left, top, columns, rows } };
  }

  forget(): void {
    this.asked.forget();
  }

  /** What to ask of a quick look: the same part of the map, coarser where it must be, and without a flaw's outline, because flaws are numbered anew. */
  get glance(): PictureRequest | undefined {
    if (!this.wanted) return undefined;
    const { flaw: _flaw, ...request } = this.wanted;
    const coarser = Math.min(1, Math.sqrt(glancePixels / (request.width * request.height)));
    const side = (pixels: number): number => Math.max(1, Math.round(pixels * coarser));
    return { ...request, width: side(request.width), height: side(request.height), pixelRatio: request.pixelRatio * coarser };
  }
}
