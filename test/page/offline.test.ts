/** The page without a network, and how a newer one takes its place. */
import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { launchBrowser, openTab, type Site, serveFolder } from '../support/browser.ts';
import { installSoundProbe } from './soundProbe.ts';

let browser: Browser;
let folder: string;
let site: Site;

beforeAll(async () => {
  browser = await launchBrowser();
  folder = mkdtempSync(join(tmpdir(), 'fettle-offline-'));
  cpSync(fileURLToPath(new URL('../../dist', import.meta.url)), folder, { recursive: true });
  site = await serveFolder(folder);
});
afterAll(async () => {
  await browser?.close();
  await site?.close();
  rmSync(folder, { recursive: true, force: true });
});

/** Resolves when the worker that serves the page has all of it. */
async function readyOffline(page: Page): Promise<void> {
  const state = async () => (await navigator.serviceWorker.getRegistration())?.active?.state;
  await expect.poll(() => page.evaluate(state), { timeout: 30_000 }).toBe('activated');
}

async function hearSound(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Start', exact: true }).click();
  await page.waitForFunction(() => window.soundProbe.peak > 0);
}

test('after one visit, without a click, the page opens and sounds without a network', async () => {
  const { page, close } = await openTab(browser, site, { beforeLoad: installSoundProbe });
  await readyOffline(page);
  await page.context().setOffline(true);
  await page.reload();
  await hearSound(page);
  const phrase = page.getByRole('combobox', { name: 'Source' });
  await phrase.selectOption('phrase bass');
  await page.getByText('“phrases/bass.wav” could not be fetched').waitFor();
  await page.context().setOffline(false);
  await phrase.selectOption('phrase bass');
  await expect.poll(() => phrase.inputValue(), { timeout: 20_000 }).toBe('phrase bass');
  await page.context().setOffline(true);
  await page.reload();
  await expect.poll(() => phrase.inputValue(), { timeout: 20_000 }).toBe('phrase bass');
  await hearSound(page);
  await close();
});

test('a newer page is said once it has been fetched, and opens on reload', async () => {
  const { page, close } = await openTab(browser, site, { beforeLoad: installSoundProbe });
  await readyOffline(page);
  await page.reload();
  const [index, worker] = [join(folder, 'index.html'), join(folder, 'offline.js')];
  writeFileSync(index, readFileSync(index, 'utf8').replace('<title>Fettle</title>', '<title>Fettle, newer</title>'));
  const newer = readFileSync(worker, 'utf8').replace(/"index.html":"\w+"/, '"index.html":"newer"');
  writeFileSync(worker, newer);
  await page.reload();
  await page.getByText('A newer Fettle has been fetched; it opens when this page is reloaded.').waitFor();
  expect(await page.title()).toBe('Fettle');
  await page.reload();
  await expect.poll(() => page.title(), { timeout: 20_000 }).toBe('Fettle, newer');
  await hearSound(page);
  const revisions = await page.evaluate(async () => {
    const keys = await (await caches.open('fettle-page')).keys();
    return keys.map(({ url }) => url.split('?')[1]);
  });
  expect(revisions).toContain('newer');
  expect(new Set(revisions).size).toBe(revisions.length);
  await close();
});
