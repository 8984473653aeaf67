/** How fast map and areas follow a held handle, in the built page: from the slider's input event to the end of the frame that draws the new picture. */
import { ServedApp, rowOf } from '../e2e/served-app.ts';
import { timesOf } from './times.ts';
import type { Times } from './times.ts';

/** Places of the handle, and a pause between them in which a person's eye would be. */
const places = 40;
const pauseMs = 60;

/** Runs in the page: moves the handle of the height threshold and answers with the times, ms. */
const moveHandle = `(async () => {
  const inside = (element, selector) => element.shadowRoot.querySelector(selector);
  const sample = inside(document.querySelector('eg-app'), 'eg-sample-place');
  const chapter = inside(sample, 'eg-chapter-flaws');
  const knob = [...chapter.shadowRoot.querySelectorAll('eg-knob')].find((each) => each.field.path === 'flaws.heightNm');
  const slider = inside(knob, 'input[type="range"]');
  const stage = inside(inside(sample, 'eg-map-panel'), 'eg-map-stage');
  const times = [];
  for (let k = 0; k < ${places}; k++) {
    slider.value = String(130 + 3 * k);
    const shown = new Promise((resolve) => { stage.addEventListener('picture', () => { requestAnimationFrame(() => { const { port1, port2 } = new MessageChannel(); port1.onmessage = resolve; port2.postMessage(0); }); }, { once: true }); });
    const start = performance.now();
    slider.dispatchEvent(new Event('input'));
    await shown;
    times.push(performance.now() - start);
    await new Promise((resolve) => { setTimeout(resolve, ${pauseMs}); });
  }
  return times;
})()`;

/** Of the invented sample of that name, 512² pixels. */
export async function previewPace(name = 'quarry-07'): Promise<Times> {
  const app = await ServedApp.start();
  try {
    const { page } = await app.open();
    // All invented samples are done, so that none of them asks for the processor.
    for (const end = Date.now() + 120_000; await page.locator('eg-tray-row .big').count() < 6; await page.waitForTimeout(100)) if (Date.now() > end) throw new Error('the invented samples were not appraised within two minutes');
    await rowOf(page, name).getByRole('button', { name: new RegExp(`${name}$`) }).press('Enter');
    await page.locator('eg-chapter-flaws summary').first().click();
    await page.locator('eg-sample-place eg-map-stage').waitFor();
    await page.waitForTimeout(1000);
    // The first looks warm the compiler up.
    return timesOf((await page.evaluate<number[]>(moveHandle)).slice(5));
  } finally {
    await app.stop();
  }
}
