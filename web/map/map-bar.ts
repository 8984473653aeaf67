/** The switches above the map: which map, raw or levelled, causes over it or not, a cut, zoom. */
import { LitElement, css, html } from 'lit';
import type { MapName } from '../../workers/api.ts';
import { controlStyles } from '../app/controls.ts';
import { mapWords, rawTwin, switchMaps } from './map-words.ts';
import type { SwitchMap } from './map-words.ts';

/** What a switch asks for; detail of the `tool` event. */
export type Tool =
  | { readonly tool: 'map'; readonly map: SwitchMap }
  | { readonly tool: 'raw' | 'causes' | 'cut' | 'fit' | 'in' | 'out' };

export class MapBar extends LitElement {
  static override properties = {
    maps: { attribute: false }, map: { attribute: false }, raw: { type: Boolean }, causes: { type: Boolean }, cutting: { type: Boolean },
  };

  /** Maps that this sample has. */
  declare maps: readonly MapName[];
  declare map: SwitchMap;
  declare raw: boolean;
  declare causes: boolean;
  declare cutting: boolean;

  static override styles = [controlStyles, css`
    :host { display: block; container-type: inline-size; }
    .all { display: flex; flex-wrap: wrap; gap: 6px 10px; align-items: center; }
    [role='group'] { display: inline-flex; gap: 3px; }
    .zoom { margin-left: auto; }
    button { padding: 0.15rem 0.6rem; font-size: 0.875rem; border-color: var(--line, #25313b); color: var(--dim, #8fa0af); }
    button[aria-pressed='true'] { background: var(--raised, #1b252d); border-color: var(--edge, #5a6b79); color: var(--glow-soft, #ffd9a0); }
    button:disabled { opacity: 0.45; cursor: default; }
    kbd { margin-left: 5px; font: inherit; font-size: 0.75rem; color: var(--dim, #8fa0af); }
    @container (max-width: 20rem) {
      .all { display: grid; gap: 8px; }
      [role='group'] { display: grid; grid-template-columns: repeat(6, 1fr); gap: 4px; }
      [role='group'] button { grid-column: span 2; }
      /* Five maps: three over two. */
      [role='group'].maps button:nth-child(4):nth-last-child(2), [role='group'].maps button:nth-child(5):last-child { grid-column: span 3; }
      .zoom { margin: 0; }
      button { padding: 0.1rem 0.2rem; }
    }
  `];

  override render() {
    const twin = rawTwin[this.map];
    const hasRaw = twin !== undefined && this.maps.includes(twin);
    return html`<div class="all">
      <div role="group" class="maps" aria-label="Map">
        ${switchMaps.filter((map) => this.maps.includes(map)).map((map) => html`
          <button type="button" aria-pressed=${map === this.map ? 'true' : 'false'} @click=${() => { this.send({ tool: 'map', map }); }}>${mapWords[map]}</button>`)}
      </div>
      <div role="group" aria-label="On the map">
        ${this.toggle('raw', 'raw', 'R', this.raw && hasRaw, 'The map as the file has it; hold R for a glance', !hasRaw)}
        ${this.toggle('causes', 'causes', 'C', this.causes, 'Causes of loss over the map')}
        ${this.toggle('cut', 'cut', 'X', this.cutting, 'Profile along a line: two clicks, or drag with Shift')}
      </div>
      <div role="group" class="zoom" aria-label="Zoom">
        <button type="button" aria-label="Zoom out" title="Zoom out (−)" @click=${() => { this.send({ tool: 'out' }); }}>−</button>
        <button type="button" title="Whole map (0, or double click)" @click=${() => { this.send({ tool: 'fit' }); }}>whole</button>
        <button type="button" aria-label="Zoom in" title="Zoom in (+)" @click=${() => { this.send({ tool: 'in' }); }}>+</button>
      </div>
    </div>`;
  }

  private toggle(tool: 'raw' | 'causes' | 'cut', word: string, key: string, on: boolean, hint: string, off = false) {
    return html`<button type="button" aria-pressed=${on ? 'true' : 'false'} aria-keyshortcuts=${key} ?disabled=${off} title="${hint} (${key})" @click=${() => { this.send({ tool }); }}>${word}<kbd aria-hidden="true">${key}</kbd></button>`;
  }

  private send(detail: Tool): void {
    this.dispatchEvent(new CustomEvent('tool', { detail }));
  }
}

customElements.define('eg-map-bar', MapBar);
