/** Layout of a row of the tray: one line of columns on a desk, one card on a phone. */
import { css } from 'lit';

export const rowStyles = css`
  :host { display: block; container-type: inline-size; }
  article {
    display: grid; grid-template-columns: 2.5rem 6rem minmax(0, 1fr) 11rem 13rem; grid-template-areas: "rank picture middle area verdict"; gap: 0.5rem 1.25rem; align-items: center;
    padding: 0.7rem 1rem 0.7rem 0; background: var(--panel); border: 1px solid var(--line); border-radius: 10px;
  }
  article.opens { cursor: pointer; }
  article.opens:hover { border-color: var(--edge); }
  article:has(.open:focus-visible) { outline: 2px solid var(--focus); outline-offset: 1px; }
  .open:focus-visible { outline: none; }
  .rank { grid-area: rank; justify-self: end; color: var(--dim); font-size: 1.25rem; }
  eg-thumbnail { grid-area: picture; }
  .middle { grid-area: middle; display: grid; gap: 0.4rem; min-width: 0; }
  .title { display: flex; flex-wrap: wrap; gap: 0 0.75rem; align-items: baseline; }
  h3 { margin: 0; font-size: 1.0625rem; font-weight: 600; min-width: 0; }
  .open { padding: 0; border: 0; background: none; font: inherit; text-align: left; white-space: normal; overflow-wrap: anywhere; }
  .open:hover { background: none; color: var(--glow-soft); }
  .facts, .note { margin: 0; color: var(--dim); font-size: 0.875rem; }
  .usable { grid-area: area; text-align: right; }
  .big { display: block; font-size: 1.5rem; line-height: 1.25; color: var(--glow); white-space: nowrap; }
  .big.even { color: var(--ink); }
  .usable small { display: block; color: var(--dim); font-size: 0.8125rem; line-height: 1.4; }
  .verdict { grid-area: verdict; display: grid; gap: 0.1rem; }
  .verdict b { font-weight: 500; }
  .verdict small { color: var(--dim); font-size: 0.8125rem; line-height: 1.4; }
  .mark { display: flex; gap: 0.45rem; align-items: center; font-weight: 600; }
  .mark svg { flex: none; width: 1rem; height: 1rem; fill: none; stroke: currentColor; stroke-width: 2; }
  .enough .mark { color: var(--good); }
  .short .mark { color: var(--bad); }
  .work { display: flex; flex-wrap: wrap; gap: 0.3rem 0.75rem; align-items: center; font-size: 0.9375rem; }
  progress { width: 12rem; max-width: 100%; height: 0.4rem; accent-color: var(--glow); }
  .buttons { display: flex; flex-wrap: wrap; gap: 0.5rem; }
  .error { margin: 0; color: var(--ink); overflow-wrap: anywhere; }
  details { font-size: 0.875rem; color: var(--dim); min-width: 0; }
  summary { cursor: pointer; width: max-content; }
  details ul { margin: 0.3rem 0 0; padding-left: 1.1rem; color: var(--ink); }
  details li { overflow-wrap: anywhere; }
  article.plain { grid-template-columns: 2.5rem minmax(0, 1fr); grid-template-areas: "rank middle"; }

  @container (max-width: 60rem) {
    article { grid-template-columns: 2.5rem 6rem minmax(0, 1fr) minmax(9rem, auto); grid-template-areas: "rank picture middle area" "rank picture middle verdict"; }
    .verdict { text-align: right; justify-items: end; }
  }
  @container (max-width: 40rem) {
    article { grid-template-columns: auto minmax(0, 1fr); grid-template-areas: "title title" "picture area" "picture verdict"; gap: 0.4rem 0.9rem; padding: 0.8rem 0.9rem; align-items: start; }
    article.plain { grid-template-columns: minmax(0, 1fr); grid-template-areas: "middle"; }
    .rank { display: none; }
    /* What was found comes before its particulars. */
    .opens .middle { display: contents; }
    .opens .middle > * { grid-column: 1 / -1; }
    .opens .title { grid-area: title; }
    .title .number { display: inline; }
    .usable, .verdict { text-align: left; justify-items: start; }
  }
  .number { display: none; color: var(--dim); }
`;
