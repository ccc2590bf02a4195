import { expect, test } from 'vitest';
import { remembered } from '../../../web/draw/remembered.ts';

test('what was made of an object is made anew when an argument differs, and for another object', () => {
  let times = 0;
  const make = remembered((curve: readonly number[], width: number) => {
    times++;
    return curve.map((y) => y * width);
  });
  const [a, b] = [[1, 2], [3]];
  expect(make(a, 2)).toEqual([2, 4]);
  expect(make(b, 2)).toEqual([6]);
  expect(make(a, 2)).toBe(make(a, 2));
  expect(times).toBe(2);
  expect(make(a, 3)).toEqual([3, 6]);
  expect(make(b, 2)).toEqual([6]);
  expect(times).toBe(3);
});
