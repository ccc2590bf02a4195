import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { RENDER_NAMES, renderNamed, sha256 } from '../../support/sameRenders.ts';

const COMMITTED: Record<string, string> = JSON.parse(readFileSync(new URL('../../reference/renders.json', import.meta.url), 'utf8'));

test.each(RENDER_NAMES)('%s: the file’s SHA-256 is the committed one in Node', async (name) => {
  expect(await sha256(renderNamed(name))).toBe(COMMITTED[name]);
});
