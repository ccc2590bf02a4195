import { readFileSync } from 'node:fs';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { createChain, processChain } from '../../model/chain/chain.ts';
import { compileChain } from '../../model/chain/compile.ts';
import { renderClip } from '../../model/chain/render.ts';
import { readWav, writeWav } from '../../model/chain/wav.ts';
import { setAt } from '../../model/design/path.ts';
import { readDesign } from '../../model/design/read.ts';
import type { Design } from '../../model/design/types.ts';
import { loudnessOf } from '../../model/measure/loudness.ts';
import { launchBrowser, openTab, type Site, type Tab } from '../support/browser.ts';
import { createNoise } from '../support/noise.ts';
import { RENDER_NAMES } from '../support/sameRenders.ts';
import { serveHarness } from './serveHarness.ts';

let site: Site;
let browser: Browser;
let tab: Tab;

beforeAll(async () => {
  site = await serveHarness();
  browser = await launchBrowser();
  tab = await openTab(browser, site);
});
afterAll(async () => {
  await browser?.close();
  await site?.close();
});

function example(name: string): Design {
  const result = readDesign(readFileSync(new URL(`../../assets/designs/${name}.json`, import.meta.url), 'utf8'));
  if ('faults' in result) throw new Error(result.faults[0].sentence);
  return result.design;
}

/** Noise at a level that a sine swells and fades, so that quiet and loud both occur; whole blocks of 128. */
function programme(seed: number, rateHz: number): Float32Array<ArrayBuffer> {
  const length = 128 * Math.ceil(rateHz / 128);
  return createNoise(seed, length, 0.4).map((x, n) => x * (0.5 - 0.5 * Math.cos((2 * Math.PI * 3 * n) / length)));
}

const toText = (line: Float32Array) => Buffer.from(line.buffer, line.byteOffset, line.byteLength).toString('base64');
const toSamples = (text: string) => new Float32Array(Uint8Array.from(Buffer.from(text, 'base64')).buffer);

const DESIGNS: [string, () => Design][] = [
  ['a tremolo with resistors and a blocking capacitor', () => example('harbour-tremolo')],
  ['a square LFO with buffered feedback', () => example('lantern-pulse')],
  ['a fixed pad, not oversampled', () => setAt(example('stage-box-pad'), 'oversampling', 1)],
];

for (const rateHz of [44100, 48000, 96000]) {
  test.each(DESIGNS)(`at ${rateHz} Hz the worklet gives Node’s samples, each one: %s`, async (_, design) => {
    // Both channels differ, so that one line in place of the other would show.
    const lines = [programme(1, rateHz), programme(2, rateHz)];
    const expected = lines.map((line) => new Float32Array(line.length));
    processChain(createChain(compileChain(design(), 0, rateHz, 2, 'lowLatency')), lines, expected);
    const peak = Math.max(...expected.map((line) => line.reduce((most, x) => Math.max(most, Math.abs(x)), 0)));
    // Below the ceiling, or the monitor would change it.
    expect(peak).toBeGreaterThan(0.05);
    expect(peak).toBeLessThan(1);
    const texts = await tab.page.evaluate(([sent, rate, samples]) => window.playOffline(sent, rate, samples), [
      design(),
      rateHz,
      lines.map(toText),
    ] as const);
    texts.map(toSamples).forEach((line, c) => {
      expect(line.length).toBe(expected[c].length);
      expect(line.reduce((differing, x, n) => differing + (x === expected[c][n] ? 0 : 1), 0)).toBe(0);
    });
    expect(tab.complaints).toEqual([]);
  });
}

test('the page’s worker measures the gains that Node does, and with them every variant is as loud as the source', async () => {
  const design = example('harbour-tremolo');
  const { channels, sampleRateHz } = readWav(readFileSync(new URL('../../assets/phrases/guitar.wav', import.meta.url)));
  const lines = channels.map((line) => line.slice(0, 3 * sampleRateHz));
  const file = Buffer.from(writeWav(lines, sampleRateHz, 'float32').bytes).toString('base64');
  const { variants } = await tab.page.evaluate(([text, sound]) => window.matchOf(text, sound), [JSON.stringify(design), file] as const);
  const wanted = loudnessOf(lines, sampleRateHz);
  expect(variants).toHaveLength(design.variants.length);
  variants.forEach((db, index) => {
    const heard = renderClip(design, index, lines, sampleRateHz).map((line) => line.map((x) => x * 10 ** ((db ?? 0) / 20)));
    expect(Math.abs(loudnessOf(heard, sampleRateHz) - wanted)).toBeLessThan(0.05);
    // What is heard live has other filters and starts at once: still as loud.
    const live = lines.map((line) => new Float32Array(line.length));
    processChain(createChain(compileChain(design, index, sampleRateHz, lines.length, 'lowLatency')), lines, live);
    const lufs = loudnessOf(live, sampleRateHz) + (db ?? 0);
    expect(Math.abs(lufs - wanted)).toBeLessThan(0.05);
  });
});

const COMMITTED: Record<string, string> = JSON.parse(readFileSync(new URL('../reference/renders.json', import.meta.url), 'utf8'));

test.each(RENDER_NAMES)('%s: the file’s SHA-256 is the committed one on the page and in a worker', async (name) => {
  for (const where of ['page', 'worker'] as const) {
    const hash = await tab.page.evaluate(([sent, place]) => window.hashOf(sent, place), [name, where] as const);
    expect(hash).toBe(COMMITTED[name]);
  }
});
