/**
 * A pair of all-pass branches, the recursive form of a half-band filter.
 *
 * Law      each section (c + z⁻¹)/(1 + c·z⁻¹)
 * Scheme   y = c·x + s, then s = (1 − c²)·x − c·s: only s waits for itself. Two sections of each branch at a time over a whole run; a branch that has fewer
 *          is filled up with c = 1, which leaves what it is given as it is, to the bit
 */

export interface AllPassPair {
  /** c and 1 − c², then the same for the next section; four sections a pass: two of the straight branch, two of the delayed one. */
  readonly weights: Float64Array;
  /** s of each section, in the same order. */
  readonly memory: Float64Array;
  /** What goes through the branches, in place. */
  readonly straight: Float64Array;
  readonly delayed: Float64Array;
}

const SECTIONS = 4;

/** `poles` in rising order: even places belong to the straight branch. For runs of up to `longest` samples. */
export function createAllPassPair(poles: readonly number[], longest: number): AllPassPair {
  const passes = Math.ceil(poles.length / SECTIONS);
  const weights = new Float64Array(2 * SECTIONS * passes);
  for (let section = 0; section < SECTIONS * passes; section++) {
    const c = poles[section] ?? 1;
    const place = SECTIONS * Math.floor(section / SECTIONS) + placeInPass(section % SECTIONS);
    weights[2 * place] = c;
    weights[2 * place + 1] = 1 - c * c;
  }
  return {
    weights,
    memory: new Float64Array(SECTIONS * passes),
    straight: new Float64Array(longest),
    delayed: new Float64Array(longest),
  };
}

/** Poles of the two branches alternate; in a pass the straight ones stand first. */
function placeInPass(pole: number): number {
  return pole % 2 === 0 ? pole / 2 : SECTIONS / 2 + (pole - 1) / 2;
}

/** Takes the first `count` samples of both lines through their branches. */
export function runAllPassPair({ weights, memory, straight, delayed }: AllPassPair, count: number): void {
  for (let at = 0; at < memory.length; at += SECTIONS) {
    const a = weights[2 * at];
    const aa = weights[2 * at + 1];
    const b = weights[2 * at + 2];
    const bb = weights[2 * at + 3];
    const c = weights[2 * at + 4];
    const cc = weights[2 * at + 5];
    const d = weights[2 * at + 6];
    const dd = weights[2 * at + 7];
    let p = memory[at];
    let q = memory[at + 1];
    let r = memory[at + 2];
    let s = memory[at + 3];
    for (let i = 0; i < count; i++) {
      const x = straight[i];
      const y = a * x + p;
      p = aa * x - a * p;
      straight[i] = b * y + q;
      q = bb * y - b * q;
      const u = delayed[i];
      const v = c * u + r;
      r = cc * u - c * r;
      delayed[i] = d * v + s;
      s = dd * v - d * s;
    }
    memory[at] = forgotten(p);
    memory[at + 1] = forgotten(q);
    memory[at + 2] = forgotten(r);
    memory[at + 3] = forgotten(s);
  }
}

/** In silence a recursive filter decays into numbers that processors are slow with, and stays there. */
const NOTHING = 1e-300;

function forgotten(value: number): number {
  return value < NOTHING && value > -NOTHING ? 0 : value;
}
