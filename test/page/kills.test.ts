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

beforeAll(async () => {
  site = await serveDist();
  folder = mkdtempSync(join(tmpdir(), 'fettle-kills-'));
  context = await openProfile(folder);
  await context.addInitScript(installSoundProbe);
});
afterAll(async () => {
  await context?.close();
  await site?.close();
  rmSync(folder, { recursive: true, force: true });
});

interface Truth {
  /** Of the first sample that was taken; null while none has reached the page. */
  readonly startFrame: number | null;
  readonly nowFrame: number;
}

declare global {
  interface Window {
    truth: () => Truth;
  }
}

/** Runs in the page: from here on it knows at which frame the take began and which one plays. */
function watchTake(): void {
  const node = window.soundProbe.nodes.at(-1) as AudioWorkletNode;
  let startFrame: number | null = null;
  node.port.addEventListener('message', ({ data }) => {
    if (data.type === 'chunk') startFrame ??= data.frame;
  });
  window.truth = () => ({ startFrame, nowFrame: Math.round(node.context.currentTime * node.context.sampleRate) });
}

async function openPage(): Promise<Page> {
  const page = await context.newPage();
  await page.goto(site.url);
  await page.getByRole('button', { name: 'Start', exact: true }).waitFor();
  return page;
}

async function kill(page: Page): Promise<void> {
  const session = await context.newCDPSession(page);
  const crashed = page.waitForEvent('crash');
  session.send('Page.crash').catch(() => undefined);
  await crashed;
  await page.close();
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
    await page.evaluate(watchTake);
    const asked = await page.evaluate(() => window.truth());
    await page.getByRole('button', { name: 'Take what is heard' }).click();
    await page.waitForTimeout(1000 * moments[n]);
    const killed = await page.evaluate(() => window.truth());
    await kill(page);

    page = await openPage();
    const found = page
      .getByText(/was being taken when the page went away/)
      .waitFor({ timeout: killed.startFrame === null ? 3000 : 90_000 });
    const kept = await found.then(
      () => takeOf(page),
      () => new Float32Array(0),
    );
    const taken = killed.nowFrame - (killed.startFrame ?? asked.nowFrame);
    lost.push((taken - kept.length) / RATE_HZ);
    if (kept.length > 0) {
      const start = placeIn(source, kept.subarray(0, 4096));
      expect(start).toBeGreaterThanOrEqual(0);
      expect(kept.every((x, at) => x === source[(start + at) % source.length])).toBe(true);
      await page
        .getByRole('button', { name: /^Delete “/ })
        .first()
        .click();
    }
    console.log(`kill ${n + 1}: ${(taken / RATE_HZ).toFixed(2)} s taken, ${lost[n].toFixed(3)} s lost`);
  }
  await page.close();
  const sorted = lost.toSorted((a, b) => a - b);
  console.log(`killed ${KILLS} times: lost at most ${sorted.at(-1)?.toFixed(3)} s, median ${sorted[KILLS >> 1].toFixed(3)} s`);
  expect(sorted.at(-1)).toBeLessThanOrEqual(1);
});
