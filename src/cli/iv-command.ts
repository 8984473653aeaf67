import { readFile } from 'node:fs/promises';
import { basename } from 'node:path';
import { analyseCurves } from '../iv/analyse-curves.ts';
import type { IvOptions } from '../iv/analyse-curves.ts';
import type { IvCurve } from '../iv/curve.ts';
import { readCurves } from '../iv/read-curves.ts';
import { Problem } from '../problems/problem.ts';
import type { Notice } from '../problems/problem.ts';
import type { Command } from './command.ts';
import { exitCodes, numberOption } from './command.ts';
import { ivInWords } from './iv-text.ts';

/** `evenglow iv`: current–voltage curves to barrier height or thickness, with errors and a temperature check. */
export const ivCommand: Command = {
  name: 'iv',
  summary: 'I–V curves: barrier height or thickness from the Fowler–Nordheim plot, onset, leakage, temperature check.',
  usage: ['evenglow iv <file.csv>… [--thickness-nm D] [--area-um2 A | --area-nm2 A] [--json]'],
  options: {
    'thickness-nm': { type: 'string' }, 'area-um2': { type: 'string' }, 'area-nm2': { type: 'string' },
    'height-ev': { type: 'string' }, mass: { type: 'string' }, json: { type: 'boolean' },
  },
  optionText: {
    '--thickness-nm D': 'known thickness of the barrier in nm: the height follows from the slope. Without it the thickness follows from the height.',
    '--area-um2 A': 'area that the current flows through in µm² (a device), compared with the one that the intercept implies',
    '--area-nm2 A': 'the same in nm² (a probe’s contact)',
    '--height-ev E': 'barrier height in eV for the thickness (2.5)',
    '--mass M': 'tunnelling mass over the electron mass (0.5)',
    '--json': 'print JSON',
  },
  notes: [
    'A file is a table under a header that names quantities and units, such as bias_V,current_nA. Several current columns are several curves; a column temperature_K parts them by temperature; a sweep may go up and down. Cells are parted by tab, semicolon or comma.',
    'All files of one call belong to one barrier. The line of ln(I/V²) over 1/V is the longest stretch from the highest bias down that shows no curvature beyond its noise, without points at the amplifier’s floor or limit. Errors are standard errors of the line alone; height, mass and thickness as given count as exact.',
    'Onset is the bias above which the current stays over five standard deviations of the amplifier’s noise.',
    'Caution: a sweep stresses the barrier. A field near 1.2 V/nm breaks hexagonal boron nitride down (Hattori et al., ACS Nano 9, 916, 2015). Raise a bias slowly, with a current limit, and follow local rules and trained staff.',
    'Exit code: 0 good, 2 command line wrong, 3 some files failed (the others are complete).',
  ],
  async run({ values, positionals }, output) {
    if (positionals.length === 0) throw new Problem('option-absent', { command: 'iv', option: 'one or more I–V files' });
    const options = optionsOf(values);
    // Options are checked before a file is touched.
    analyseCurves([], options);
    const curves: IvCurve[] = [];
    const remarks: Notice[] = [];
    const failed: { name: string; message: string }[] = [];
    for (const path of positionals) {
      try {
        const read = readCurves({ name: basename(path), bytes: await bytesOf(path) });
        curves.push(...read.curves);
        remarks.push(...read.warnings);
      } catch (error) {
        if (!(error instanceof Problem)) throw error;
        failed.push({ name: basename(path), message: error.message });
        output.err(`${error.message}\n`);
      }
    }
    const analysis = analyseCurves(curves, options);
    const result = { ...analysis, ...(failed.length === 0 ? {} : { failed }), warnings: [...remarks, ...analysis.warnings] };
    if (values['json'] === true) output.out(`${JSON.stringify(result, null, 2)}\n`);
    else if (curves.length > 0) {
      output.out(ivInWords(analysis, options));
      for (const { message } of result.warnings) output.err(`note: ${message}\n`);
    }
    return failed.length > 0 ? exitCodes.someFailed : exitCodes.good;
  },
};

function optionsOf(values: Record<string, unknown>): IvOptions {
  const areaUm2 = numberOption(values, 'area-um2');
  const statedNm2 = numberOption(values, 'area-nm2');
  if (areaUm2 !== undefined && statedNm2 !== undefined) throw new Problem('option-conflict', { command: 'iv', first: '--area-um2', second: '--area-nm2' });
  if (areaUm2 !== undefined && !(areaUm2 > 0 && areaUm2 <= 1e9)) throw new Problem('barrier-argument', { name: '--area-um2', value: String(areaUm2), reason: 'must be an area above 0 and up to 1e9 µm²' });
  const areaNm2 = areaUm2 === undefined ? statedNm2 : areaUm2 * 1e6;
  const thicknessNm = numberOption(values, 'thickness-nm');
  const heightEv = numberOption(values, 'height-ev');
  const massRatio = numberOption(values, 'mass');
  if (thicknessNm !== undefined && heightEv !== undefined) throw new Problem('option-conflict', { command: 'iv', first: '--thickness-nm', second: '--height-ev' });
  return {
    ...(thicknessNm === undefined ? {} : { thicknessNm }), ...(areaNm2 === undefined ? {} : { areaNm2 }),
    ...(heightEv === undefined ? {} : { heightEv }), ...(massRatio === undefined ? {} : { massRatio }),
  };
}

async function bytesOf(path: string): Promise<Uint8Array> {
  try {
    return new Uint8Array(await readFile(path));
  } catch (error) {
    const code = error instanceof Error && 'code' in error ? error.code : undefined;
    if (code === 'ENOENT') throw new Problem('input-absent', { path });
    throw new Problem('input-unreadable', { path, reason: error instanceof Error ? error.message : String(error) });
  }
}
