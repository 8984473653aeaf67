/** Styles of the Sample place. */
import { css } from 'lit';

export const samplePlaceStyles = css`
  :host { display: flex; flex-direction: column; box-sizing: border-box; height: calc(100dvh - var(--header-height, 3.3rem)); min-height: 620px; overflow: hidden; }
  :host([hidden]) { display: none; }
  .top { position: relative; padding: 10px 24px 8px; border-bottom: 1px solid var(--line, #25313b); }
  .headline { display: flex; gap: 8px 24px; align-items: flex-start; justify-content: space-between; margin-bottom: 10px; }
  eg-verdict-line { flex: 1; min-width: 0; }
  .steps { display: flex; gap: 8px; flex: none; padding-top: 4px; }
  .steps button { font-size: 0.875rem; max-width: 18rem; overflow: hidden; text-overflow: ellipsis; }
  .steps button:disabled { opacity: 0.45; cursor: default; }
  .error { margin-top: 6px; }
  .top eg-progress-line { position: absolute; right: 24px; bottom: 2px; width: min(27rem, 60%); padding-left: 12px; background: var(--background, #0d1216); }
  .error { margin-bottom: 0; color: var(--bad, #ff9a76); font-size: 0.9375rem; }
  /* The map is as high as there is room and takes no more width than that; the chapters have the rest. */
  .main { flex: 1; container-type: size; display: grid; grid-template-columns: fit-content(calc(100% - 25rem)) minmax(25rem, 1fr); min-height: 0; }
  eg-map-panel { padding: 12px 18px 4px 24px; }
  .chapters { border-left: 1px solid var(--line, #25313b); overflow: auto; scrollbar-gutter: stable; }
  .stale .result { opacity: 0.72; }
  .result { transition: opacity 200ms; }
  .empty { padding: 2rem 24px; }
  @media (max-width: 1180px) and (min-width: 901px) { .main { grid-template-columns: fit-content(calc(100% - 22rem)) minmax(22rem, 1fr); } }
  @media (max-width: 900px) {
    :host { height: auto; min-height: 0; overflow: visible; }
    .top { padding: 10px 14px; }
    .headline { flex-direction: column; }
    .steps.none { display: none; }
    .top eg-progress-line { position: static; width: auto; padding: 6px 0 0; }
    .main { display: block; container-type: normal; }
    eg-map-panel { padding: 12px 14px; }
    .chapters { border-left: 0; border-top: 1px solid var(--line, #25313b); overflow: visible; }
  }
  @media (prefers-reduced-motion: reduce) { .result { transition: none; } }
`;
