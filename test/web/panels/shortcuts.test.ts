import { expect, test } from 'vitest';
import { runShortcut } from '../../../web/panels/shortcuts.ts';
import { createFakeBench } from '../fakeBench.ts';

const press = (code: string, keys: Partial<KeyboardEvent> = {}) =>
  ({ code, altKey: false, ctrlKey: false, metaKey: false, shiftKey: false, ...keys }) as KeyboardEvent;

test('bare letters and digits do nothing: speech and typing must not set off the sound', () => {
  const bench = createFakeBench();
  for (const code of ['KeyP', 'KeyM', 'KeyB', 'Digit1', 'Space']) expect(runShortcut(press(code), bench, () => undefined)).toBe(false);
  expect(bench.sound.value).toBe('playing');
});

test('with Alt the sound stops, mutes and is compared, and the variants are heard', () => {
  const bench = createFakeBench();
  runShortcut(press('KeyM', { altKey: true }), bench, () => undefined);
  expect(bench.muted.value).toBe(true);
  runShortcut(press('KeyB', { altKey: true }), bench, () => undefined);
  expect(bench.hearing.value).toBe('bypass');
  runShortcut(press('Digit3', { altKey: true }), bench, () => undefined);
  expect(bench.heardVariant.value).toBe(2);
  runShortcut(press('Digit4', { altKey: true }), bench, () => undefined);
  expect(bench.heardVariant.value).toBe(2);
  runShortcut(press('KeyP', { altKey: true }), bench, () => undefined);
  expect(bench.sound.value).toBe('stopped');
});

test('undo and redo answer to Ctrl Z and Ctrl Shift Z', () => {
  const bench = createFakeBench();
  bench.setValue('cell.seriesOhm', 22e3);
  runShortcut(press('KeyZ', { ctrlKey: true }), bench, () => undefined);
  expect(bench.design.value.variants[0].cell.seriesOhm).toBe(10e3);
  runShortcut(press('KeyZ', { ctrlKey: true, shiftKey: true }), bench, () => undefined);
  expect(bench.design.value.variants[0].cell.seriesOhm).toBe(22e3);
});
