/**
 * The cell's processor: input 0 → chains of all variants, and the bypass → choice → take → level, mute, ceiling → output 0. Input 1 carries a take
 * that is played instead.
 */
import type { Bank, Lane } from './bank.ts';
import { checkSlot, createBank, dropLane, endResidual, processBank, setLane, startResidual } from './bank.ts';
import { beginBlock, createLoad, endBlock } from './load.ts';
import type { Measured, Meter } from './meter.ts';
import { createMeter, processMeter, returnReport } from './meter.ts';
import { choose, createMix, processMix, setGains } from './mix.ts';
import { createMonitor, processMonitor, setCeiling, setGain, setMuted } from './monitor.ts';
import type { CellOptions, FromCell, Heard, Match, ResidualChoice, ReturnedChunk, ToCell } from './protocol.ts';
import { PREVIOUS_SLOT, SLOTS } from './protocol.ts';
import type { Recorder } from './recorder.ts';
import { createRecorder, endRecording, processRecorder, returnChunk, startRecording } from './recorder.ts';

/** Sources of the mix after the slots. */
const BYPASS = SLOTS;
const ASIDE = SLOTS + 1;
const RESIDUAL = SLOTS + 2;
const SOURCES = SLOTS + 3;

export class CellProcessor extends AudioWorkletProcessor {
  private readonly measured: Measured;
  private readonly meter: Meter;
  private readonly recorder: Recorder;
  private readonly inputs: Float32Array[];
  private readonly asides: Float32Array[];
  private readonly sources: (readonly Float32Array[])[];
  private focus: number;
  private heard: Heard;
  private match: Match;
  private residual: ResidualChoice;
  private silence = new Float32Array(128);
  private alive = true;

  constructor(options: { processorOptions: CellOptions }) {
    super();
    const { chains, focus, channels, heard, match, residual, gain, ceilingPeak, muted } = options.processorOptions;
    const bank = createBank(chains, channels, sampleRate);
    this.focus = checkFilled(bank, focus);
    this.heard = heard;
    this.match = match;
    this.residual = residual;
    if (residual.part !== null) startResidual(bank, focus, residual.part);
    const mix = createMix(SOURCES, sourceOf(bank, focus, heard), sampleRate);
    setGains(mix, gainsOf(match, residual));
    mix.gain.set(mix.gainTo);
    const monitor = createMonitor(gain, ceilingPeak, muted, sampleRate);
    this.measured = { bank, mix, monitor, load: createLoad() };
    this.meter = createMeter(this.port, sampleRate);
    this.recorder = createRecorder(this.port, channels, sampleRate);
    this.inputs = Array.from({ length: channels }, () => this.silence);
    this.asides = Array.from({ length: channels }, () => this.silence);
    this.sources = Array.from({ length: SOURCES }, () => this.asides);
    this.port.onmessage = (event: MessageEvent<ToCell>) => this.receive(event.data);
    this.tell({ type: 'ready', latencySamples: bank.latencySamples });
  }

  process(inputs: Float32Array[][], outputs: Float32Array[][]): boolean {
    const lines = outputs[0];
    const { bank, mix, monitor, load } = this.measured;
    beginBlock(load);
    if (this.silence.length !== lines[0].length) this.silence = new Float32Array(lines[0].length);
    for (let c = 0; c < this.inputs.length; c++) {
      this.inputs[c] = inputs[0][c] ?? this.silence;
      this.asides[c] = inputs[1]?.[c] ?? this.silence;
    }
    processBank(bank, this.inputs);
    this.findSources();
    const chosen = mix.chosen < SLOTS ? bank.lanes[mix.chosen] : null;
    processMix(mix, this.sources, lines, chosen !== null && chosen.lead > 0);
    processRecorder(this.recorder, currentFrame, lines);
    processMonitor(monitor, lines);
    const lane = this.laneInFocus();
    processMeter(this.meter, currentFrame, this.inputs, lane.lines, lane.chain.readings, this.measured);
    endBlock(load, lines[0].length / sampleRate);
    return this.alive;
  }

