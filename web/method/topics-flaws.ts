/** Method page: how flaws are found, parted, measured and named. */
import { html } from 'lit';
import type { Topic } from './topic.ts';

export const flawTopics: readonly Topic[] = [
  {
    id: 'thresholds', title: 'Detection in height and current', settings: ['flaws.heightNm', 'flaws.heightNoise', 'flaws.dropDecades', 'flaws.edgeShare', 'flaws.minPixels'],
    what: html`
      <p>A flaw starts where the surface, as a mean over nine pixels so that no single noisy one starts it, rises over its surroundings by more than the larger of two limits: a height in nm, and a multiple of this map’s own noise. It extends to where the rise falls to the edge share of that (two thresholds, hysteresis). The rise is taken over the plane of the terrace and then over the local ground, a window mean with flaws left out.</p>
      <p>Its outline then follows the current where that can be judged: within three pixels of the raised part a pixel is flawed if its current lies the stated drop below that of the nearest undisturbed ground, and is not if its current is in order. A bump that conducts like the ground is noted, not booked. Beside ground at the floor or saturated the height alone decides. While a handle is held, a quick look at every n-th pixel of the map shows where it would lead; letting go computes the result.</p>
      <p>A <em>decade</em> is a factor of ten of the current. One layer of barrier costs what the map’s own ladder shows; the knob says how many layers the drop is, and how many times the noise of the log current.</p>`,
    formulas: ['start: rise ≥ max(height in nm, multiple × noise)', 'edge: rise ≥ edge share × start', 'lost: log₁₀ I(ground) − log₁₀ I ≥ drop'],
    sources: ['J. Canny, IEEE Trans. PAMI 8, 679 (1986), for hysteresis.', 'F. C. Crow, SIGGRAPH (1984), for the summed-area tables of the local ground.'],
    limits: 'Below the start nothing is found, however large. A multiple of the noise below about four finds noise.',
  },
  {
    id: 'steps', title: 'Steps that are no flaws', settings: ['barrier.layerNm', 'flaws.shortLayers'],
    what: html`
      <p>Not every rise is dirt. Three rules keep steps apart:</p>
      <ul>
        <li>A step of whole layers of the <em>injector</em> changes the height and leaves the current as it is: usable ground.</li>
        <li>A step of the <em>barrier</em> changes the height by whole layers and the current by as many rungs of the ladder: more or less barrier, booked as thick or thin.</li>
        <li>A rise with a fall of the current that fits neither is a <em>film</em>: residue.</li>
      </ul>
      <p>Terraces enter as planes, so that a step is no rise; strips too narrow for a plane are recognised by a mean rise of one or two layers together with a current that has fallen by as many, or is censored where it would have. A small island (below 0.6 µm²) two layers or more above all ground beside it counts as barrier only where its median height lies within 0.12 nm and two standard errors of what its current says; otherwise it is a film.</p>`,
    formulas: ['barrier: Δh = m × layer and Δlog₁₀ I = −m × step of the ladder', 'injector: Δh = m × layer and Δlog₁₀ I = 0'],
    limits: 'A film that is as high as a layer and costs as much current as one cannot be told from a layer.',
  },
  {
    id: 'spots-of-current', title: 'Shorts and opens', settings: ['flaws.shortLayers', 'band.shortMaxUm2', 'band.terraceMinUm2'],
    what: html`
      <p>A <em>short</em> is a patch of one pixel up to the stated area. Its current lies the stated number of layers’ worth above its surroundings, or saturates, or it is a pit through the barrier that conducts. Surroundings are the current with every bright patch narrower than the largest short removed.</p>
      <p>Four bright patches are no shorts:</p>
      <ul>
        <li>A saturated one near a larger saturated terrace, unless it shows a pit: saturation hides by how much it stands out.</li>
        <li>One that raised flaws shut in, unless it shows a pit: they may cut it off from ground like itself.</li>
        <li>One whose border is partly like itself: the corner of a thinner terrace.</li>
        <li>One that saturates less than two layers’ worth above its border: a thinner terrace explains that, too.</li>
      </ul>
      <p>An <em>open</em> is a patch at the floor, smaller than a terrace, that nothing in the height explains and whose surroundings carry clearly more. The ragged edge of a terrace at the floor is none. Nor is a stretch of line that had lost contact.</p>`,
    formulas: ['short: log₁₀ I − opening(log₁₀ I) ≥ layers × decades per layer'],
    sources: ['Grey-scale opening: J. Serra, Image Analysis and Mathematical Morphology (1982).'],
    limits: 'Scan lines cross only part of all point shorts; how many more to expect is said in the chapter’s first line.',
  },
  {
    id: 'ridges', title: 'Folds, by their crests',
    what: html`<p>For eight directions over a half-turn the distances are taken at which the height has fallen to half of a pixel’s own. The direction with the smallest sum runs across, the one with the largest along. A crest keeps half its height for at least two and a half times its width, does not rise steeply along its length (the foot of a dome would), and is narrower than a quarter of a micrometre. Touching bubbles in a row have no crest, because between them the height falls. What lies on both sides of a fold goes on under it.</p>`,
    formulas: ['crest: (length at half height) ÷ (width at half height) ≥ 2.5'],
    limits: 'A fold shorter than two and a half of its own widths is no ridge. Bounds are this program’s judgement, checked on scenes of known truth.',
  },
  {
    id: 'parting', title: 'Parting what touches',
    what: html`
      <p>Raised ground is parted in four steps: round domes by their circles; folds by their crests; the rest by its peaks; and then what leans on something higher without a peak of its own.</p>
      <p>Domes: circles that the outline follows over more than half of their directions, or on which the slope breaks as it does at the rim of a dome that stands on something else, and inside which, towards the free directions, the height is a paraboloid rather than a block or a cone. So a dome stays whole where a fold or a film runs into it, and where the map cuts it. Peaks: pixels in order of height join the highest neighbouring part or start one (a watershed). Where two parts meet they become one unless the saddle lies below 0.8 of the lower peak and five standard deviations of the noise below it. Leaning: beyond the foot that a shape with this outline at half height would have, what remains is another thing if it is wide enough: a film beside a bubble.</p>`,
    formulas: ['dome h(1 − ρ²), block h(1 − ρ⁴), cone h(1 − ρ): least squares for each', 'two things: saddle < 0.8 × lower peak', 'foot of a paraboloid: √2 × its radius at half height'],
    sources: ['L. Vincent & P. Soille, IEEE Trans. PAMI 13, 583 (1991).'],
    limits: 'Two domes that overlap so far that no saddle is left stay one. Parts and seams can be corrected by hand: split and merge.',
  },
  {
    id: 'measures', title: 'What is measured of a flaw',
    what: html`<p>Area is pixels times pixel area; the diameter is that of a circle of this area; peak, mean and volume are over the local ground. <em>h/R</em> is the peak height over that circle’s radius: how steep a dome is. <em>Fullness</em> is 0.95 times the mean height divided by the 95 % quantile of the height, which stands in for the peak because noise hardly raises it: 0.41 for a cone (whose mean is a third of its peak), 0.48 to 0.5 for a paraboloid (a pressurised membrane is close to one), near 1 for a plateau. The outline’s length is counted from pixel edges by the rule of Cauchy and Crofton.</p>`,
    formulas: ['R = √(area ÷ π)', 'fullness = 0.95 × mean height ÷ 95 % quantile of the height', 'outline ≈ π/4 × length of pixel edges', 'roundness = 4π area ÷ outline²'],
    limits: 'The probe’s own width is not taken off: small flaws look wider and pits shallower than they are.',
  },
  {
    id: 'classes', title: 'Classes, and how sure they are',
    what: html`
      <p>In this order. <strong>Wrinkle</strong>: a crest, or an outline long and thin against its own size. <strong>Bubble</strong>: a round dome found by its circle. <strong>Residue, a film</strong>: a patch that lowers the current and does not block it; what is trapped in a bubble blocks. <strong>Bubble</strong>, too: any other smooth dome; three looks are weighed, how full the shape is (1/2 for a paraboloid), how wide its top, and how much of the height a round paraboloid explains. <strong>Residue, a particle</strong>: the rest, uneven, pointed or flat-topped.</p>
      <p>Confidence runs from 0.5 (could as well be the other class) to 1. It grows with the distance from the border between the two classes, in units of how far apart typical ones lie. Below 0.65 a flaw counts as ambiguous and the list says between what: bubble or residue, wrinkle or bubble. The reason says in words what was seen. Whatever is wrong can be set by hand.</p>`,
    formulas: ['bubble against residue: fullness 0.64 half-way between dome and patch; 0.45 half-way between cone and dome'],
    sources: ['Height over radius is evidence and no rule, because skins of several layers do not keep it (Nat. Commun. 13, 2022, s41467-022-32708-z).'],
    limits: 'Below twelve pixels noise hides the shape. Confidence is a margin and not a probability; where no height is known it is 0.5.',
  },
];
