/**
 * Programme loudness of one or two channels, as they come.
 *
 * Law      K-weighting (a high shelf, then a high-pass), mean square over 400 ms, channels added;  −0.691 + 10·log10 of it in LUFS. Blocks overlap by
 *          75 %; those above −70 LUFS are averaged, then those above that average − 10 LU
 * Scheme   the standard's sections for 48 kHz, taken back to their analogue prototypes by the inverse bilinear transform and forth again at any
 *          rate, each section exact at the frequency of its poles. Blocks are gathered in classes of 0.01 LU, each with its number and its sum, so that
 *          a programme of any length takes one room
 * Error    against the standard's coefficients at 48 kHz under 1e-14. A block counts with the mean of its class, so one within 0.01 LU of the
 *          relative gate may fall on its wrong side. At rates not divisible by ten a block may be a sample longer than the next
 * Valid    rates from 8 kHz; left, right and mono, whose weight is 1
 * Source   ITU-R BS.1770-4, Annex 1
 */
import { cosTurns, log10, power, sinTurns, turnsOf } from '../device/math.ts';

/** b0 b1 b2, a1 a2 at 48 kHz (BS.1770-4, tables 1 and 2). */
const SHELF_48 = [1.53512485958697, -2.69169618940638, 1.19839281085285, -1.69065929318241, 0.73248077421585];
const HIGHPASS_48 = [1, -2, 1, -1.99004745483398, 0.99007225036621];
const STANDARD_HZ = 48000;
const LOWEST_RATE_HZ = 8000;

const OFFSET_LU = -0.691;
const ABSOLUTE_GATE_LUFS = -70;
/** Powers this far under the mean are gated: −10 LU. */
const RELATIVE_GATE = 0.1;
const HOPS_A_SEC = 10;
const HOPS_A_BLOCK = 4;

/** Classes of block loudness, from the absolute gate up to +30 LUFS; what is louder falls into the last. */
const CLASSES_A_LU = 100;
const CLASSES = 100 * CLASSES_A_LU;

/** Two states of each section, then the sum of the weighted squares in the present hop. */
const SLOTS = 5;
const SQUARES = 4;

/** b0 b1 b2 a1 a2 of the shelf, then of the high-pass, a0 = 1, at `sampleRateHz`. */
export function kWeighting(sampleRateHz: number): Float64Array {
  return Float64Array.of(...atRate(SHELF_48, sampleRateHz), ...atRate(HIGHPASS_48, sampleRateHz));
}

/** A section for 48 kHz at another rate: s = (1 − 1/z)/(1 + 1/z), scaled by the ratio of the warped pole frequencies. */
function atRate([b0, b1, b2, a1, a2]: readonly number[], sampleRateHz: number): number[] {
  const above = [b0 + b1 + b2, 2 * (b0 - b2), b0 - b1 + b2];
  const below = [1 + a1 + a2, 2 * (1 - a2), 1 - a1 + a2];
  const warped = Math.sqrt(below[0] / below[2]);
  const angleTurns = (turnsOf(warped, 1) * STANDARD_HZ) / sampleRateHz;
  const ratio = sampleRateHz === STANDARD_HZ ? 1 : (warped * cosTurns(angleTurns)) / sinTurns(angleTurns);
  const [zero, one, two] = backToZ(above, ratio);
  const [a0, first, second] = backToZ(below, ratio);
  return [zero / a0, one / a0, two / a0, first / a0, second / a0];
}

function backToZ([c0, c1, c2]: readonly number[], ratio: number): number[] {
  const first = c1 * ratio;
  const second = c2 * ratio * ratio;
  return [(c0 + first + second) / 4, (2 * c0 - 2 * second) / 4, (c0 - first + second) / 4];
}

/** A measurement that goes on. Made by `createLoudness`; only `addLoudness` and `resetLoudness` change it. */
export interface Loudness {
  readonly sampleRateHz: number;
  readonly sections: Float64Array;
  /** One for each channel: filter states and a sum. */
  readonly states: readonly Float64Array[];
  /** Weighted squares of the last four hops of 100 ms, and their lengths in samples. */
  readonly hopSums: Float64Array;
  readonly hopSamples: Float64Array;
  /** By place: samples in the present hop, hops done, power of the last whole block. */
  readonly progress: Float64Array;
  /** Least power of each class; how many blocks fell in it, and the sum of their powers. */
  readonly classFloor: Float64Array;
  readonly classCount: Float64Array;
  readonly classPower: Float64Array;
}

const IN_HOP = 0;
const HOPS = 1;
const BLOCK_POWER = 2;

/** An empty measurement of 1 or 2 channels. Throws a RangeError naming a rate or a number that it cannot do. */
export function createLoudness(sampleRateHz: number, channels: number): Loudness {
  if (!(sampleRateHz >= LOWEST_RATE_HZ && Number.isFinite(sampleRateHz))) {
    throw new RangeError(`the sample rate is ${sampleRateHz} Hz; expected at least ${LOWEST_RATE_HZ} Hz`);
  }
  if (channels !== 1 && channels !== 2) throw new RangeError(`the audio has ${channels} channels; expected 1 or 2`);
  return {
    sampleRateHz,
    sections: kWeighting(sampleRateHz),
    states: Array.from({ length: channels }, () => new Float64Array(SLOTS)),
    hopSums: new Float64Array(HOPS_A_BLOCK),
    hopSamples: new Float64Array(HOPS_A_BLOCK),
    progress: new Float64Array(3),
    classFloor: Float64Array.from({ length: CLASSES }, (_, i) => powerOf(ABSOLUTE_GATE_LUFS + i / CLASSES_A_LU)),
    classCount: new Float64Array(CLASSES),
    classPower: new Float64Array(CLASSES),
  };
}

