/**
 * What is heard: a voice, and while the shape of the circuit changes a second one that it fades into. `createChain` and `moveChain` allocate and
 * belong outside the audio callback; `processChain` computes only.
 */
import { gateSourceV } from '../cell/cell.ts';
import { quietControlV } from '../control/control.ts';
import { type Aligner, align, createAligner, setAligner } from './align.ts';
import type { ChainNumbers } from './compile.ts';
import { latencyOf } from './latency.ts';
import type { ResidualPart } from './residual.ts';
import { createVoice, FULL_SCALE_V, inherit, LONGEST_BLOCK, moveVoice, processVoice, setVoiceResidual, type Voice } from './voice.ts';

const FADE_SEC = 0.03;
/** A new voice runs unheard for at least this long before it is faded in, so that its filters are full. */
const LEAD_SEC = 0.01;
/** Or of its own latency, where that is longer. */
const LEAD_LATENCIES = 2;
/** Input samples beyond this many times full scale are no audio: they count as faults and are taken as silence. */
export const LARGEST_SAMPLE = 1e4;

/** Of the last call of `processChain`; peaks over all channels. `faults` counts blocks with unusable input, a lost state or values that could not be put in force, since the start. */
export interface ChainReadings {
  /** The control voltage used for the last sample. */
  controlV: number;
  /** Gate-source voltage of the first channel without the audio that rides on it. */
  gateSourceV: number;
  /** What the control alone leaves at the drain. */
  feedthroughPeakV: number;
  drainPeakV: number;
  inputPeakV: number;
  /** In samples, 1.0 being full scale. */
  outputPeak: number;
  faults: number;
}

const NO_LINES: readonly Float32Array[] = [];

export interface Chain {
  numbers: ChainNumbers;
  latencySamples: number;
  readonly readings: ChainReadings;
  voice: Voice;
  /** The voice that is being faded in, and the one that is to follow it. */
  next: Voice | null;
  pending: Voice | null;
  fadeDone: number;
  readonly aligner: Aligner;
  readonly residualAligner: Aligner;
  readonly inputs: readonly Float64Array[];
  readonly external: Float64Array;
  readonly outputs: readonly Float64Array[];
  readonly fadeOutputs: readonly Float64Array[];
  /** The part of what the cells add that is left beside the output; null for none. */
  residual: ResidualPart | null;
  readonly residuals: readonly Float64Array[];
  readonly fadeResiduals: readonly Float64Array[];
}

/** A chain at its operating point. Throws a RangeError when a cell's network is singular. */
export function createChain(numbers: ChainNumbers): Chain {
  const buffers = () => numbers.cells.map(() => new Float64Array(LONGEST_BLOCK));
  const voice = createVoice(numbers);
  return {
    numbers,
    latencySamples: latencyOf(numbers),
    readings: {
      controlV: quietControlV(numbers.control),
      gateSourceV: gateSourceV(voice.quiet.cell),
      feedthroughPeakV: 0,
      drainPeakV: 0,
      inputPeakV: 0,
      outputPeak: 0,
      faults: 0,
    },
    voice,
    next: null,
    pending: null,
    fadeDone: 0,
    aligner: createAligner(numbers.cells.length),
    residualAligner: createAligner(numbers.cells.length),
    inputs: buffers(),
    external: new Float64Array(LONGEST_BLOCK),
    outputs: buffers(),
    fadeOutputs: buffers(),
    residual: null,
    residuals: buffers(),
    fadeResiduals: buffers(),
  };
}

/** From now on the chain leaves this part of what its cells add beside its output; null ends that. Allocates. */
export function setResidual(chain: Chain, part: ResidualPart | null): void {
  chain.residual = part;
  setVoiceResidual(chain.voice, part);
  if (chain.next !== null) setVoiceResidual(chain.next, part);
  if (chain.pending !== null) setVoiceResidual(chain.pending, part);
}

/**
 * Moves to new numbers: along a ramp where only values differ, by a crossfade where the shape does. The state is kept. Throws a RangeError,
 * and keeps sounding as before, when the rate or the number of channels differs or a network is singular.
 */
