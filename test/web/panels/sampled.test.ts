import { signal } from '@preact/signals';
import { expect, test, vi } from 'vitest';
import { sampled } from '../../../web/panels/parts/sampled.ts';

test('a fast signal is copied at most once in each interval, and its last value arrives', () => {
  vi.useFakeTimers();
  let nowMs = 0;
  const source = signal(0);
  const { copy, end } = sampled(source, 100, () => nowMs);
  const seen: number[] = [];
  copy.subscribe((value) => void seen.push(value));
  for (let n = 1; n <= 20; n++) {
    nowMs = n * 10;
    vi.advanceTimersByTime(10);
    source.value = n;
  }
  nowMs = 1000;
  vi.advanceTimersByTime(1000);
  expect(seen.length).toBeLessThanOrEqual(4);
  expect(copy.value).toBe(20);
  end();
  source.value = 99;
  vi.advanceTimersByTime(1000);
  expect(copy.value).toBe(20);
  vi.useRealTimers();
});
