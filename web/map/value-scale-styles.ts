/** Styles of the value scale. */
import { css } from 'lit';

export const valueScaleStyles = css`
  :host { display: block; position: relative; padding-top: 2px; font-size: 12px; font-variant-numeric: tabular-nums; color: var(--dim, #8fa0af); }
  .bins { display: block; width: 100%; height: 30px; }
  .line { position: relative; height: 16px; cursor: ew-resize; touch-action: none; }
  .colours { display: block; width: 100%; height: 100%; border-radius: 2px; }
  .mark { position: absolute; top: -3px; bottom: -3px; border: 1.5px dashed var(--glow-soft, #ffd9a0); border-radius: 2px; pointer-events: none; box-sizing: border-box; }
  .handle { position: absolute; top: -5px; width: 24px; height: 26px; margin: 0 0 0 -12px; padding: 0; border: 0; background: none; color: inherit; font: inherit; cursor: ew-resize; touch-action: none; }
  .handle::before { content: ''; position: absolute; inset: 0 9px; border-radius: 3px; background: var(--ink, #dfe6ec); box-shadow: 0 0 0 2px var(--background, #0d1216); }
  .handle:hover::before, .handle:focus-visible::before { background: var(--glow-soft, #ffd9a0); }
  .handle:focus-visible { outline: 2px solid var(--focus, var(--glow-soft, #ffd9a0)); border-radius: 4px; }
  .ticks { position: relative; height: 17px; margin-top: 5px; }
  .layers { margin-top: 0; }
  .tick { position: absolute; top: 0; white-space: nowrap; }
  .limit { color: var(--ink, #dfe6ec); font-weight: 600; }
  .rung { color: var(--glow-soft, #ffd9a0); }
  .reference { font-weight: 600; }
`;
