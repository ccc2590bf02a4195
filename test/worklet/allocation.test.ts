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
test.each([
  // 533 s of sound: 29 reports a second and about six chunks.
  { run: 'plain', what: '200 000 blocks of four variants', messages: 15_000, most: 0 },
  // Values that move without rest still leave about 1 kB a block: 2 collections were seen. At rest there are none.
  {
    run: 'everything',
    what: '20 000 blocks at ×8 with noise, values that move, the loop, a real amplifier, graded capacitances and λ',
    messages: 1500,
    most: 3,
  },
])(
  '$what, another heard at each, with reports and a take running, cause at most $most garbage collections',
  async ({ run, messages, most }) => {
    const folder = mkdtempSync(join(tmpdir(), 'fettle-allocation-'));
    try {
      await build({
        configFile: false,
        logLevel: 'warn',
        build: {
          ssr: entry,
          outDir: folder,
          emptyOutDir: true,
          target: 'es2022',
          rollupOptions: { output: { entryFileNames: 'run.mjs' } },
        },
      });
      const counted = JSON.parse(execFileSync(process.execPath, ['--expose-gc', join(folder, 'run.mjs'), run], { encoding: 'utf8' }));
      expect(counted.processing).toBeLessThanOrEqual(most);
      expect(counted.messages).toBeGreaterThan(messages);
      expect(counted.control).toBeGreaterThan(0);
    } finally {
      rmSync(folder, { recursive: true });
    }
  },
  300_000,
);
