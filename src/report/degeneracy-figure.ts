/** Thickness against barrier height for what the map measured: the pairs that fit it equally well, drawn. */
import type { Degeneracy, EqualCurve } from '../barrier/degeneracy.ts';
import { markup } from './markup.ts';
import type { Markup } from './markup.ts';
import { fixed, niceBelow, plain } from './numbers.ts';

const box = { width: 720, height: 330, left: 58, right: 150, top: 16, bottom: 44 } as const;
const colours = { slope: '#0072b2', current: '#a35f00' } as const;
const dashes = ['', '7 4', '2 4', '9 3 2 3'] as const;

/**
 * Inline SVG: thickness in nm (left) and layers (right) over barrier height in eV, one line a mass, the ratio of currents at two biases in blue, the current at one bias in
 * brown with its 95 % band at the stated mass; the published range of heights is the axis' marked part, and the pair that was taken a dot. Undefined without a
 * curve of two points.
 */
export function degeneracyFigure({ curves, taken, published }: Degeneracy, layerNm: number): Markup | undefined {
  const drawn = curves.filter(({ points }) => points.length > 1);
  if (drawn.length === 0) return undefined;
  const bands = drawn.filter(({ massRatio, by }) => massRatio === taken.massRatio && (by === 'slope' || !drawn.some((curve) => curve.by === 'slope')));
  const thicknesses = [...drawn.flatMap(({ points }) => points.map((point) => point.thicknessM)), ...bands.flatMap(({ points }) => points.flatMap(({ low95M, high95M }) => [low95M, high95M])), taken.thicknessM]
    .filter((value) => value !== undefined).map((value) => value * 1e9);
  const heights = [...drawn.flatMap(({ points }) => points.map(({ heightEv }) => heightEv)), taken.heightEv];
  const [x0, x1] = [Math.min(...heights), Math.max(...heights)];
  const [y0, y1] = [Math.max(0, Math.min(...thicknesses) - 0.3), Math.max(...thicknesses) + 0.3];
  const right = box.width - box.right;
  const bottom = box.height - box.bottom;
  const x = (heightEv: number): string => (box.left + ((heightEv - x0) / (x1 - x0)) * (right - box.left)).toFixed(1);
  const y = (nm: number): string => (bottom - ((nm - y0) / (y1 - y0)) * (bottom - box.top)).toFixed(1);
  const masses = [...new Set(drawn.map(({ massRatio }) => massRatio))];
  const dash = (mass: number): string => (mass === taken.massRatio ? '' : dashes[1 + masses.filter((other) => other !== taken.massRatio).indexOf(mass)] ?? '2 4');

  const lines = drawn.map(({ by, massRatio, points }) => markup`<path d="M${points.map(({ heightEv, thicknessM }) => `${x(heightEv)} ${y(thicknessM * 1e9)}`).join('L')}" fill="none" stroke="${colours[by]}" stroke-width="${massRatio === taken.massRatio ? '2.2' : '1.4'}" stroke-dasharray="${dash(massRatio)}"/>`);
  const shades = bands.map((curve) => band(curve, x, y));
  const labels = spread(drawn.map(({ massRatio, by, points }) => ({ at: Number(y(points[points.length - 1]!.thicknessM * 1e9)), text: `${by === 'slope' ? 'ratio' : 'current'}, mass ${plain(massRatio)}`, colour: colours[by] })))
    .map(({ at, text, colour }) => markup`<text x="${right + 34}" y="${(at + 4).toFixed(1)}" style="fill:${colour}">${text}</text>`);
  const [markFrom, markTo] = [Math.max(x0, published.heightEv.from), Math.min(x1, published.heightEv.to)];
  const heightTicks = ticks(x0, x1).map((value) => markup`<path d="M${x(value)} ${bottom}v5" stroke="#1a2229"/><text x="${x(value)}" y="${bottom + 19}" text-anchor="middle">${plain(value)}</text>`);
  const thicknessTicks = ticks(y0, y1).map((value) => markup`<path d="M${box.left} ${y(value)}h-5" stroke="#1a2229"/><text x="${box.left - 9}" y="${(Number(y(value)) + 4).toFixed(1)}" text-anchor="end">${plain(value)}</text>`);
  const everyLayers = Math.max(1, Math.ceil((y1 - y0) / layerNm / 14));
  const layerTicks = Array.from({ length: Math.floor(y1 / layerNm) + 1 }, (_, n) => n).filter((n) => n * layerNm >= y0 && n % everyLayers === 0)
    .map((n) => markup`<path d="M${right} ${y(n * layerNm)}h4" stroke="#5a6772"/><text class="dim" x="${right + 7}" y="${(Number(y(n * layerNm)) + 4).toFixed(1)}">${n}</text>`);
  const words = `At mass ${plain(taken.massRatio)}: ${[drawn.find(({ massRatio }) => massRatio === taken.massRatio)!].map(({ points }) => `${fixed(points[0]!.thicknessM * 1e9, 2)} nm at ${plain(points[0]!.heightEv)} eV to ${fixed(points[points.length - 1]!.thicknessM * 1e9, 2)} nm at ${plain(points[points.length - 1]!.heightEv)} eV`).join('')}; taken ${fixed(taken.thicknessM * 1e9, 2)} nm at ${plain(taken.heightEv)} eV.`;
  return markup`<svg class="scale" viewBox="0 0 ${box.width} ${box.height}" role="img" aria-label="Thickness against barrier height. ${words}">
<rect x="${x(markFrom)}" y="${box.top}" width="${(Number(x(markTo)) - Number(x(markFrom))).toFixed(1)}" height="${bottom - box.top}" fill="#f3f5f7"/>
${shades}${lines}${labels}
<path d="M${box.left} ${box.top}V${bottom}H${right}V${box.top}" fill="none" stroke="#1a2229"/>
${heightTicks}${thicknessTicks}${layerTicks}
<circle cx="${x(taken.heightEv)}" cy="${y(taken.thicknessM * 1e9)}" r="5" fill="#fff" stroke="#1a2229" stroke-width="2"/>
<text x="${((box.left + right) / 2).toFixed(1)}" y="${box.height - 6}" text-anchor="middle">barrier height, eV</text>
<text transform="translate(15 ${((box.top + bottom) / 2).toFixed(1)}) rotate(-90)" text-anchor="middle">thickness, nm</text>
<text class="dim" x="${right + 7}" y="${box.top - 5}">layers</text>
</svg>`;
}

