/** What is kept between visits, in a real browser: by reloads, by tabs that are killed, and by a store that is damaged, full or another tab's. */
import { readFileSync } from 'node:fs';
import type { Browser, BrowserContext, Download, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { readWav, writeWav } from '../../model/chain/wav.ts';
import { launchBrowser, openTab, type Site, serveDist, type Tab } from '../support/browser.ts';
import { createNoise } from '../support/noise.ts';
import { installSoundProbe } from './soundProbe.ts';

/** The machine may be busy. */
const POLL = { timeout: 20_000 };

let site: Site;
let browser: Browser;
let tab: Tab;
let page: Page;
let context: BrowserContext;

beforeAll(async () => {
  site = await serveDist();
  browser = await launchBrowser();
});
afterAll(async () => {
  await browser?.close();
  await site?.close();
});
beforeEach(async () => {
  tab = await openTab(browser, site, { beforeLoad: installSoundProbe });
  page = tab.page;
  context = page.context();
  await context.addInitScript(installSoundProbe);
});
afterEach(async () => {
  // A reload ends what was still being fetched.
  expect(tab.complaints.filter((complaint) => !complaint.endsWith('ERR_ABORTED'))).toEqual([]);
  await tab.close();
});

const button = (name: string | RegExp) => page.getByRole('button', { name, exact: true });
const seriesR = () => page.getByRole('spinbutton', { name: /^R1, in series/ }).first();

async function startSound(): Promise<void> {
  await button('Start').click();
  await page.waitForFunction(() => window.soundProbe.peak > 0);
}

async function takeFor(seconds: number): Promise<void> {
  await button('Take what is heard').click();
  await page.waitForTimeout(1000 * seconds);
  await button('End the take').click();
}

async function savedTake(name: string): Promise<Float32Array[]> {
  await page.getByRole('combobox', { name: 'Format of saved takes' }).selectOption('float32');
  const [download] = await Promise.all([page.waitForEvent('download') as Promise<Download>, button(`Save “${name}”`).click()]);
  return readWav(readFileSync(await download.path())).channels;
}

async function typeInto(value: ReturnType<typeof seriesR>, typed: string): Promise<void> {
  await value.click();
  await page.keyboard.type(typed);
  await page.keyboard.press('Enter');
}

/** Runs in the page: changes the kept document as no page would. */
async function spoilDocument(): Promise<void> {
  const database = await new Promise<IDBDatabase>((resolve, reject) => {
    const request = indexedDB.open('fettle');
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error);
  });
  const store = database.transaction('kept', 'readwrite').objectStore('kept');
  const done = (request: IDBRequest) => new Promise((resolve) => request.addEventListener('success', () => resolve(request.result)));
  const record = (await done(store.get('document'))) as { design: { variants: { cell: { seriesOhm: number } }[] } };
  record.design.variants[0].cell.seriesOhm = -5;
  await done(store.put(record, 'document'));
  database.close();
}

describe('a visit is taken up where the last one ended', () => {
  test('design, undo, levels, phrase and takes are there after a reload, the take sample by sample', async () => {
    await typeInto(seriesR(), '6k8');
    await typeInto(page.getByRole('spinbutton', { name: 'Ceiling, full scale' }), '-9');
    await page.getByRole('combobox', { name: 'Source' }).selectOption('phrase drums');
    await page.waitForTimeout(500);
    await startSound();
    await takeFor(1.5);
    const before = await savedTake('Take 1');
    await page.reload();
    await expect.poll(() => seriesR().textContent(), POLL).toContain('6.80');
    await expect.poll(() => page.getByRole('spinbutton', { name: 'Ceiling, full scale' }).textContent(), POLL).toContain('−9.0');
    await expect.poll(() => page.getByRole('combobox', { name: 'Source' }).inputValue(), POLL).toBe('phrase drums');
    const after = await savedTake('Take 1');
    expect(before[0].length).toBeGreaterThan(48000);
    expect(after).toEqual(before);
    await startSound();
    await button('Play “Take 1”').click();
    await button('Stop “Take 1”').waitFor();
    await button('Undo').first().click();
    await expect.poll(() => seriesR().textContent(), POLL).toContain('10.0');
  });

  test('a change is kept that was made the moment before a reload', async () => {
    await typeInto(seriesR(), '6k8');
    await page.reload();
    await expect.poll(() => seriesR().textContent(), POLL).toContain('6.80');
  });
});

