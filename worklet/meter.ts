/**
 * Level totals over every sample, and the samples themselves, reported to the page at most 30 times a second.
 *
 * Reports are a pool of messages made once: one is filled, posted with its arrays transferred, and comes back by `returnReport`.
 * While none is free nothing is sent; the totals go on, so no peak is lost, only the samples between two reports.
 */
import type { ChainReadings } from '../model/chain/chain.ts';
import type { Bank } from './bank.ts';
import type { Load } from './load.ts';
import { takeLoad } from './load.ts';
import type { Mix } from './mix.ts';
import type { Monitor } from './monitor.ts';
import { CEILING_FRAMES, HEARD_PEAK, HEARD_SQUARES } from './monitor.ts';
import type { Report } from './protocol.ts';
import { SLOTS } from './protocol.ts';

const POOL = 6;
const REPORTS_PER_SEC = 30;

const INPUT_PEAK = 0;
const OUTPUT_PEAK = 1;
const OUTPUT_SQUARES = 2;
const INPUT_PEAK_V = 3;
const DRAIN_PEAK_V = 4;
const FEEDTHROUGH_PEAK_V = 5;
const SAMPLES = 6;
const GATE_LOW_V = 7;
const GATE_HIGH_V = 8;
const RESIDUAL_SQUARES = 9;
const TOTALS = 10;

export interface Post {
  postMessage(message: unknown, transfer: Transferable[]): void;
}

/** What a report is made of beside the totals. */
export interface Measured {
  readonly bank: Bank;
  readonly mix: Mix;
  readonly monitor: Monitor;
  readonly load: Load;
}

export interface Meter {
  readonly post: Post;
  readonly reports: Report[];
  readonly transfers: Transferable[][];
  readonly free: boolean[];
  readonly totals: Float64Array;
  readonly frames: number;
  readonly sampleRateHz: number;
  /** The report being filled, −1 while none is free, and how many of its frames are there. */
  slot: number;
  fill: number;
}

export function createMeter(post: Post, sampleRateHz: number): Meter {
  const frames = Math.ceil(sampleRateHz / REPORTS_PER_SEC);
  const reports = Array.from({ length: POOL }, (_, slot) => createReport(slot, frames));
  const transfers = reports.map((report): Transferable[] => [report.input.buffer, report.output.buffer]);
  const totals = new Float64Array(TOTALS);
  clearTotals(totals);
  return { post, reports, transfers, free: reports.map((_, slot) => slot > 0), totals, frames, sampleRateHz, slot: 0, fill: 0 };
}

/** Counts one block; `outputs` and `readings` are those of the chain in focus. */
export function processMeter(
  meter: Meter,
  frame: number,
  inputs: readonly Float32Array[],
  outputs: readonly Float32Array[],
  readings: ChainReadings,
  measured: Measured,
): void {
  const { totals } = meter;
  for (let c = 0; c < outputs.length; c++) addLevels(totals, inputs[c], outputs[c]);
  if (measured.bank.residualSlot >= 0) addResidual(totals, measured.bank.residualLines);
  totals[INPUT_PEAK_V] = Math.max(totals[INPUT_PEAK_V], readings.inputPeakV);
  totals[DRAIN_PEAK_V] = Math.max(totals[DRAIN_PEAK_V], readings.drainPeakV);
  totals[FEEDTHROUGH_PEAK_V] = Math.max(totals[FEEDTHROUGH_PEAK_V], readings.feedthroughPeakV);
  totals[GATE_LOW_V] = Math.min(totals[GATE_LOW_V], readings.gateSourceV);
  totals[GATE_HIGH_V] = Math.max(totals[GATE_HIGH_V], readings.gateSourceV);
  for (let n = 0; n < outputs[0].length; n++) {
    if (meter.slot < 0 && !takeSlot(meter)) return;
    const report = meter.reports[meter.slot];
    if (meter.fill === 0) report.frame = frame + n;
    report.input[meter.fill] = inputs[0][n];
    report.output[meter.fill] = outputs[0][n];
    meter.fill++;
    if (meter.fill === meter.frames) send(meter, report, readings, measured);
  }
}

/** Puts a report's arrays back into the pool. */
export function returnReport(meter: Meter, slot: number, input: Float32Array<ArrayBuffer>, output: Float32Array<ArrayBuffer>): void {
  const report = meter.reports[slot];
  if (report === undefined || input.length !== meter.frames || output.length !== meter.frames) {
    throw new RangeError(`Report ${slot} came back with ${input.length} and ${output.length} frames; expected ${meter.frames}`);
  }
  report.input = input;
  report.output = output;
  meter.transfers[slot][0] = input.buffer;
  meter.transfers[slot][1] = output.buffer;
  meter.free[slot] = true;
}

