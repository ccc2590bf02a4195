/**
 * Gaussian and triangular numbers from a seed, the same in every engine.
 *
 * Law      xorshift128 on four 32-bit words (Marsaglia, J. Stat. Soft. 8 (2003) 14), seeded by a multiplicative hash; pairs of uniform numbers to
 *          Gaussian ones by the polar method (Marsaglia & Bray, SIAM Rev. 6 (1964) 260), or added to triangular ones; from memory
 */
import { log } from './math.ts';

/** Words of the generator, then a kept Gaussian number and whether there is one. */
export interface GaussianSource {
  readonly words: Uint32Array;
  readonly kept: Float64Array;
}

export function createGaussian(seed: number): GaussianSource {
  const words = new Uint32Array(4);
  let x = seed >>> 0;
  for (let i = 0; i < 4; i++) {
    x = (Math.imul(x ^ (x >>> 16), 0x45d9f3b) + 0x9e3779b9) >>> 0;
    words[i] = x | 1;
  }
  const source = { words, kept: new Float64Array(2) };
  for (let i = 0; i < 16; i++) uniform(words);
  return source;
}

/** −1 … 1, 32 bits. */
function uniform(words: Uint32Array): number {
  let t = words[3];
  const first = words[0];
  words[3] = words[2];
  words[2] = words[1];
  words[1] = first;
  t ^= t << 11;
  t ^= t >>> 8;
  words[0] = t ^ first ^ (first >>> 19);
  return words[0] / 2147483648 - 1;
}

/** The next number of mean 0 and variance 1. Allocates nothing. */
export function nextGaussian({ words, kept }: GaussianSource): number {
  if (kept[1] === 1) {
    kept[1] = 0;
    return kept[0];
  }
  let x = 0;
  let y = 0;
  let square = 0;
  do {
    x = uniform(words);
    y = uniform(words);
    square = x * x + y * y;
  } while (square >= 1 || square === 0);
  const scale = Math.sqrt((-2 * log(square)) / square);
  kept[0] = y * scale;
  kept[1] = 1;
  return x * scale;
}

/** The next number of triangular density, −1 … 1, mean 0 and variance 1/6. Allocates nothing. */
export function nextTriangular({ words }: GaussianSource): number {
  return (uniform(words) + uniform(words)) / 2;
}