describe('what goes wrong is said', () => {
  test('a faulty design is named and offered as a file, and the page opens with the example', async () => {
    await page.waitForTimeout(500);
    await page.evaluate(spoilDocument);
    await page.reload();
    await page.getByText('variants[0].cell.seriesOhm is -5; expected 1 Ω to 100 MΩ').waitFor();
    await expect.poll(() => seriesR().textContent(), POLL).toContain('10.0');
    const [download] = await Promise.all([page.waitForEvent('download'), button('Save it as a file').click()]);
    expect(JSON.parse(readFileSync(await download.path(), 'utf8')).design.variants[0].cell.seriesOhm).toBe(-5);
    await expect.poll(() => page.getByText('seriesOhm is -5').count(), POLL).toBe(0);
  });

  test('a second tab says that another keeps, and keeps from then on when that one is closed', async () => {
    await typeInto(seriesR(), '6k8');
    await page.waitForTimeout(1000);
    const first = page;
    page = await context.newPage();
    await page.goto(site.url);
    await page.getByText('Another tab has Fettle open and keeps design and takes').waitFor();
    await expect.poll(() => seriesR().textContent(), POLL).toContain('6.80');
    await typeInto(seriesR(), '22k');
    await first.close();
    await page.getByText('The other tab is closed; this one keeps from now on').waitFor();
    await page.reload();
    await expect.poll(() => seriesR().textContent(), POLL).toContain('22.0');
  });

  test('a window that has no files for pages says that takes last until it is closed', async () => {
    const bare = await openTab(browser, site, { beforeLoad: withoutFiles });
    await bare.page.getByText('This browser keeps no audio here: it keeps nothing for pages in this window.').waitFor();
    await bare.close();
  });
});

/** Runs in the page before its own scripts: as a private window of some browsers does. */
function withoutFiles(): void {
  // A worker opens the files, and a worker is out of a test's reach: the page asks first whether there are any.
  navigator.storage.getDirectory = () => Promise.reject(new DOMException('denied', 'SecurityError'));
}

test('takes are held in files: sixteen megabytes of them leave no more than four in memory', { timeout: 240_000 }, async () => {
  const session = await context.newCDPSession(page);
  const held = async () => {
    await session.send('HeapProfiler.collectGarbage');
    const { usedSize, backingStorageSize } = (await session.send('Runtime.getHeapUsage')) as {
      usedSize: number;
      backingStorageSize: number;
    };
    return (usedSize + backingStorageSize) / 1e6;
  };
  const lines = [createNoise(1, 10 * 48000, 0.5), createNoise(2, 10 * 48000, 0.5)];
  const [chooser] = await Promise.all([page.waitForEvent('filechooser'), button('your own file').click()]);
  await chooser.setFiles({ name: 'ten.wav', mimeType: '', buffer: Buffer.from(writeWav(lines, 48000, 'pcm24').bytes) });
  await page.getByText('ten.wav').first().waitFor();
  const render = async (n: number) => {
    await button('Render the file').click();
    await button(`Save “Take ${n}”`).waitFor({ timeout: 120_000 });
    await page.waitForTimeout(500);
  };
  await render(1);
  const before = await held();
  for (const n of [2, 3, 4, 5]) await render(n);
  const after = await held();
  console.log(`memory ${before.toFixed(1)} MB with one take of 3.8 MB, ${after.toFixed(1)} MB with five`);
  expect(after - before).toBeLessThan(4);
});
