import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { Texture } from '../../src/ground/measure-texture.ts';
import { writeReport } from '../../src/report/report.ts';
import { verdictOf, writeVerdict } from '../../src/report/verdict.ts';
import { createAppraisal } from '../fixtures/create-appraisal.ts';

const app = { name: 'Evenglow', version: '0.1.0' };

const texture: Texture = {
  pixels: 30, gradientPixels: 12, sqM: 0.3e-9, saM: 0.24e-9, ssk: -0.2, sku: 3.1, spM: 1e-9, svM: 0.8e-9, szM: 1.8e-9, sdq: 0.0125, sdr: 7.8e-5,
  levelling: { correlationM: 200e-9, shape: 'gaussian', roughnessM: 0.25e-9, lineShare: 0.035, formShare: 0.0036, removedM2: 0.07e-18, sqInsideTerracesM: 0.26e-9 },
};

const reportText = (change: Partial<Texture>): string =>
  writeReport(createAppraisal({ texture: { ...texture, ...change } }), app).replaceAll('\u00a0', ' ').replace(/<[^>]*>/g, '').replace(/\s+/g, ' ');

describe('texture in verdict.json', () => {
  it('gives the parameters in the units of their names, Sq raw and corrected, and by which share it is too low', () => {
    assert.deepEqual(verdictOf(createAppraisal({ texture }), app).texture, {
      pixels: 30, gradientPixels: 12, sqNm: 0.3, saNm: 0.24, ssk: -0.2, sku: 3.1, spNm: 1, svNm: 0.8, szNm: 1.8, sdq: 0.0125, sdr: 7.8e-5,
      // √(0.3² + 0.07) = 0.4.
      sqCorrectedNm: 0.4, levellingBiasShare: 0.25, correlationNm: 200, correlationShape: 'gaussian', roughnessNm: 0.25,
      lineVarianceShare: 0.035, formVarianceShare: 0.0036, sqInsideTerracesNm: 0.26,
    });
  });

  it('says why there is no estimate and has no number that is not known', () => {
    const found = verdictOf(createAppraisal({ texture: { ...texture, levelling: 'too-wide', gradientPixels: 0, sdq: Number.NaN, sdr: Number.NaN } }), app).texture;
    assert.deepEqual(Object.keys(found ?? {}), ['pixels', 'gradientPixels', 'sqNm', 'saNm', 'ssk', 'sku', 'spNm', 'svNm', 'szNm', 'noEstimate']);
    assert.equal(found?.noEstimate, 'too-wide');
    assert.ok(!('texture' in verdictOf(createAppraisal(), app)), 'no section without a texture');
    assert.doesNotMatch(writeVerdict(createAppraisal({ texture: { ...texture, levelling: 'no-correlation' } }), app), /NaN|null/);
  });
});

describe('texture in the report', () => {
  it('gives raw and corrected Sq, the correlation length and the source of the estimate', () => {
    const text = reportText({});
    for (const words of [
      'Sq 0.300 nm (0.260 nm inside terraces), Sa 0.240 nm, Sz 1.80 nm, Ssk −0.200, Sku 3.10, Sdq 0.0125 (ISO 25178-2', 'Sq is too low by about 25 %; corrected 0.400 nm',
      'correlation length, 200 nm inside terraces', '3.5 % went with line offsets and 0.4 % with the form (Nečas, Klapetek &amp; Valtr, arXiv:2001.00433, 2020)', 'structure as wide as the map is not in it',
    ]) assert.ok(text.includes(words), words);
    assert.ok(!text.includes('carry much of Sq'));
  });

  it('says what is not known, and when a few pixels decide', () => {
    assert.ok(reportText({ levelling: 'too-wide' }).includes('levelling took is not known: height changes over so large a part'));
    assert.ok(reportText({ levelling: 'little-ground' }).includes('not known: there is too little ground'));
    const noise = reportText({ levelling: 'no-correlation' });
    assert.ok(noise.includes('so this is noise') && !noise.includes('not known:'));
    assert.ok(reportText({ sku: 40 }).includes('A few pixels far from the rest, such as flaws that were not found, carry much of Sq.'));
    assert.ok(!writeReport(createAppraisal(), app).includes('<dt>Texture</dt>'));
  });
});
