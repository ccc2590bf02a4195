/** The sheet as it is seen: nothing overlaps or overflows, values are changed where they stand, and nobody is shut out. */
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { findAccessFaults, launchBrowser, openTab, type Site, serveDist } from '../support/browser.ts';

const WIDTHS = [320, 390, 768, 1280, 1600, 1920, 2560];
const FEEDBACK = 'Feedback from drain to gate';
const CONTROL = 'Control: what moves the gate';

const ADD = 'Add a part to the board';
/** All that one board can have; the pickup takes the place of a previous stage. */
const BOARD = [
  ...['pickup', 'pad', 'follower', 'coupling', 'drain return', 'output coupling', 'driver resistance', 'smoothing'],
  ...['gate clamp', 'half supply', 'shared ground', 'stray capacitance'],
];

let browser: Browser;
let site: Site;

beforeAll(async () => {
  site = await serveDist();
  browser = await launchBrowser();
});

afterAll(async () => {
  await browser?.close();
  await site?.close();
});

async function openSheet(widthPx: number, colourScheme: 'light' | 'dark' = 'light') {
  const tab = await openTab(browser, site, { widthPx, heightPx: 900, colourScheme });
  await tab.page.getByRole('slider', { name: 'k, the feedback fraction' }).waitFor();
  return tab;
}

/** The value in Fig. 1 whose accessible name begins with this. */
const value = (page: Page, name: string) => page.locator(`.drawing [role=spinbutton][aria-label^="${name}"]`);

describe.each(WIDTHS)('at %i px', (widthPx) => {
  test('no fitting makes values overlap or leave the sheet, and nothing scrolls sideways', async () => {
    const { page, complaints, close } = await openSheet(widthPx);
    for (const feedback of ['resistor', 'buffered', 'none']) {
      await page.locator('.drawing').getByLabel(FEEDBACK).selectOption(feedback);
      for (const shape of ['square', 'envelope', 'external', 'fixed', 'falling', 'sine']) {
        await page.getByLabel(CONTROL).selectOption(shape);
        expect(await page.evaluate(overlapsInDrawing), `${feedback}, ${shape}`).toEqual([]);
        expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(widthPx);
      }
    }
    expect(complaints).toEqual([]);
    await close();
  });

  test('a full board makes no values overlap or leave the sheet, and nothing scrolls sideways', async () => {
    const { page, complaints, close } = await openSheet(widthPx);
    for (const part of ['previous stage', ...BOARD]) await page.getByLabel(ADD).selectOption(part);
    for (const shape of ['square', 'envelope']) {
      await page.getByLabel(CONTROL).selectOption(shape);
      expect(await page.evaluate(overlapsInDrawing), shape).toEqual([]);
      expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(widthPx);
    }
    expect(await page.evaluate(smallTexts)).toEqual([]);
    for (const part of BOARD) await page.getByRole('button', { name: `Take out: ${part}`, exact: true }).click();
    expect(await page.locator('.board .drawing').count()).toBe(0);
    expect(complaints).toEqual([]);
    await close();
  });

  test('what stands in red beside the FET crosses no wire and no value, and nothing scrolls sideways', async () => {
    const { page, close } = await openSheet(widthPx);
    await page.getByLabel(CONTROL).selectOption('fixed');
    await value(page, 'Control voltage').click();
    await page.keyboard.type('1.2');
    await page.keyboard.press('Enter');
    await page.locator('.limit-words', { hasText: 'gate conducts' }).waitFor();
    expect(await page.evaluate(underLimitWords)).toEqual([]);
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(widthPx);
    await close();
  });

  test('no text is under 11 px', async () => {
    const { page, close } = await openSheet(widthPx);
    expect(await page.evaluate(smallTexts)).toEqual([]);
    await close();
  });
});

