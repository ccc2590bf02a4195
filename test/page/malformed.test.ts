/** Files that anybody may have made, opened in the real browser: each is refused by a sentence or taken, and the page goes on. */
import { readFileSync } from 'node:fs';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { launchBrowser, openTab, type Site, serveDist } from '../support/browser.ts';
import { malformedFile } from '../support/malformed.ts';
import { serveHarness } from './serveHarness.ts';
import { installSoundProbe } from './soundProbe.ts';

/** All of them: FETTLE_MALFORMED=2000. */
const FILES = Number(process.env.FETTLE_MALFORMED ?? 100);
const AT_ONCE = 100;
const THROUGH_THE_DOOR = 6;
const design = readFileSync(new URL('../../assets/designs/harbour-tremolo.json', import.meta.url), 'utf8');

let browser: Browser;
let harness: Site;
let built: Site;

beforeAll(async () => {
  browser = await launchBrowser();
  harness = await serveHarness();
  built = await serveDist();
});
afterAll(async () => {
  await browser?.close();
  await harness?.close();
  await built?.close();
});

test(`of ${FILES} malformed files each is refused by a sentence that names it, or taken; good files open in between`, {
  timeout: 600_000,
}, async () => {
  const { page, complaints, close } = await openTab(browser, harness);
  const total = { refused: 0, taken: 0 };
  const sentences: string[] = [];
  for (let from = 0; from < FILES; from += AT_ONCE) {
    const seeds = Array.from({ length: AT_ONCE }, (_, n) => from + n);
    const fed = await page.evaluate(([list, text]) => window.feedMalformed(list, text), [seeds, design] as const);
    expect(fed.faults).toEqual([]);
    total.refused += fed.refused;
    total.taken += fed.taken;
    sentences.push(...fed.sentences);
  }
  console.log(`malformed files: ${total.refused} refused, ${total.taken} taken\n${[...new Set(sentences)].slice(0, 40).join('\n')}`);
  // Both happen: a check that refuses all, or takes all, would prove little.
  expect(total.refused).toBeGreaterThan(FILES / 2);
  expect(total.taken).toBeGreaterThan(FILES / 50);
  expect(complaints).toEqual([]);
  await close();
});

test(`${THROUGH_THE_DOOR} malformed files dropped on the page while it plays leave it playing, and usable`, async () => {
  const { page, complaints, close } = await openTab(browser, built, { beforeLoad: installSoundProbe });
  await page.getByRole('button', { name: 'Start', exact: true }).click();
  await page.waitForFunction(() => window.soundProbe.firstSoundMs !== null);
  for (let n = 0; n < THROUGH_THE_DOOR; n++) {
    const { name, bytes } = malformedFile(100_000 + n, design);
    const dropped = { name, text: Buffer.from(bytes).toString('base64') };
    await page.evaluate(dropFile, dropped);
    await page
      .waitForFunction(
        (title) => document.body.textContent?.includes(`“${title}”`) || document.querySelector('.sentence')?.textContent?.includes(title),
        name,
        { timeout: 5000 },
      )
      .catch(() => {
        // A design that was taken shows in its title and variants, not by the name of its file.
        expect(name).toMatch(/json$/);
      });
    const putAway = page.getByRole('button', { name: 'Put away' });
    while ((await putAway.count()) > 0) await putAway.first().click();
  }
  expect(complaints).toEqual([]);
  await page.getByLabel('Source', { exact: true }).selectOption({ label: 'Bass line' });
  await page.waitForFunction(() => window.soundProbe.peak > 0);
  await close();
});

/** Runs in the page. */
function dropFile({ name, text }: { name: string; text: string }): void {
  const bytes = Uint8Array.from(atob(text), (letter) => letter.charCodeAt(0));
  const dropped = new DataTransfer();
  dropped.items.add(new File([bytes], name));
  window.dispatchEvent(new DragEvent('drop', { dataTransfer: dropped }));
}
