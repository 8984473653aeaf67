/** Method page: how the height is levelled. */
import { html } from 'lit';
import type { Topic } from './topic.ts';

/** Which products of powers each order adds to the form. */
const termRows: readonly (readonly [order: string, terms: string, count: string])[] = [
  ['0', '1', '1'], ['1', 'x, y', '3'], ['2', 'x², xy, y²', '6'], ['3', 'x³, x²y, xy², y³', '10'], ['4', 'x⁴, x³y, x²y², xy³, y⁴', '15'], ['5', 'x⁵, x⁴y, x³y², x²y³, xy⁴, y⁵', '21'],
];

export const heightTopics: readonly Topic[] = [
  {
    id: 'form', title: 'Form: tilt, bow and higher orders', settings: ['ground.order'],
    what: html`
      <p>The sample is never quite parallel to the scanner, and the scanner bends its own plane. A polynomial of the place takes both out of the height; never out of the current, where only an offset and a factor have a meaning. Order n has all products x<sup>i</sup>y<sup>j</sup> with i + j ≤ n:</p>
      <table><thead><tr><th scope="col">order</th><th scope="col">adds</th><th scope="col">terms in all</th></tr></thead><tbody>${termRows.map(([order, terms, count]) => html`<tr><td>${order}</td><td>${terms}</td><td>${count}</td></tr>`)}</tbody></table>
      <p>It is computed in products of Legendre polynomials, which span the same surfaces and keep the sums well conditioned. Only ground counts. At first everything does; then what lies more than three widths above the most common remainder, or four below it, is dropped and the form fitted again, until nothing changes. The width is that of the scatter <em>below</em> the most common value, because bubbles and residue only ever stand above.</p>`,
    formulas: ['z(x, y) = Σ aᵢⱼ Pᵢ(u) Pⱼ(v), i + j ≤ n, u and v from −1 to 1 over the map'],
    sources: ['Legendre polynomials by Bonnet’s recursion; least squares by Cholesky factorisation (Golub & Van Loan, Matrix Computations, 4th ed., algorithm 4.3.5).'],
    limits: 'Where flaws or several terraces cover most of the map, the most common remainder need not be ground: pick the ground by hand then. A high order follows real structure as wide as the map; take the lowest that leaves the ground even.',
  },
  {
    id: 'by-hand', title: 'Ground picked by hand', settings: ['ground.order'],
    what: html`
      <p>Three or more spots replace the automatic ground. The height of a spot is the median within five pixels around it, each pixel taken together with its opposite, so that a slope does not move it and a spike neither; the lines’ offsets are taken out before. The form is the least-squares polynomial through these heights.</p>
      <p>The order is lowered to what the spots support: one spot a term at least (3 for a tilt, 6 for order 2, then 10, 15, 21), and no term that the spots’ places leave open, as a tilt across spots on one line. A remark says so. Line offsets and terraces are found as always, and zero stays at the most common height.</p>`,
    formulas: ['minimise Σₖ (median height at spot k − z(xₖ, yₖ))²'],
    limits: 'The form is only as good as the spots: outside the polygon that they span it is extrapolated, and spots on two terraces tilt the map by the step between them. Spread them over one terrace.',
  },
  {
    id: 'lines', title: 'Line offsets, by planes', settings: ['ground.lines'],
    what: html`
      <p>Between two lines the tip’s zero drifts, so each line has an offset of its own. The median of a whole line would follow terraces; so would its mean. The first offsets therefore come from medians of differences between lines 1, 2, 4, 8 and 16 apart on undisturbed ground, reconciled by weighted least squares: a terrace’s edge crosses few columns between two near lines and does not move their median.</p>
      <p>Once the terraces are known as parallel planes (see there), form, planes and offsets are found together: over the ground the height is form + line offset + plane. The offsets are eliminated first (each line counts by its deviations from its own mean), so that planes and form come out the same whatever the offsets are; each line’s offset is then the median of its ground over form and planes. Three rounds. Mean and linear trend of the offsets belong to the form.</p>`,
    formulas: ['height(line r, column c) = form + offsetᵣ + plane(r, c) + ground', 'first: minimise Σ wᵣₛ (offsetᵣ − offsetₛ − median difference)², w = pixels ÷ distance'],
    limits: 'Lines with fewer than 24 pixels of ground take the offset of the lines beside them. A real step that lies along the lines over their whole width cannot be told from an offset unless the current shows it.',
  },
  {
    id: 'planes', title: 'Terraces as parallel planes', settings: ['barrier.layerNm'],
    what: html`
      <p>Steps of whole layers are no roughness. Where the current tells the layer (see its ladder), the height of the terrace is that many layers; the height of one step is measured at the borders, from pairs of places a few pixels apart on one line, and rounded to whole layers where it comes near to them.</p>
      <p>Where the current does not tell, because it is at the floor, saturated, or not measured, connected stretches of flat ground get one unknown level each, linked by the steps at their common borders. Small patches at no whole step that may be films help to level but are no terraces.</p>`,
    formulas: ['plane = (rung of the ladder) × (height of one step)'],
    limits: 'A terrace narrower than about ten pixels gets no plane; on maps of 640 columns and more, where every second to fourth column is taken, one that lies across the lines and is narrower than about thirty columns. Whole layers are assumed within a third of a layer; a stack of two materials with other spacings keeps its measured steps.',
  },
  {
    id: 'repair', title: 'Repair of broken runs, spikes and single missing points', settings: ['ground.repair'],
    what: html`
      <p>A broken run is a stretch of one to three lines where the probe lost contact: long along the line (eight pixels or more), sharp across it. A pixel belongs to one when it stands off its reference by more than six times the noise and more than four times the reference’s own disagreement; the reference are the two middle ones of the pixels up to two lines before and after (of six up to three lines, where these do not settle it), so that a broken line beside it does not hide it. On a ridge or a slope those disagree and nothing is marked; a run goes on over such places as long as the line itself does.</p>
      <p>A spike is a single pixel that stands off all eight neighbours by twelve times the noise, while they agree within eight. A pit up to 6 nm deep is left alone: it may be a pinhole. Both are filled linearly from the nearest good pixels above and below (at most four lines apart), else from left and right; between lines that disagree a broken pixel takes the nearer one’s value. Where height is all there is, a missing point stays missing.</p>`,
    limits: 'Repaired pixels are counted and can be marked on the map. They are booked by their repaired value, never by what was broken. Bounds in noise are this program’s judgement.',
  },
  {
    id: 'noise', title: 'Noise of height and current',
    what: html`<p>The noise of a map is the robust standard deviation of differences between neighbours along a line on flat ground: the median of their amount, scaled as for a normal distribution. Slopes and features add little, since a median ignores the steep few. The current’s noise is read where no current flows; the noise of the log current, by which the current drop is judged, where it is above the floor and not saturated.</p>`,
    formulas: ['σ = 1.4826 × median |z(c+1) − z(c)| ÷ √2'],
    limits: 'A filter in the microscope makes neighbours alike and the noise too small.',
  },
  {
    id: 'texture', title: 'Roughness, and what levelling took of it',
    what: html`<p>Sq is the rms height of the flawless measured ground (ISO 25178-2), repaired pixels left out. Taking a level from every line and a form from the map takes part of the roughness too, the more the longer its correlation length T is against the line’s length L. The share follows from projecting the autocorrelation onto what was subtracted. T and the roughness are fitted together with that share to the autocorrelation of the levelled ground, and Sq is given with it added back.</p>`,
    formulas: ['share taken by a line’s mean, Gaussian correlation exp(−d²/T²): (1/L²) ∬ ρ(x − x′) dx dx′', 'Sq corrected = √(Sq² + variance taken)'],
    sources: ['D. Nečas, P. Klapetek, M. Valtr, arXiv:2001.00433 (2020).', 'ISO 25178-2.'],
    limits: 'Roughness is taken to be normal and the same everywhere. Structure as wide as the map is gone with the form and leaves no trace; from a share of a fifth on the estimate is a lower bound.',
  },
];
