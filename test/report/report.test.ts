import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { Appraisal } from '../../src/evaluate/appraisal.ts';
import { maskMap } from '../../src/grid/maps.ts';
import { ledgerBar } from '../../src/report/ledger-figure.ts';
import { escaped, markup, named } from '../../src/report/markup.ts';
import { changedValues } from '../../src/report/report-origin.ts';
import { writeReport } from '../../src/report/report.ts';
import { leastWearDecades } from '../../src/ground/wear.ts';
import { createAppraisal, createBarrier, createCurrentGround, createFlaw, createFlaws, createHeightGround, createHeightOnlyAppraisal, createLedger, createRelativeAppraisal, createSample, grid } from '../fixtures/create-appraisal.ts';

const app = { name: 'Evenglow', version: '0.1.0' };
const report = (appraisal: Appraisal): string => writeReport(appraisal, app).replaceAll('\u00a0', ' ');

/** Text as a reader sees it: style and tags gone. */
const textOf = (html: string): string => html.replace(/<style>[\s\S]*?<\/style>/, '').replace(/<[^>]*>/g, ' ').replace(/\s+/g, ' ');

describe('markup', () => {
  it('escapes every value, also in attributes, and keeps what is markup', () => {
    assert.equal(markup`<i a="${'"x'}">${'<b>&\''}${markup`<u>${1}</u>`}${undefined}${['<', markup`<s>`]}</i>`.text, '<i a="&quot;x">&lt;b&gt;&amp;&#39;<u>1</u>&lt;<s></i>');
    assert.equal(escaped('a\u0000b\u001bc\td\ne'), 'a\ufffdb\ufffdc\td\ne');
    assert.equal(named('x<').text, '<bdi>x&lt;</bdi>');
  });
});

describe('ledger bar', () => {
  const rows = createLedger().rows.map(({ cause, areaM2, share, assessed }) => ({ cause, areaUm2: areaM2 * 1e12, share, assessed }));

  it('fills its width, usable first, the rest by area', () => {
    const svg = ledgerBar(rows, { width: 1000, height: 40, labels: true }).text;
    const segments = [...svg.matchAll(/<rect x="([\d.]+)" y="0" width="([\d.]+)"[^>]*fill="url\(#hatch-([a-z]+)\)"/g)].map(([, x, width, cause]) => ({ x: Number(x), width: Number(width), cause }));
    assert.equal(segments.length, 12);
    assert.equal(segments[0]?.cause, 'usable');
    const widths = segments.map(({ width }) => width);
    assert.deepEqual(widths.slice(1), widths.slice(1).sort((a, b) => b - a));
    assert.ok(Math.abs(widths.reduce((sum, width) => sum + width, 0) - 1000) < 0.1);
    segments.slice(1).forEach(({ x }, index) => assert.ok(Math.abs(x - (segments[index]?.x ?? 0) - (segments[index]?.width ?? 0)) < 0.02));
    assert.ok(svg.includes('>usable</tspan>') && !svg.includes('>open</tspan>'), 'only wide segments carry labels');
  });

  it('stands empty when nothing is booked', () => {
    const svg = ledgerBar(rows.map((row) => ({ ...row, areaUm2: 0, share: 0 })), { width: 100, height: 10, labels: true }).text;
    assert.ok(svg.includes('no area') && !svg.includes('url('));
  });
});

