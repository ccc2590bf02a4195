/** Sources and their faults on the built page: live input, the loop and the place, devices and contexts that go away. */
import { readFileSync } from 'node:fs';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { readWav, writeWav } from '../../model/chain/wav.ts';
import { launchBrowser, openTab, type Site, serveDist } from '../support/browser.ts';
import { installSoundProbe } from './soundProbe.ts';

const FAKE_DEVICE = '--use-fake-device-for-media-stream';
const ALLOWED = '--use-fake-ui-for-media-stream';

let site: Site;
let browser: Browser;

beforeAll(async () => {
  site = await serveDist();
  browser = await launchBrowser({ flags: [FAKE_DEVICE, ALLOWED] });
});
afterAll(async () => {
  await browser?.close();
  await site?.close();
});

const button = (page: Page, name: string) => page.getByRole('button', { name, exact: true });
const source = (page: Page) => page.getByLabel('Source', { exact: true });
const place = (page: Page) => page.getByRole('slider', { name: /^Place in/ });
const spin = (page: Page, name: RegExp) => page.getByRole('spinbutton', { name }).first();
const peakRises = (page: Page) => page.waitForFunction(() => window.soundProbe.peak > 0);

/** The page with its sound on and one variant, so that a busy machine keeps up. */
async function openPlaying(within: Browser = browser, installMore: () => void = () => {}) {
  const tab = await openTab(within, site, { beforeLoad: installSoundProbe });
  await tab.page.evaluate(installMore);
  const design = JSON.parse(readFileSync(new URL('../../assets/designs/harbour-tremolo.json', import.meta.url), 'utf8'));
  await drop(tab.page, 'one.json', Buffer.from(JSON.stringify({ ...design, variants: design.variants.slice(0, 1), oversampling: 1 })));
  await button(tab.page, 'Copy variant A to B').waitFor();
  await button(tab.page, 'Start').click();
  await tab.page.waitForFunction(() => window.soundProbe.firstSoundMs !== null);
  return tab;
}

async function drop(page: Page, name: string, bytes: Buffer): Promise<void> {
  await page.evaluate(
    ([title, text]) => {
      const dropped = new DataTransfer();
      dropped.items.add(new File([Uint8Array.from(atob(text), (letter) => letter.charCodeAt(0))], title));
      window.dispatchEvent(new DragEvent('drop', { dataTransfer: dropped }));
    },
    [name, bytes.toString('base64')] as const,
  );
}

async function openLive(page: Page): Promise<void> {
  await source(page).selectOption('live input');
  await button(page, 'Open the input').click();
}