/** Forgets everything. Allocates nothing. */
export function resetLoudness(loudness: Loudness): void {
  for (let channel = 0; channel < loudness.states.length; channel++) loudness.states[channel].fill(0);
  loudness.hopSums.fill(0);
  loudness.hopSamples.fill(0);
  loudness.progress.fill(0);
  loudness.classCount.fill(0);
  loudness.classPower.fill(0);
}

/**
 * Takes samples of every channel, all of one length, 1.0 being full scale. Allocates nothing; how the sound is cut into calls changes no bit.
 * A sample that is not a number makes the reading not a number until `resetLoudness`.
 */
export function addLoudness(loudness: Loudness, channels: readonly (Float32Array | Float64Array)[]): void {
  const { progress, sampleRateHz, states } = loudness;
  const length = channels[0].length;
  for (let from = 0; from < length; ) {
    const hop = progress[HOPS];
    const hopLength = Math.round(((hop + 1) * sampleRateHz) / HOPS_A_SEC) - Math.round((hop * sampleRateHz) / HOPS_A_SEC);
    const to = Math.min(length, from + hopLength - progress[IN_HOP]);
    for (let channel = 0; channel < states.length; channel++) weigh(loudness.sections, states[channel], channels[channel], from, to);
    progress[IN_HOP] += to - from;
    from = to;
    if (progress[IN_HOP] < hopLength) continue;
    endHop(loudness, hop % HOPS_A_BLOCK, hopLength);
    progress[IN_HOP] = 0;
    progress[HOPS] = hop + 1;
    if (hop + 1 >= HOPS_A_BLOCK) gatherBlock(loudness);
  }
}

/** Weighs samples of one channel and adds up their squares one by one, so that the cut of a call leaves no trace. */
function weigh(sections: Float64Array, state: Float64Array, samples: Float32Array | Float64Array, from: number, to: number): void {
  const b0 = sections[0];
  const b1 = sections[1];
  const b2 = sections[2];
  const a1 = sections[3];
  const a2 = sections[4];
  const c0 = sections[5];
  const c1 = sections[6];
  const c2 = sections[7];
  const d1 = sections[8];
  const d2 = sections[9];
  let s1 = state[0];
  let s2 = state[1];
  let s3 = state[2];
  let s4 = state[3];
  let sum = state[SQUARES];
  for (let i = from; i < to; i++) {
    const x = samples[i];
    const shelved = b0 * x + s1;
    s1 = b1 * x - a1 * shelved + s2;
    s2 = b2 * x - a2 * shelved;
    const weighted = c0 * shelved + s3;
    s3 = c1 * shelved - d1 * weighted + s4;
    s4 = c2 * shelved - d2 * weighted;
    sum += weighted * weighted;
  }
  state[0] = s1;
  state[1] = s2;
  state[2] = s3;
  state[3] = s4;
  state[SQUARES] = sum;
}

function endHop({ states, hopSums, hopSamples }: Loudness, slot: number, samples: number): void {
  hopSamples[slot] = samples;
  hopSums[slot] = 0;
  for (let channel = 0; channel < states.length; channel++) {
    hopSums[slot] += states[channel][SQUARES];
    states[channel][SQUARES] = 0;
  }
}

/** The block that has just become whole, into its class: the last whose least power it exceeds. */
function gatherBlock({ hopSums, hopSamples, progress, classFloor, classCount, classPower }: Loudness): void {
  const samples = hopSamples[0] + hopSamples[1] + hopSamples[2] + hopSamples[3];
  const blockPower = (hopSums[0] + hopSums[1] + hopSums[2] + hopSums[3]) / samples;
  progress[BLOCK_POWER] = blockPower;
  if (blockPower <= classFloor[0]) return;
  let low = 0;
  let high = CLASSES;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (blockPower > classFloor[middle]) low = middle;
    else high = middle;
  }
  classCount[low] += 1;
  classPower[low] += blockPower;
}

/** Gated loudness of all that was taken so far, LUFS; −Infinity while no block is above the absolute gate. */
export function integratedLufs({ classCount, classPower }: Loudness): number {
  const meanAbove = (gate: number) => {
    let count = 0;
    let sum = 0;
    for (let i = 0; i < CLASSES; i++) {
      if (classCount[i] === 0 || classPower[i] <= gate * classCount[i]) continue;
      count += classCount[i];
      sum += classPower[i];
    }
    return count === 0 ? 0 : sum / count;
  };
  return lufsOf(meanAbove(RELATIVE_GATE * meanAbove(0)));
}

/** Loudness of the last whole 400 ms, ungated, renewed every 100 ms, LUFS; −Infinity before the first and in silence. */
export function momentaryLufs({ progress }: Loudness): number {
  return lufsOf(progress[BLOCK_POWER]);
}

/** Gated loudness of whole channels of equal length, LUFS. Throws a RangeError as `createLoudness` does. */
export function loudnessOf(channels: readonly (Float32Array | Float64Array)[], sampleRateHz: number): number {
  const loudness = createLoudness(sampleRateHz, channels.length);
  addLoudness(loudness, channels);
  return integratedLufs(loudness);
}

/** Gain that brings `otherLufs` to the loudness of `referenceLufs`, dB; 0 where either is silent, since no gain would. */
export function matchingGainDb(referenceLufs: number, otherLufs: number): number {
  return Number.isFinite(referenceLufs) && Number.isFinite(otherLufs) ? referenceLufs - otherLufs : 0;
}

function lufsOf(meanSquare: number): number {
  return OFFSET_LU + 10 * log10(meanSquare);
}

function powerOf(lufs: number): number {
  return power(10, (lufs - OFFSET_LU) / 10);
}
