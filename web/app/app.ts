/** The page: header, notices, the place one is at, and the way in for files. Turns events of its elements into actions of the session. */
import { LitElement, css, html, nothing } from 'lit';
import type { PropertyValues } from 'lit';
import type { ComputeFacts } from '../../workers/api.ts';
import type { AnswerDetail } from '../import/import-form.ts';
import '../import/import-form.ts';
import type { PagesDetail } from '../import/pages-form.ts';
import { questionsOf } from '../import/questions.ts';
import type { CorrectionEvent, CorrectionOutEvent, HowEvent, SpotsEvent } from '../sample/events.ts';
import '../sample/sample-place.ts';
import { answer } from '../session/actions/answer.ts';
import { answerPages } from '../session/actions/answer-pages.ts';
import { cancel } from '../session/actions/cancel.ts';
import { changeRecipe } from '../session/actions/change-recipe.ts';
import { clearDemo } from '../session/actions/clear-demo.ts';
import { close } from '../session/actions/close.ts';
import { correct, takeOutCorrection } from '../session/actions/correct.ts';
import { redo, undo } from '../session/actions/move-in-history.ts';
import { openDemo } from '../session/actions/open-demo.ts';
import { openFiles } from '../session/actions/open-files.ts';
import { pickSpots } from '../session/actions/pick-spots.ts';
import { retry } from '../session/actions/retry.ts';
import { dismiss, go, setRequired, setTheme } from '../session/actions/settings.ts';
import type { RecipeValue } from '../session/recipe.ts';
import type { Session } from '../session/session.ts';
import type { Place, SampleState, SessionState } from '../session/state.ts';
import { Tray } from '../tray/tray.ts';
import './drop-zone.ts';
import type { Dropped } from './dropped-files.ts';
import { Header } from './header.ts';
import './notices.ts';
import { rememberTheme, watchTheme } from './theme.ts';

export class App extends LitElement {
  static override properties = { session: { attribute: false }, facts: { state: true }, hasMethod: { state: true } };

  declare session: Session;
  declare facts: ComputeFacts | undefined;
  /** The method page has been loaded: it is not part of the page's first script. */
  declare hasMethod: boolean;
  /** The place that is on the screen. */
  private shownPlace: Place | undefined;
  /** How far the sample was scrolled when the method page was opened. */
  private leftAt = 0;
  private theme: ReturnType<typeof watchTheme> | undefined;

  static override styles = css`
    :host { display: block; min-height: 100vh; }
    main:focus { outline: none; }
    .asking { max-width: 60rem; margin: 1rem auto; padding: 1rem clamp(0.9rem, 2vw, 1.5rem); background: var(--panel); border: 1px solid var(--line); border-radius: 10px; }
  `;

  override connectedCallback(): void {
    super.connectedCallback();
    this.session.addEventListener('change', this.changed);
    addEventListener('keydown', this.keyed);
    this.theme = watchTheme(() => this.session.state.theme);
    this.session.compute.facts().then(
      (facts) => { this.facts = facts; },
      (error: unknown) => { this.session.say('Evenglow', `The computation did not start: ${error instanceof Error ? error.message : String(error)}. Reload the page.`); },
    );
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.session.removeEventListener('change', this.changed);
    removeEventListener('keydown', this.keyed);
    this.theme?.stop();
  }

  override render() {
    const { state } = this.session;
    const { place } = state;
    const sample = place.name === 'tray' ? undefined : this.session.sample(place.id);
    return html`
      <eg-drop-zone @files=${this.filesGiven}></eg-drop-zone>
      <eg-header .sampleName=${sample?.name} .count=${state.samples.length} .theme=${state.theme}
        ?explains=${place.name === 'method'} @files=${this.filesGiven} @leave=${this.leave} @back=${this.back} @theme=${(event: CustomEvent<SessionState['theme']>) => { this.setTheme(event.detail); }}></eg-header>
      <eg-notices .notices=${state.notices} @dismiss=${(event: CustomEvent<{ index?: number }>) => { this.session.do(dismiss, event.detail.index); }}></eg-notices>
      <main tabindex="-1">${sample === undefined ? this.tray(state) : html`${this.samplePlace(sample, place.name === 'method')}${place.name === 'method' ? this.method(place) : nothing}`}</main>
    `;
  }

  override updated(changed: PropertyValues): void {
    super.updated(changed);
    const { place } = this.session.state;
    const name = place.name === 'tray' ? undefined : this.session.sample(place.id)?.name;
    document.title = name === undefined ? 'Evenglow' : `${name} · Evenglow`;
    if (place !== this.shownPlace) this.arrive(place);
  }

  /** The keyboard goes along: into a sample at its top, and back onto the row that one came from. */
  private arrive(place: Place): void {
    const from = this.shownPlace;
    this.shownPlace = place;
    if (from === undefined || (place.name === 'tray' && from.name === 'tray')) return;
    if (place.name === 'sample' && from.name === 'method') scrollTo(0, this.leftAt);
    else if (place.name !== 'tray') {
      if (place.name === 'sample') scrollTo(0, 0);
      this.renderRoot.querySelector('main')?.focus({ preventScroll: true });
    } else if (from.name !== 'tray') {
      const tray = this.renderRoot.querySelector('eg-tray');
      if (tray instanceof Tray) void tray.focusRow(from.id);
    }
  }

