import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Plugin } from 'vite';
import { build, preview } from 'vite';
import config from '../../vite.config.ts';
import type { Site } from '../support/browser.ts';

const root = fileURLToPath(new URL('./harness', import.meta.url));

/** Builds the bench without panels as the page is built, policy and all, into a folder of its own, and serves it. */
export async function serveHarness(): Promise<Site> {
  const outDir = mkdtempSync(join(tmpdir(), 'fettle-harness-'));
  const { test: _, plugins, ...rest } = config;
  // What belongs to the page alone stays away: its assets, its budget, its entries and its worker for use without a network.
  const { rolldownOptions: __, ...buildOptions } = rest.build ?? {};
  const ofPage = ['fettle-assets', 'fettle-budget', 'fettle-offline'];
  const copying = (plugins as Plugin[]).filter(({ name }) => !ofPage.includes(name));
  await build({
    ...rest,
    configFile: false,
    root,
    logLevel: 'warn',
    plugins: copying,
    build: { ...buildOptions, outDir, copyPublicDir: true },
  });
  const server = await preview({
    configFile: false,
    root,
    logLevel: 'warn',
    build: { outDir },
    preview: { port: 4500, host: 'localhost' },
  });
  const url = server.resolvedUrls?.local[0];
  if (url === undefined) throw new Error('the server came up without a local address');
  return {
    url,
    async close() {
      await server.close();
      rmSync(outDir, { recursive: true });
    },
  };
}