/** The 95 % band of a curve, where both ends exist. */
function band({ by, points }: EqualCurve, x: (heightEv: number) => string, y: (nm: number) => string): Markup {
  const known = points.filter((point) => point.low95M !== undefined && point.high95M !== undefined);
  if (known.length < 2) return markup``;
  const upper = known.map((point) => `${x(point.heightEv)} ${y(point.high95M! * 1e9)}`);
  const lower = [...known].reverse().map((point) => `${x(point.heightEv)} ${y(point.low95M! * 1e9)}`);
  return markup`<path d="M${[...upper, ...lower].join('L')}Z" fill="${colours[by]}" fill-opacity="0.13"/>`;
}

/** Labels one under the other, at least a line apart. */
function spread<Label extends { readonly at: number }>(labels: readonly Label[]): (Label & { at: number })[] {
  let last = Number.NEGATIVE_INFINITY;
  return [...labels].sort((a, b) => a.at - b.at).map((label) => {
    last = Math.max(label.at, last + 14);
    return { ...label, at: last };
  });
}

function ticks(from: number, to: number): number[] {
  const step = niceBelow((to - from) / 4);
  const first = Math.ceil(from / step - 1e-9);
  return Array.from({ length: Math.floor(to / step + 1e-9) - first + 1 }, (_, k) => Number(((first + k) * step).toPrecision(6)));
}
