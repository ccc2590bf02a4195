/** Random choices from a seed, the same in every engine: xorshift128 (Marsaglia, J. Stat. Softw. 8 (2003) 14; from memory), hashed from 32 bits. */
export class Dice {
  private readonly words = new Uint32Array(4);

  constructor(seed: number) {
    let x = seed >>> 0;
    for (let i = 0; i < 4; i++) {
      x = (Math.imul(x ^ (x >>> 15), 0x2c1b3c6d) + 0x9e3779b9) >>> 0;
      this.words[i] = x || 1;
    }
    for (let i = 0; i < 8; i++) this.next();
  }

  /** 0 up to 1, 32 bits. */
  next(): number {
    const { words } = this;
    let t = words[3];
    const first = words[0];
    words[3] = words[2];
    words[2] = words[1];
    words[1] = first;
    t ^= t << 11;
    t ^= t >>> 8;
    words[0] = t ^ first ^ (first >>> 19);
    return words[0] / 4294967296;
  }

  chance(fraction: number): boolean {
    return this.next() < fraction;
  }

  between(low: number, high: number): number {
    return low + (high - low) * this.next();
  }

  /** A whole number, both ends included. */
  whole(low: number, high: number): number {
    return low + Math.floor((high - low + 1) * this.next());
  }

  /** Evenly spread over the decades between two positive numbers. */
  decades(low: number, high: number): number {
    return Math.min(high, Math.max(low, low * (high / low) ** this.next()));
  }

  pick<T>(list: readonly T[]): T {
    return list[Math.floor(list.length * this.next())];
  }

  /** −1 … 1. */
  sign(): number {
    return 2 * this.next() - 1;
  }
}
