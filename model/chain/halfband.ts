/**
 * One doubling of the sample rate and its undoing, by polyphase half-band filters.
 *
 * Law      all-pass pair  H(z) = ½·[A0(z²) + z⁻¹·A1(z²)]: a few samples of delay, phase not linear
 *          linear phase   H(z) = ½·z⁻ᶜ + Σ t·(z^−(c−d) + z^−(c+d)), d odd: constant delay of c samples
 * Source   Valenzuela & Constantinides, IEE Proc. G 130 (1983) 225; Vaidyanathan & Nguyen, IEEE TCAS 34 (1987) 297 (from memory)
 *
 * A half keeps its memory in `state`; process allocates nothing and gives the same bits for any cutting into blocks.
 */
import { ALL_PASS, LINEAR_PHASE } from './coefficients.ts';

export type FilterSet = 'lowLatency' | 'linearPhase';

export interface Half {
  readonly filters: FilterSet;
  readonly stage: number;
  /** Low latency: poles, the straight branch first. Linear phase: the taps at odd distances on one side, the nearest first. */
  readonly weights: Float64Array;
  readonly straightCount: number;
  readonly state: Float64Array;
  /** Linear phase only: past input, so that each output is one sum over a run of it. */
  readonly history: Float64Array;
}

/** Longest run of lower-rate samples that one call may hold, for a linear-phase half. */
export const LONGEST_RUN = 128 * 8;

export function createHalf(filters: FilterSet, stage: number): Half {
  if (filters === 'lowLatency') {
    const poles = ALL_PASS[stage];
    const straight = poles.filter((_, i) => i % 2 === 0);
    const delayed = poles.filter((_, i) => i % 2 === 1);
    const weights = Float64Array.from([...straight, ...delayed]);
    const state = new Float64Array(poles.length + 2);
    return { filters, stage, weights, straightCount: straight.length, state, history: new Float64Array(0) };
  }
  const side = LINEAR_PHASE[stage];
  return {
    filters,
    stage,
    weights: Float64Array.from(side),
    straightCount: 0,
    state: new Float64Array(side.length),
    history: new Float64Array(4 * side.length + 2 * LONGEST_RUN),
  };
}

/** Doubles the rate: `count` samples of `input` become 2·`count` of `output`. */
export function doubleRate(half: Half, input: Float64Array, output: Float64Array, count: number): void {
  if (half.filters === 'lowLatency') {
    const { weights, straightCount, state } = half;
    for (let i = 0; i < count; i++) {
      const x = input[i];
      output[2 * i] = allPassChain(weights, 0, straightCount, state, 0, x);
      output[2 * i + 1] = allPassChain(weights, straightCount, weights.length, state, 1, x);
    }
    forgetNothing(state);
    return;
  }
  const { weights, history } = half;
  const side = weights.length;
  const kept = 2 * side - 1;
  const paired = side - (side % 2);
  for (let i = 0; i < count; i++) history[kept + i] = input[i];
  for (let i = 0; i < count; i++) {
    let even = 0;
    let odd = 0;
    const below = i + side - 1;
    for (let k = 0; k < paired; k += 2) {
      even += weights[k] * (history[below - k] + history[below + 1 + k]);
      odd += weights[k + 1] * (history[below - k - 1] + history[below + 2 + k]);
    }
    if (paired < side) even += weights[paired] * (history[below - paired] + history[below + 1 + paired]);
    const sum = even + odd;
    output[2 * i] = 2 * sum;
    output[2 * i + 1] = history[below + 1];
  }
  for (let k = 0; k < kept; k++) history[k] = history[count + k];
}

/** In silence a recursive filter decays into numbers that processors are slow with, and stays there. */
const NOTHING = 1e-300;

function forgetNothing(state: Float64Array): void {
  for (let k = 0; k < state.length; k++) if (state[k] < NOTHING && state[k] > -NOTHING) state[k] = 0;
}

/** Halves the rate: 2·`count` samples of `input` become `count` of `output`. */
export function halveRate(half: Half, input: Float64Array, output: Float64Array, count: number): void {
  if (half.filters === 'lowLatency') {
    const { weights, straightCount, state } = half;
    for (let i = 0; i < count; i++) {
      const delayed = allPassChain(weights, straightCount, weights.length, state, 1, input[2 * i]);
      const straight = allPassChain(weights, 0, straightCount, state, 0, input[2 * i + 1]);
      output[i] = 0.5 * (straight + delayed);
    }
    forgetNothing(state);
    return;
  }
  const { weights, history, state } = half;
  const side = weights.length;
  const kept = 2 * side - 1;
  const paired = side - (side % 2);
  for (let i = 0; i < count; i++) history[kept + i] = input[2 * i];
  for (let i = 0; i < count; i++) {
    let even = 0;
    let odd = 0;
    const below = i + side - 1;
    for (let k = 0; k < paired; k += 2) {
      even += weights[k] * (history[below - k] + history[below + 1 + k]);
      odd += weights[k + 1] * (history[below - k - 1] + history[below + 2 + k]);
    }
    if (paired < side) even += weights[paired] * (history[below - paired] + history[below + 1 + paired]);
    const sum = even + odd;
    output[i] = sum + 0.5 * (i >= side ? input[2 * (i - side) + 1] : state[i]);
  }
  for (let k = 0; k < kept; k++) history[k] = history[count + k];
  keepOdd(state, input, count, side);
}

/** The last `centre` odd samples stay for the next run. */
function keepOdd(state: Float64Array, input: Float64Array, count: number, centre: number): void {
  if (count < centre) for (let k = 0; k < centre - count; k++) state[k] = state[count + k];
  for (let k = Math.max(0, centre - count); k < centre; k++) state[k] = input[2 * (count - centre + k) + 1];
}

/**
 * First-order all-pass sections (c + z⁻¹)/(1 + c·z⁻¹) from `from` to `to`. Each section's past output is the next one's past input, so a branch
 * of m sections keeps m + 1 values, at `from + branch` on.
 */
function allPassChain(weights: Float64Array, from: number, to: number, state: Float64Array, branch: number, input: number): number {
  let x = input;
  let past = state[from + branch];
  state[from + branch] = x;
  for (let k = from; k < to; k++) {
    const y = weights[k] * (x - state[k + 1 + branch]) + past;
    past = state[k + 1 + branch];
    state[k + 1 + branch] = y;
    x = y;
  }
  return x;
}

/** Delay of a doubling and a halving together, in samples of the lower rate; at low frequencies for the all-pass pair. */
export function roundTripSamples(filters: FilterSet, stage: number): number {
  if (filters === 'linearPhase') return 2 * LINEAR_PHASE[stage].length - 1;
  let sum = -0.5;
  ALL_PASS[stage].forEach((c, i) => {
    if (i % 2 === 0) sum += (2 * (1 - c)) / (1 + c);
  });
  return sum;
}
