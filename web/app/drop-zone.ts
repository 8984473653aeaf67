/** Makes the whole page take dropped and pasted files. Sends `files` {groups, notices} and covers the page while something hovers. */
import { LitElement, css, html, nothing } from 'lit';
import { droppedFiles } from './dropped-files.ts';
import type { Dropped } from './dropped-files.ts';

export class DropZone extends LitElement {
  static override properties = { hovering: { state: true } };

  declare hovering: boolean;

  static override styles = css`
    .cover {
      position: fixed; inset: 0; z-index: 10; display: grid; place-content: center; gap: 0.25rem; padding: 2rem; text-align: center;
      background: color-mix(in srgb, var(--background) 88%, transparent); pointer-events: none;
    }
    .cover::before { content: ''; position: absolute; inset: 1rem; border: 2px dashed var(--glow); border-radius: 14px; }
    strong { font-size: 1.5rem; font-weight: 500; color: var(--glow-soft); }
    span { color: var(--dim); }
  `;

  constructor() {
    super();
    this.hovering = false;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    addEventListener('dragover', this.over);
    addEventListener('dragleave', this.leave);
    addEventListener('drop', this.drop);
    addEventListener('paste', this.paste);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    removeEventListener('dragover', this.over);
    removeEventListener('dragleave', this.leave);
    removeEventListener('drop', this.drop);
    removeEventListener('paste', this.paste);
  }

  override render() {
    if (!this.hovering) return nothing;
    return html`
      <div class="cover">
        <strong>Drop to appraise</strong>
        <span>Maps, or folders of them. A height and a current map of the same name make one sample.</span>
      </div>
    `;
  }

  private readonly over = (event: DragEvent): void => {
    if (event.dataTransfer === null || !event.dataTransfer.types.includes('Files')) return;
    event.preventDefault();
    event.dataTransfer.dropEffect = 'copy';
    this.hovering = true;
  };

  private readonly leave = (event: DragEvent): void => {
    // Only leaving the window has nothing on the other side.
    if (event.relatedTarget === null) this.hovering = false;
  };

  private readonly drop = (event: DragEvent): void => {
    this.hovering = false;
    if (event.dataTransfer === null || !event.dataTransfer.types.includes('Files')) return;
    event.preventDefault();
    void droppedFiles(event.dataTransfer).then(this.send);
  };

  private readonly paste = (event: ClipboardEvent): void => {
    if (event.clipboardData === null || event.clipboardData.files.length === 0) return;
    event.preventDefault();
    void droppedFiles(event.clipboardData).then(this.send);
  };

  private readonly send = (detail: Dropped): void => {
    this.dispatchEvent(new CustomEvent('files', { detail, bubbles: true, composed: true }));
  };
}

customElements.define('eg-drop-zone', DropZone);
