import { expect, test } from 'vitest';
import { createGateSweep, sweepLines } from '../../../web/draw/gateSweep.ts';
import { linearScale } from '../../../web/draw/scale.ts';

/** 8 s over 800 pixels, 0 to −2 V over 100. */
const x = linearScale(0, 8, 0, 800);
const y = linearScale(-2, 0, 100, 0);

const steady = { controlV: -1, gateSourceV: -1, gateLowV: -1, gateHighV: -1 };

function swept(fromSec: number, toSec: number, gapAtSec = Number.POSITIVE_INFINITY) {
  const sweep = createGateSweep(8);
  for (let n = 0; fromSec + n / 10 <= toSec + 1e-9; n++) {
    const atSec = fromSec + n / 10;
    if (atSec < gapAtSec || atSec > gapAtSec + 1) sweep.note({ ...steady, atSec });
  }
  return sweep;
}

test('only the last span is kept', () => {
  const readings = swept(0, 20).readings();
  expect(readings.at(-1)?.atSec).toBeCloseTo(20, 9);
  expect(readings[0].atSec).toBeGreaterThan(12);
});

test('the pen writes from the left, and what lies ahead of it is of the turn before', () => {
  const { now, before, pen } = sweepLines(swept(0, 11).readings(), 8, x, y);
  expect(pen?.x).toBeCloseTo(300, 6);
  expect(pen?.y).toBeCloseTo(50, 9);
  expect(now[0].x).toBeCloseTo(0, 6);
  // A fiftieth of the span stays blank before the pen.
  expect(Math.min(...before.map((point) => point.x))).toBeGreaterThan(316);
  expect(Math.max(...before.map((point) => point.x))).toBeCloseTo(790, 6);
});

test('no line is drawn over a time without sound', () => {
  const { now } = sweepLines(swept(0, 5, 2).readings(), 8, x, y);
  expect(now.filter(({ y: height }) => Number.isNaN(height))).toHaveLength(1);
});

test('nothing has been written before anything has sounded', () => {
  expect(sweepLines([], 8, x, y)).toEqual({ now: [], before: [], pen: null });
});

test('a dip between two readings is drawn, and the gate goes on from where it was read', () => {
  const sweep = createGateSweep(8);
  sweep.note({ ...steady, atSec: 1 });
  sweep.note({ ...steady, atSec: 1.03, gateLowV: -1.8 });
  expect(sweepLines(sweep.readings(), 8, x, y).now.map((point) => Math.round(point.y))).toEqual([50, 50, 90, 50]);
});
