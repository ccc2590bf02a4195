import { expect, test } from 'vitest';
import { runShortcut } from '../../../web/panels/shortcuts.ts';
import { createRateTap } from '../../../web/panels/tap.ts';
import type { Bench } from '../../../web/state/bench.ts';
import { createFakeBench } from '../fakeBench.ts';

const press = (code: string, keys: Partial<KeyboardEvent> = {}) =>
  ({ code, altKey: false, ctrlKey: false, metaKey: false, shiftKey: false, ...keys }) as KeyboardEvent;

const actsOn = (bench: Bench) => ({ bench, open: () => undefined, tapRate: createRateTap(bench) });

test('bare letters and digits do nothing: speech and typing must not set off the sound', () => {
  const bench = createFakeBench();
  for (const code of ['KeyP', 'KeyM', 'KeyB', 'Digit1', 'Space']) expect(runShortcut(press(code), actsOn(bench))).toBe(false);
  expect(bench.sound.value).toBe('playing');
});

test('with Alt the sound stops, mutes and is compared, and the variants are heard', () => {
  const bench = createFakeBench();
  runShortcut(press('KeyM', { altKey: true }), actsOn(bench));
  expect(bench.muted.value).toBe(true);
  runShortcut(press('KeyB', { altKey: true }), actsOn(bench));
  expect(bench.hearing.value).toBe('bypass');
  runShortcut(press('Digit3', { altKey: true }), actsOn(bench));
  expect(bench.heardVariant.value).toBe(2);
  runShortcut(press('Digit4', { altKey: true }), actsOn(bench));
  expect(bench.heardVariant.value).toBe(2);
  runShortcut(press('KeyP', { altKey: true }), actsOn(bench));
  expect(bench.sound.value).toBe('stopped');
});

test('undo and redo answer to Ctrl Z and Ctrl Shift Z', () => {
  const bench = createFakeBench();
  bench.setValue('cell.seriesOhm', 22e3);
  runShortcut(press('KeyZ', { ctrlKey: true }), actsOn(bench));
  expect(bench.design.value.variants[0].cell.seriesOhm).toBe(10e3);
  runShortcut(press('KeyZ', { ctrlKey: true, shiftKey: true }), actsOn(bench));
  expect(bench.design.value.variants[0].cell.seriesOhm).toBe(22e3);
});

test('Alt T taps the rate of the LFO: half a second apart is 2 Hz', () => {
  const bench = createFakeBench();
  const acts = actsOn(bench);
  for (const timeStamp of [1000, 1500, 2000]) runShortcut(press('KeyT', { altKey: true, timeStamp }), acts);
  expect(bench.design.value.variants[0].control).toMatchObject({ rateHz: 2 });
});