describe.each(['light', 'dark'] as const)('in the %s scheme', (scheme) => {
  test.each([390, 768, 1280, 1920])(
    'axe-core finds no fault at rest, while typing, when refused and in a dialog, at %i px',
    async (widthPx) => {
      const { page, close } = await openSheet(widthPx, scheme);
      expect(await findAccessFaults(page)).toEqual([]);
      await value(page, 'R1').click();
      await page.keyboard.type('6k8');
      expect(await findAccessFaults(page)).toEqual([]);
      await page.keyboard.type('k');
      expect(await findAccessFaults(page)).toEqual([]);
      await page.keyboard.press('Escape');
      await page.getByLabel(ADD).selectOption('half supply');
      await page.getByLabel(ADD).selectOption('coupling');
      await page.getByLabel(CONTROL).selectOption('envelope');
      expect(await findAccessFaults(page)).toEqual([]);
      await page.getByRole('button', { name: 'Keys' }).click();
      expect(await findAccessFaults(page)).toEqual([]);
      await close();
    },
  );
});

describe('a value where it stands', () => {
  test('is typed, and Enter sets it; undo brings the old one back', async () => {
    const { page, close } = await openSheet(1280);
    const before = await value(page, 'R1').textContent();
    await value(page, 'R1').click();
    await page.keyboard.type('6k8');
    await page.keyboard.press('Enter');
    expect(await value(page, 'R1').textContent()).toBe('6.80\u2009kΩ');
    expect(await value(page, 'R1').getAttribute('aria-valuetext')).toBe('6.80\u2009kΩ');
    await page.getByRole('button', { name: 'Undo' }).click();
    expect(await value(page, 'R1').textContent()).toBe(before);
    await close();
  });

  test('is left as it was by Esc, and keeps the focus', async () => {
    const { page, close } = await openSheet(1280);
    const before = await value(page, 'R1').textContent();
    await value(page, 'R1').focus();
    await page.keyboard.type('33');
    await page.keyboard.press('Escape');
    expect(await value(page, 'R1').textContent()).toBe(before);
    expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-label'))).toContain('R1');
    await close();
  });

  test('is refused with a sentence and advice, and nothing changes', async () => {
    const { page, close } = await openSheet(1280);
    const before = await value(page, 'R2').textContent();
    await value(page, 'R2').click();
    await page.keyboard.type('1M2k');
    await page.keyboard.press('Enter');
    expect(await page.getByRole('alert').textContent()).toBe('“1M2k” is not a resistance.');
    expect(await page.locator('.schematic figcaption').textContent()).toContain('Write 1M2');
    await page.keyboard.press('Escape');
    expect(await value(page, 'R2').textContent()).toBe(before);
    await close();
  });

  test('steps through E24 by the arrow keys and by decades with the page keys', async () => {
    const { page, close } = await openSheet(1280);
    await value(page, 'R1').click();
    await page.keyboard.type('10k');
    await page.keyboard.press('Enter');
    await page.keyboard.press('ArrowUp');
    expect(await value(page, 'R1').textContent()).toBe('11.0\u2009kΩ');
    await page.keyboard.press('PageDown');
    expect(await value(page, 'R1').textContent()).toBe('1.10\u2009kΩ');
    await close();
  });

  test('is dragged through its steps', async () => {
    const { page, close } = await openSheet(1280);
    await value(page, 'R1').click();
    await page.keyboard.type('10k');
    await page.keyboard.press('Enter');
    const box = await value(page, 'R1').boundingBox();
    if (box === null) throw new Error('R1 is not on the page');
    await page.mouse.move(box.x + 10, box.y + 8);
    await page.mouse.down();
    await page.mouse.move(box.x + 10 + 28, box.y + 8, { steps: 4 });
    await page.mouse.up();
    expect(await value(page, 'R1').textContent()).toBe('13.0\u2009kΩ');
    await close();
  });

  test('takes a part out with «none», and the drawing follows', async () => {
    const { page, close } = await openSheet(1280);
    await page.locator('.drawing').getByLabel(FEEDBACK).selectOption('resistor');
    await value(page, 'C1').click();
    await page.keyboard.type('100n');
    await page.keyboard.press('Enter');
    const plates = () => page.locator('.drawing .symbol .plate').count();
    const fitted = await plates();
    await value(page, 'C1').click();
    await page.keyboard.type('none');
    await page.keyboard.press('Enter');
    expect(await value(page, 'C1').textContent()).toBe('none');
    expect(await plates()).toBe(fitted - 1);
    await close();
  });

  test.each([390, 1280])('shows its slip where it hides no other value, at %i px', async (widthPx) => {
    const { page, close } = await openSheet(widthPx);
    for (const name of ['R1', 'R3', 'R4', 'VGS(off)', 'IDSS', 'Make-up']) {
      await value(page, name).click();
      await page.keyboard.type('1');
      await page.waitForTimeout(50);
      expect(await page.evaluate(valuesUnderSlip), name).toEqual([]);
      await page.keyboard.press('Escape');
    }
    await close();
  });
});

