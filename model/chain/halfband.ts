/**
 * One doubling of the sample rate and its undoing, by polyphase half-band filters.
 *
 * Law      all-pass pair  H(z) = ½·[A0(z²) + z⁻¹·A1(z²)]: a few samples of delay, phase not linear
 *          linear phase   H(z) = ½·z⁻ᶜ + Σ t·(z^−(c−d) + z^−(c+d)), d odd: constant delay of c samples
 * Source   Valenzuela & Constantinides, IEE Proc. G 130 (1983) 225; Vaidyanathan & Nguyen, IEEE TCAS 34 (1987) 297 (from memory)
 *
 * Processing allocates nothing and gives the same bits for any cutting into blocks.
 */
import { type AllPassPair, createAllPassPair, runAllPassPair } from './allPass.ts';
import { ALL_PASS, LINEAR_PHASE } from './coefficients.ts';

export type FilterSet = 'lowLatency' | 'linearPhase';

interface AllPassHalf {
  readonly filters: 'lowLatency';
  readonly pair: AllPassPair;
}

interface LinearPhaseHalf {
  readonly filters: 'linearPhase';
  /** The taps at odd distances on one side, the nearest first. */
  readonly weights: Float64Array;
  /** Past input, so that each output is one sum over a run of it; past odd samples of the way down. */
  readonly history: Float64Array;
  readonly odd: Float64Array;
}

export type Half = AllPassHalf | LinearPhaseHalf;

/** Longest run of lower-rate samples that one call may hold. */
export const LONGEST_RUN = 128 * 8;

export function createHalf(filters: FilterSet, stage: number): Half {
  if (filters === 'lowLatency') return { filters, pair: createAllPassPair(ALL_PASS[stage], LONGEST_RUN) };
  const side = LINEAR_PHASE[stage];
  return {
    filters,
    weights: Float64Array.from(side),
    history: new Float64Array(4 * side.length + 2 * LONGEST_RUN),
    odd: new Float64Array(side.length),
  };
}

export function clearHalf(half: Half): void {
  if (half.filters === 'lowLatency') half.pair.memory.fill(0);
  else {
    half.history.fill(0);
    half.odd.fill(0);
  }
}

/** Doubles the rate: `count` samples of `input` become 2·`count` of `output`. */
export function doubleRate(half: Half, input: Float64Array, output: Float64Array, count: number): void {
  if (half.filters === 'lowLatency') doubleByPair(half.pair, input, output, count);
  else doubleByTaps(half, input, output, count);
}

/** Halves the rate: 2·`count` samples of `input` become `count` of `output`. */
export function halveRate(half: Half, input: Float64Array, output: Float64Array, count: number): void {
  if (half.filters === 'lowLatency') halveByPair(half.pair, input, output, count);
  else halveByTaps(half, input, output, count);
}

function doubleByPair(pair: AllPassPair, input: Float64Array, output: Float64Array, count: number): void {
  const { straight, delayed } = pair;
  for (let i = 0; i < count; i++) {
    straight[i] = input[i];
    delayed[i] = input[i];
  }
  runAllPassPair(pair, count);
  for (let i = 0; i < count; i++) {
    output[2 * i] = straight[i];
    output[2 * i + 1] = delayed[i];
  }
}

function halveByPair(pair: AllPassPair, input: Float64Array, output: Float64Array, count: number): void {
  const { straight, delayed } = pair;
  for (let i = 0; i < count; i++) {
    delayed[i] = input[2 * i];
    straight[i] = input[2 * i + 1];
  }
  runAllPassPair(pair, count);
  for (let i = 0; i < count; i++) output[i] = 0.5 * (straight[i] + delayed[i]);
}

function doubleByTaps({ weights, history }: LinearPhaseHalf, input: Float64Array, output: Float64Array, count: number): void {
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

function halveByTaps({ weights, history, odd }: LinearPhaseHalf, input: Float64Array, output: Float64Array, count: number): void {
  const side = weights.length;
  const kept = 2 * side - 1;
  for (let i = 0; i < count; i++) history[kept + i] = input[2 * i];
  sumSides(weights, history, output, 1, count);
  for (let i = 0; i < count; i++) output[i] += 0.5 * (i >= side ? input[2 * (i - side) + 1] : odd[i]);
  for (let k = 0; k < kept; k++) history[k] = history[count + k];
  keepOdd(odd, input, count, side);
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

/** The last `centre` odd samples stay for the next run. */
function keepOdd(odd: Float64Array, input: Float64Array, count: number, centre: number): void {
  if (count < centre) for (let k = 0; k < centre - count; k++) odd[k] = odd[count + k];
  for (let k = Math.max(0, centre - count); k < centre; k++) odd[k] = input[2 * (count - centre + k) + 1];
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
