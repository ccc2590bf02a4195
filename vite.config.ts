import { cpSync } from 'node:fs';
import { basename } from 'node:path';
import { fileURLToPath } from 'node:url';
import { gzipSync } from 'node:zlib';
import type { Plugin, Rolldown } from 'vite';
import { defineConfig } from 'vitest/config';

/** JavaScript that a first visit may load, compressed, in kB of 1000 bytes. The README states the same number. */
const FIRST_LOAD_LIMIT_KB = 300;

const here = (path: string) => fileURLToPath(new URL(path, import.meta.url));

const POLICY = [
  "default-src 'self'",
  "script-src 'self' 'wasm-unsafe-eval'",
  "worker-src 'self'",
  "style-src 'self'",
  "img-src 'self' data: blob:",
  "media-src 'self' blob:",
  "connect-src 'self'",
  "object-src 'none'",
  "base-uri 'none'",
  "form-action 'none'",
].join('; ');

/** Writes the Content-Security-Policy into the built page, so that any static host serves it. */
const policy: Plugin = {
  name: 'fettle-policy',
  apply: 'build',
  transformIndexHtml: () => [
    { tag: 'meta', attrs: { 'http-equiv': 'Content-Security-Policy', content: POLICY }, injectTo: 'head-prepend' },
  ],
};

/** A worklet or worker holds its own copy of model/, out of reach of module replacement: an edit there reloads the page. */
const reloadWithModel: Plugin = {
  name: 'fettle-reload-with-model',
  hotUpdate({ file }) {
    if (!file.startsWith(here('worklet')) && !file.startsWith(here('model'))) return undefined;
    this.environment.hot.send({ type: 'full-reload' });
    return [];
  },
};

/** Copies what the page fetches out of assets/, and leaves the scripts that made it behind. */
const assetsWithoutScripts: Plugin = {
  name: 'fettle-assets',
  apply: 'build',
  writeBundle: () =>
    cpSync(here('assets'), here('dist'), { recursive: true, filter: (path) => !/\.(mjs|js|ts|py|sh)$|screenshots/.test(path) }),
};

/**
 * Fails the build when the entry, its static imports and the workers and worklets they name weigh too much. That nothing else is fetched before a
 * click is tested on the built page.
 */
const firstLoadBudget: Plugin = {
  name: 'fettle-budget',
  apply: 'build',
  generateBundle: {
    order: 'post',
    handler(_options, bundle) {
      const weights = weighFirstLoad(bundle);
      const totalKb = [...weights.values()].reduce((sum, kb) => sum + kb, 0);
      const list = [...weights].map(([name, kb]) => `${name} ${kb.toFixed(1)}`).join(', ');
      const sentence = `First-load JavaScript is ${totalKb.toFixed(1)} kB compressed, of ${FIRST_LOAD_LIMIT_KB} kB allowed (${list})`;
      if (totalKb > FIRST_LOAD_LIMIT_KB) this.error(sentence);
      this.info(sentence);
    },
  },
};

function weighFirstLoad(bundle: Rolldown.OutputBundle): Map<string, number> {
  const files = Object.values(bundle);
  const workers = files.filter((file) => file.type === 'asset' && file.fileName.endsWith('.js'));
  const waiting = files.filter((file) => file.type === 'chunk' && file.isEntry);
  const weights = new Map<string, number>();
  for (const file of waiting) {
    if (weights.has(file.fileName)) continue;
    const source = file.type === 'chunk' ? file.code : String(file.source);
    weights.set(file.fileName, gzipSync(source).length / 1000);
    waiting.push(...workers.filter((worker) => source.includes(basename(worker.fileName))));
    if (file.type === 'chunk') waiting.push(...file.imports.map((name) => bundle[name]));
  }
  return weights;
}

export default defineConfig({
  root: here('web'),
  base: './',
  publicDir: here('assets'),
  plugins: [policy, reloadWithModel, assetsWithoutScripts, firstLoadBudget],
  oxc: { jsx: { runtime: 'automatic', importSource: 'preact' } },
  worker: { format: 'es' },
  server: { host: 'localhost', fs: { allow: [here('.')] } },
  preview: { host: 'localhost' },
  build: {
    outDir: here('dist'),
    emptyOutDir: true,
    sourcemap: true,
    target: 'es2022',
    assetsInlineLimit: 0,
    copyPublicDir: false,
    reportCompressedSize: false,
    // Our own plugins take most of so short a build, which is no news to anyone who starts the page.
    rolldownOptions: { checks: { pluginTimings: false } },
  },
  test: {
    root: here('.'),
    projects: [
      {
        extends: true,
        test: {
          name: 'node',
          include: ['test/**/*.test.ts', 'test/**/*.test.tsx'],
          exclude: ['test/page/**'],
          testTimeout: 30_000,
          execArgv: ['--expose-gc'],
          server: { deps: { inline: ['ebur128-wasm'] } },
        },
      },
      {
        extends: true,
        test: {
          name: 'page',
          include: ['test/page/**/*.test.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
