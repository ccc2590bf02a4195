/** What the page tests share: a browser, the page as built or in development, and a tab that notes every complaint. */

import { existsSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';
import { createServer, preview } from 'vite';
import { findChromium } from './chromium.ts';

const configFile = fileURLToPath(new URL('../../vite.config.ts', import.meta.url));

const FLAGS = [
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export interface Site {
  /** Address of the page, ending in a slash. */
  readonly url: string;
  close(): Promise<void>;
}

/** Serves dist/ as it was last built, policy and all, on a free port. */
export async function serveDist(): Promise<Site> {
  if (!existsSync(fileURLToPath(new URL('../../dist/index.html', import.meta.url))))
    throw new Error('dist/ is empty: run npm run build first');
  return serveFolder(fileURLToPath(new URL('../../dist', import.meta.url)));
}

/** The same for a copy of it. */
export async function serveFolder(outDir: string): Promise<Site> {
  const server = await preview({
    configFile,
    logLevel: 'warn',
    build: { outDir },
    preview: { port: 4300, host: 'localhost', open: false },
  });
  return siteOf(server.resolvedUrls, () => server.close());
}

/** Serves the page from its sources, as npm run dev does, on a free port. */
export async function serveDev(): Promise<Site> {
  const server = await createServer({ configFile, logLevel: 'warn', server: { port: 4400, host: 'localhost', open: false } });
  await server.listen();
  return siteOf(server.resolvedUrls, () => server.close());
}

function siteOf(urls: { local: string[] } | null, close: () => Promise<void>): Site {
  const url = urls?.local[0];
  if (url === undefined) throw new Error('the server came up without a local address');
  return { url, close };
}

export interface BrowserOptions {
  /** Lets sound start without a click. Off unless asked for, as in a visitor's browser. */
  autoplayForced?: boolean;
  /** Further command-line flags. */
  flags?: readonly string[];
}

export function launchBrowser(options: BrowserOptions = {}): Promise<Browser> {
  const autoplay = options.autoplayForced ? ['--autoplay-policy=no-user-gesture-required'] : [];
  return chromium.launch({
    executablePath: findChromium(),
    headless: true,
    chromiumSandbox: false,
    args: [...FLAGS, ...autoplay, ...(options.flags ?? [])],
  });
}

/** A browser with a profile in `folder`: what its pages keep stays there when it is closed or killed. */
export function openProfile(folder: string): Promise<BrowserContext> {
  return chromium.launchPersistentContext(folder, {
    executablePath: findChromium(),
    headless: true,
    chromiumSandbox: false,
    viewport: { width: 1280, height: 800 },
    acceptDownloads: true,
    args: FLAGS,
  });
}

export interface TabOptions {
  widthPx?: number;
  heightPx?: number;
  colourScheme?: 'light' | 'dark';
  reducedMotion?: boolean;
  touch?: boolean;
  /** What follows the site's address: `?x=1#y`. */
  path?: string;
  /** Runs in the tab before the page's own scripts; it must stand by itself. */
  beforeLoad?: () => void;
}

export interface Tab {
  readonly page: Page;
  /** Console errors and warnings, uncaught errors, failed or foreign requests, policy violations, in order. Empty when all is well. */
  readonly complaints: string[];
  close(): Promise<void>;
}

/** Opens the page in a fresh profile (nothing stored), 1280 × 800 and light unless told otherwise, and waits until it stands there: it is drawn once what was kept has been read. */
export async function openTab(browser: Browser, site: Site, options: TabOptions = {}): Promise<Tab> {
  const context = await browser.newContext({
    viewport: { width: options.widthPx ?? 1280, height: options.heightPx ?? 800 },
    colorScheme: options.colourScheme ?? 'light',
    reducedMotion: options.reducedMotion ? 'reduce' : 'no-preference',
    hasTouch: options.touch ?? false,
    acceptDownloads: true,
  });
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warning')
      complaints.push(`console ${message.type()}: ${message.text()} (${message.location().url})`);
  });
  page.on('pageerror', (error) => complaints.push(`uncaught: ${error.stack ?? error.message}`));
  page.on('requestfailed', (request) => complaints.push(`request failed: ${request.url()} ${request.failure()?.errorText ?? ''}`));
  page.on('response', (response) => {
    if (response.status() >= 400) complaints.push(`answered ${response.status()}: ${response.url()}`);
  });
  page.on('request', (request) => {
    if (!request.url().startsWith(site.url) && !/^(data|blob):/.test(request.url())) complaints.push(`asked elsewhere: ${request.url()}`);
  });
  if (options.beforeLoad) await page.addInitScript(options.beforeLoad);
  await page.goto(site.url + (options.path ?? ''), { waitUntil: 'load' });
  await peek(page, async () => {
    const sheet = document.getElementById('sheet');
    while (sheet !== null && !sheet.hasChildNodes()) await new Promise((resolve) => setTimeout(resolve, 10));
  });
  return { page, complaints, close: () => context.close() };
}

/**
 * Evaluates a function of no arguments in the page as page.evaluate does, but not as a user's gesture. Playwright's own evaluate, and
 * so every locator, counts as one and lets sound start: until the first real click, a test about that click looks through peek alone.
 */
export async function peek<T>(page: Page, read: () => T | Promise<T>): Promise<T> {
  const session = await page.context().newCDPSession(page);
  const expression = `(${read.toString()})()`;
  const { result, exceptionDetails } = await session.send('Runtime.evaluate', { expression, returnByValue: true, awaitPromise: true });
  await session.detach();
  if (exceptionDetails !== undefined) throw new Error(exceptionDetails.exception?.description ?? exceptionDetails.text);
  return result.value;
}

const AXE_SOURCE = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** Faults that axe-core finds against WCAG 2.2 A and AA and against its best practices, each as `rule: help (element, element)`. Empty when there are none. */
export async function findAccessFaults(page: Page): Promise<string[]> {
  await page.evaluate(AXE_SOURCE);
  return page.evaluate(async () => {
    const { axe } = globalThis as unknown as { axe: typeof import('axe-core') };
    const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];
    const { violations } = await axe.run(document, { runOnly: { type: 'tag', values: tags } });
    return violations.map(({ id, help, nodes }) => `${id}: ${help} (${nodes.map((node) => node.target.join(' ')).join(', ')})`);
  });
}
