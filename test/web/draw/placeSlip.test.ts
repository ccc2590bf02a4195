import { expect, test } from 'vitest';
import { type Box, overlap, placeSlip } from '../../../web/draw/placeSlip.ts';

const page: Box = { left: 0, top: 0, width: 400, height: 400 };
const anchor: Box = { left: 100, top: 100, width: 60, height: 20 };
const slip = { width: 120, height: 24 };
const at = (place: { left: number; top: number }): Box => ({ ...place, ...slip });

test('stands below its value when nothing is there', () => {
  expect(placeSlip(anchor, slip, { values: [], lines: [] }, page)).toEqual({ left: 100, top: 122 });
});

test('hides no other value while any place is free', () => {
  const values: Box[] = [
    { left: 80, top: 124, width: 200, height: 20 },
    { left: 80, top: 70, width: 100, height: 20 },
    { left: 170, top: 100, width: 100, height: 20 },
  ];
  const place = at(placeSlip(anchor, slip, { values, lines: [] }, page));
  expect(values.filter((value) => overlap(place, value))).toEqual([]);
  expect(overlap(place, anchor)).toBe(false);
});

test('would rather cross a wire than hide a value, and crosses none when it need not', () => {
  const wire: Box = { left: 150, top: 100, width: 1, height: 300 };
  const free = at(placeSlip(anchor, slip, { values: [], lines: [wire] }, page));
  expect(overlap(free, wire)).toBe(false);
  const values: Box[] = [{ left: 0, top: 0, width: 400, height: 99 }];
  const pressed = at(placeSlip(anchor, slip, { values, lines: [wire] }, page));
  expect(overlap(pressed, values[0])).toBe(false);
});

test('stays on the page at its edges', () => {
  const place = placeSlip({ left: 360, top: 376, width: 40, height: 20 }, slip, { values: [], lines: [] }, page);
  expect(place.left + slip.width).toBeLessThanOrEqual(400);
  expect(place.top + slip.height).toBeLessThanOrEqual(400);
});
