/** How buttons and fields look, shared by the elements of the page. */
import { css } from 'lit';

export const controlStyles = css`
  *, *::before, *::after { box-sizing: border-box; }
  button, input, select { font: inherit; color: inherit; }
  button, .button {
    padding: 0.3rem 0.8rem; background: var(--panel); border: 1px solid var(--edge); border-radius: 7px; cursor: pointer; font-size: 0.9375rem; line-height: 1.5; white-space: nowrap;
  }
  button:hover, .button:hover { background: var(--raised); }
  button.main { border-color: var(--glow); color: var(--glow-soft); }
  button.plain { padding: 0.1rem 0.3rem; border-color: transparent; background: none; color: var(--dim); text-decoration: underline; text-underline-offset: 0.2em; }
  button.plain:hover { color: var(--ink); }
  input:not([type="checkbox"]), select { padding: 0.3rem 0.5rem; background: var(--background); border: 1px solid var(--edge); border-radius: 7px; line-height: 1.5; }
  input[aria-invalid="true"], select[aria-invalid="true"] { border-color: var(--bad); }
  input[type="checkbox"] { accent-color: var(--glow); }
  :focus-visible { outline: 2px solid var(--focus); outline-offset: 2px; }
  .unseen { position: absolute; width: 1px; height: 1px; overflow: hidden; clip-path: inset(50%); white-space: nowrap; }
`;
