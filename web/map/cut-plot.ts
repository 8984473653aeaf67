/** The profile along a cut, from A to B. */
import { LitElement, css, html, nothing, svg } from 'lit';
import type { MapInfo } from '../../workers/api.ts';
import { tickText, withUnit } from '../sample/format.ts';
import { SizeWatch } from '../sample/size-watch.ts';
import { roundTicks, shareOf } from './value-axis.ts';
import type { Axis } from './value-axis.ts';

const height = 92;
const foot = 18;
const side = 64;

/** The axis that holds every value of a profile; logarithmic only over its positive values. Undefined when nothing is there. */
export function profileAxis(values: Float32Array, log: boolean): Axis | undefined {
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    if (Number.isNaN(value) || (log && value <= 0)) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  if (low > high) return undefined;
  if (log) return { low: low / 1.2, high: high * 1.2, log };
  const room = high > low ? 0.06 * (high - low) : Math.abs(high) * 0.1 + 1e-12;
  return { low: low - room, high: high + room, log };
}

/** The profile as an SVG path in a box; broken where a value is missing. */
export function profilePath(values: Float32Array, axis: Axis, width: number, tall: number): string {
  let path = '';
  let drawn = false;
  values.forEach((value, index) => {
    const missing = Number.isNaN(value) || (axis.log && value <= 0);
    if (!missing) path += `${drawn ? 'L' : 'M'}${((index / Math.max(1, values.length - 1)) * width).toFixed(1)} ${((1 - shareOf(axis, value)) * tall).toFixed(1)}`;
    drawn = !missing;
  });
  return path;
}

export class CutPlot extends LitElement {
  static override properties = { values: { attribute: false }, map: { attribute: false }, lengthUm: { attribute: false }, log: { attribute: false }, width: { state: true } };

  declare values: Float32Array | undefined;
  declare map: MapInfo;
  declare lengthUm: number;
  declare log: boolean;
  declare width: number;
  protected readonly sizes = new SizeWatch(this, () => { this.width = this.clientWidth; });

  static override styles = css`
    :host { display: block; position: relative; height: 110px; font-size: 12px; color: var(--dim, #8fa0af); }
    svg { display: block; overflow: visible; }
    text { fill: var(--dim, #8fa0af); font-size: 12px; font-variant-numeric: tabular-nums; }
    .grid { stroke: var(--line, #25313b); }
    .profile { fill: none; stroke: var(--glow, #ffb454); stroke-width: 1.5; stroke-linejoin: round; }
    button { position: absolute; top: 0; right: 0; border: 1px solid var(--line, #25313b); border-radius: 4px; background: var(--panel, #141b21); color: var(--ink, #dfe6ec); font: inherit; cursor: pointer; }
  `;

  constructor() {
    super();
    this.width = 0;
    this.lengthUm = 0;
    this.log = false;
  }


  override render() {
    const { values, map } = this;
    const axis = values && profileAxis(values, this.log);
    const width = Math.max(10, this.width - side - 70);
    const tall = height - foot;
    const ticks = axis ? roundTicks(axis) : [];
    const every = Math.max(1, Math.ceil(ticks.length / 4));
    return html`<svg width=${this.width} height=${height} role="img" aria-label="Profile of ${map.name} along the cut from A to B, ${withUnit(this.lengthUm, 'µm')}">
      <g transform="translate(${side} 4)">
        ${ticks.filter((_, index) => index % every === 0).map((tick) => svg`
          <path class="grid" d="M0 ${(1 - tick.share) * tall}H${width}"></path>
          <text x="-6" y=${(1 - tick.share) * tall + 4} text-anchor="end">${tickText(tick.value, map.unit)}</text>`)}
        ${values && axis ? svg`<path class="profile" d=${profilePath(values, axis, width, tall)}></path>` : nothing}
        <text x="0" y=${tall + 16}>A</text>
        <text x=${width / 2} y=${tall + 16} text-anchor="middle">${values && !axis ? 'no values along this cut' : `cut of ${withUnit(this.lengthUm, 'µm')}`}</text>
        <text x=${width} y=${tall + 16} text-anchor="end">B</text>
      </g>
    </svg>
    <button type="button" @click=${() => this.dispatchEvent(new CustomEvent('remove-cut'))}>remove</button>`;
  }
}

customElements.define('eg-cut-plot', CutPlot);
