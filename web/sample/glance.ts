/** A quick look at where a held handle would lead: one question in flight, late answers dropped, nothing kept. */
import type { Compute, Preview, PreviewRequest, RecipeData } from '../../workers/api.ts';
import { Latest } from '../map/latest.ts';
import type { MapPanel } from '../map/map-panel.ts';

export class Glance {
  /** The newest answer, while the handle is held and until the new result is there. */
  now: Preview | undefined;
  private readonly compute: () => Compute;
  private readonly panel: () => MapPanel | null;
  private readonly changed: () => void;
  private readonly asked: Latest<PreviewRequest, Preview>;
  private shows = false;

  /** @param panel the map that shows it; @param changed is told when `now` is another. */
  constructor(compute: () => Compute, panel: () => MapPanel | null, changed: () => void) {
    this.compute = compute;
    this.panel = panel;
    this.changed = changed;
    // A look that fails is left out: letting go computes the real result, which says why.
    this.asked = new Latest((request) => compute().preview(request), (request, preview) => { this.show(request, preview); }, () => undefined);
  }

  /** A handle has been taken: looks are held against one at the recipe in force, which is had ready meanwhile. */
  take(id: string, recipe: RecipeData): void {
    this.compute().preview({ id, recipe }).catch(() => undefined);
  }

  look(id: string, recipe: RecipeData): void {
    const picture = this.panel()?.glanceRequest;
    this.shows = true;
    this.asked.ask({ id, recipe, ...(picture ? { picture } : {}) });
  }

  /** The handle has been let go: no answer that is still to come counts. */
  stop(): void {
    this.asked.forget();
  }

  /** What the appraisal itself shows comes back. */
  end(): void {
    if (!this.shows) return;
    this.shows = false;
    this.asked.forget();
    const picture = this.panel()?.glanceRequest;
    if (picture) this.panel()?.glance(picture, undefined);
    if (this.now === undefined) return;
    this.now = undefined;
    this.changed();
  }

  private show({ picture }: PreviewRequest, preview: Preview): void {
    this.now = preview;
    if (picture && preview.picture) this.panel()?.glance(picture, preview.picture);
    this.changed();
  }
}
