/** Styles of the map's stage. */
import { css } from 'lit';

export const mapStageStyles = css`
  :host { display: block; position: relative; min-height: 0; }
  canvas { position: absolute; inset: 0; width: 100%; height: 100%; border-radius: 4px; cursor: crosshair; touch-action: none; }
  canvas:active { cursor: grabbing; }
  canvas:focus-visible { outline: 2px solid var(--focus, var(--glow-soft, #ffd9a0)); outline-offset: 2px; }
  @media (max-width: 760px) { canvas:not(.drawing) { touch-action: pan-y; } }
`;
