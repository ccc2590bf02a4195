/**
 * Gaussian and triangular numbers from a seed, the same in every engine.
 *
 * Law      xorshift128 on four 32-bit words (Marsaglia, J. Stat. Soft. 8 (2003) 14), seeded by a multiplicative hash; a uniform number to a Gaussian
 *          one by layers of equal area (Marsaglia & Tsang, J. Stat. Soft. 5 (2000) 8), its layer and its place from different bits (Doornik, 2005);
 *          two added to a triangular one; from memory
 */
import { exp, expAt, log, logAt } from './math.ts';

/** Layers of equal area under exp(−x²/2), the lowest with the tail beyond TAIL_FROM: figures of Marsaglia & Tsang for 128. */
const LAYERS = 128;
const TAIL_FROM = 3.442619855899;
const AREA = 9.91256303526217e-3;
const INVERSE_WORD = 1 / 4294967296;
const EDGES = edges();
const HEIGHTS = EDGES.map((x) => exp(-0.5 * x * x));
/** For each layer, what turns 24 bits with their sign into a place in it: the lowest counts as wide as its area. */
const WIDTHS = EDGES.map((x, layer) => (layer === 0 ? AREA / HEIGHTS[1] : x) / 8388608).slice(0, LAYERS);

/** Right edge of each layer from below: of the lowest that of the tail, of the topmost 0. */
function edges(): Float64Array {
  const x = new Float64Array(LAYERS + 1);
  x[0] = TAIL_FROM;
  x[1] = TAIL_FROM;
  for (let layer = 2; layer < LAYERS; layer++) {
    const height = exp(-0.5 * x[layer - 1] * x[layer - 1]) + AREA / x[layer - 1];
    x[layer] = Math.sqrt(-2 * log(height));
  }
  return x;
}

/** Words of the generator. */
export interface GaussianSource {
  readonly words: Uint32Array;
}

export function createGaussian(seed: number): GaussianSource {
  const words = new Uint32Array(4);
  let x = seed >>> 0;
  for (let i = 0; i < 4; i++) {
    x = (Math.imul(x ^ (x >>> 16), 0x45d9f3b) + 0x9e3779b9) >>> 0;
    words[i] = x | 1;
  }
  const source = { words };
  for (let i = 0; i < 16; i++) uniform(words);
  return source;
}

/** The next word, signed. */
function next(words: Uint32Array): number {
  let t = words[3];
  const first = words[0];
  words[3] = words[2];
  words[2] = words[1];
  words[1] = first;
  t ^= t << 11;
  t ^= t >>> 8;
  t ^= first ^ (first >>> 19);
  words[0] = t;
  return t | 0;
}

/** −1 … 1, 32 bits. */
function uniform(words: Uint32Array): number {
  next(words);
  return words[0] / 2147483648 - 1;
}

/** Puts the next numbers of mean 0 and variance 1 into `slots`, `from` to `to`. Allocates nothing. */
export function putGaussians({ words }: GaussianSource, slots: Float64Array, from: number, to: number): void {
  // `next`, with its words in locals: nearly every number is taken from its first word.
  let a = words[0] | 0;
  let b = words[1] | 0;
  let c = words[2] | 0;
  let d = words[3] | 0;
  for (let at = from; at < to; at++) {
    const t = d ^ (d << 11);
    d = c;
    c = b;
    b = a;
    a = t ^ (t >>> 8) ^ (a ^ (a >>> 19));
    const layer = a & (LAYERS - 1);
    const x = (a >> 8) * WIDTHS[layer];
    slots[at] = x;
    if (Math.abs(x) < EDGES[layer + 1]) continue;
    words[0] = a;
    words[1] = b;
    words[2] = c;
    words[3] = d;
    putFromWord(words, slots, at);
    a = words[0] | 0;
    b = words[1] | 0;
    c = words[2] | 0;
    d = words[3] | 0;
  }
  words[0] = a;
  words[1] = b;
  words[2] = c;
  words[3] = d;
}

/** Puts the number that begins with the word last drawn. */
function putFromWord(words: Uint32Array, slots: Float64Array, at: number): void {
  for (let word = words[0] | 0; ; word = next(words)) {
    const layer = word & (LAYERS - 1);
    // The upper 24 bits, apart from those that chose the layer.
    const x = (word >> 8) * WIDTHS[layer];
    const size = Math.abs(x);
    if (size < EDGES[layer + 1]) {
      slots[at] = x;
      return;
    }
    if (layer === 0) {
      putTail(words, slots, at, x < 0);
      return;
    }
    slots[at] = -0.5 * size * size;
    expAt(slots, at);
    if (HEIGHTS[layer] + (next(words) * INVERSE_WORD + 0.5) * (HEIGHTS[layer + 1] - HEIGHTS[layer]) < slots[at]) {
      slots[at] = x;
      return;
    }
  }
}

/** Beyond the last edge, by Marsaglia's method. */
function putTail(words: Uint32Array, slots: Float64Array, at: number, negative: boolean): void {
  for (;;) {
    slots[at] = next(words) * INVERSE_WORD + 0.5 + 0.5 * INVERSE_WORD;
    logAt(slots, at);
    const past = -slots[at] / TAIL_FROM;
    slots[at] = next(words) * INVERSE_WORD + 0.5 + 0.5 * INVERSE_WORD;
    logAt(slots, at);
    if (-2 * slots[at] >= past * past) {
      slots[at] = negative ? -(TAIL_FROM + past) : TAIL_FROM + past;
      return;
    }
  }
}

/** The next number of triangular density, −1 … 1, mean 0 and variance 1/6. Allocates nothing. */
export function nextTriangular({ words }: GaussianSource): number {
  return (uniform(words) + uniform(words)) / 2;
}
