/** Method page: how the current is conditioned. */
import { html } from 'lit';
import type { Topic } from './topic.ts';

export const currentTopics: readonly Topic[] = [
  {
    id: 'zero', title: 'Current: offset, floor, saturation', settings: ['ground.offsetA', 'scan.floorA'],
    what: html`
      <p>What the amplifier reads without current is, in this order: as given; the densest reading under tall features, which block; the same on insulating ground off the sample; the densest readings of all, if they are as uncorrelated from line to line as amplifier noise; else zero is assumed and said.</p>
      <p>The floor is the current below which nothing can be told from noise: three standard deviations (one reading in 700 of pure noise lies above), or two steps of a coarsely digitised current, whichever is more. The amplifier saturates where far more pixels sit at the largest value than a smooth distribution puts there. Pixels at the floor are at most, saturated ones at least what they show; neither enters a mean or a fit.</p>`,
    formulas: ['floor = max(3 σ, 2 steps)', 'rounding to steps: σ ≥ step ÷ √12'],
    sources: ['B. Widrow, IRE Trans. Circuit Theory 3, 266 (1956).', 'P. J. Huber, Robust Statistics (1981), for the errors of median and scatter.'],
    limits: 'A map that shows no spot without current has no measured offset. A feature that conducts is no reference and is recognised only when much of the map would lie below its reading.',
  },
  {
    id: 'wear', title: 'Wear of the tip', settings: ['ground.wear'],
    what: html`
      <p>A tip that loses its coating loses conductance slowly, from the first line to the last: a factor on the current, a straight line in its logarithm. It is sought as a trend down the map inside patches of one terrace, each with a level of its own, so that terraces do not feign it; the barrier’s own slow variation is taken as correlated in space, and its length is the likeliest one.</p>
      <p>A loss is undone as a factor a line only when it is large enough, at least twice its standard error, and the same on the return scan where there is one: both directions measure a line through the same tip at nearly the same time. A gain is never put down to the tip. A <em>decade</em> is a factor of ten: 0.3 decades are a factor of two.</p>`,
    formulas: ['log₁₀ I(line) = level of patch − wear × (line ÷ lines) + correlated variation', 'fit: generalised least squares, correlation exp(−d²/ℓ²) between blocks'],
    limits: 'Real variation of the barrier along the slow axis that is smooth over the whole map looks the same. It is then said and not undone; a second scan with the slow axis turned round would tell.',
  },
  {
    id: 'lag', title: 'Lag of the amplifier', settings: ['ground.lag', 'ground.lagPx'],
    what: html`<p>A slow amplifier keeps a share k of the reading before: edges are smeared and shifted along the line. Behind every sudden fall the readings then form a tail in which each is the same share of the one before. Three things tell an amplifier from a blunt edge: the share is the same in all tails, they run one way along the lines, and nothing falls faster. Shift and smear are undone by the exact inverse where the change is above the noise; what was taken off hides small currents, so the floor is raised there. Behind saturated spots the current is only bounded.</p>`,
    formulas: ['read: I′ₙ = k I′ₙ₋₁ + (1 − k) Iₙ, k = exp(−1 ÷ time constant in pixels)', 'undone: Iₙ = (I′ₙ − k I′ₙ₋₁) ÷ (1 − k)'],
    sources: ['T. Robertson & J. D. Cryer, J. Am. Stat. Assoc. 69, 1012 (1974), for the half-sample mode of the shares.'],
    limits: 'Exact for one pole only. Time constants below 0.4 pixels do no harm and above 8 leave too little to restore; neither is sought. Noise grows by the inverse.',
  },
  {
    id: 'alignment', title: 'Alignment of current to height and return to forward', settings: ['ground.align'],
    what: html`<p>Flaws that stand up block the current, so their outlines are in both maps. The shift at which one looks like the other is found in whole pixels by the best normalised correlation and then to a part of a pixel by least squares with the gradient of the reference. It is undone, by whole pixels, when it is at least half a pixel and more than three standard errors; a current between two pixels of which one carries none is not their mean. The same compares the return scan with the forward scan, which is told and not mixed in.</p>`,
    formulas: ['minimise Σ (moved(x + d) − a · reference(x) − b)² over d, a, b'],
    sources: [
      'B. D. Lucas & T. Kanade, Proc. IJCAI, 674 (1981); S. Baker & I. Matthews, Int. J. Comput. Vis. 56, 221 (2004).', 'K.-Y. Liang & S. L. Zeger, Biometrika 73, 13 (1986), for standard errors of clustered residuals.',
    ],
    limits: 'Without enough flaws in common the maps do not tell. A shift that changes over the map (drift, creep) is taken as one.',
  },
];
