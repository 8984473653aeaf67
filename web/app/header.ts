/** Head of the page: the name, where one is, and how files get in. Sends `files`, `theme`, `leave`, `back`. */
import { LitElement, css, html, svg } from 'lit';
import type { SessionState } from '../session/state.ts';
import { controlStyles } from './controls.ts';
import { chosenFolder } from './dropped-files.ts';
import type { Dropped } from './dropped-files.ts';

type Theme = SessionState['theme'];
const nextTheme: Readonly<Record<Theme, Theme>> = { system: 'dark', dark: 'light', light: 'system' };
const themeWords: Readonly<Record<Theme, string>> = { system: 'as the system', dark: 'dark', light: 'light' };

/** A disc that is lit, dark, or half of each. */
const themeDrawing: Readonly<Record<Theme, unknown>> = {
  light: svg``,
  dark: svg`<circle class="full" cx="10" cy="10" r="7"></circle>`,
  system: svg`<path class="full" d="M10 3a7 7 0 0 0 0 14z"></path>`,
};

export class Header extends LitElement {
  static override properties = { sampleName: { attribute: false }, count: { type: Number }, theme: {}, explains: { type: Boolean } };

  /** Name of the sample that is open; undefined in the tray. */
  declare sampleName: string | undefined;
  /** Samples in the tray. */
  declare count: number;
  declare theme: Theme;
  /** The method page is open, reached from the sample. */
  declare explains: boolean;

  static override styles = [controlStyles, css`
    :host { display: block; background: var(--panel); border-bottom: 1px solid var(--line); }
    header { display: flex; flex-wrap: wrap; align-items: center; gap: 0.5rem 1.25rem; padding: 0.5rem clamp(0.9rem, 2vw, 1.5rem); }
    .name { display: flex; align-items: center; gap: 0.6rem; margin: 0; font-size: 1rem; font-weight: 600; letter-spacing: 0.02em; }
    .dot { width: 0.6rem; height: 0.6rem; border-radius: 50%; background: #ffb454; box-shadow: 0 0 0.35rem 0.1rem rgb(255 180 84 / 60%), 0 0 1rem 0.3rem rgb(255 180 84 / 30%); }
    nav { flex: 1; min-width: 0; }
    ol { display: flex; gap: 0.5rem; align-items: baseline; margin: 0; padding: 0; list-style: none; color: var(--dim); }
    li { min-width: 0; overflow: hidden; text-overflow: ellipsis; white-space: nowrap; }
    li:first-child { flex: none; overflow: visible; }
    li + li::before { content: '/'; margin-right: 0.5rem; color: var(--edge); }
    [aria-current] { color: var(--ink); }
    ol button { font-size: inherit; }
    .ways { display: flex; gap: 0.5rem; align-items: center; }
    .theme { display: grid; place-items: center; padding: 0.4rem; color: var(--dim); }
    svg { display: block; width: 1.2rem; height: 1.2rem; fill: none; stroke: currentColor; stroke-width: 1.5; }
    svg .full { fill: currentColor; stroke: none; }
    @media (max-width: 40rem) { nav { order: 3; flex-basis: 100%; } nav.tray { display: none; } .ways { margin-left: auto; } .long { display: none; } .ways button { text-transform: capitalize; } }
  `];

  constructor() {
    super();
    this.count = 0;
    this.theme = 'system';
    this.explains = false;
  }

  override render() {
    // In a sample the verdict is the page's heading.
    const name = html`<span class="dot"></span>Evenglow`;
    const tray = `Tray${this.count > 0 ? ` · ${this.count}` : ''}`;
    return html`
      <header>
        ${this.sampleName === undefined ? html`<h1 class="name">${name}</h1>` : html`<span class="name">${name}</span>`}
        <nav class=${this.sampleName === undefined ? 'tray' : ''} aria-label="Place">
          <ol>
            ${this.sampleName === undefined
              ? html`<li aria-current="page">${tray}</li>`
              : html`<li><button class="plain" @click=${this.leave}>${tray}</button></li>${this.explains
                ? html`<li><button class="plain" @click=${() => { this.send('back', undefined); }}>${this.sampleName}</button></li><li aria-current="page">How this is done</li>`
                : html`<li aria-current="page">${this.sampleName}</li>`}`}
          </ol>
        </nav>
        <div class="ways">
          <button @click=${() => { this.pick('files'); }}><span class="long">Open </span>files</button>
          <button @click=${() => { this.pick('folder'); }}><span class="long">Open </span>folder</button>
          <input class="unseen" id="files" type="file" multiple tabindex="-1" aria-label="Files to open" @change=${this.filesChosen}>
          <input class="unseen" id="folder" type="file" webkitdirectory tabindex="-1" aria-label="Folder to open" @change=${this.folderChosen}>
          ${this.themeButton()}
        </div>
      </header>
    `;
  }

  /** Opens the browser's own dialogue for files or a folder. */
  pick(what: 'files' | 'folder'): void {
    this.renderRoot.querySelector<HTMLInputElement>(`#${what}`)?.click();
  }

  private themeButton() {
    const label = `Theme: ${themeWords[this.theme]}; switch to ${themeWords[nextTheme[this.theme]]}`;
    return html`
      <button class="theme" title=${label} aria-label=${label} @click=${() => { this.send('theme', nextTheme[this.theme]); }}>
        <svg viewBox="0 0 20 20" aria-hidden="true">
          <circle cx="10" cy="10" r="7"></circle>
          ${themeDrawing[this.theme]}
        </svg>
      </button>
    `;
  }

  private readonly leave = (): void => { this.send('leave', undefined); };

  private readonly filesChosen = (event: Event): void => {
    const files = takeFiles(event);
    this.send('files', { groups: files.length > 0 ? [files] : [], notices: [] } satisfies Dropped);
  };

  private readonly folderChosen = (event: Event): void => { this.send('files', chosenFolder(takeFiles(event))); };

  private send(name: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(name, { detail, bubbles: true, composed: true }));
  }
}

/** The chosen files; the field is emptied so that choosing the same again is a change. */
function takeFiles(event: Event): File[] {
  const input = event.target as HTMLInputElement;
  const files = [...(input.files ?? [])];
  input.value = '';
  return files;
}

customElements.define('eg-header', Header);
