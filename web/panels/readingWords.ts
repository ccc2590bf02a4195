import type { ToneReading } from '../../model/study/tone.ts';

/** Harmonic n over the fundamental, with the sign of its cosine against the input's; null when the reading does not hold it. */
export function signedHarmonic(reading: ToneReading, n: number): number | null {
  const harmonic = reading.harmonics.find((each) => each.n === n);
  if (harmonic === undefined) return null;
  const sign = Math.cos(harmonic.phaseRad) >= 0 ? 1 : -1;
  return (sign * harmonic.amplitudeV) / reading.fundamentalV;
}