  /** The lines of each source, where they are now; empties slots that were dropped and are no longer heard. */
  private findSources(): void {
    const { bank, mix } = this.measured;
    for (let slot = 0; slot < SLOTS; slot++) {
      const lane = bank.lanes[slot];
      if (lane === null) continue;
      this.sources[slot] = lane.lines;
      if (lane.leaving && mix.weight[slot] === 0) {
        if (bank.residualSlot === slot) endResidual(bank);
        bank.lanes[slot] = null;
      }
    }
    this.sources[BYPASS] = bank.bypassLines;
    this.sources[RESIDUAL] = bank.residualLines;
    if (this.residual.part === null && bank.residualSlot >= 0 && mix.weight[RESIDUAL] === 0) endResidual(bank);
  }

  private laneInFocus(): Lane {
    // There always is one: a slot in focus is never dropped.
    return this.measured.bank.lanes[this.focus] as Lane;
  }

  /** A message that is refused changes nothing: the last good values go on sounding and the page is told why. */
  private receive(message: ToCell): void {
    try {
      this.obey(message);
    } catch (error) {
      this.tell({ type: 'fault', sentence: error instanceof Error ? error.message : String(error) });
    }
  }

  private obey(message: ToCell): void {
    const { bank, mix, monitor } = this.measured;
    switch (message.type) {
      case 'move':
        setLane(bank, message.slot, message.numbers, this.laneInFocus());
        return;
      case 'drop':
        if (message.slot === this.focus || message.slot === mix.chosen) {
          throw new RangeError(`Slot ${message.slot} is heard; expected another one to be dropped`);
        }
        dropLane(bank, message.slot);
        return;
      case 'focus':
        checkSlot(bank, message.slot);
        this.turnTo(message.slot, this.heard);
        return;
      case 'hear':
        this.turnTo(this.focus, message.heard);
        return;
      case 'match':
        setGains(mix, gainsOf(message.match, this.residual));
        this.match = message.match;
        return;
      case 'residual':
        setGains(mix, gainsOf(this.match, message.residual));
        this.residual = message.residual;
        this.followFocus();
        return;
      case 'gain':
        setGain(monitor, message.gain);
        return;
      case 'ceiling':
        setCeiling(monitor, message.peak);
        return;
      case 'mute':
        setMuted(monitor, message.on);
        return;
      case 'record':
        message.on ? this.record(message.to ?? null) : endRecording(this.recorder);
        return;
      case 'return report':
        returnReport(this.meter, message.slot, message.input, message.output);
        return;
      case 'return chunk':
        returnChunk(this.recorder, message.slot, message.channels);
        return;
      case 'dispose':
        this.alive = false;
        return;
      default:
        message satisfies never;
        throw new TypeError(`The cell's processor does not know the message ${JSON.stringify(message)}`);
    }
  }

  private record(to: MessagePort | null): void {
    startRecording(this.recorder, to ?? this.port);
    if (to === null) return;
    to.onmessage = ({ data }: MessageEvent<ReturnedChunk>) => returnChunk(this.recorder, data.slot, data.channels);
  }

  private turnTo(focus: number, heard: Heard): void {
    const { bank, mix } = this.measured;
    checkFilled(bank, focus);
    choose(mix, sourceOf(bank, focus, heard));
    this.focus = focus;
    this.heard = heard;
    this.followFocus();
  }

  /** The residual is that of the chain in focus; one that is no longer wanted goes on until it is not heard. */
  private followFocus(): void {
    const { part } = this.residual;
    if (part !== null) startResidual(this.measured.bank, this.focus, part);
  }

  private tell(message: FromCell): void {
    this.port.postMessage(message);
  }
}

function gainsOf({ slots, bypass }: Match, { gain }: ResidualChoice): number[] {
  return [...slots, bypass, 1, gain];
}

/** Throws a RangeError where what is to be heard is not there. */
function sourceOf(bank: Bank, focus: number, heard: Heard): number {
  switch (heard) {
    case 'cell':
      return checkFilled(bank, focus);
    case 'previous':
      return checkFilled(bank, PREVIOUS_SLOT);
    case 'bypass':
      return BYPASS;
    case 'residual':
      return RESIDUAL;
    case 'aside':
      return ASIDE;
    default:
      heard satisfies never;
      throw new RangeError(`heard is “${heard}”; expected cell, previous, bypass, residual or aside`);
  }
}

function checkFilled(bank: Bank, slot: number): number {
  checkSlot(bank, slot);
  const lane = bank.lanes[slot];
  if (lane === null || lane.leaving) throw new RangeError(`Slot ${slot} is empty; expected one with a chain`);
  return slot;
}
