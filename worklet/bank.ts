/**
 * The chains of one processor, each in its slot: up to four variants and the setting before the last change, all fed by the same input. Every
 * chain and the bypass leave as late as the latest of them. A chain that is set, moved or dropped leaves the others as they are.
 */
import { type Chain, createChain, moveChain, processChain, setResidual, warmChain } from '../model/chain/chain.ts';
import type { ChainNumbers } from '../model/chain/compile.ts';
import type { ResidualPart } from '../model/chain/residual.ts';
import { createDelay, type Delay, LONGEST_DELAY, processDelay, setDelay } from './delay.ts';
import { createJoin, type Join, joinAnew, processJoin } from './join.ts';
import { SLOTS } from './protocol.ts';

/** A new chain runs unheard for this long, so that its filters are full. */
const LEAD_SEC = 0.01;
const NO_LINES: readonly Float32Array[] = [];

export interface Lane {
  readonly chain: Chain;
  readonly delay: Delay;
  /** What the chain puts out, in step with the others. */
  lines: Float32Array[];
  /** Frames left before it may be heard. */
  lead: number;
  /** Dropped: it runs until it is no longer heard. */
  leaving: boolean;
  /** Since the caller last cleared it. */
  peak: number;
}

export interface Bank {
  readonly lanes: (Lane | null)[];
  readonly bypass: Delay;
  readonly channels: number;
  readonly sampleRateHz: number;
  bypassLines: Float32Array[];
  /** The slot whose cells leave what they add in `residualLines`, −1 for none. */
  residualSlot: number;
  residualLines: Float32Array[];
  readonly join: Join;
  /** Of the latest lane, whole. */
  latencySamples: number;
}

/** Every chain has run its branches. Throws a RangeError where there is none or one cannot be made. */
export function createBank(all: readonly (ChainNumbers | null)[], channels: number, sampleRateHz: number): Bank {
  if (all.length > SLOTS) throw new RangeError(`There are ${all.length} chains; expected at most ${SLOTS}`);
  const lanes = Array.from({ length: SLOTS }, (_, slot) => {
    const numbers = all[slot] ?? null;
    return numbers === null ? null : createLane(createChain(numbers), 0, channels, sampleRateHz);
  });
  for (const lane of lanes) if (lane !== null) warmChain(lane.chain);
  const latencySamples = latestOf(lanes);
  for (const lane of lanes) {
    if (lane !== null) lane.delay.to = lane.delay.wanted = latencySamples - Math.round(lane.chain.latencySamples);
  }
  const bypass = createDelay(channels, latencySamples, sampleRateHz);
  return {
    lanes,
    bypass,
    channels,
    sampleRateHz,
    bypassLines: blocks(channels, 128),
    residualSlot: -1,
    residualLines: blocks(channels, 128),
    join: createJoin(channels, sampleRateHz),
    latencySamples,
  };
}

/** From now on the chain of a slot leaves this part of what its cells add; the chain that did so before no longer does. Allocates. */
export function startResidual(bank: Bank, slot: number, part: ResidualPart): void {
  const lane = bank.lanes[slot];
  if (lane === null) throw new RangeError(`Slot ${slot} is empty; expected one with a chain`);
  if (bank.residualSlot === slot && lane.chain.residual === part) return;
  endResidual(bank);
  setResidual(lane.chain, part);
  bank.residualSlot = slot;
}

/** Allocates nothing. */
export function endResidual(bank: Bank): void {
  joinAnew(bank.join);
  const lane = bank.residualSlot < 0 ? null : bank.lanes[bank.residualSlot];
  if (lane !== null) setResidual(lane.chain, null);
  bank.residualSlot = -1;
}

/** Moves the chain of a slot, or makes one: it takes over the phase of `like`, so that a copy sounds the same. Throws a RangeError and changes nothing. */
export function setLane(bank: Bank, slot: number, numbers: ChainNumbers, like: Lane | null): void {
  checkSlot(bank, slot);
  const lane = bank.lanes[slot];
  if (lane !== null) {
    moveChain(lane.chain, numbers);
    lane.leaving = false;
    return;
  }
  if (numbers.sampleRateHz !== bank.sampleRateHz || numbers.cells.length !== bank.channels) {
    throw new RangeError(
      `the new chain is for ${numbers.cells.length} channels at ${numbers.sampleRateHz} Hz; expected ${bank.channels} at ${bank.sampleRateHz} Hz`,
    );
  }
  const chain = createChain(numbers);
  if (like !== null) chain.voice.drive.phase[0] = like.chain.voice.drive.phase[0];
  bank.lanes[slot] = createLane(chain, Math.round(LEAD_SEC * bank.sampleRateHz), bank.channels, bank.sampleRateHz);
}

/** Marks a slot to be emptied; the caller empties it once nothing of it is heard. */
export function dropLane(bank: Bank, slot: number): void {
  checkSlot(bank, slot);
  const lane = bank.lanes[slot];
  if (lane !== null) lane.leaving = true;
}

export function checkSlot(bank: Bank, slot: number): void {
  if (bank.lanes[slot] === undefined) throw new RangeError(`The slot is ${slot}; expected 0 to ${bank.lanes.length - 1}`);
}

/** One block through every chain. Allocates only where the block's length differs from the last one's. */
export function processBank(bank: Bank, inputs: readonly Float32Array[]): void {
  const frames = inputs[0].length;
  if (bank.bypassLines[0].length !== frames) {
    bank.bypassLines = blocks(bank.channels, frames);
    bank.residualLines = blocks(bank.channels, frames);
  }
  if (bank.residualSlot < 0) silence(bank.residualLines);
  bank.latencySamples = latestOf(bank.lanes);
  for (let slot = 0; slot < bank.lanes.length; slot++) {
    const lane = bank.lanes[slot];
    if (lane === null) continue;
    if (lane.lines[0].length !== frames) lane.lines = blocks(bank.channels, frames);
    processChain(lane.chain, inputs, lane.lines, null, slot === bank.residualSlot ? bank.residualLines : NO_LINES);
    if (lane.chain.readings.outputPeak > lane.peak) lane.peak = lane.chain.readings.outputPeak;
    setDelay(lane.delay, bank.latencySamples - Math.round(lane.chain.latencySamples));
    processDelay(lane.delay, lane.lines, lane.lines);
    if (lane.lead > 0) lane.lead -= frames;
  }
  setDelay(bank.bypass, bank.latencySamples);
  processDelay(bank.bypass, inputs, bank.bypassLines);
  processJoin(bank.join, bank.residualLines);
}

function silence(lines: readonly Float32Array[]): void {
  for (let c = 0; c < lines.length; c++) lines[c].fill(0);
}

function createLane(chain: Chain, lead: number, channels: number, sampleRateHz: number): Lane {
  if (chain.latencySamples > LONGEST_DELAY) {
    throw new RangeError(`The chain is ${chain.latencySamples} samples late; expected at most ${LONGEST_DELAY}`);
  }
  return { chain, delay: createDelay(channels, 0, sampleRateHz), lines: blocks(channels, 128), lead, leaving: false, peak: 0 };
}

function latestOf(lanes: readonly (Lane | null)[]): number {
  let latest = 0;
  for (let slot = 0; slot < lanes.length; slot++) {
    const lane = lanes[slot];
    if (lane !== null) latest = Math.max(latest, Math.round(lane.chain.latencySamples));
  }
  return latest;
}

function blocks(channels: number, frames: number): Float32Array[] {
  return Array.from({ length: channels }, () => new Float32Array(frames));
}
