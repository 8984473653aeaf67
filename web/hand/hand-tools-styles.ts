/** Styles of the tools for correcting by hand. */
import { css } from 'lit';

export const handToolsStyles = css`
  :host { display: block; font-size: 0.8125rem; }
  section { padding-bottom: 8px; }
  h3 { margin: 8px 0 4px; font-size: 0.8125rem; font-weight: 600; color: var(--dim, #8fa0af); }
  p { margin: 4px 0; line-height: 1.45; }
  .note, .measures { color: var(--dim, #8fa0af); }
  .problem { color: var(--bad, #ff9a76); }
  .choice { display: flex; flex-wrap: wrap; gap: 4px; }
  .row { display: flex; flex-wrap: wrap; gap: 6px; align-items: center; margin-top: 6px; }
  button { padding: 0.15rem 0.6rem; font-size: 0.8125rem; border-color: var(--line, #25313b); }
  .choice button { display: inline-flex; gap: 6px; align-items: center; }
  button[aria-pressed='true'] { background: var(--raised, #1b252d); border-color: var(--glow, #ffb454); color: var(--glow-soft, #ffd9a0); }
  button.plain:disabled { opacity: 0.45; cursor: default; }
  .swatch { flex: none; }
  .clear { width: 12px; height: 12px; border: 1px dashed var(--edge, #5a6b79); border-radius: 2px; }
  label { display: inline-flex; gap: 6px; align-items: center; }
  input[type='text'] { width: 4rem; padding: 0.1rem 0.4rem; text-align: right; font-size: 0.8125rem; }
  details { padding: 4px 0 8px; }
  summary { cursor: pointer; color: var(--dim, #8fa0af); }
  ol { margin: 4px 0; padding-left: 1.8em; max-height: 11rem; overflow: auto; }
  li span { margin-right: 8px; }
  @media (pointer: coarse) { button { padding: 0.35rem 0.7rem; } }
`;
