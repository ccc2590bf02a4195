/** The cell's processor: input 0 → chain → monitor → output 0. Input 1 carries a take that is played instead. */
import type { Chain } from '../model/chain/chain.ts';
import { createChain, moveChain, processChain, warmChain } from '../model/chain/chain.ts';
import type { Delay } from './delay.ts';
import { createDelay, processDelay } from './delay.ts';
import type { Meter } from './meter.ts';
import { createMeter, processMeter, returnReport } from './meter.ts';
import type { Monitor } from './monitor.ts';
import { createMonitor, processMonitor, setCeiling, setGain, setHeard, setMuted } from './monitor.ts';
import type { CellOptions, FromCell, ToCell } from './protocol.ts';
import type { Recorder } from './recorder.ts';
import { createRecorder, endRecording, processRecorder, returnChunk, startRecording } from './recorder.ts';

export class CellProcessor extends AudioWorkletProcessor {
  private readonly chain: Chain;
  private readonly monitor: Monitor;
  private readonly meter: Meter;
  private readonly recorder: Recorder;
  private delay: Delay;
  private latencySamples: number;
  private readonly inputs: Float32Array[];
  private readonly asides: Float32Array[];
  private silence = new Float32Array(128);
  private alive = true;

  constructor(options: { processorOptions: CellOptions }) {
    super();
    const { numbers, channels, heard, gain, ceilingPeak, muted } = options.processorOptions;
    this.chain = createChain(numbers);
    warmChain(this.chain);
    this.monitor = createMonitor(heard, gain, ceilingPeak, muted, sampleRate);
    this.meter = createMeter(this.port, sampleRate);
    this.recorder = createRecorder(this.port, channels);
    this.latencySamples = this.chain.latencySamples;
    this.delay = createDelay(channels, this.latencySamples);
    this.inputs = Array.from({ length: channels }, () => this.silence);
    this.asides = Array.from({ length: channels }, () => this.silence);
    this.port.onmessage = (event: MessageEvent<ToCell>) => this.receive(event.data);
    this.tell({ type: 'ready', latencySamples: this.latencySamples });
  }

  process(inputs: Float32Array[][], outputs: Float32Array[][]): boolean {
    const lines = outputs[0];
    if (this.silence.length !== lines[0].length) this.silence = new Float32Array(lines[0].length);
    for (let c = 0; c < this.inputs.length; c++) {
      this.inputs[c] = inputs[0][c] ?? this.silence;
      this.asides[c] = inputs[1]?.[c] ?? this.silence;
    }
    processDelay(this.delay, this.inputs);
    processChain(this.chain, this.inputs, lines);
    processRecorder(this.recorder, currentFrame, lines);
    processMeter(this.meter, currentFrame, this.inputs, lines, this.chain.readings, this.monitor);
    processMonitor(this.monitor, lines, this.delay.lines, this.asides);
    return this.alive;
  }

  /** A message that is refused changes nothing: the last good values go on sounding and the page is told why. */
  private receive(message: ToCell): void {
    try {
      this.obey(message);
      this.followLatency();
    } catch (error) {
      this.tell({ type: 'fault', sentence: error instanceof Error ? error.message : String(error) });
    }
  }

  private obey(message: ToCell): void {
    switch (message.type) {
      case 'move':
        moveChain(this.chain, message.numbers);
        return;
      case 'hear':
        setHeard(this.monitor, message.heard);
        return;
      case 'gain':
        setGain(this.monitor, message.gain);
        return;
      case 'ceiling':
        setCeiling(this.monitor, message.peak);
        return;
      case 'mute':
        setMuted(this.monitor, message.on);
        return;
      case 'record':
        message.on ? startRecording(this.recorder) : endRecording(this.recorder);
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

  /** The chain's delay changes with its oversampling, at a move or at the end of a fade; the bypass follows at the next message. */
  private followLatency(): void {
    const { latencySamples } = this.chain;
    if (latencySamples === this.latencySamples) return;
    this.latencySamples = latencySamples;
    this.delay = createDelay(this.inputs.length, latencySamples);
    this.tell({ type: 'latency', latencySamples });
  }

  private tell(message: FromCell): void {
    this.port.postMessage(message);
  }
}
