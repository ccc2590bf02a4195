/**
 * A-weighting.
 *
 * Law      f4²·f⁴/[(f² + f1²)·√(f² + f2²)·√(f² + f3²)·(f² + f4²)], over its value at 1 kHz
 * Source   IEC 61672-1, poles 20.598997, 107.65265, 737.86223 and 12194.217 Hz
 */

const squareOf = (x: number) => x * x;
const POLE_1 = squareOf(20.598997);
const POLE_2 = squareOf(107.65265);
const POLE_3 = squareOf(737.86223);
const POLE_4 = squareOf(12194.217);

/** Ratio, 1 at 1 kHz. */
export function aWeighting(frequencyHz: number): number {
  return shape(frequencyHz) / shape(1000);
}

function shape(frequencyHz: number): number {
  const f = frequencyHz * frequencyHz;
  return (f * f) / ((f + POLE_1) * Math.sqrt(f + POLE_2) * Math.sqrt(f + POLE_3) * (f + POLE_4));
}