function clearTotals(totals: Float64Array): void {
  totals.fill(0);
  totals[GATE_LOW_V] = Number.POSITIVE_INFINITY;
  totals[GATE_HIGH_V] = Number.NEGATIVE_INFINITY;
}

function addLevels(totals: Float64Array, input: Float32Array, output: Float32Array): void {
  let inputPeak = totals[INPUT_PEAK];
  let outputPeak = totals[OUTPUT_PEAK];
  let squares = totals[OUTPUT_SQUARES];
  for (let n = 0; n < output.length; n++) {
    const x = Math.abs(input[n]);
    const y = Math.abs(output[n]);
    if (x > inputPeak) inputPeak = x;
    if (y > outputPeak) outputPeak = y;
    squares += y * y;
  }
  totals[INPUT_PEAK] = inputPeak;
  totals[OUTPUT_PEAK] = outputPeak;
  totals[OUTPUT_SQUARES] = squares;
  totals[SAMPLES] += output.length;
}

function addResidual(totals: Float64Array, lines: readonly Float32Array[]): void {
  let squares = totals[RESIDUAL_SQUARES];
  for (let c = 0; c < lines.length; c++) for (let n = 0; n < lines[c].length; n++) squares += lines[c][n] * lines[c][n];
  totals[RESIDUAL_SQUARES] = squares;
}

function takeSlot(meter: Meter): boolean {
  meter.slot = meter.free.indexOf(true);
  if (meter.slot < 0) return false;
  meter.free[meter.slot] = false;
  meter.fill = 0;
  return true;
}

function send(meter: Meter, report: Report, readings: ChainReadings, { bank, mix, monitor, load }: Measured): void {
  const { totals } = meter;
  report.inputPeak = totals[INPUT_PEAK];
  report.outputPeak = totals[OUTPUT_PEAK];
  report.outputSquare = totals[OUTPUT_SQUARES] / totals[SAMPLES];
  report.heardSquare = monitor.totals[HEARD_SQUARES] / totals[SAMPLES];
  report.residualSquare = totals[RESIDUAL_SQUARES] / totals[SAMPLES];
  report.inputPeakV = totals[INPUT_PEAK_V];
  report.drainPeakV = totals[DRAIN_PEAK_V];
  report.feedthroughPeakV = totals[FEEDTHROUGH_PEAK_V];
  report.gateLowV = totals[GATE_LOW_V];
  report.gateHighV = totals[GATE_HIGH_V];
  report.lagMs = Date.now() - (1000 * report.frame) / meter.sampleRateHz;
  report.controlV = readings.controlV;
  report.gateSourceV = readings.gateSourceV;
  report.faults = readings.faults + mix.broken;
  report.heardPeak = monitor.totals[HEARD_PEAK];
  report.ceilingFrames = monitor.totals[CEILING_FRAMES];
  report.latencySamples = bank.latencySamples;
  report.loadFraction = takeLoad(load);
  for (let slot = 0; slot < SLOTS; slot++) {
    const lane = bank.lanes[slot];
    report.slotPeaks[slot] = lane === null ? 0 : lane.peak;
    report.slotFaults[slot] = lane === null ? 0 : lane.chain.readings.faults;
    if (lane !== null) lane.peak = 0;
  }
  meter.post.postMessage(report, meter.transfers[meter.slot]);
  clearTotals(totals);
  monitor.totals.fill(0);
  meter.slot = -1;
}

function createReport(slot: number, frames: number): Report {
  return {
    type: 'report',
    slot,
    frame: 0,
    input: new Float32Array(frames),
    output: new Float32Array(frames),
    inputPeak: 0,
    outputPeak: 0,
    heardPeak: 0,
    outputSquare: 0,
    heardSquare: 0,
    residualSquare: 0,
    controlV: 0,
    gateSourceV: 0,
    inputPeakV: 0,
    drainPeakV: 0,
    feedthroughPeakV: 0,
    gateLowV: 0,
    gateHighV: 0,
    faults: 0,
    slotPeaks: new Float64Array(SLOTS),
    slotFaults: new Float64Array(SLOTS),
    latencySamples: 0,
    loadFraction: 0,
    ceilingFrames: 0,
    lagMs: 0,
  };
}