describe('report.html', () => {
  it('asks nothing of the outside: no script, no address but data:, a closed policy', () => {
    const html = report(createAppraisal());
    assert.ok(html.includes(`http-equiv="Content-Security-Policy" content="default-src &#39;none&#39;; img-src data:; style-src &#39;unsafe-inline&#39;"`));
    assert.doesNotMatch(html, /<script|<link|<iframe|<object|@import|javascript:/i);
    for (const [, address] of html.matchAll(/(?:src|href)="([^"]*)"/g)) assert.match(address ?? '', /^data:image\/png;base64,/);
    for (const [, address] of html.matchAll(/url\(([^)]*)\)/g)) assert.match(address ?? '', /^#hatch-/);
  });

  it('says verdict, interval, surface, bias, reference, ladder, device, flaws, warnings, cautions and sources', () => {
    const text = textOf(report(createAppraisal()));
    for (const words of [
      '2.0 of 5.6 µm² is even barrier, within a factor of 3 at 3.62 V (proposed).', '95 %: 1.70 – 2.20 µm²', 'largest patch 1.63 µm²',
      'it holds where the outlines of flaws and of other ground lie; ground whose current lies near the border', 'It does not hold another choice of the reference terrace.', 'tested in this order: short, bubble, residue', 'Bare barrier.', 'upper bound', '4 V',
      '12 (4.00 nm)', '0.980 ± 0.020 decades of current, measured on this map’s terraces; the model gives 0.780 decades',
      '1.00 nA/µm² on the reference before any voltage drop (95 %: 0.15 – 6.4 nA/µm²', '3.62 V, proposed',
      '1 short seen. Scan lines cross about 24 % of shorts that are points; for those met on one line only, about 3.2 more are expected', 'notes.txt is not a format Evenglow reads.',
      '1.2 V/nm', 'rules of your laboratory', '1.00 V/nm during the scan', 'a'.repeat(64), 'npx evenglow appraise scans --recipe recipe.json --out results', 'Evenglow 0.1.0',
    ]) assert.ok(text.includes(words), words);
  });

  it('names a loss of the tip only where it is told from the barrier, and a given bias as given', () => {
    const withWear = (wearDecades: number): string => textOf(report(createAppraisal({ ground: { height: createHeightGround(), current: createCurrentGround({ wearDecades }), warnings: [] } })));
    assert.ok(withWear(leastWearDecades).includes('the tip lost 0.20 decades of conductance'));
    for (const decades of [0.9 * leastWearDecades, -0.5]) {
      assert.ok(withWear(decades).includes('tip wear cannot be told from the barrier, none undone'));
      assert.ok(!withWear(decades).includes('the tip lost') && !withWear(decades).includes('gained'));
    }
    const barrier = createBarrier();
    const given = createAppraisal({ barrier: { ...barrier, device: { ...barrier.device!, biasV: 3.2517, proposed: false } } });
    assert.ok(textOf(report(given)).includes('3.2517 V, given'));
  });

  it('gives the whole device’s current where the sheet knows it', () => {
    const base = createAppraisal();
    const sheet = { relativeDensity: base.ledger.glow, totals: { deviceCurrentA: 4e-9, shortShareOfCurrent: 0.25 }, warnings: [] };
    assert.ok(textOf(report({ ...base, sheet })).includes('4.00 nA (95 %: 600 pA – 26 nA); 25 % of it through shorts, taken as ohmic. Pixels saturated in the scan, so this is a lower bound.'));
    assert.ok(!textOf(report(base)).includes('Whole device'));
  });

  it('shows four pictures with words, scale bars and colour scales', () => {
    const html = report(createAppraisal());
    const alts = [...html.matchAll(/<img [^>]*alt="([^"]*)"/g)].map(([, alt]) => alt);
    assert.deepEqual(alts.map((alt) => alt?.slice(0, 13)), ['Map of causes', 'Map of curren', 'Map of height', 'Map of glow, ']);
    assert.ok(alts[0]?.includes('3.00 by 2.00 µm') && alts[0].includes('usable 36 %'));
    assert.equal(html.match(/class="bar" style="width:33.33%">1 µm</g)?.length, 4);
    assert.equal(html.match(/class="scale"/g)?.length, 3);
    assert.ok(textOf(html).includes('100 pA') && textOf(html).includes('Light grey: no value (2.1 % of the map)'));
  });

  it('shows only what a sample without current has', () => {
    const html = report(createHeightOnlyAppraisal());
    assert.equal(html.match(/<img /g)?.length, 2);
    const text = textOf(html);
    assert.ok(text.includes('flaw-free') && text.includes('Shorts cannot be seen without a current map') && text.includes('not measured: shorts'));
    assert.ok(text.includes('no flaw seen in height') && text.includes('it holds where the outlines of flaws and of other ground lie. It does not hold'));
    assert.ok(!text.includes('Reference, ladder'));
    assert.ok(text.includes('1 wrinkle: ') && !text.includes('1 short,') && !text.includes('open spot,'), 'what height does not show is not counted');
    assert.doesNotMatch(text, /NaN|Infinity|undefined/);
  });

  it('names no ampere for a current in a unit of the file’s own', () => {
    const text = textOf(report(createRelativeAppraisal()));
    assert.ok(text.includes('not anchored') && text.includes('Device not assessed') && text.includes('in the file’s own unit'));
    assert.doesNotMatch(text, /\d [pnfµ]A\b|NaN|undefined/);
  });

  it('takes nothing from a file for a tag', () => {
    const evil = '<script>alert(1)</script>"\'&';
    const base = createAppraisal();
    const html = report({
      ...base,
      sample: createSample({
        name: evil, channels: base.sample.channels.map((channel) => ({ ...channel, source: evil })), sources: [{ name: evil, sha256: evil, bytes: 1 }],
      }),
      flaws: { ...createFlaws(), list: [createFlaw({ reason: evil })] },
      ledger: createLedger({ verdict: evil }),
      warnings: [{ code: 'file-unrecognised', message: evil }],
    });
    assert.ok(!html.includes('<script') && !html.includes(`"'&`));
    assert.equal(html.match(/&lt;script&gt;alert\(1\)&lt;\/script&gt;&quot;&#39;&amp;/g)?.length, 9);
  });

  it('lists the hundred largest flaws and says how many more there are', () => {
    const list = Array.from({ length: 103 }, (_, index) => createFlaw({ flaw: index + 1, areaM2: (index + 1) * 1e-14 }));
    const text = textOf(report(createAppraisal({ flaws: { ...createFlaws(), list } })));
    assert.ok(text.includes('The 100 largest; 3 more are in flaws.csv.'));
    assert.ok(text.includes('103 bubble 1.03') && text.includes(' 4 bubble 0.0400') && !text.includes(' 3 bubble 0.0300'));
  });

  it('highlights only the recipe values that are not the defaults', () => {
    const { recipe } = createAppraisal();
    assert.deepEqual(changedValues(recipe), [{ path: 'band.factor', value: '4', fallback: '3', title: 'Band factor' }]);
    const changed = { ...recipe, scan: { ...recipe.scan, widthUm: 10 }, plan: { ...recipe.plan, requiredUm2: 5 }, band: { ...recipe.band, factor: 3 } };
    assert.deepEqual(changedValues(changed).map(({ path, value, fallback }) => [path, value, fallback]), [
      ['scan.widthUm', '10 µm', 'taken from the file or its sidecar'], ['plan.requiredUm2', '5 µm²', 'no requirement is judged'],
    ]);
    assert.ok(report(createAppraisal({ recipe: { ...recipe, band: { ...recipe.band, factor: 3 } } })).includes('All values are the defaults.'));
  });

  it('gives the same bytes whatever the timings', () => {
    assert.equal(report(createAppraisal({ timings: { read: 99 } })), report(createAppraisal()));
  });

  it('survives a map on which nothing could be computed', () => {
    const base = createAppraisal();
    const blank = createSample({ footprint: maskMap(grid) });
    assert.ok(base.ground.current);
    const current = { ...base.ground.current, log10: { ...base.ground.current.log10, data: new Float32Array(48).fill(Number.NaN) } };
    const text = textOf(report({ ...base, sample: blank, ground: { ...base.ground, current: current as typeof base.ground.current } }));
    assert.ok(text.includes('No value could be computed.'));
  });
});
