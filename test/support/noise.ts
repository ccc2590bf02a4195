/** White noise that is the same for the same seed: xorshift32 (Marsaglia, J. Stat. Softw. 8 (2003) 14; from memory), uniform in ±peak. */
export function createNoise(seed: number, length: number, peak: number): Float32Array<ArrayBuffer> {
  let state = seed >>> 0 || 1;
  return Float32Array.from({ length }, () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return ((state >>> 0) / 2147483648 - 1) * peak;
  });
}
