import { execFileSync } from 'node:child_process';
import { cpSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { type Import, judgeImport, readImports } from './support/imports.ts';

const root = fileURLToPath(new URL('..', import.meta.url));

function sourcesIn(folder: string): string[] {
  const names = readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' });
  return names.filter((name) => /\.(ts|tsx|mjs|js)$/.test(name)).map((name) => `${folder}/${name.replaceAll('\\', '/')}`);
}

function faultsOf(path: string, source: string): string[] {
  return readImports(path, source)
    .map((found) => judgeImport(path, found))
    .filter((fault) => fault !== undefined);
}

describe('import arrows', () => {
  test.each(['model', 'worklet', 'web'])('every import in %s points inward', (folder) => {
    expect(sourcesIn(folder).flatMap((path) => faultsOf(path, readFileSync(join(root, path), 'utf8')))).toEqual([]);
  });

  test('every way of importing is seen', () => {
    const source = `
      import './a.ts';
      import b from './b.ts';
      import type { C } from './c.ts';
      import { type D } from './d.ts';
      export { e } from './e.ts';
      export type { F } from './f.ts';
      export * from './g.ts';
      const h = await import('./h.ts');
      let i: import('./i.ts').I;
      const j = new Worker(new URL('./j.ts', import.meta.url));
      const notAnImport = new URL('./k.ts', document.baseURI);`;
    const expected: Import[] = ['a', 'b', 'c', 'd', 'e', 'f', 'g', 'h', 'i', 'j'].map((name) => ({
      target: `./${name}.ts`,
      typeOnly: ['c', 'f', 'i'].includes(name),
    }));
    const byTarget = (a: Import, b: Import) => a.target.localeCompare(b.target);
    expect(readImports('model/cell/x.ts', source).sort(byTarget)).toEqual(expected);
    expect(() => readImports('web/x.ts', 'import(name)')).toThrow('web/x.ts: an import is computed');
  });

  test.each([
    ['model/control/x.ts', `import { solve } from '../cell/solve.ts'`],
    ['model/control/x.ts', `import type { Cell } from '../cell/cell.ts'`],
    ['model/control/x.ts', `import { readDesign } from '../design/types.ts'`],
    ['model/device/x.ts', `export * from '../cell/solve.ts'`],
    ['model/design/x.ts', `import { law } from '../device/law.ts'`],
    ['model/measure/x.ts', `const chain = await import('../chain/chain.ts')`],
    ['model/chain/x.ts', `import { map } from '../study/map.ts'`],
    ['model/study/x.ts', `import { main } from '../command/main.ts'`],
    ['model/cell/x.ts', `import { view } from '../../web/main.tsx'`],
    ['model/chain/x.ts', `import { readFileSync } from 'node:fs'`],
    ['model/chain/x.ts', `import { readFileSync } from 'fs'`],
    ['model/chain/x.ts', `import { h } from 'preact'`],
    ['worklet/x.ts', `import { bench } from '../web/state/bench.ts'`],
    ['web/x.tsx', `import { Shell } from '../worklet/cell.worklet.ts'`],
    ['web/x.tsx', `import { main } from '../model/command/main.ts'`],
    ['web/x.tsx', `import { launch } from '../test/support/browser.ts'`],
    ['web/x.tsx', `import chai from 'fast-check'`],
  ])('a wrong arrow is caught: %s with %s', (path, source) => {
    expect(faultsOf(path, source)).toHaveLength(1);
  });

  test.each([
    ['model/cell/x.ts', `import { law } from '../device/law.ts'`],
    ['model/control/x.ts', `import type { Variant } from '../design/types.ts'`],
    ['model/command/x.ts', `import { readFileSync } from 'node:fs'`],
    ['web/audio/x.ts', `import url from '../../worklet/cell.worklet.ts?worker&url'`],
    ['web/x.tsx', `import type { Message } from '../worklet/protocol.ts'`],
  ])('a right arrow is let through: %s with %s', (path, source) => {
    expect(faultsOf(path, source)).toEqual([]);
  });
});

describe('lint', () => {
  const banned = {
    'a function of Math': 'export const x = Math.exp(1);',
    'a function of Math handed on': 'export const x = [1, 2].map(Math.sin);',
    'Math taken apart': 'export const { pow } = Math;',
    'Math under another name': 'const M = Math;\nexport const x = M.tanh(1);',
    'Math by index': "export const x = Math['log'](2);",
    'Math by way of the global object': 'export const x = globalThis.Math.cos(1);',
    'the power operator': 'export const x = (a: number) => a ** 2;',
    'the power assignment': 'export function x(a: number) {\n  let y = a;\n  y **= 2;\n  return y;\n}',
  };
  const madeCode = {
    'new Function': "export const x = new Function('return 1');",
    Function: "export const x = Function('return 1');",
    eval: "export const x = eval('1');",
    'eval called from afar': "export const x = (0, eval)('1');",
  };
  const allowed = 'export const x = (a: number) => Math.sqrt(Math.abs(a)) * Math.PI + Math.max(a, Math.floor(a)) - (a * a) / 2;';

  test.each(Object.entries({ ...banned, ...madeCode }))('refuses %s in model/', (_name, source) => {
    expect(lint('model/device/x.ts', source)).toBeGreaterThan(0);
  });

  test.each(Object.entries(madeCode))('refuses %s outside model/', (_name, source) => {
    expect(lint('web/x.ts', source)).toBeGreaterThan(0);
  });

  test('lets the exact operations through, and all of Math outside model/', () => {
    expect(lint('model/device/x.ts', allowed)).toBe(0);
    expect(lint('web/x.ts', banned['a function of Math'])).toBe(0);
  });

  /** How many errors the repository's own settings find in a file with this source at this path. */
  function lint(path: string, source: string): number {
    const folder = mkdtempSync(join(tmpdir(), 'fettle-lint-'));
    try {
      for (const name of ['biome.json', 'test/support/lint']) cpSync(join(root, name), join(folder, name), { recursive: true });
      mkdirSync(join(folder, path, '..'), { recursive: true });
      writeFileSync(join(folder, path), source);
      return countErrors(folder);
    } finally {
      rmSync(folder, { recursive: true });
    }
  }

  function countErrors(folder: string): number {
    const command = [join(root, 'node_modules/@biomejs/biome/bin/biome'), 'lint', '--reporter=json', '.'];
    try {
      return readErrors(execFileSync(process.execPath, command, { cwd: folder, encoding: 'utf8', stdio: 'pipe' }));
    } catch (error) {
      return readErrors((error as { stdout: string }).stdout);
    }
  }

  function readErrors(report: string): number {
    const { summary } = JSON.parse(report) as { summary: { errors: number; unchanged: number } };
    if (summary.unchanged === 0) throw new Error('nothing was linted');
    return summary.errors;
  }
});
