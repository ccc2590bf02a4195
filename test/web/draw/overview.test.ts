import { describe, expect, test } from 'vitest';
import { endAt, overviewOf, overviewPath, peakOf, readClock, timeTicks } from '../../../web/draw/overview.ts';
import { plotArea } from '../../../web/draw/plotArea.ts';
import { linearScale } from '../../../web/draw/scale.ts';

describe('the overview of a clip', () => {
  test('keeps every peak, of either channel, whatever the number of columns', () => {
    const left = new Float32Array(10007);
    const right = new Float32Array(10007);
    left[4321] = 0.9;
    right[10006] = -0.8;
    for (const columns of [7, 300, 1201, 20000]) {
      const { least, greatest } = overviewOf([left, right], columns);
      expect(Math.max(...greatest)).toBeCloseTo(0.9, 6);
      expect(Math.min(...least)).toBeCloseTo(-0.8, 6);
      expect(peakOf({ least, greatest })).toBeCloseTo(0.9, 6);
      expect(greatest.indexOf(Math.max(...greatest)) / columns).toBeCloseTo(4321 / 10007, 1);
    }
  });

  test('draws the peak to the edges, and shows silence', () => {
    const area = plotArea(4, 40, { left: 0, right: 0, top: 0, bottom: 0 });
    const path = overviewPath(overviewOf([Float32Array.of(1, -2, 0, 0.5)], 4), 2, area);
    expect(path).toBe('M0.5 10.0v0.8M1.5 40.0v0.8M2.5 20.0v0.8M3.5 15.0v0.8');
  });
});

test.each([
  [0.3, 300],
  [8, 1100],
  [8, 300],
  [61, 1100],
  [3599, 300],
  [20000, 300],
])('figures of %d s over %d px stand apart and say where they are', (seconds, width) => {
  const ticks = timeTicks(linearScale(0, seconds, 0, width));
  expect(ticks.length).toBeGreaterThan(1);
  expect(new Set(ticks.map(({ words }) => words)).size).toBe(ticks.length);
  for (const [n, { at }] of ticks.slice(1).entries()) expect(at - ticks[n].at).toBeGreaterThan(40);
  for (const { at, words } of ticks) {
    const [minutes, rest] = words.split(':').map(Number);
    expect((at / width) * seconds).toBeCloseTo(60 * minutes + rest, 1);
  }
});

test('the end of a loop nearest to a press is taken within 8 px', () => {
  const scale = linearScale(0, 10, 0, 1000);
  expect(endAt(scale, null, 0)).toBeNull();
  expect(endAt(scale, { fromSec: 2, toSec: 2.1 }, 206)).toBe('to');
  expect(endAt(scale, { fromSec: 2, toSec: 2.1 }, 204)).toBe('from');
  expect(endAt(scale, { fromSec: 2, toSec: 2.1 }, 219)).toBeNull();
});

test('a time is read as it is written, and else refused by name', () => {
  expect(['1:23.4', '83,4', '0:05 ', '5 s'].map(readClock)).toEqual([83.4, 83.4, 5, 5]);
  for (const text of ['', 'soon', '1:2:3', '-4']) expect(() => readClock(text)).toThrow('is not a time. Write 0:05.5 or 5.5.');
});