describe('a choice', () => {
  test('that is refused says why, and the list goes back', async () => {
    const { page, close } = await openSheet(1280);
    const control = page.getByLabel(CONTROL);
    await control.selectOption('fixed');
    await value(page, 'Control voltage').click();
    await page.keyboard.type('90');
    await page.keyboard.press('Enter');
    await control.selectOption('sine');
    expect(await page.getByRole('alert').textContent()).toContain('is 135; expected −100 V to 100 V');
    expect(await control.inputValue()).toBe('fixed');
    expect(await value(page, 'Control voltage').textContent()).toBe('90.00\u2009V');
    await close();
  });

  test('of the channel is one step of undo, with the control that goes with it', async () => {
    const { page, close } = await openSheet(1280);
    const texts = () => page.locator('.drawing .value').allTextContents();
    const before = await texts();
    await page.getByLabel('Channel of J1').selectOption('p');
    expect(await value(page, 'VGS(off)').textContent()).toBe('1.50\u2009V');
    await page.getByRole('button', { name: 'Undo' }).click();
    expect(await texts()).toEqual(before);
    await close();
  });
});

describe('the rate of the LFO', () => {
  test('is tapped by key and by pointer', async () => {
    const { page, close } = await openSheet(1280);
    const tap = page.getByRole('button', { name: 'Tap the rate of the LFO' });
    const rate = async () => Number((await value(page, 'Rate of the LFO').textContent())?.split('\u2009')[0]);
    await page.evaluate(() => {
      Object.assign(window, { tapsMs: [] });
      window.addEventListener('click', ({ timeStamp }) => (window as unknown as { tapsMs: number[] }).tapsMs.push(timeStamp), true);
    });
    /** Of the taps as the page had them: a busy machine spaces them as it likes. */
    const tappedHz = async () => {
      const tapsMs = await page.evaluate(() => (window as unknown as { tapsMs: number[] }).tapsMs.splice(0));
      return Number(((1000 * (tapsMs.length - 1)) / (tapsMs[tapsMs.length - 1] - tapsMs[0])).toPrecision(3));
    };
    await tap.focus();
    for (let n = 0; n < 5; n++) {
      await page.keyboard.press('Enter');
      await page.waitForTimeout(125);
    }
    expect(Math.abs((await rate()) / (await tappedHz()) - 1)).toBeLessThan(0.02);
    await page.waitForTimeout(2600);
    for (let n = 0; n < 4; n++) {
      await tap.click();
      await page.waitForTimeout(400);
    }
    expect(Math.abs((await rate()) / (await tappedHz()) - 1)).toBeLessThan(0.02);
    await close();
  });
});