export function moveChain(chain: Chain, numbers: ChainNumbers): void {
  if (numbers.sampleRateHz !== chain.numbers.sampleRateHz || numbers.cells.length !== chain.numbers.cells.length) {
    throw new RangeError(
      `the new values are for ${numbers.cells.length} channels at ${numbers.sampleRateHz} Hz; ` +
        `expected ${chain.numbers.cells.length} at ${chain.numbers.sampleRateHz} Hz`,
    );
  }
  const heading = chain.next ?? chain.voice;
  if (numbers.shape === heading.numbers.shape) {
    moveVoice(heading, numbers);
    chain.pending = null;
  } else {
    const coming = createVoice(numbers);
    setVoiceResidual(coming, chain.residual);
    if (chain.next) chain.pending = coming;
    else startFade(chain, coming);
  }
  chain.numbers = numbers;
}

function startFade(chain: Chain, next: Voice): void {
  inherit(next, chain.voice);
  const latency = latencyOf(next.numbers);
  const lateness = latency - latencyOf(chain.voice.numbers);
  const lead = Math.round(Math.max(LEAD_SEC * next.numbers.sampleRateHz, LEAD_LATENCIES * latency));
  setAligner(chain.aligner, lateness, lead);
  setAligner(chain.residualAligner, lateness, lead);
  chain.next = next;
  chain.fadeDone = -chain.aligner.glide;
  chain.latencySamples = latency;
}

/**
 * Any number of frames. Missing inputs are silence; `external` is the recorded control, where the design has one, silence when missing;
 * `residuals` takes what `setResidual` asked for, one line for each channel. Never throws, allocates nothing.
 */
export function processChain(
  chain: Chain,
  inputs: readonly Float32Array[],
  outputs: readonly Float32Array[],
  external: Float32Array | null = null,
  residuals: readonly Float32Array[] = NO_LINES,
): void {
  const { readings } = chain;
  const length = outputs.length > 0 ? outputs[0].length : 0;
  readings.inputPeakV = 0;
  readings.outputPeak = 0;
  readings.drainPeakV = 0;
  readings.feedthroughPeakV = 0;
  let start = 0;
  while (start < length) {
    const count = Math.min(LONGEST_BLOCK, length - start, samplesToFadeEnd(chain));
    const heard = takeExternal(chain, external, start, count) || chain.voice.external === null;
    if (!processBlock(chain, inputs, outputs, start, count) || !heard) readings.faults += 1;
    for (let channel = 0; channel < residuals.length; channel++) {
      const from = chain.residuals[Math.min(channel, chain.residuals.length - 1)];
      for (let i = 0; i < count; i++) residuals[channel][start + i] = chain.residual === null ? 0 : from[i];
    }
    start += count;
  }
  readings.gateSourceV = gateSourceV(chain.voice.quiet.cell);
}

/** A fade ends at the end of a block, so that what follows it begins at the same sample whatever the caller's blocks are. */
function samplesToFadeEnd({ next, fadeDone, aligner }: Chain): number {
  return next ? fadeSamples(next) + tailSamples(aligner) - fadeDone : LONGEST_BLOCK;
}

/** After the fade a new voice that is earlier than the old one goes back to its own time. */
function tailSamples({ lateness, glide }: Aligner): number {
  return lateness < 0 ? glide : 0;
}

function fadeSamples(next: Voice): number {
  return Math.round(FADE_SEC * next.numbers.sampleRateHz);
}

function processBlock(
  chain: Chain,
  inputs: readonly Float32Array[],
  outputs: readonly Float32Array[],
  start: number,
  count: number,
): boolean {
  const { readings, voice } = chain;
  let sound = takeInputs(chain, inputs, start, count);
  sound = processVoice(voice, chain.inputs, chain.external, chain.outputs, chain.residuals, count) && sound;
  if (chain.next) sound = crossfade(chain, chain.next, count) && sound;
  for (let channel = 0; channel < outputs.length; channel++) {
    const from = chain.outputs[Math.min(channel, chain.outputs.length - 1)];
    const to = outputs[channel];
    for (let i = 0; i < count; i++) {
      const sample = from[i];
      to[start + i] = sample;
      const size = Math.abs(sample);
      if (size > readings.outputPeak) readings.outputPeak = size;
    }
  }
  for (let channel = 0; channel < voice.lanes.length; channel++) {
    readings.drainPeakV = Math.max(readings.drainPeakV, voice.lanes[channel].outputPeakV);
  }
  readings.feedthroughPeakV = Math.max(readings.feedthroughPeakV, voice.quiet.feedthroughPeakV);
  readings.controlV = voice.drive.lastV[0];
  return sound;
}

