/** Styles of the ledger bar. */
import { css } from 'lit';

export const ledgerBarStyles = css`
  :host { display: block; min-width: 0; font-size: 13px; line-height: 1.4; }
  .bar { position: relative; height: 36px; }
  :host([compact]) .bar { height: 14px; }
  svg { display: block; overflow: visible; }
  .bar > svg { position: absolute; inset: 0 auto auto 0; }
  .segment { transition: opacity 160ms; }
  .segment.usable { filter: drop-shadow(0 0 7px rgb(255 180 84 / 0.5)); }
  :host([compact]) .segment.usable { filter: drop-shadow(0 0 3px rgb(255 180 84 / 0.4)); }
  .segment.dimmed { opacity: 0.28; filter: none; }
  .glow-from { stop-color: #ffb454; }
  .glow-to { stop-color: #ffd9a0; }
  ul { position: absolute; inset: 0; margin: 0; padding: 0; list-style: none; }
  li { position: absolute; top: 0; bottom: 0; }
  button { position: absolute; inset: 0 -1px; margin: 0; padding: 0; border: 0; border-radius: 2px; background: transparent; cursor: pointer; }
  button:hover { box-shadow: 0 0 0 2px var(--ink, #dfe6ec); }
  button[aria-pressed='true'] { box-shadow: 0 0 0 2px var(--glow-soft, #ffd9a0); }
  button:focus-visible { outline: 2px solid var(--focus, var(--glow-soft, #ffd9a0)); outline-offset: 3px; }
  text { fill: var(--dim, #8fa0af); font-size: 13px; font-variant-numeric: tabular-nums; }
  text .cause { fill: var(--ink, #dfe6ec); font-weight: 600; }
  g.off, .legend .off { opacity: 0.45; }
  g.shown .area { fill: var(--ink, #dfe6ec); }
  .leader, .bracket { fill: none; stroke: var(--dim, #8fa0af); stroke-width: 1; shape-rendering: crispEdges; }
  .leader { opacity: 0.8; }
  .legend { display: flex; flex-wrap: wrap; gap: 4px 14px; padding-top: 8px; color: var(--dim, #8fa0af); font-variant-numeric: tabular-nums; }
  .legend span { display: inline-flex; align-items: center; gap: 5px; cursor: pointer; }
  .legend b, .detail b { color: var(--ink, #dfe6ec); font-weight: 600; }
  .detail { margin: 2px 0 0; min-height: 1.4em; color: var(--dim, #8fa0af); font-size: 12px; }
  @media (prefers-reduced-motion: reduce) { .segment { transition: none; } }
`;