  private tray({ samples, requiredUm2 }: SessionState) {
    const { session } = this;
    type One = CustomEvent<{ readonly id: string }>;
    return html`
      <eg-tray .samples=${samples} .requiredUm2=${requiredUm2} .facts=${this.facts} .compute=${session.compute}
        @open-sample=${(event: One) => { session.do(go, { name: 'sample', id: event.detail.id }); }}
        @cancel-run=${(event: One) => { session.do(cancel, event.detail.id); }}
        @retry=${(event: One) => { void session.do(retry, event.detail.id); }}
        @remove=${(event: One) => { session.do(close, [event.detail.id]); }}
        @undo-answer=${(event: One) => { void session.do(undo, event.detail.id); }}
        @answer-samples=${({ detail }: CustomEvent<AnswerDetail & { readonly ids: readonly string[] }>) => { void session.do(answer, detail.ids, detail.values, detail.label); }}
        @answer-sample-pages=${({ detail }: CustomEvent<{ readonly id: string; readonly file: string; readonly pages: PagesDetail }>) => { void session.do(answerPages, detail.id, detail.file, detail.pages); }}
        @require=${(event: CustomEvent<{ value: number | undefined }>) => { session.do(setRequired, event.detail.value); }}
        @clear-demo=${() => { session.do(clearDemo); }}
        @open-demo=${() => { void session.do(openDemo); }}></eg-tray>
    `;
  }

  /** The sample stays where it is, out of sight, so that one comes back to what one left. */
  private method({ topic }: Extract<Place, { name: 'method' }>) {
    if (!this.hasMethod) {
      import('../method/method-place.ts').then(() => { this.hasMethod = true; }, () => {
        this.session.say('How this is done', 'This page could not be loaded; check that the program still serves it, and try again.');
        this.back();
      });
      return nothing;
    }
    return html`<eg-method-place .topic=${topic} .fields=${this.facts?.fields ?? []} @back=${this.back}></eg-method-place>`;
  }

  private samplePlace(sample: SampleState, hidden: boolean) {
    const { session } = this;
    const { id } = sample;
    type Change = CustomEvent<{ readonly path: string; readonly value: RecipeValue | undefined; readonly label: string }>;
    return html`
      ${sample.status === 'asking' && !hidden ? this.questions(sample) : nothing}
      <eg-sample-place ?hidden=${hidden} .sample=${sample} .facts=${this.facts} .compute=${session.compute}
        @recipe-change=${({ detail }: Change) => { void session.do(changeRecipe, id, detail.path, detail.value, detail.label); }}
        @how=${({ detail }: HowEvent) => { this.explain(id, detail.topic); }}
        @spots=${({ detail }: SpotsEvent) => { void session.do(pickSpots, id, detail.spots, detail.label); }}
        @correction=${({ detail }: CorrectionEvent) => { void session.do(correct, id, detail.correction, detail.label); }}
        @correction-out=${({ detail }: CorrectionOutEvent) => { void session.do(takeOutCorrection, id, detail.index, detail.label); }}
        @undo=${() => { void session.do(undo, id); }}
        @redo=${() => { void session.do(redo, id); }}
        @cancel=${() => { session.do(cancel, id); }}
        @retry=${() => { void session.do(retry, id); }}
        @leave=${this.leave}></eg-sample-place>
    `;
  }

  /** A sample that was appraised asks again when the answer to its questions has been undone. */
  private questions(sample: SampleState) {
    const pages = sample.error === undefined ? undefined : questionsOf(sample.error).find((question) => question.kind === 'pages');
    return html`
      <div class="asking">
        <eg-import-form .sample=${sample} .fields=${this.facts?.fields ?? []}
          @answer=${({ detail }: CustomEvent<AnswerDetail>) => { void this.session.do(answer, [sample.id], detail.values, detail.label); }}
          @answer-pages=${({ detail }: CustomEvent<PagesDetail>) => { if (pages?.kind === 'pages') void this.session.do(answerPages, sample.id, pages.file, detail); }}></eg-import-form>
      </div>
    `;
  }

  private readonly changed = (): void => { this.requestUpdate(); };

  private explain(id: string, topic: string): void {
    this.leftAt = scrollY;
    this.session.do(go, { name: 'method', id, topic });
  }

  private readonly back = (): void => {
    const { place } = this.session.state;
    if (place.name === 'method') this.session.do(go, { name: 'sample', id: place.id });
  };

  private readonly leave = (): void => { this.session.do(go, { name: 'tray' }); };

  private readonly filesGiven = ({ detail }: CustomEvent<Dropped>): void => {
    for (const { name, message } of detail.notices) this.session.say(name, message);
    for (const group of detail.groups) void this.session.do(openFiles, group);
  };

  private setTheme(theme: SessionState['theme']): void {
    this.session.do(setTheme, theme);
    rememberTheme(theme);
    this.theme?.show();
  }

  private readonly keyed = (event: KeyboardEvent): void => {
    if (event.key.toLowerCase() !== 'o' || !(event.ctrlKey || event.metaKey) || event.altKey || event.shiftKey) return;
    event.preventDefault();
    const header = this.renderRoot.querySelector('eg-header');
    if (header instanceof Header) header.pick('files');
  };
}

customElements.define('eg-app', App);