/** False when a sample of the recorded control was not a usable number: it is taken as 0. */
function takeExternal(chain: Chain, external: Float32Array | null, start: number, count: number): boolean {
  let sound = true;
  for (let i = 0; i < count; i++) {
    const sample = external ? external[start + i] : 0;
    const usable = Math.abs(sample) <= LARGEST_SAMPLE;
    if (!usable) sound = false;
    chain.external[i] = usable ? sample : 0;
  }
  return sound;
}

/** Copies the block's input to Float64; false when a sample was not a usable number. */
function takeInputs(chain: Chain, inputs: readonly Float32Array[], start: number, count: number): boolean {
  const { readings } = chain;
  let sound = true;
  let peak = 0;
  for (let channel = 0; channel < chain.inputs.length; channel++) {
    const to = chain.inputs[channel];
    const from = inputs.length > 0 ? inputs[Math.min(channel, inputs.length - 1)] : null;
    for (let i = 0; i < count; i++) {
      const sample = from ? from[start + i] : 0;
      const size = Math.abs(sample);
      const usable = size <= LARGEST_SAMPLE;
      if (!usable) sound = false;
      to[i] = usable ? sample : 0;
      if (usable && size > peak) peak = size;
    }
  }
  // From an array: the numbers come in objects of many makings, of which reading a fraction costs memory.
  readings.inputPeakV = Math.max(readings.inputPeakV, peak * chain.voice.levels.to[FULL_SCALE_V]);
  return sound;
}

function crossfade(chain: Chain, next: Voice, count: number): boolean {
  const sound = processVoice(next, chain.inputs, chain.external, chain.fadeOutputs, chain.fadeResiduals, count);
  const total = fadeSamples(next);
  const { aligner } = chain;
  const since = chain.fadeDone + aligner.glide;
  alignFade(aligner, chain.outputs, chain.fadeOutputs, since, total, count);
  mixIn(chain, chain.outputs, chain.fadeOutputs, total, count);
  if (chain.residual !== null) {
    alignFade(chain.residualAligner, chain.residuals, chain.fadeResiduals, since, total, count);
    mixIn(chain, chain.residuals, chain.fadeResiduals, total, count);
  }
  chain.fadeDone += count;
  if (chain.fadeDone >= total + tailSamples(aligner)) {
    chain.voice = next;
    chain.next = null;
    const { pending } = chain;
    chain.pending = null;
    if (pending) startFade(chain, pending);
  }
  return sound;
}

/** Delays whichever of the two is earlier. */
function alignFade(
  aligner: Aligner,
  leaving: readonly Float64Array[],
  coming: readonly Float64Array[],
  since: number,
  total: number,
  count: number,
): void {
  if (aligner.lateness > 0) align(aligner, leaving, since, 0, count);
  else if (aligner.lateness < 0) align(aligner, coming, since, aligner.glide + total, count);
}

function mixIn({ fadeDone }: Chain, lines: readonly Float64Array[], incoming: readonly Float64Array[], total: number, count: number): void {
  for (let channel = 0; channel < lines.length; channel++) {
    for (let i = 0; i < count; i++) {
      const share = Math.min(1, Math.max(0, (fadeDone + i + 1) / total));
      lines[channel][i] += share * (incoming[channel][i] - lines[channel][i]);
    }
  }
}

const WARM_BLOCKS = 400;

const WARM_MOVE = 1.001;

/** Runs every branch often enough to be compiled, on a copy that moves and fades; the chain itself is untouched. */
export function warmChain(chain: Chain): void {
  const copy = createChain(chain.numbers);
  const input = copy.inputs.map(() => new Float32Array(LONGEST_BLOCK));
  const output = copy.inputs.map(() => new Float32Array(LONGEST_BLOCK));
  const { numbers } = chain;
  const moved = { ...numbers, cells: numbers.cells.map((cell) => ({ ...cell, values: cell.values.map((value) => value * WARM_MOVE) })) };
  for (let block = 0; block < WARM_BLOCKS; block++) {
    const peak = block % 4 === 3 ? 40 / chain.numbers.fullScaleV : block % 4;
    for (const channel of input) for (let i = 0; i < channel.length; i++) channel[i] = peak * (((block + i) % 32) / 16 - 1);
    if (block % 50 === 0) moveChain(copy, block % 100 === 0 ? moved : numbers);
    if (block === WARM_BLOCKS / 2) moveChain(copy, { ...numbers, shape: `${numbers.shape} once more` });
    processChain(copy, input, output);
  }
}
