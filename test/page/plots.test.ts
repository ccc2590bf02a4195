/** Figures are read out by pointer and keyboard, saved as numbers and as pictures, and move without holding up the page. */
import { readFileSync } from 'node:fs';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { findAccessFaults, launchBrowser, openTab, type Site, serveDist } from '../support/browser.ts';

let browser: Browser;
let site: Site;

beforeAll(async () => {
  site = await serveDist();
  browser = await launchBrowser();
});

afterAll(async () => {
  await browser?.close();
  await site?.close();
});

const FIGURES = [2, 3, 4, 5, 6];
const figureOf = (page: Page, number: number) => page.locator('.figure', { has: page.locator(`figcaption b:text-is("Fig. ${number}.")`) });

async function openSheet(colourScheme: 'light' | 'dark' = 'light') {
  const tab = await openTab(browser, site, { widthPx: 1280, heightPx: 900, colourScheme });
  // The last of the figures' numbers to come.
  for (const number of FIGURES)
    await figureOf(tab.page, number)
      .getByRole('slider', { name: /^Cursor/ })
      .waitFor();
  return tab;
}

/** What a press of this word saves: the file's name and text. */
async function saved(page: Page, number: number, words: 'CSV' | 'SVG') {
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    figureOf(page, number)
      .getByRole('button', { name: new RegExp(`^${words}`) })
      .click(),
  ]);
  return { name: download.suggestedFilename(), text: readFileSync(await download.path(), 'utf8') };
}

describe('the cursor', () => {
  test('reads every figure by keyboard, with units, and Esc or leaving gives the caption back', async () => {
    const { page, complaints, close } = await openSheet();
    const units: Record<number, RegExp> = { 2: /%/, 3: /V/, 4: /Hz.*dB/, 5: /V.*dB/, 6: /V.*A/ };
    for (const number of FIGURES) {
      const figure = figureOf(page, number);
      const cursor = figure.getByRole('slider', { name: /^Cursor/ });
      const words = figure.locator('.caption-words');
      const before = await words.textContent();
      await cursor.focus();
      await page.keyboard.press('Home');
      const first = await cursor.getAttribute('aria-valuetext');
      for (let n = 0; n < 3; n++) await page.keyboard.press('PageUp');
      await page.keyboard.press('ArrowRight');
      const later = await cursor.getAttribute('aria-valuetext');
      expect(later, `Fig. ${number}`).not.toBe(first);
      expect(later, `Fig. ${number}`).toMatch(units[number]);
      expect(await words.textContent()).toContain(later as string);
      expect(Number(await cursor.getAttribute('aria-valuenow'))).toBeGreaterThan(Number(await cursor.getAttribute('aria-valuemin')));
      await page.keyboard.press('Escape');
      expect(await words.textContent()).toBe(before);
    }
    expect(complaints).toEqual([]);
    await close();
  });

  test('follows the pointer, and what it reads in Fig. 5 is the gain that is saved for that gate voltage', async () => {
    const { page, close } = await openSheet();
    const figure = figureOf(page, 5);
    const { text } = await saved(page, 5, 'CSV');
    const plot = await figure.locator('.plot').boundingBox();
    if (plot === null) throw new Error('Fig. 5 is not on the page');
    await page.mouse.move(plot.x + plot.width / 2, plot.y + plot.height / 2);
    const [, gate, gain] = /gate (\S+)\u2009V: gain (\S+)\u2009dB/.exec((await figure.locator('.caption-words').textContent()) ?? '') ?? [];
    const number = (words: string) => Number(words.replace('−', '-'));
    const rows = text
      .trim()
      .split('\r\n')
      .slice(1)
      .map((line) => line.split(',').map(Number));
    expect(rows.some(([gateV, gainDb]) => Math.abs(gateV - number(gate)) < 0.0051 && Math.abs(gainDb - number(gain)) < 0.051)).toBe(true);
    await page.mouse.move(plot.x, plot.y - 60);
    expect(await figure.locator('.caption-words').textContent()).toContain('Gain against gate voltage');
    await close();
  });

  test('leaves nobody shut out while it reads, in either scheme', async () => {
    for (const scheme of ['light', 'dark'] as const) {
      const { page, close } = await openSheet(scheme);
      await figureOf(page, 4).getByLabel('What Fig. 4 shows').selectOption('waveforms');
      await figureOf(page, 3).getByLabel('What the gate is drawn against in Fig. 3').selectOption('time');
      await figureOf(page, 6).getByRole('slider').focus();
      expect(await findAccessFaults(page)).toEqual([]);
      await close();
    }
  });
});

