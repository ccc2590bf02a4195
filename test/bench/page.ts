/**
 * What the page costs, on the built page in Chromium: `npm run bench:page [-- minutes of playing]`. The machines are shared, so gaps between frames stand beside
 * those of a blank page on the same machine at the same time.
 */
import type { CDPSession, Page } from 'playwright-core';
import { launchBrowser, openTab, type Site, serveDist } from '../support/browser.ts';

const CHANGES = 40;
const FRAMES_SEC = 20;
const TAKES_A_MINUTE = 2;

interface Spread {
  readonly median: number;
  readonly most: number;
}

function spreadOf(values: readonly number[]): Spread {
  const sorted = [...values].sort((a, b) => a - b);
  return { median: sorted[sorted.length >> 1], most: sorted[sorted.length - 1] };
}

const told = ({ median, most }: Spread, bar: number) =>
  `${median.toFixed(0)} ms in the middle, ${most.toFixed(0)} ms at most; bar ${bar} ms`;

/** Notes when the page asks its workers and when they answer; runs before its own scripts. */
function noteMessages(): void {
  const notes: { type: string; id: number; atMs: number; asked: boolean }[] = [];
  Object.assign(window, { notes });
  const heard = new WeakSet<Worker>();
  const post = Worker.prototype.postMessage as (this: Worker, ...given: unknown[]) => void;
  Worker.prototype.postMessage = function (this: Worker, ...given: unknown[]) {
    if (!heard.has(this))
      this.addEventListener('message', ({ data }) => notes.push({ type: data.type, id: data.id, atMs: performance.now(), asked: false }));
    heard.add(this);
    const { type, id } = given[0] as { type: string; id: number };
    notes.push({ type, id, atMs: performance.now(), asked: true });
    post.apply(this, given);
  } as typeof Worker.prototype.postMessage;
}

/**
 * From the press of an arrow key on R1 to the new figure of THD; and how long the worker is at a curve, from its answer to the moment, which comes first, to
 * the 41 points, ms. Strings, so that no helper comes along.
 */
async function measureAnswers(page: Page): Promise<{ answers: number[]; curves: number[] }> {
  await page.evaluate(`{
    window.answers = [];
    let pressedMs = null;
    addEventListener('keydown', (event) => { pressedMs = event.timeStamp; }, true);
    new MutationObserver(() => {
      if (pressedMs !== null) window.answers.push(performance.now() - pressedMs);
      pressedMs = null;
    }).observe(document.querySelector('.reading.large'), { subtree: true, childList: true, characterData: true });
    window.notes.length = 0;
  }`);
  const value = page.locator('.drawing [role=spinbutton][aria-label^="R1"]').first();
  await value.focus();
  for (let n = 0; n < CHANGES; n++) {
    await page.keyboard.press(n % 2 === 0 ? 'ArrowUp' : 'ArrowDown');
    await page.waitForTimeout(400);
  }
  return page.evaluate(`({
    answers: window.answers,
    curves: window.notes.filter(({ type, asked }) => type === 'curve' && !asked).flatMap(({ id, atMs }) => {
      const moment = window.notes.find((note) => note.type === 'reading' && !note.asked && note.id === id);
      return moment ? [atMs - moment.atMs] : [];
    }),
  })`);
}

/** Gaps between frames over some seconds, ms, and the longest stretch of the page's own work in one go. */
async function measureFrames(page: Page, seconds: number): Promise<{ gaps: number[]; tasks: number[] }> {
  return page.evaluate(`new Promise((done) => {
    const gaps = [], tasks = [];
    const observer = new PerformanceObserver((list) => tasks.push(...list.getEntries().map(({ duration }) => duration)));
    observer.observe({ entryTypes: ['longtask'] });
    let before = null;
    const end = performance.now() + ${1000 * seconds};
    const look = (now) => {
      if (before !== null) gaps.push(now - before);
      before = now;
      if (now < end) requestAnimationFrame(look);
      else { observer.disconnect(); done({ gaps, tasks }); }
    };
    requestAnimationFrame(look);
  })`);
}

function framesTold(what: string, { gaps, tasks }: { gaps: number[]; tasks: number[] }): string {
  const rate = (1000 * gaps.length) / gaps.reduce((sum, gap) => sum + gap, 0);
  const long = gaps.filter((gap) => gap > 50).length;
  return `${what}: ${rate.toFixed(1)} frames a second, ${long} gaps over 50 ms, ${tasks.length} tasks over 50 ms, the longest gap ${spreadOf(gaps).most.toFixed(0)} ms`;
}

async function heapMb(session: CDPSession): Promise<number> {
  await session.send('HeapProfiler.collectGarbage');
  const { usedSize } = await session.send('Runtime.getHeapUsage');
  return usedSize / 1e6;
}

async function play(page: Page, minutes: number): Promise<void> {
  const session = await page.context().newCDPSession(page);
  await page.waitForTimeout(5000);
  const before = await heapMb(session);
  for (let minute = 1; minute <= minutes; minute++) {
    for (let take = 0; take < TAKES_A_MINUTE; take++) {
      await page.getByRole('button', { name: 'Take what is heard' }).click();
      await page.waitForTimeout(30000 / TAKES_A_MINUTE);
      await page.getByRole('button', { name: 'End the take' }).click();
      await page.waitForTimeout(30000 / TAKES_A_MINUTE);
    }
    const now = await heapMb(session);
    console.log(
      `after ${minute} of ${minutes} minutes, ${minute * TAKES_A_MINUTE} takes: heap ${now.toFixed(1)} MB, ${(now - before).toFixed(1)} MB more; bar 20 MB`,
    );
  }
}

async function main(site: Site, minutes: number): Promise<void> {
  const browser = await launchBrowser();
  const { page } = await openTab(browser, site, { widthPx: 1280, heightPx: 900, beforeLoad: noteMessages });
  await page.waitForTimeout(4000);
  const resting = await measureAnswers(page);
  console.log(`a change answered, at rest: ${told(spreadOf(resting.answers), 100)} (${resting.answers.length} of ${CHANGES})`);
  console.log(`curve of 41 points in the worker: ${told(spreadOf(resting.curves), 50)} (${resting.curves.length})`);
  await page.getByRole('button', { name: 'Start', exact: true }).click();
  await page.waitForTimeout(3000);
  const blank = await browser.newPage();
  await blank.bringToFront();
  console.log(framesTold('a blank page beside the sound', await measureFrames(blank, FRAMES_SEC)));
  await blank.close();
  await page.bringToFront();
  await page.waitForTimeout(2000);
  console.log(framesTold('the page while it plays', await measureFrames(page, FRAMES_SEC)));
  if (minutes > 0) await play(page, minutes);
  await browser.close();
}

const minutes = Number(process.argv[2] ?? 0);
if (!(minutes >= 0)) throw new RangeError(`the minutes of playing are “${process.argv[2]}”; expected a number of 0 or more`);
const site = await serveDist();
await main(site, minutes);
await site.close();
