/** Asks for exactly what a sample's files do not state; other buttons may be put beside its own. Sends `answer` {values, label, forAll} or `answer-pages` {height, current}. */
import { LitElement, css, html, nothing } from 'lit';
import type { FieldInfo } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import type { SampleState } from '../session/state.ts';
import './pages-form.ts';
import { questionsOf, reasonOf } from './questions.ts';
import type { FieldQuestion } from './questions.ts';
import { choiceWords, readTyped, statementLabel } from './statement.ts';

export interface AnswerDetail {
  readonly values: Readonly<Record<string, number | string>>;
  readonly label: string;
  /** The same for all samples that ask for the same. */
  readonly forAll: boolean;
}

/** Where the recipe's own title would be read two ways among questions about maps. */
const labels: Readonly<Record<string, string>> = { 'scan.widthUm': 'Width of the map', 'scan.heightUm': 'Height of the map', 'scan.channel': 'What the map shows' };

export class ImportForm extends LitElement {
  static override properties = { sample: { attribute: false }, fields: { attribute: false }, others: { type: Number }, typed: { state: true }, complaints: { state: true } };

  declare sample: SampleState | undefined;
  /** All fields of the recipe; the form takes titles, units and choices from them. */
  declare fields: readonly FieldInfo[];
  /** How many other samples ask for the same. */
  declare others: number;
  declare typed: Readonly<Record<string, string>>;
  declare complaints: Readonly<Record<string, string>>;

  static override styles = [controlStyles, css`
    :host { display: block; }
    p { margin: 0 0 0.75rem; }
    .files { color: var(--dim); overflow-wrap: anywhere; }
    .fields { display: flex; flex-wrap: wrap; gap: 0.75rem 1.25rem; align-items: flex-start; }
    .field { display: grid; grid-template-columns: minmax(0, 1fr); gap: 0.2rem; width: 12rem; }
    .label { font-size: 0.875rem; }
    .box { display: flex; align-items: center; gap: 0.4rem; }
    .box input, .box select { min-width: 0; width: 0; flex: 1; }
    .unit, small { color: var(--dim); font-size: 0.8125rem; line-height: 1.35; }
    .complaint { color: var(--bad); }
    .end { display: flex; flex-wrap: wrap; gap: 0.75rem 1.25rem; align-items: center; margin-top: 1rem; }
    .end label { display: flex; gap: 0.5rem; align-items: center; }
  `];

  constructor() {
    super();
    this.fields = [];
    this.others = 0;
    this.typed = {};
    this.complaints = {};
  }

  override render() {
    const { sample } = this;
    if (sample?.error === undefined) return nothing;
    const questions = questionsOf(sample.error);
    const pages = questions.find((question) => question.kind === 'pages');
    return html`
      <p>${reasonOf(sample.error)}</p>
      <p class="files">${sample.files.length === 1 ? 'File' : 'Files'}: ${sample.files.join(', ')}</p>
      ${pages !== undefined
        ? html`<eg-pages-form .question=${pages}><slot></slot></eg-pages-form>`
        : html`
          <form novalidate @submit=${this.submit} aria-label=${`What the files of ${sample.name} do not state`}>
            <div class="fields">${this.asked().map(({ question, field }) => this.field(question, field))}</div>
            <div class="end">
              <button class="main">Appraise</button>
              ${this.others > 0 ? html`<label><input type="checkbox" name="for-all"> the same for ${this.others === 1 ? 'the other sample that asks' : `the other ${this.others} samples that ask`} for this</label>` : nothing}
              <slot></slot>
            </div>
          </form>`}
    `;
  }

  /** Questions of now: which unit is asked for depends on the role that was chosen. */
  private asked(): { question: FieldQuestion; field: FieldInfo }[] {
    const questions = this.sample?.error === undefined ? [] : questionsOf(this.sample.error);
    const asksRole = questions.some((question) => question.kind === 'field' && question.path === 'scan.channel');
    return questions.flatMap((question) => {
      if (question.kind !== 'field') return [];
      if (asksRole && question.onlyFor !== undefined && question.onlyFor !== this.typed['scan.channel']) return [];
      const field = this.fields.find(({ path }) => path === question.path);
      return field === undefined ? [] : [{ question, field }];
    });
  }

  private field(question: FieldQuestion, field: FieldInfo) {
    const { path, title, unit } = field;
    const complaint = this.complaints[path];
    const text = this.typed[path] ?? '';
    const keep = (event: Event): void => {
      this.typed = { ...this.typed, [path]: (event.target as HTMLInputElement | HTMLSelectElement).value };
    };
    const hint = question.required ? field.description : `Optional: ${field.absent ?? 'may be left empty'}.`;
    return html`
      <div class="field">
        <label class="label" for=${path}>${labels[path] ?? title}</label>
        <span class="box">
          ${field.kind === 'choice'
            ? html`<select id=${path} @change=${keep} aria-describedby=${`${path}-hint`} aria-invalid=${complaint !== undefined} .value=${text}>
                <option value="" ?selected=${text === ''}>choose</option>
                ${(field.choices ?? []).map((choice) => html`<option value=${choice} ?selected=${choice === text}>${choiceWords(choice)}</option>`)}
              </select>`
            : html`<input id=${path} inputmode="decimal" autocomplete="off" .value=${text} @input=${keep} aria-required=${question.required} aria-describedby=${`${path}-hint`} aria-invalid=${complaint !== undefined}>`}
          ${unit === undefined ? nothing : html`<span class="unit">${unit}</span>`}
        </span>
        <small id=${`${path}-hint`}>${complaint === undefined ? hint : html`<span class="complaint">${complaint}</span>`}</small>
      </div>
    `;
  }

  private readonly submit = (event: SubmitEvent): void => {
    event.preventDefault();
    const values: Record<string, number | string> = {};
    const complaints: Record<string, string> = {};
    const asked = this.asked();
    for (const { question, field } of asked) {
      const typed = readTyped(field, this.typed[field.path] ?? '', question.required);
      if (typed === undefined) continue;
      if ('value' in typed) values[field.path] = typed.value;
      else complaints[field.path] = typed.complaint;
    }
    this.complaints = complaints;
    const [wrong] = Object.keys(complaints);
    if (wrong !== undefined) {
      this.renderRoot.querySelector<HTMLElement>(`#${CSS.escape(wrong)}`)?.focus();
      return;
    }
    const forAll = this.renderRoot.querySelector<HTMLInputElement>('[name="for-all"]')?.checked ?? false;
    const detail: AnswerDetail = { values, label: statementLabel(asked.map(({ field }) => field), values), forAll };
    this.dispatchEvent(new CustomEvent('answer', { detail, bubbles: true, composed: true }));
  };
}

customElements.define('eg-import-form', ImportForm);
