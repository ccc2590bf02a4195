/** A seeded source of random numbers: the same seed gives the same sequence everywhere. */
export interface Random {
  /** Uniform in 0…1, 1 excluded. */
  fraction(): number;
  /** Uniform in −1…1. */
  bipolar(): number;
}

/**
 * Law     xorshift on 32 bits with shifts 13, 17, 5; period 2³² − 1
 * Source  G. Marsaglia, «Xorshift RNGs», Journal of Statistical Software 8 (14), 2003; from memory
 */
export function createRandom(seed: number): Random {
  let state = Math.imul(seed, 0x9e3779b1) ^ 0x2545f491;
  if (state === 0) state = 1;
  const next = () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 4294967296;
  };
  for (let n = 0; n < 8; n++) next();
  return { fraction: next, bipolar: () => 2 * next() - 1 };
}
