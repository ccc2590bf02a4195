import { expect, test } from 'vitest';
import { missingFeature } from '../../../web/audio/features.ts';

const whole = { isSecureContext: true, AudioContext: class {}, AudioWorkletNode: class {}, Worker: class {} };
const scopeWith = (change: object) => ({ ...whole, ...change }) as unknown as typeof globalThis;

test('a browser that has everything lacks nothing', () => {
  expect(missingFeature(scopeWith({}))).toBeNull();
});

test.each([
  [{ isSecureContext: false }, 'https'],
  [{ AudioContext: undefined }, 'Web Audio'],
  [{ AudioWorkletNode: undefined }, 'audio worklet'],
  [{ Worker: undefined }, 'workers'],
])('without %o it is told what is missing', (change, words) => {
  expect(missingFeature(scopeWith(change))).toContain(words);
});
