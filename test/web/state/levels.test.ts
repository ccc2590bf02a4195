import { expect, test } from 'vitest';
import { createLevels, MOST_SAMPLES } from '../../../web/state/levels.ts';
import type { Report } from '../../../worklet/protocol.ts';
import { createNoise } from '../../support/noise.ts';

const quiet = {
  type: 'report',
  slot: 0,
  inputPeak: 0,
  outputPeak: 0,
  heardPeak: 0,
  outputSquare: 0,
  heardSquare: 0,
  residualSquare: 0,
  slotPeaks: new Float64Array(5),
  slotFaults: new Float64Array(5),
  latencySamples: 48,
  loadFraction: 0.5,
  controlV: -1,
  gateSourceV: -0.5,
  gateLowV: -0.6,
  gateHighV: -0.4,
  inputPeakV: 0.1,
  drainPeakV: 0.05,
  feedthroughPeakV: 0.001,
  faults: 0,
  ceilingFrames: 0,
  lagMs: 0,
} as const;

function report(frame: number, output: Float32Array<ArrayBuffer>, change: Partial<Report> = {}): Report {
  return { ...quiet, frame, input: output.map((x) => -x), output, ...change };
}

test('the window holds the latest samples, oldest first, of any length up to 32768', () => {
  const levels = createLevels();
  const line = createNoise(1, 1600 * 50, 1);
  for (let at = 0; at < line.length; at += 1600) levels.note(report(at, line.slice(at, at + 1600)), 0, [0]);
  for (const length of [1, 2048, 5000, MOST_SAMPLES]) {
    const window = new Float32Array(length);
    levels.outputSamples(window);
    expect(window).toEqual(line.slice(-length));
    levels.inputSamples(window);
    expect(window).toEqual(line.slice(-length).map((x) => -x));
  }
  expect(() => levels.outputSamples(new Float32Array(MOST_SAMPLES + 1))).toThrow('A window of 32769 samples');
});

test('samples on either side of a gap are never shown as one piece', () => {
  const levels = createLevels();
  levels.note(report(0, new Float32Array(100).fill(1)), 0, [0]);
  levels.note(report(500, new Float32Array(100).fill(2)), 0, [0]);
  const window = new Float32Array(200);
  levels.outputSamples(window);
  expect(window).toEqual(Float32Array.from({ length: 200 }, (_, n) => (n < 100 ? 0 : 2)));
});

test('levels are in dBFS, silence is −∞, and the recent peak stays for 1.5 s', () => {
  let nowMs = 0;
  const levels = createLevels(() => nowMs);
  const block = new Float32Array(100);
  levels.note(report(0, block), 3, [0]);
  expect(levels.live.value).toMatchObject({ outputPeakDbfs: Number.NEGATIVE_INFINITY, atCeiling: false, underruns: 3, controlV: -1 });
  levels.note(report(100, block, { outputPeak: 0.5, outputSquare: 0.5, ceilingFrames: 1 }), 3, [0]);
  expect(levels.live.value?.outputPeakDbfs).toBeCloseTo(-6.0206, 4);
  expect(levels.live.value?.outputRmsDbfs).toBeCloseTo(-3.0103, 4);
  expect(levels.live.value?.atCeiling).toBe(true);
  nowMs = 1400;
  levels.note(report(200, block, { outputPeak: 0.1 }), 3, [0]);
  expect(levels.live.value?.recentPeakDbfs).toBeCloseTo(-6.0206, 4);
  nowMs = 1600;
  levels.note(report(300, block, { outputPeak: 0.01 }), 3, [0]);
  expect(levels.live.value?.recentPeakDbfs).toBeCloseTo(-20, 4);
});

test('each variant’s peak and faults are found in its slot, and the load is a mean', () => {
  const levels = createLevels();
  const slotPeaks = Float64Array.of(0.5, 0, 1, 0, 0);
  const slotFaults = Float64Array.of(0, 0, 3, 0, 0);
  const block = new Float32Array(100);
  levels.note(report(0, block, { slotPeaks, slotFaults, loadFraction: 0, heardSquare: 0.5 }), 0, [2, 0]);
  expect(levels.live.value?.variants).toEqual([
    { peakDbfs: 0, faults: 3 },
    { peakDbfs: expect.closeTo(-6.0206, 4), faults: 0 },
  ]);
  expect(levels.live.value?.heardRmsDbfs).toBeCloseTo(-3.0103, 4);
  levels.note(report(100, block, { loadFraction: 1 }), 0, [0]);
  expect(levels.live.value?.loadFraction).toBe(0.5);
  for (let n = 2; n < 2000; n++) levels.note(report(n * 100, block, { loadFraction: n % 2 }), 0, [0]);
  expect(levels.live.value?.loadFraction).toBeCloseTo(0.5, 2);
});
