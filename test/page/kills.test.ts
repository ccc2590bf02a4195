/**
 * A tab that is killed while a take is under way loses at most the last second of it. In every run of the tests a few moments; all fifty:
 * FETTLE_KILLS=50 npx vitest run --project page test/page/kills.test.ts
 */
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { readWav } from '../../model/chain/wav.ts';
import { openProfile, type Site, serveDist } from '../support/browser.ts';
import { createNoise } from '../support/noise.ts';
import { installSoundProbe } from './soundProbe.ts';

const KILLS = Number(process.env.FETTLE_KILLS ?? 4);
/** The longest take before the kill. */
const LONGEST_SEC = 6;
const RATE_HZ = 48000;

let site: Site;
let folder: string;
let context: BrowserContext;
/** The last frame that the page told of. */
let toldFrame = 0;

beforeAll(async () => {
  site = await serveDist();
  folder = mkdtempSync(join(tmpdir(), 'fettle-kills-'));
  context = await openProfile(folder);
  await context.addInitScript(installSoundProbe);
  await context.exposeFunction('tellFrame', (frame: number) => {
    toldFrame = frame;
  });
});
afterAll(async () => {
  await context?.close();
  await site?.close();
  rmSync(folder, { recursive: true, force: true });
});

/** What goes into the cell from a frame on, and the delay with which the bypass puts it out. */
interface Fed {
  readonly frame: number;
  readonly latencySamples: number;
  readonly input: number[];
}

declare global {
  interface Window {
    fed: Fed | null;
    nowFrame: () => number;
    tellFrame: (frame: number) => void;
  }
}

/** Runs in the page: from here on it knows which frame plays, and what was fed at which one. Chunks of a take go past the page, so they tell nothing. */
function watchSound(): void {
  const node = window.soundProbe.nodes.at(-1) as AudioWorkletNode;
  let input: number[] = [];
  const post = node.port.postMessage.bind(node.port) as (message: { type: string; input?: Float32Array }, transfer: Transferable[]) => void;
  node.port.postMessage = (message: { type: string; input?: Float32Array }, transfer: unknown) => {
    // A report's samples are read as they go back, before they are transferred.
    if (message.type === 'return report') input = Array.from(message.input ?? []);
    post(message, transfer as Transferable[]);
  };
  window.fed = null;
  node.port.addEventListener('message', ({ data }) => {
    if (data.type === 'report' && input.some((x) => x !== 0))
      window.fed = { frame: data.frame, latencySamples: data.latencySamples, input };
  });
  window.nowFrame = () => Math.round(node.context.currentTime * node.context.sampleRate);
  setInterval(() => window.tellFrame(window.nowFrame()), 10);
}

async function openPage(): Promise<Page> {
  const page = await context.newPage();
  await page.goto(site.url);
  await page.getByRole('button', { name: 'Start', exact: true }).waitFor();
  return page;
}

/** Kills the tab `afterMs` from now; it has told the frame that plays up to its last hundredths of a second. */
async function kill(page: Page, afterMs: number): Promise<number> {
  const session = await context.newCDPSession(page);
  const crashed = page.waitForEvent('crash');
  await page.waitForTimeout(afterMs);
  session.send('Page.crash').catch(() => undefined);
  await crashed;
  await page.close();
  return toldFrame;
}

async function takeOf(page: Page): Promise<Float32Array> {
  await page.getByRole('combobox', { name: 'Format of saved takes' }).selectOption('float32');
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page
      .getByRole('button', { name: /^Save “/ })
      .first()
      .click(),
  ]);
  return readWav(readFileSync(await download.path())).channels[0];
}

/** Where a piece stands in a looped line; −1 where it does not. */
function placeIn(line: Float32Array, piece: Float32Array): number {
  return line.findIndex((x, start) => x === piece[0] && piece.every((y, n) => y === line[(start + n) % line.length]));
}

/** The first frame from `fromFrame` on at which the bypass puts out this place of a looped line. */
function frameAt(place: number, line: Float32Array, { frame, latencySamples, input }: Fed, fromFrame: number): number {
  const known = placeIn(line, Float32Array.from(input));
  expect(known).toBeGreaterThanOrEqual(0);
  const late = frame + latencySamples + place - known - fromFrame;
  return fromFrame + (((late % line.length) + line.length) % line.length);
}

test(`killed at ${KILLS} moments of a take, it loses at most the last second`, { timeout: 120_000 + KILLS * 90_000 }, async () => {
  const source = readWav(readFileSync(new URL('../../assets/phrases/guitar.wav', import.meta.url))).channels[0];
  const moments = createNoise(50, KILLS, LONGEST_SEC).map(Math.abs);
  const lost: number[] = [];
  let page = await openPage();
  for (let n = 0; n < KILLS; n++) {
    await page.getByRole('button', { name: 'bypass', exact: true }).click();
    await page.getByRole('button', { name: 'Start', exact: true }).click();
    await page.waitForFunction(() => window.soundProbe.peak > 0);
    // The cell gives way to the bypass within a few hundredths of a second.
    await page.waitForTimeout(300);
    await page.evaluate(watchSound);
    const fed = await page.waitForFunction(() => window.fed).then((handle) => handle.jsonValue() as Promise<Fed>);
    const askedFrame = await page.evaluate(() => window.nowFrame());
    await page.getByRole('button', { name: 'Take what is heard' }).click();
    const killedFrame = await kill(page, 1000 * moments[n]);

    page = await openPage();
    const found = await page
      .getByText(/was being taken when the page went away|had just begun when the page went away/)
      .waitFor({ timeout: 60_000 })
      .then(() => page.getByText(/was being taken/).isVisible());
    const kept = found ? await takeOf(page) : new Float32Array(0);
    const start = found ? placeIn(source, kept.subarray(0, 4096)) : -1;
    if (found) {
      expect(start).toBeGreaterThanOrEqual(0);
      expect(kept.every((x, at) => x === source[(start + at) % source.length])).toBe(true);
      await page
        .getByRole('button', { name: /^Delete “/ })
        .first()
        .click();
    }
    // Where nothing is left, the take may have begun when it was asked for.
    const startFrame = found ? frameAt(start, source, fed, askedFrame) : askedFrame;
    const taken = killedFrame - startFrame;
    lost.push((taken - kept.length) / RATE_HZ);
    console.log(
      `kill ${n + 1}: begun ${((startFrame - askedFrame) / RATE_HZ).toFixed(3)} s after the click, ` +
        `${(taken / RATE_HZ).toFixed(2)} s taken, ${lost[n].toFixed(3)} s lost`,
    );
  }
  await page.close();
  const sorted = lost.toSorted((a, b) => a - b);
  console.log(`killed ${KILLS} times: lost at most ${sorted.at(-1)?.toFixed(3)} s, median ${sorted[KILLS >> 1].toFixed(3)} s`);
  expect(sorted.at(-1)).toBeLessThanOrEqual(1);
});
