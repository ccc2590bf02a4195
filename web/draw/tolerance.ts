/** What the tolerance of a pair of resistors does to k, and so to distortion. */

/** Of the parts that are bought: 1 %. */
export const TOLERANCE = 0.01;

/** k with one resistor of the pair at one end of its tolerance and the other at the other end, lower first; a buffer's share is a pair's too. */
export function fractionsWithin(k: number, tolerance = TOLERANCE): readonly [number, number] {
  const moved = (up: number) => (k * (1 + up)) / (k * (1 + up) + (1 - k) * (1 - up));
  return [moved(-tolerance), moved(tolerance)];
}

export interface Distorted {
  /** Fractions of the fundamental. */
  readonly thd: number;
  readonly h2Signed: number;
}

/**
 * Between two readings, a share of 0 to 1 of the way: the second harmonic goes in a straight line and so does the power of all others, from
 * which THD follows; a null between two readings is then seen.
 */
export function between(a: Distorted, b: Distorted, share: number): Distorted {
  const others = ({ thd, h2Signed }: Distorted) => Math.max(0, thd * thd - h2Signed * h2Signed);
  const h2Signed = a.h2Signed + share * (b.h2Signed - a.h2Signed);
  return { h2Signed, thd: Math.sqrt(h2Signed * h2Signed + others(a) + share * (others(b) - others(a))) };
}

/** The least and the highest THD along readings in order of k. */
export function thdWithin(readings: readonly Distorted[]): readonly [number, number] {
  const nulls = readings.slice(1).flatMap((next, n) => {
    const last = readings[n];
    if (last.h2Signed * next.h2Signed >= 0) return [];
    return [between(last, next, last.h2Signed / (last.h2Signed - next.h2Signed))];
  });
  const thds = [...readings, ...nulls].map(({ thd }) => thd);
  return [Math.min(...thds), Math.max(...thds)];
}
