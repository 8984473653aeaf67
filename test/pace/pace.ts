/**
 * `npm run pace`: how long an appraisal takes, part by part and end to end. `npm run pace -- --quick` does 512² only,
 * `npm run pace -- --page` the app in a Chromium instead.
 *
 * Absolute times lie: they differ between machines and with what else runs. The last column divides by a fixed loop over as
 * many pixels, timed in the same run; compare that, and the minimum rather than the median.
 */
import { mkdtemp, rm } from 'node:fs/promises';
import { cpus, loadavg, tmpdir } from 'node:os';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { loadKernels } from '../../src/cli/load-kernels.ts';
import { appraisalPace } from './appraisal-pace.ts';
import type { AppraisalPace } from './appraisal-pace.ts';
import { commandPace } from './command-pace.ts';
import { kernelPace, leastGain } from './kernel-pace.ts';
import type { KernelPace } from './kernel-pace.ts';
import { pagePace } from './page-pace.ts';
import { previewPace } from './preview-pace.ts';
import { paintedFiles } from './scans.ts';
import { aligned, shownMs } from './times.ts';
import type { Times } from './times.ts';

/** Larger maps are repeated less often; their times scatter less. */
const sizes = [{ side: 512, repeats: 7 }, { side: 1024, repeats: 5 }, { side: 2048, repeats: 3 }] as const;
const commandRepeats = 3;
const kernelRepeats = 15;
const pageRepeats = 3;
const header = ['', 'min ms', 'median ms', '× reference'] as const;

const { values } = parseArgs({ options: { quick: { type: 'boolean', default: false }, page: { type: 'boolean', default: false } } });
const chosen = values.quick ? sizes.slice(0, 1) : sizes;
const commandSide = values.quick ? 512 : 1024;

const directory = await mkdtemp(join(tmpdir(), 'evenglow-pace-'));
try {
  const processors = cpus();
  print(`Node ${process.versions.node}, ${process.platform} ${process.arch}, ${processors.length} × ${processors[0]?.model.trim() || 'unnamed processor'}`);
  if (values.page) await printPage(commandSide);
  else await printChain();
} finally {
  await rm(directory, { recursive: true, force: true });
}

async function printPage(side: number): Promise<void> {
  print(`Load before: ${loadavg().map((load) => load.toFixed(1)).join(', ')} over 1, 5, 15 minutes`);
  const { firstView, demo, drop, longestTaskMs, mostWorkMs, longestWaitMs, workers } = await pagePace(side, pageRepeats);
  print(`\nThe app in Chromium, ${workers} ${workers === 1 ? 'worker' : 'workers'}, ${pageRepeats} pages`);
  print(aligned([header.slice(0, 3), ...([['six rows on the screen', firstView], ['six samples appraised', demo], [`drop to verdict, ${side} × ${side} pixels`, drop]] as const).map(([name, times]) => row(name, times, undefined).slice(0, 3))]));
  print(aligned([row('held handle to new picture and areas, 512 × 512 pixels', await previewPace(), undefined).slice(0, 3)]));
  print(`  the page’s own thread: longest task ${shownMs(longestTaskMs)} ms by the clock; most processor time of one task ${shownMs(mostWorkMs)} ms; a timer waited ${shownMs(longestWaitMs)} ms at most`);
}

async function printChain(): Promise<void> {
  await loadKernels();
  let sink = 0;
  let commandReference: Times | undefined;
  for (const { side, repeats } of chosen) {
    const pace = await appraisalPace(paintedFiles(side), directory, repeats);
    sink += pace.sink;
    if (side === commandSide) commandReference = pace.reference;
    print(`\n${side} × ${side} pixels, ${repeats} repeats after a warm-up, usable ${(100 * pace.usableShare).toFixed(4)} %`);
    print(aligned(appraisalRows(pace)));
  }
  const command = await commandPace(paintedFiles(commandSide), directory, commandRepeats);
  print(`\nCommand line, a pair of ${commandSide} × ${commandSide} pixels, ${commandRepeats} repeats after a warm-up`);
  print(aligned([header, row('start-up', command.startUp, commandReference), row('appraise, end to end', command.appraise, commandReference)]));
  print(`\nKernels against plain TypeScript, ${commandSide} × ${commandSide} pixels, copies included, ${kernelRepeats} repeats in turns; kept from ${leastGain} times on`);
  print(aligned(kernelRows(await kernelPace(paintedFiles(commandSide), kernelRepeats))));
  print(`\nsink ${sink.toPrecision(12)}`);
}

function appraisalRows({ reference, parts }: AppraisalPace): (readonly string[])[] {
  return [header, row('reference loop', reference, reference), ...[...parts].map(([name, times]) => row(name, times, reference))];
}

function kernelRows(paces: readonly KernelPace[]): (readonly string[])[] {
  return [['', 'plain min ms', 'kernel min ms', 'times faster'], ...paces.map(({ name, plain, kernel, gain }) => [name, shownMs(plain.minMs), shownMs(kernel.minMs), gain.toFixed(2)])];
}

function row(name: string, { minMs, medianMs }: Times, reference: Times | undefined): readonly string[] {
  const ratio = reference === undefined ? '' : (minMs / reference.minMs).toFixed(1);
  return [name, shownMs(minMs), shownMs(medianMs), ratio];
}

function print(text: string): void {
  process.stdout.write(`${text}\n`);
}
