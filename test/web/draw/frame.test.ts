import { expect, test } from 'vitest';
import { createPainter } from '../../../web/draw/frame.ts';

test('however often it is marked, a picture is painted once a frame, and not after it has stopped', () => {
  const frames: (() => void)[] = [];
  const cancelled: number[] = [];
  let painted = 0;
  const painter = createPainter(
    () => painted++,
    (run) => frames.push(run),
    (id) => cancelled.push(id),
  );
  for (let n = 0; n < 5; n++) painter.dirty();
  expect(frames.length).toBe(1);
  frames[0]();
  expect(painted).toBe(1);
  painter.dirty();
  expect(frames.length).toBe(2);
  painter.stop();
  expect(cancelled).toEqual([2]);
});
