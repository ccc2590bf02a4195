import { expect, test } from 'vitest';
import { missingFeature, missingForPage } from '../../../web/audio/features.ts';

class Thing {}
const whole = {
  ...{ isSecureContext: true, AudioContext: Thing, AudioWorkletNode: Thing, Worker: Thing },
  ...{ HTMLDialogElement: Thing, ResizeObserver: Thing, PointerEvent: Thing },
};
const scopeWith = (change: object) => ({ ...whole, ...change }) as unknown as typeof globalThis;

test('a browser that has everything lacks nothing', () => {
  expect(missingFeature(scopeWith({}))).toBeNull();
  expect(missingForPage(scopeWith({}))).toEqual([]);
});

test.each([
  [{ isSecureContext: false }, 'https'],
  [{ AudioContext: undefined }, 'Web Audio'],
  [{ AudioWorkletNode: undefined }, 'audio worklet'],
])('without %o it is told what sound lacks', (change, words) => {
  expect(missingFeature(scopeWith(change))).toContain(words);
});

test.each([
  [{ Worker: undefined }, ['workers']],
  [{ HTMLDialogElement: undefined, PointerEvent: undefined }, ['dialog', 'pointer']],
  [{ ResizeObserver: undefined }, ['ResizeObserver']],
])('without %o it is told what the page lacks', (change, words) => {
  const missing = missingForPage(scopeWith(change));
  expect(missing).toHaveLength(words.length);
  for (const [n, word] of words.entries()) expect(missing[n]).toContain(word);
});
