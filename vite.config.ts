import { createHash } from 'node:crypto';
import { cpSync, readdirSync, readFileSync } from 'node:fs';
import { basename, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { gzipSync } from 'node:zlib';
import type { Plugin, Rolldown } from 'vite';
import { defineConfig } from 'vitest/config';

/** JavaScript that a first visit may load, compressed, in kB of 1000 bytes. */
const FIRST_LOAD_LIMIT_KB = 300;

/** The worker that serves the page without a network stands at the root, since it serves what lies below it. */
const OFFLINE = 'offline.js';

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

const isFetched = (path: string) => !/\.(mjs|js|ts|py|sh)$|screenshots/.test(path);

/** Copies what the page fetches out of assets/, and leaves the scripts that made it behind. */
const assetsWithoutScripts: Plugin = {
  name: 'fettle-assets',
  apply: 'build',
  writeBundle: () => cpSync(here('assets'), here('dist'), { recursive: true, filter: isFetched }),
};

/** Puts into the worker that serves the page without a network what the page consists of, each file with a revision that follows from its bytes. */
const offlineFiles: Plugin = {
  name: 'fettle-offline',
  apply: 'build',
  generateBundle: {
    order: 'post',
    handler(_options, bundle) {
      const worker = bundle[OFFLINE];
      if (worker?.type !== 'chunk') throw new Error(`The build made no ${OFFLINE}`);
      const revisions: Record<string, string> = {};
      const revisionOf = (bytes: string | Uint8Array) => createHash('sha256').update(bytes).digest('hex').slice(0, 12);
      for (const file of Object.values(bundle)) {
        if (file === worker || file.fileName.endsWith('.map')) continue;
        revisions[file.fileName] = revisionOf(file.type === 'chunk' ? file.code : file.source);
      }
      for (const entry of readdirSync(here('assets'), { recursive: true, withFileTypes: true })) {
        const path = relative(here('assets'), join(entry.parentPath, entry.name)).replaceAll('\\', '/');
        if (entry.isFile() && isFetched(path)) revisions[path] = revisionOf(readFileSync(here(`assets/${path}`)));
      }
      const { phrases } = JSON.parse(readFileSync(here('assets/phrases/manifest.json'), 'utf8'));
      const onDemand = phrases.slice(1).map(({ file }: { file: string }) => `phrases/${file}`);
      worker.code = worker.code
        .replaceAll('FETTLE_FILES', `(${JSON.stringify(revisions)})`)
        .replaceAll('FETTLE_ON_DEMAND', JSON.stringify(onDemand));
    },
  },
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
  plugins: [policy, reloadWithModel, assetsWithoutScripts, offlineFiles, firstLoadBudget],
  oxc: { jsx: { runtime: 'automatic', importSource: 'preact' } },
  // Kernels are alike, and compress to half while their variables keep their names.
  worker: { format: 'es', rolldownOptions: { output: { minify: { mangle: false, compress: true, codegen: { removeWhitespace: true } } } } },
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
    rolldownOptions: {
      checks: { pluginTimings: false },
      input: { index: here('web/index.html'), offline: here('web/workers/offline.ts') },
      output: { entryFileNames: ({ name }) => (name === 'offline' ? OFFLINE : 'assets/[name]-[hash].js') },
    },
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
