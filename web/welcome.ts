/** What the page shows in this version: what Evenglow is, and how to run it. */
import { LitElement, css, html } from 'lit';

/** One command and what it does. */
export interface Command {
  readonly line: string;
  readonly does: string;
}

const commands: readonly Command[] = [
  { line: 'npx evenglow appraise scans --out results', does: 'appraises every scan in the folder “scans” and writes ledgers, maps and a report' },
  { line: 'npx evenglow --help', does: 'lists all commands' },
];

export class WelcomeElement extends LitElement {
  static override properties = { commands: { attribute: false } };

  declare commands: readonly Command[];

  static override styles = css`
    :host { display: block; max-width: 44rem; margin: 0 auto; padding: clamp(2rem, 10vh, 7rem) 1.5rem 3rem; }
    h1 { margin: 0 0 1.5rem; font-size: 2.25rem; font-weight: 500; letter-spacing: 0.01em; color: var(--glow); }
    p { margin: 0 0 1.25rem; }
    section { margin-top: 2rem; padding: 1.25rem 1.5rem 1.5rem; background: var(--panel); border: 1px solid var(--line); border-radius: 10px; }
    h2 { margin: 0 0 0.5rem; font-size: 1rem; font-weight: 600; }
    dl { margin: 0; }
    dt { margin-top: 1rem; overflow-x: auto; white-space: nowrap; font-family: var(--code); font-size: 0.95rem; color: var(--glow-soft); }
    dd { margin: 0.15rem 0 0; }
    dd, .note { color: var(--dim); }
  `;

  constructor() {
    super();
    this.commands = commands;
  }

  override render() {
    return html`
      <main>
        <h1>Evenglow</h1>
        <p>
          Evenglow reads conductive-probe scans of thin tunnel barriers, height and current in one pass, and books
          every pixel of the footprint to exactly one cause: usable, thin, thick, bubble, short and so on. The areas
          add up to the footprint, so the ledger says how much of a stack can glow evenly, what is in the way, and
          what to do next.
        </p>
        <section aria-labelledby="how">
          <h2 id="how">This version works on the command line</h2>
          <p class="note">The page cannot open scans yet. In the project’s folder, run:</p>
          <dl>
            ${this.commands.map((command) => html`<dt>${command.line}</dt><dd>${command.does}</dd>`)}
          </dl>
        </section>
      </main>
    `;
  }
}

customElements.define('evenglow-welcome', WelcomeElement);
