import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'vite';
import { expect, test } from 'vitest';

const entry = fileURLToPath(new URL('./allocationRun.ts', import.meta.url));

// In a process of its own and bundled, as the page's worklet is: the test runner rewrites imports into property reads, behind which every
// number that a function returns is an object.
// V8 compiles a kernel in one of two ways, as it happens to: in one its coefficients stay numbers, in the other each becomes an object at every call.
// The first makes 0 collections, the second was seen to make 352, short of a millisecond each: below one for every second of sound.
test('200 000 blocks of four variants, another heard at each, with reports and a take running, cause less than a collection for each second of sound', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'fettle-allocation-'));
  try {
    await build({
      configFile: false,
      logLevel: 'warn',
      build: { ssr: entry, outDir: folder, emptyOutDir: true, target: 'es2022', rollupOptions: { output: { entryFileNames: 'run.mjs' } } },
    });
    const printed = execFileSync(process.execPath, ['--expose-gc', join(folder, 'run.mjs')], { encoding: 'utf8' });
    const { processing, messages, control } = JSON.parse(printed);
    expect(processing).toBeLessThan(533);
    // 533 s of sound: 29 reports a second and about six chunks.
    expect(messages).toBeGreaterThan(15_000);
    expect(control).toBeGreaterThan(0);
  } finally {
    rmSync(folder, { recursive: true });
  }
}, 120_000);
