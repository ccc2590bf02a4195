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

export function clearHalf({ state, history }: Half): void {
  state.fill(0);
  history.fill(0);
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
  for (let i = 0; i < count; i++) history[kept + i] = input[i];
  sumSides(weights, history, output, 2, count);
  for (let i = 0; i < count; i++) {
    output[2 * i] *= 2;
    output[2 * i + 1] = history[i + side];
  }
  for (let k = 0; k < kept; k++) history[k] = history[count + k];
}

/**
 * The taps' sum at each of `count` samples of `history`, to every `stride`th of `output`. Two outputs at a time share what they read; each has the same
 * sums, in the same order, as the last of an odd number has alone.
 */
function sumSides(weights: Float64Array, history: Float64Array, output: Float64Array, stride: number, count: number): void {
  const side = weights.length;
  const paired = side - (side % 2);
  let i = 0;
  for (; i + 1 < count; i += 2) {
    const below = i + side - 1;
    let even = 0;
    let odd = 0;
    let nextEven = 0;
    let nextOdd = 0;
    let nearBelow = history[below + 1];
    let nearAbove = nearBelow;
    for (let k = 0; k < paired; k += 2) {
      const first = weights[k];
      const second = weights[k + 1];
      const below0 = history[below - k];
      const below1 = history[below - k - 1];
      const above1 = history[below + 2 + k];
      const above2 = history[below + 3 + k];
      even += first * (below0 + nearAbove);
      odd += second * (below1 + above1);
      nextEven += first * (nearBelow + above1);
      nextOdd += second * (below0 + above2);
      nearBelow = below1;
      nearAbove = above2;
    }
    if (paired < side) {
      even += weights[paired] * (history[below - paired] + nearAbove);
      nextEven += weights[paired] * (nearBelow + history[below + 2 + paired]);
    }
    output[stride * i] = even + odd;
    output[stride * (i + 1)] = nextEven + nextOdd;
  }
  if (i === count) return;
  const below = i + side - 1;
  let even = 0;
  let odd = 0;
  for (let k = 0; k < paired; k += 2) {
    even += weights[k] * (history[below - k] + history[below + 1 + k]);
    odd += weights[k + 1] * (history[below - k - 1] + history[below + 2 + k]);
  }
  if (paired < side) even += weights[paired] * (history[below - paired] + history[below + 1 + paired]);
  output[stride * i] = even + odd;
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
  for (let i = 0; i < count; i++) history[kept + i] = input[2 * i];
  sumSides(weights, history, output, 1, count);
  for (let i = 0; i < count; i++) output[i] += 0.5 * (i >= side ? input[2 * (i - side) + 1] : state[i]);
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