describe('live input', () => {
  test('is warned of before it is opened, begins muted, and is heard in a context of less delay, whose delay is stated', async () => {
    const { page, complaints, close } = await openPlaying();
    await source(page).selectOption('live input');
    await page.getByText('A loudspeaker near the microphone howls').waitFor();
    await button(page, 'Leave it').click();
    expect(await source(page).inputValue()).toBe('phrase guitar');
    await openLive(page);
    await page.getByText(/late by (at least )?\d+\sms \(input \d/).waitFor();
    expect(await button(page, 'Muted').getAttribute('aria-pressed')).toBe('true');
    await page.waitForTimeout(300);
    expect(await page.evaluate(() => window.soundProbe.peak)).toBe(0);
    await button(page, 'Muted').click();
    await peakRises(page);
    const [before, live] = await page.evaluate(() => window.soundProbe.contexts.map(({ baseLatency }) => baseLatency));
    expect(live).toBeLessThan(before);
    expect(await page.getByText('Live input has no end, so it is not rendered whole.').count()).toBe(1);
    const device = page.getByLabel('Input device');
    const values = await device.locator('option').evaluateAll((options) => options.map((option) => (option as HTMLOptionElement).value));
    expect(values.length).toBeGreaterThan(1);
    await device.selectOption(values[values.length - 1]);
    await button(page, 'Muted').waitFor();
    await button(page, 'Take what is heard').click();
    await page.waitForTimeout(600);
    await button(page, 'End the take').click();
    await button(page, 'Save “Take 1”').waitFor();
    await source(page).selectOption({ label: 'Bass line' });
    await button(page, 'Muted').click();
    await peakRises(page);
    expect(complaints).toEqual([]);
    await close();
  });

  test('asks for its processing to be off', async () => {
    const { page, close } = await openPlaying(browser, () => {
      const asked = navigator.mediaDevices.getUserMedia.bind(navigator.mediaDevices);
      navigator.mediaDevices.getUserMedia = (wishes) => {
        Object.assign(window, { wishes });
        return asked(wishes);
      };
    });
    await openLive(page);
    await page.getByText(/late by/).waitFor();
    expect(await page.evaluate(() => (window as unknown as { wishes: unknown }).wishes)).toMatchObject({
      audio: { echoCancellation: false, noiseSuppression: false, autoGainControl: false },
    });
    await close();
  });

  test('that goes away stops the sound and says so; Start plays what was chosen before', async () => {
    const { page, complaints, close } = await openPlaying(browser, () => {
      const asked = navigator.mediaDevices.getUserMedia.bind(navigator.mediaDevices);
      navigator.mediaDevices.getUserMedia = async (wishes) => {
        const stream = await asked(wishes);
        Object.assign(window, { stream });
        return stream;
      };
    });
    await openLive(page);
    await page.getByText(/late by/).waitFor();
    // As the browser does when a device is unplugged: `stop` by a page fires nothing.
    await page.evaluate(() => (window as unknown as { stream: MediaStream }).stream.getAudioTracks()[0].dispatchEvent(new Event('ended')));
    await page.getByText(/^The input “.*” is gone/).waitFor();
    expect(await source(page).inputValue()).toBe('phrase guitar');
    await button(page, 'Start').click();
    await button(page, 'Muted').click();
    await peakRises(page);
    expect(complaints).toEqual([]);
    await close();
  });

  test('that is refused is said, and what plays goes on', async () => {
    const other = await launchBrowser({ flags: [FAKE_DEVICE] });
    const { page, close } = await openPlaying(other);
    await openLive(page);
    await page.getByText('The browser was not allowed to listen to an input').waitFor();
    expect(await source(page).inputValue()).toBe('phrase guitar');
    await peakRises(page);
    await close();
    await other.close();
  });

  test('that is not there is said, and what plays goes on', async () => {
    const { page, close } = await openPlaying(browser, () => {
      navigator.mediaDevices.getUserMedia = () => Promise.reject(new DOMException('Requested device not found', 'NotFoundError'));
    });
    await openLive(page);
    await page.getByText('This machine has no sound input').waitFor();
    expect(await source(page).inputValue()).toBe('phrase guitar');
    await peakRises(page);
    await close();
  });
});

test('the loop is drawn, seeks are pressed, and nothing of it clicks', async () => {
  const { page, complaints, close } = await openPlaying();
  const sine = Float32Array.from({ length: 96000 }, (_, n) => 0.5 * Math.sin((2 * Math.PI * 100 * n) / 48000));
  await drop(page, 'sine.wav', Buffer.from(writeWav([sine], 48000, 'float32').bytes));
  await page.getByRole('slider', { name: /sine\.wav/ }).waitFor();
  await button(page, 'bypass').click();
  await page.waitForTimeout(500);
  await button(page, 'Take what is heard').click();
  const box = await page.locator('.source-track').boundingBox();
  if (box === null) throw new Error('the source is not drawn');
  const y = box.y + box.height / 3;
  const at = (fraction: number) => box.x + box.width * fraction;
  await page.mouse.move(at(0.3), y);
  await page.mouse.down();
  await page.mouse.move(at(0.4133), y, { steps: 3 });
  await page.mouse.up();
  await page.waitForTimeout(1200);
  for (const fraction of [0.35, 0.391, 0.8, 0.123, 0.5]) {
    await page.mouse.click(at(fraction), y);
    await page.waitForTimeout(250);
  }
  await button(page, 'End the take').click();
  await page.getByRole('combobox', { name: 'Format of saved takes' }).selectOption('float32');
  const [download] = await Promise.all([page.waitForEvent('download'), button(page, 'Save “Take 1”').click()]);
  const [taken] = readWav(readFileSync(await download.path())).channels;
  expect(taken.length).toBeGreaterThan(48000);
  const greatest = taken.subarray(1).reduce((most, x, n) => Math.max(most, Math.abs(x - taken[n])), 0);
  // A sine of 100 Hz at 0.5 steps by 0.0065, two of them that fade over 20 ms by 0.001 more, over 10 ms of raised cosine by 0.0033; a cut by up to 1.
  expect(greatest).toBeLessThan(0.015);
  expect(complaints).toEqual([]);
  await close();
});

test('the place and the loop are set by key, and by typing', async () => {
  const { page, complaints, close } = await openTab(browser, site);
  await expect.poll(async () => Number(await place(page).getAttribute('aria-valuemax'))).toBeGreaterThan(7);
  await place(page).focus();
  for (const key of ['ArrowRight', 'ArrowRight', 'ArrowRight', 'ArrowRight', '[', 'PageUp', ']', 'Home']) await page.keyboard.press(key);
  expect(await spin(page, /^Loop begins/).textContent()).toBe('0:02');
  expect(await spin(page, /^Loop ends/).textContent()).toBe('0:07');
  await expect.poll(() => place(page).getAttribute('aria-valuetext')).toBe('0:02.0');
  expect(await place(page).getAttribute('aria-valuemax')).toBe('7');
  await page.keyboard.press(']');
  await page.getByText('The loop is 2.00 s to 2.00 s; expected 0.05 s or more').waitFor();
  await spin(page, /^Loop ends/).click();
  await page.keyboard.type('0:03.5');
  await page.keyboard.press('Enter');
  expect(await spin(page, /^Loop ends/).textContent()).toBe('0:03.5');
  await place(page).focus();
  await page.keyboard.press('Escape');
  expect(await spin(page, /^Loop begins/).textContent()).toBe('0:00');
  expect(complaints).toEqual([]);
  await close();
});

describe('faults', () => {
  test('an output device that is gone is said, and Start goes on', async () => {
    const { page, close } = await openPlaying();
    await page.evaluate(() => window.soundProbe.contexts[0].dispatchEvent(new Event('error')));
    await page.getByText('The sound output is gone').waitFor();
    await page.waitForFunction(() => window.soundProbe.contexts[0].state === 'suspended');
    await button(page, 'Start').click();
    await peakRises(page);
    await close();
  });

  test('sound that stops coming without a word is said', async () => {
    const { page, close } = await openPlaying();
    await page.waitForTimeout(500);
    // The node goes on, but nothing of it arrives: as when the device takes no more samples.
    await page.evaluate(() => {
      (window.soundProbe.nodes.at(-1) as AudioWorkletNode).port.onmessage = null;
    });
    await page.getByText('No sound has come for 3 s').waitFor({ timeout: 20_000 });
    await close();
  });

  test('a tab that the browser froze in the background plays on when it is back', async () => {
    const { page, complaints, close } = await openPlaying();
    const session = await page.context().newCDPSession(page);
    await session.send('Page.setWebLifecycleState', { state: 'frozen' });
    await new Promise((resolve) => setTimeout(resolve, 2500));
    await session.send('Page.setWebLifecycleState', { state: 'active' });
    await peakRises(page);
    expect(await button(page, 'Stop').count()).toBe(1);
    expect(complaints).toEqual([]);
    await close();
  });

  test('an interruption, as Safari has it, is said, and sound is there again after it', async () => {
    const { page, close } = await openPlaying();
    await page.evaluate(() => {
      const [context] = window.soundProbe.contexts;
      Object.defineProperty(context, 'state', { value: 'interrupted', configurable: true });
      context.dispatchEvent(new Event('statechange'));
    });
    await page.getByText('The system has paused the sound').waitFor();
    await page.evaluate(() => {
      const [context] = window.soundProbe.contexts;
      Reflect.deleteProperty(context, 'state');
      context.dispatchEvent(new Event('statechange'));
    });
    await button(page, 'Stop').waitFor();
    await close();
  });

  test('a browser that cannot show the page is told what it lacks; one that cannot play is told that, and shows the rest', async () => {
    const old = await openTab(browser, site, { beforeLoad: () => Reflect.deleteProperty(window, 'ResizeObserver') });
    await old.page.getByText('ResizeObserver').waitFor();
    expect(old.complaints).toEqual([]);
    await old.close();
    const silent = await openTab(browser, site, { beforeLoad: () => Reflect.deleteProperty(window, 'AudioWorkletNode') });
    await silent.page.getByText('This browser has no audio worklet').waitFor();
    await silent.page.locator('.k-pointer').waitFor();
    expect(silent.complaints).toEqual([]);
    await silent.close();
  });
});
