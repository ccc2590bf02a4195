import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { gzipSync } from 'node:zlib';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { findAccessFaults, launchBrowser, openTab, peek, type Site, serveDev, serveDist } from '../support/browser.ts';

const SIZES = [
  { widthPx: 390, heightPx: 844 },
  { widthPx: 1280, heightPx: 800 },
] as const;
const COLOUR_SCHEMES = ['light', 'dark'] as const;
const VIEWS = SIZES.flatMap((size) => COLOUR_SCHEMES.map((colourScheme) => ({ ...size, colourScheme })));

let browser: Browser;
let built: Site;

beforeAll(async () => {
  built = await serveDist();
  browser = await launchBrowser();
});

afterAll(async () => {
  await browser?.close();
  await built?.close();
});

describe('the built page', () => {
  test.each(VIEWS)('opens without a complaint at $widthPx × $heightPx, $colourScheme', async (view) => {
    const { page, complaints, close } = await openTab(browser, built, view);
    expect(await page.title()).toContain('Fettle');
    await page.getByRole('heading').first().waitFor();
    expect(complaints).toEqual([]);
    await close();
  });

  test.each(VIEWS)(
    'has no fault against WCAG 2.2 A and AA, or best practice, that axe-core can find at $widthPx × $heightPx, $colourScheme',
    async (view) => {
      const { page, close } = await openTab(browser, built, view);
      await page.getByRole('heading').first().waitFor();
      expect(await findAccessFaults(page)).toEqual([]);
      await close();
    },
  );

  test('does not scroll sideways at 390 px', async () => {
    const { page, close } = await openTab(browser, built, SIZES[0]);
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
    await close();
  });

  test('is under a policy that refuses inline scripts, and a refusal is a complaint', async () => {
    const { page, complaints, close } = await openTab(browser, built);
    await page.evaluate(() => {
      const script = document.createElement('script');
      script.textContent = 'document.title = "inline ran"';
      document.head.append(script);
    });
    expect(await page.title()).not.toBe('inline ran');
    await expect.poll(() => complaints.join()).toContain('Content Security Policy');
    await close();
  });

  test('keeps sound waiting for a click, as any browser does', async () => {
    const { page, close } = await openTab(browser, built);
    const soundState = () => new AudioContext({ sampleRate: 48000 }).state;
    expect(await peek(page, soundState)).toBe('suspended');
    await page.mouse.click(1, 1);
    expect(await peek(page, soundState)).toBe('running');
    await close();
  });

  test('loads under 300 kB of compressed JavaScript before a click, all that the page fetches counted', async () => {
    const { page, close } = await openTab(browser, built);
    const names = new Set<string>();
    page.context().on('request', (request) => {
      const { pathname } = new URL(request.url());
      // What the worker for use without a network fetches comes after the page has all that it needs.
      if (/\.m?js$/.test(pathname) && request.serviceWorker() === null) names.add(pathname);
    });
    await page.reload({ waitUntil: 'networkidle' });
    await page.waitForTimeout(2000);
    const sizes = [...names].map((name) => gzipSync(readFileSync(new URL(`../../dist${name}`, import.meta.url))).length);
    const totalKb = sizes.reduce((sum, bytes) => sum + bytes, 0) / 1000;
    console.log(`first load ${totalKb.toFixed(1)} kB: ${[...names].map((name, n) => `${name} ${sizes[n]}`).join(', ')}`);
    // The entry, the worker and the worklet at least: a count that misses one of them would prove nothing.
    for (const part of ['index', 'worker', 'worklet']) expect([...names].join()).toContain(part);
    expect(totalKb).toBeLessThan(300);
    await close();
  });

  test('comes without the scripts that made its assets', () => {
    const names = readdirSync(fileURLToPath(new URL('../../dist', import.meta.url)), { recursive: true, encoding: 'utf8' });
    expect(names.filter((name) => /\.(mjs|ts|py|sh)$/.test(name))).toEqual([]);
  });
});

test('the page in development opens without a complaint', async () => {
  const dev = await serveDev();
  const { page, complaints, close } = await openTab(browser, dev);
  await page.getByRole('heading').first().waitFor();
  expect(complaints).toEqual([]);
  await close();
  await dev.close();
});