describe('k', () => {
  test('moves the resistor that is chosen', async () => {
    const { page, close } = await openSheet(1280);
    const before = await value(page, 'R2').textContent();
    await page.getByLabel('What setting k moves').selectOption('controlOhm');
    await page.getByRole('slider', { name: 'k, the feedback fraction' }).focus();
    await page.keyboard.press('PageUp');
    expect(await value(page, 'R2').textContent()).toBe(before);
    expect(await value(page, 'R3').textContent()).not.toBe('910\u2009kΩ');
    await close();
  });

  test('is set by the pointer on the axis of Fig. 2, from the keyboard and by dragging', async () => {
    const { page, close } = await openSheet(1280);
    await page.locator('.drawing').getByLabel(FEEDBACK).selectOption('buffered');
    const slider = page.getByRole('slider', { name: 'k, the feedback fraction' });
    await slider.focus();
    await page.keyboard.press('Home');
    const low = Number(await slider.getAttribute('aria-valuenow'));
    await page.keyboard.press('ArrowRight');
    expect(Number(await slider.getAttribute('aria-valuenow'))).toBeCloseTo(low + 0.001, 6);
    const track = await page.locator('.k-track').boundingBox();
    if (track === null) throw new Error('Fig. 2 has no axis');
    await page.mouse.move(track.x + 10, track.y + 20);
    await page.mouse.down();
    await page.mouse.move(track.x + track.width / 2, track.y + 20, { steps: 5 });
    await page.mouse.up();
    expect(Number(await slider.getAttribute('aria-valuenow'))).toBeCloseTo(0.5, 1);
    await close();
  });
});

/** Pairs of values and labels in Fig. 1 that lie on each other, and those that leave the sheet. */
function overlapsInDrawing(): string[] {
  const sheet = document.documentElement.clientWidth;
  const things = [...document.querySelectorAll('.drawing .value, .drawing .choice, .drawing .name, .drawing .live')].filter(
    (element) => !element.querySelector('.name'),
  );
  const boxes = things
    .map((element) => ({ words: element.textContent ?? '', box: element.getBoundingClientRect() }))
    .filter(({ box }) => box.width > 0);
  const found = boxes.filter(({ box }) => box.left < 0 || box.right > sheet).map(({ words }) => `${words} leaves the sheet`);
  boxes.forEach((a, n) => {
    for (const b of boxes.slice(n + 1)) {
      const across = Math.min(a.box.right, b.box.right) - Math.max(a.box.left, b.box.left);
      const down = Math.min(a.box.bottom, b.box.bottom) - Math.max(a.box.top, b.box.top);
      if (across > 1 && down > 3) found.push(`${a.words} on ${b.words}`);
    }
  });
  return found;
}

/** Wires, symbols and values of Fig. 1 that the sentence about a limit lies on. */
function underLimitWords(): string[] {
  const words = document.querySelector('.drawing .limit-words')?.getBoundingClientRect();
  if (!words) return [];
  const things = [...document.querySelectorAll('.drawing line, .drawing .symbol, .drawing .value, .drawing .choice, .drawing .live')];
  return things
    .filter((element) => {
      const box = element.getBoundingClientRect();
      return box.left < words.right && words.left < box.right && box.top < words.bottom && words.top < box.bottom;
    })
    .map((element) => element.textContent || element.outerHTML);
}

function smallTexts(): string[] {
  const texts = [...document.querySelectorAll('body *')].filter((element) =>
    [...element.childNodes].some((node) => node.nodeType === 3 && node.textContent?.trim()),
  );
  const plain = texts.filter((element) => !element.closest('sub, .subscript, .offscreen, noscript'));
  return plain
    .filter((element) => Number.parseFloat(getComputedStyle(element).fontSize) < 10.99)
    .map((element) => element.textContent ?? '');
}

/** Values that the slip lies on. */
function valuesUnderSlip(): string[] {
  const slip = document.querySelector('.slip');
  const own = slip?.closest('.value-box');
  if (!slip || !own) return ['there is no slip'];
  const box = slip.getBoundingClientRect();
  const others = [...document.querySelectorAll('.value, .choice, .live')].filter((element) => !own.contains(element));
  return others
    .filter((element) => {
      const other = element.getBoundingClientRect();
      return other.width > 0 && box.left < other.right && other.left < box.right && box.top < other.bottom && other.top < box.bottom;
    })
    .map((element) => element.textContent ?? '');
}
