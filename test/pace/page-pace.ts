/** Times in the app as a person meets it: the built page, our own server, a real Chromium. */
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { ServedApp, drop } from '../e2e/served-app.ts';
import { paintedFiles } from './scans.ts';
import { timesOf } from './times.ts';
import type { Times } from './times.ts';

export interface PagePace {
  /** From the page's start to the six rows of the invented samples, none of them appraised yet. */
  readonly firstView: Times;
  /** From the page's start to the verdict of the last of them. */
  readonly demo: Times;
  /** From the drop of two maps to the verdict in the tray. */
  readonly drop: Times;
  /** Longest task of the page's own thread in the worst repeat, from the start until a sample has been opened, by the clock. */
  readonly longestTaskMs: number;
  /** The most processor time that one task took: what the longest would be on a machine with nothing else to do. */
  readonly mostWorkMs: number;
  /** Longest time that a timer of 5 ms had to wait beyond its turn, worst repeat: sees shorter tasks, and the machine's other work. */
  readonly longestWaitMs: number;
  /** Workers that shared the work. */
  readonly workers: number;
}

/** What the watch in the page has seen, ms since the page's start. */
interface Seen {
  readonly firstView: number;
  readonly demo: number;
  readonly dropped: number;
  readonly verdict: number;
  readonly longestWait: number;
}

interface Task {
  readonly ms: number;
  readonly workMs: number;
}

/** The part of the browser's own record that is looked at; durations in µs. */
interface TraceEvent {
  readonly name: string;
  readonly ph: string;
  readonly pid: number;
  readonly tid: number;
  readonly dur?: number;
  readonly tdur?: number;
  readonly args?: { readonly name?: string };
}

/** Runs in the page before its own scripts. Rows are counted where they are drawn, samples where their status is kept. */
const watch = `
  const seen = (globalThis.seenByPace = { firstView: 0, demo: 0, dropped: 0, verdict: 0, longestWait: 0 });
  addEventListener('drop', () => { seen.dropped = performance.now(); }, true);
  let last = performance.now();
  setInterval(() => {
    const now = performance.now();
    seen.longestWait = Math.max(seen.longestWait, now - last - 5);
    last = now;
    const rows = [...document.querySelector('eg-app')?.shadowRoot?.querySelector('eg-tray')?.shadowRoot?.querySelectorAll('eg-tray-row') ?? []];
    const done = rows.filter((row) => row.shadowRoot?.querySelector('.big')).length;
    if (!seen.firstView && rows.length >= 6) seen.firstView = now;
    if (!seen.demo && done >= 6) seen.demo = now;
    if (!seen.verdict && done >= 7) seen.verdict = now;
  }, 5);
`;

/** Every repeat is a page of its own, so that nothing is remembered; its worker is warm from the invented samples when the maps are dropped. */
export async function pagePace(side: number, repeats: number): Promise<PagePace> {
  const app = await ServedApp.start();
  try {
    const paths = paintedFiles(side).map(({ name, bytes }) => {
      const path = join(app.folder, name);
      writeFileSync(path, bytes);
      return path;
    });
    const all: Seen[] = [];
    const tasks: Task[] = [];
    let workers = 0;
    for (let repeat = 0; repeat < repeats; repeat++) {
      const { page, stopTrace } = await app.trace(['toplevel'], watch);
      await saw(page, 'demo');
      workers = page.workers().length;
      await drop(page, paths);
      await saw(page, 'verdict');
      await page.locator('eg-tray-row div.usable').first().click();
      await page.locator('eg-sample-place eg-map-stage').waitFor();
      await page.waitForTimeout(1000);
      all.push(await saw(page, 'verdict'));
      tasks.push(...tasksOf(await stopTrace()));
      await page.close();
    }
    return {
      firstView: timesOf(all.map(({ firstView }) => firstView)), demo: timesOf(all.map(({ demo }) => demo)), drop: timesOf(all.map(({ dropped, verdict }) => verdict - dropped)),
      longestTaskMs: Math.max(...tasks.map(({ ms }) => ms)), mostWorkMs: Math.max(...tasks.map(({ workMs }) => workMs)), longestWaitMs: Math.max(...all.map(({ longestWait }) => longestWait)), workers,
    };
  } finally {
    await app.stop();
  }
}

/** Tasks of the threads that draw pages: the watched one is the only page that does anything. */
function tasksOf(trace: string): Task[] {
  const { traceEvents } = JSON.parse(trace) as { readonly traceEvents: readonly TraceEvent[] };
  const key = ({ pid, tid }: TraceEvent): string => `${pid} ${tid}`;
  const pages = new Set(traceEvents.filter(({ name, args }) => name === 'thread_name' && args?.name === 'CrRendererMain').map(key));
  const tasks = traceEvents.filter((event) => event.ph === 'X' && event.name.endsWith('RunTask') && pages.has(key(event)));
  if (tasks.length === 0) throw new Error('the browser recorded no task');
  return tasks.map(({ dur = 0, tdur = 0 }) => ({ ms: dur / 1000, workMs: tdur / 1000 }));
}

/** What has been seen, once `what` has. */
async function saw(page: Page, what: keyof Seen): Promise<Seen> {
  for (const end = Date.now() + 120_000; Date.now() < end; await page.waitForTimeout(100)) {
    const seen = await page.evaluate<Seen>('globalThis.seenByPace');
    if (seen[what] > 0) return seen;
  }
  throw new Error(`the page did not come to "${what}" within two minutes`);
}
