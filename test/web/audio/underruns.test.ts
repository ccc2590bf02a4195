import { expect, test } from 'vitest';
import { createLagCounter } from '../../../web/audio/underruns.ts';

/** Reports 29 times a second for a while, the lag jittering as a callback's timing does. */
function run(seconds: number, lagAt: (second: number) => number): number {
  const counter = createLagCounter();
  for (let n = 0; n < seconds * 29; n++) counter.note(lagAt(n / 29) + (n % 7) * 3);
  return counter.count();
}

test('jitter and a clock that drifts by 100 ppm are no gaps', () => {
  expect(run(60, (second) => 1e6 + second * 0.1)).toBe(0);
});

test('a moment of lateness that is made up again is no gap', () => {
  expect(run(10, (second) => (second > 5 && second < 5.1 ? 40 : 0))).toBe(0);
});

test('each gap that stays is counted once', () => {
  expect(run(60, (second) => Math.floor(second / 10) * 20)).toBe(5);
});
