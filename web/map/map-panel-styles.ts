/** Styles of the map panel. */
import { css } from 'lit';

export const mapPanelStyles = css`
  :host {
    display: grid; grid-template: 'stage bar' auto 'stage side' minmax(0, 1fr) 'scale side' auto 'cut side' auto / minmax(0, var(--stage-width)) 16.5rem; gap: 10px 18px; min-height: 0;
    /* What the map can use beside the scale under it, which is 100 pixels high with its gaps; never too narrow for the scale's words. */
    --stage-width: max(24rem, calc((100cqh - 116px) * var(--map-aspect, 1)));
  }
  eg-map-bar { grid-area: bar; }
  .stage { grid-area: stage; position: relative; min-height: 240px; }
  /* Beside the map and never over it, so that all of the map can be drawn on. */
  eg-hand-strip { grid-area: hand; }
  :host([inhand]) { grid-template: 'stage bar' auto 'stage hand' auto 'stage side' minmax(0, 1fr) 'scale side' auto 'cut side' auto / minmax(0, var(--stage-width)) 16.5rem; }
  eg-map-stage { position: absolute; inset: 0; transition: opacity 200ms; }
  .foot { grid-area: scale; display: grid; grid-template-columns: minmax(0, 1fr) auto; gap: 0 12px; align-items: start; }
  .log { margin-top: 28px; }
  .log button { padding: 0 0.5rem; font-size: 0.8125rem; border-color: var(--line, #25313b); }
  eg-cut-plot { grid-area: cut; }
  .side { grid-area: side; display: flex; flex-direction: column; gap: 14px; min-width: 0; overflow: auto; font-size: 13px; line-height: 1.5; }
  .card { padding: 10px 12px; background: var(--panel, #141b21); border: 1px solid var(--line, #25313b); border-radius: 7px; }
  .card h3 { margin: 0 0 4px; font-size: 12px; font-weight: 500; color: var(--dim, #8fa0af); }
  .card p { margin: 0; }
  .say { position: absolute; top: 10px; left: 50%; transform: translateX(-50%); max-width: 90%; padding: 2px 10px; border-radius: 5px; background: rgb(13 18 22 / 0.86); color: #fff; font-size: 13px; pointer-events: none; }
  @media (max-width: 900px) {
    :host { grid-template: 'bar' auto 'stage' auto 'scale' auto 'cut' auto 'side' auto / minmax(0, 1fr); }
    :host([inhand]) { grid-template: 'bar' auto 'hand' auto 'stage' auto 'scale' auto 'cut' auto 'side' auto / minmax(0, 1fr); }
    .stage { aspect-ratio: var(--map-aspect, 1); min-height: 0; max-height: 70dvh; }
    .side { flex-flow: row wrap; overflow: visible; }
    .card { flex: 1 1 16rem; }
  }
  @media (prefers-reduced-motion: reduce) { eg-map-stage { transition: none; } }
`;
