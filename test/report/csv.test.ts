import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { writeCsv } from '../../src/report/csv.ts';
import { writeFlawsCsv, writeLedgerCsv } from '../../src/report/tables.ts';
import { createFlaws, createLedger } from '../fixtures/create-appraisal.ts';

/** One column's text as written, header left out. */
const cell = (value: string | number | boolean | undefined): string => writeCsv(['h'], [[value]]).slice(2, -1);

describe('CSV writer', () => {
  it('quotes commas, quotes and line breaks (RFC 4180)', () => {
    assert.equal(cell('a,b'), '"a,b"');
    assert.equal(cell('say "no"'), '"say ""no"""');
    assert.equal(cell('two\nlines'), '"two\nlines"');
    assert.equal(cell('plain'), 'plain');
  });

  it('disarms text that a spreadsheet would run, and leaves numbers alone', () => {
    assert.equal(cell('=HYPERLINK("x")'), '"\'=HYPERLINK(""x"")"');
    for (const start of ['+1', '-1', '@sum', ' =1', '＝1']) assert.equal(cell(start), `'${start}`);
    assert.equal(cell('\tx'), "'\tx");
    assert.equal(cell('\rx'), '"\'\rx"');
    assert.equal(cell(-1.5), '-1.5');
    assert.equal(cell('a-b'), 'a-b');
  });

  it('leaves missing numbers empty and writes minus zero as zero', () => {
    for (const value of [Number.NaN, Infinity, -Infinity, undefined]) assert.equal(cell(value), '');
    assert.equal(cell(-0), '0');
    assert.equal(cell(1e-13), '1e-13');
    assert.equal(cell(true), 'true');
  });

  it('refuses a row of the wrong length', () => {
    assert.throws(() => writeCsv(['a', 'b'], [[1]]), RangeError);
  });
});

describe('result tables', () => {
  it('books the ledger in µm² under the frozen header', () => {
    const lines = writeLedgerCsv(createLedger()).split('\n');
    assert.equal(lines[0], 'code,cause,area_um2,pixels,share');
    assert.equal(lines[1], '1,usable,2,16,0.355555555556');
    assert.equal(lines[12], '12,stray,0.25,2,0.0444444444444');
    assert.equal(lines.length, 14);
    assert.equal(lines[13], '');
  });

  it('lists flaws in µm and nm under the frozen header, sorted by number', () => {
    const flaws = createFlaws();
    const lines = writeFlawsCsv({ ...flaws, list: [...flaws.list].reverse() }).split('\n');
    assert.equal(lines[0], 'flaw,cause,confidence,reason,x_um,y_um,area_um2,boundary_um,diameter_um,long_um,short_um,angle_deg,peak_nm,mean_nm,volume_um2nm,height_to_radius,log10_current,touches_edge');
    // 20 nm peak; 6e-21 m³ are 6 µm²·nm.
    assert.equal(lines[1], '1,bubble,0.94,"smooth dome, no current inside",2.5,1.5,0.5,3,0.798,1,0.5,-30,20,12,6,0.05,-13,true');
    assert.equal(lines[2], '2,residue,0.7,"tall, rough, ""particle""",0.4,0.2,0.375,3,0.798,1,0.5,-30,20,12,6,0.05,-13,true');
    assert.equal(lines[4], '4,short,0.94,saturated,2.25,1.125,0.125,3,0.798,1,0.5,-30,,,,,-8,true');
    assert.ok(lines[5]?.includes(`"'=at the floor, nothing in height"`));
  });
});
