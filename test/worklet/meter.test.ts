import { describe, expect, test } from 'vitest';
import type { ChainReadings } from '../../model/chain/chain.ts';
import { createBank } from '../../worklet/bank.ts';
import { createLoad } from '../../worklet/load.ts';
import { createMeter, type Measured, processMeter, returnReport } from '../../worklet/meter.ts';
import { createMix } from '../../worklet/mix.ts';
import { createMonitor } from '../../worklet/monitor.ts';
import type { Report } from '../../worklet/protocol.ts';
import { createNoise } from '../support/noise.ts';

const READINGS: ChainReadings = {
  controlV: -1,
  gateSourceV: -0.5,
  drainPeakV: 0.2,
  feedthroughPeakV: 0.001,
  inputPeakV: 0.4,
  outputPeak: 0.1,
  faults: 0,
};
const BLOCK = 128;

function measuredAt(rate: number): Measured {
  return { bank: createBank([], 1, rate), mix: createMix(7, 0, rate), monitor: createMonitor(1, 1, false, rate), load: createLoad() };
}

function runMeter(rate: number, inputs: Float32Array[], outputs: Float32Array[], readingsAt = (_block: number) => READINGS): Report[] {
  const reports: Report[] = [];
  const meter = createMeter(
    {
      postMessage(message, transfer) {
        const report = structuredClone(message, { transfer }) as Report;
        reports.push({ ...report, input: report.input.slice(), output: report.output.slice() });
        returnReport(meter, report.slot, report.input, report.output);
      },
    },
    rate,
  );
  const measured = measuredAt(rate);
  for (let at = 0; at < inputs[0].length; at += BLOCK) {
    const block = (line: Float32Array) => line.subarray(at, at + BLOCK);
    processMeter(meter, at, inputs.map(block), outputs.map(block), readingsAt(at / BLOCK), measured);
  }
  return reports;
}

describe('the meter', () => {
  test.each([44100, 48000, 96000, 192000])('at %i Hz reports at most 30 times a second and at least 25', (rate) => {
    const seconds = 2;
    const line = new Float32Array(BLOCK * Math.floor((rate * seconds) / BLOCK));
    const reports = runMeter(rate, [line], [line]);
    expect(reports.length).toBeLessThanOrEqual(30 * seconds);
    expect(reports.length).toBeGreaterThanOrEqual(25 * seconds);
  });

  test('the gate’s least and highest voltage are those of every block since the report before, and of none before that', () => {
    const line = new Float32Array(BLOCK * 40);
    // A dip in block 3 and a rise in block 20: 1600 samples are 12.5 blocks, so the first report holds the one and the second the other.
    const gateV = (block: number) => (block === 3 ? -1.4 : block === 20 ? -0.1 : -0.5);
    const reports = runMeter(48000, [line], [line], (block) => ({ ...READINGS, gateSourceV: gateV(block) }));
    expect(reports.slice(0, 3).map(({ gateLowV, gateHighV }) => [gateLowV, gateHighV])).toEqual([
      [-1.4, -0.5],
      [-0.5, -0.1],
      [-0.5, -0.5],
    ]);
  });

  test('its windows put together are the samples themselves', () => {
    const input = createNoise(1, BLOCK * 400, 0.5);
    const output = createNoise(2, BLOCK * 400, 0.5);
    const reports = runMeter(48000, [input, input], [output, output]);
    const joined = (pick: (report: Report) => Float32Array) => Float32Array.from(reports.flatMap((report) => [...pick(report)]));
    const length = reports.length * reports[0].input.length;
    expect(joined((report) => report.input)).toEqual(input.slice(0, length));
    expect(joined((report) => report.output)).toEqual(output.slice(0, length));
    expect(reports.map((report) => report.frame)).toEqual(reports.map((_, i) => i * reports[0].input.length));
  });

  test('counts every sample of every channel: one peak anywhere is in exactly one report', () => {
    for (const at of [0, 1, 1599, 1600, 12345]) {
      const left = new Float32Array(BLOCK * 150);
      const right = left.slice();
      right[at] = -0.75;
      const peaks = runMeter(48000, [left, left], [left, right]).map((report) => report.outputPeak);
      expect(peaks.filter((peak) => peak === 0.75)).toHaveLength(1);
      expect(peaks.filter((peak) => peak === 0)).toHaveLength(peaks.length - 1);
    }
  });

  test('mean square of a full-scale sine is one half', () => {
    const sine = Float32Array.from({ length: BLOCK * 400 }, (_, n) => Math.sin((2 * Math.PI * n) / 16));
    for (const report of runMeter(48000, [sine], [sine])) expect(report.outputSquare).toBeCloseTo(0.5, 6);
  });

  test('while the page keeps the reports nothing is sent, and the next one still holds the highest peak', () => {
    const kept: Report[] = [];
    const meter = createMeter({ postMessage: (message, transfer) => kept.push(structuredClone(message, { transfer }) as Report) }, 48000);
    const measured = measuredAt(48000);
    const quiet = new Float32Array(BLOCK);
    const loud = quiet.slice();
    loud[5] = 0.9;
    for (let block = 0; block < 400; block++) {
      if (block === 350) returnReport(meter, 2, kept[2].input, kept[2].output);
      const line = block === 300 ? loud : quiet;
      processMeter(meter, block * BLOCK, [quiet], [line], READINGS, measured);
    }
    expect(kept.map((report) => report.slot)).toEqual([0, 1, 2, 3, 4, 5, 2]);
    expect(kept[6].outputPeak).toBe(Math.fround(0.9));
    expect(kept[6].frame).toBe(350 * BLOCK);
  });

  test('refuses arrays that are not its own', () => {
    const meter = createMeter({ postMessage() {} }, 48000);
    expect(() => returnReport(meter, 0, new Float32Array(1), new Float32Array(1600))).toThrow('Report 0 came back with 1 and 1600 frames');
  });
});