describe('a figure is saved', () => {
  test('as numbers under names with units', async () => {
    const { page, close } = await openSheet();
    const headers: Record<number, string> = {
      2: 'k,THD (%),H2 (%),H3 (%)',
      3: 'time (s),gate (V),control (V)',
      4: 'frequency (Hz),in (dBFS),out (dBFS),shadow tone (Hz)',
      5: 'gate (V),gain (dB)',
      6: 'VDS (V),now (A),end of ohmic (A),VDS (V),at VGS',
    };
    for (const number of FIGURES) {
      const { name, text } = await saved(page, number, 'CSV');
      const [header, ...rows] = text.trimEnd().split('\r\n');
      expect(name).toMatch(new RegExp(`^Harbour tremolo-fig-${number}-.*\\.csv$`));
      expect(header.startsWith(headers[number]), header).toBe(true);
      expect(rows.length).toBeGreaterThan(20);
      const fields = header.split(/,(?=(?:[^"]*"[^"]*")*[^"]*$)/).length;
      for (const row of rows) expect(row.split(',')).toHaveLength(fields);
    }
    await close();
  });

  test('as a picture that stands by itself: colours and type written into it, traces as lines, nothing fetched', async () => {
    const { page, close } = await openSheet();
    for (const number of FIGURES) {
      const { name, text } = await saved(page, number, 'SVG');
      expect(name).toMatch(/\.svg$/);
      // What stands over the canvas is saved with what stands under it.
      if (number === 4) expect(text).toContain('shadow tone');
      const found = await page.evaluate((source) => {
        const parsed = new DOMParser().parseFromString(source, 'image/svg+xml');
        const curves = [...parsed.querySelectorAll('path')].filter((path) => (path.getAttribute('d') ?? '').length > 100);
        return {
          broken: parsed.querySelector('parsererror') !== null,
          size: Number(parsed.documentElement.getAttribute('width')),
          classes: parsed.querySelectorAll('[class]').length,
          links: parsed.querySelectorAll('image, use, [href]').length,
          texts: parsed.querySelectorAll('text[font-size][fill]').length,
          curves: curves.filter((path) => /^(rgb|#)/.test(path.getAttribute('stroke') ?? '')).length,
        };
      }, text);
      expect(found, `Fig. ${number}`).toMatchObject({ broken: false, classes: 0, links: 0 });
      expect(found.size).toBeGreaterThan(200);
      expect(found.texts).toBeGreaterThan(4);
      expect(found.curves).toBeGreaterThan(0);
    }
    await close();
  });
});

test('the hints of a first visit are put away, and stay away', async () => {
  const { page, close } = await openSheet();
  await page.getByRole('button', { name: 'Put the hints away' }).click();
  expect(await page.getByText('What is underlined is changed').count()).toBe(0);
  await close();
});

test('a limit of Table 1 that is passed turns its number over, and «none» asks nothing', async () => {
  const { page, close } = await openSheet();
  const row = page.locator('.characteristics tr', { hasText: 'Past off' });
  expect(await row.locator('.over').count()).toBe(0);
  await row.getByRole('spinbutton').click();
  await page.keyboard.type('0.5');
  await page.keyboard.press('Enter');
  expect(await row.locator('.over').textContent()).toBe('+0.31');
  await row.getByRole('spinbutton').click();
  await page.keyboard.type('none');
  await page.keyboard.press('Enter');
  expect(await row.locator('.over').count()).toBe(0);
  await close();
});
