/** The hatches of the causes as SVG patterns, from the facts of the computation. */
import { nothing, svg } from 'lit';
import type { SVGTemplateResult } from 'lit';
import type { ComputeFacts } from '../../workers/api.ts';

type CauseLook = ComputeFacts['causes'][number];

/** Patterns `hatch-<code>` and the gradient `glow` for a `<defs>`; their ids are local to the element's shadow tree. */
export function hatchDefinitions(causes: readonly CauseLook[], period: number): SVGTemplateResult {
  return svg`<defs>
    <linearGradient id="glow"><stop class="glow-from" offset="0"></stop><stop class="glow-to" offset="1"></stop></linearGradient>
    ${causes.map((look) => svg`<pattern id="hatch-${look.code}" width=${period} height=${period} patternUnits="userSpaceOnUse">
      <rect width=${period} height=${period} fill=${look.fill}></rect>${hatchLines(look)}
    </pattern>`)}
  </defs>`;
}

/** What a segment is filled with. */
export function causeFill(code: number, cause: string): string {
  return cause === 'usable' ? 'url(#glow)' : `url(#hatch-${code})`;
}

function hatchLines({ hatchPath, hatchStroke, ink }: CauseLook) {
  if (hatchPath === '') return nothing;
  return hatchStroke > 0
    ? svg`<path d=${hatchPath} fill="none" stroke=${ink} stroke-width=${hatchStroke}></path>`
    : svg`<path d=${hatchPath} fill=${ink}></path>`;
}
