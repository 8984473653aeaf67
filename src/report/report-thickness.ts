/** The report's part on thickness: what anchors it, terraces by maps at several biases, and what cannot be told apart. */
import { degeneracyOf } from '../barrier/degeneracy-of-map.ts';
import type { Appraised } from './appraised.ts';
import { degeneracyFigure } from './degeneracy-figure.ts';
import { markup } from './markup.ts';
import type { Markup } from './markup.ts';
import { figure, fixed, percent, plain } from './numbers.ts';
import type { Verdict } from './verdict.ts';

/** Nothing where no thickness is known. */
export function thicknessPart({ recipe, ground, barrier }: Appraised, { thickness }: Verdict): Markup | undefined {
  if (barrier === undefined || thickness === undefined) return undefined;
  const anchors = thickness.anchors.map(({ taken, sentence }) => markup`<li>${taken ? markup`<b>Taken.</b> ` : ''}${sentence}</li>`);
  const degeneracy = degeneracyOf(barrier, recipe.barrier, ground.current?.biasV);
  const picture = degeneracy && degeneracyFigure(degeneracy, recipe.barrier.layerNm);
  const drawn = picture && markup`<figure>${picture}<figcaption><b>Height and thickness cannot be told apart by a current.</b> Every point of a line fits this map equally well${thickness.biases ? '; blue: the same ratio of currents at two biases, free of the contact’s area' : ''}; brown: the same current through the stated contact. Shaded: 95 % from ${thickness.biases ? 'the contact’s change between the scans' : 'the contact’s area'}. Grey: heights published of hBN, 1.5–3.1 eV (masses 0.26–0.5). Circle: what layers and densities were computed with.</figcaption></figure>`;
  return markup`<section><h2>Thickness</h2>${anchors.length > 0 ? markup`<ul>${anchors}</ul>` : ''}${thickness.biases && biasTable(thickness.biases)}${drawn}</section>`;
}

function biasTable({ biasesV, lowV, highV, terraces }: NonNullable<NonNullable<Verdict['thickness']>['biases']>): Markup {
  const rows = terraces.map((terrace) => markup`<tr><td>${terrace.step === 0 ? 'reference' : plain(terrace.step)}</td><td class="n">${fixed(terrace.thicknessNm, 3)} ± ${figure(terrace.seNm, 2)}</td><td class="n">${fixed(terrace.layers, 2)}</td><td class="n">${fixed(terrace.lnRatio, 3)} ± ${figure(terrace.lnRatioSe, 2)}</td><td class="n">${terrace.steepnessEv15Nm === undefined ? '–' : `${fixed(terrace.steepnessEv15Nm, 3)} ± ${figure(terrace.steepnessSeEv15Nm, 2)}`}</td><td class="n">${percent(terrace.usedShare)}</td><td class="n">${figure(terrace.pixelSeNm, 2)}</td></tr>`);
  return markup`<h3>By maps at ${biasesV.map((biasV) => `${plain(biasV)}\u00a0V`).join(', ')}</h3>
<table><thead><tr><th>terrace</th><th class="n">thickness, nm</th><th class="n">layers</th><th class="n">ln I(${plain(highV)}\u00a0V)/I(${plain(lowV)}\u00a0V)</th><th class="n">√m·φ^1.5·d, eV^1.5 nm</th><th class="n">pixels used</th><th class="n">noise a pixel, nm</th></tr></thead><tbody>${rows}</tbody></table>
<p class="note">Thickness at the stated barrier height and mass, with the standard error of the terrace’s median; √m·φ^1.5·d by Fowler–Nordheim’s formula needs neither. Pixels that are saturated, near the floor, repaired or beside an edge in one of the maps take no part.</p>`;
}
