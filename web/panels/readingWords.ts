import type { ToneReading } from '../../model/study/tone.ts';

/** Harmonic n over the fundamental, with the sign of its cosine against the input's; null when the reading does not hold it. */
export function signedHarmonic(reading: ToneReading, n: number): number | null {
  const harmonic = reading.harmonics.find((each) => each.n === n);
  if (harmonic === undefined) return null;
  const sign = Math.cos(harmonic.phaseRad) >= 0 ? 1 : -1;
  return (sign * harmonic.amplitudeV) / reading.fundamentalV;
}

/**
 * Where the shadow tone drives the channel past its limits, in words with the share of the period; null while it does not. Being cut off is no
 * limit: that is how a cell turns the sound on.
 */
export function leavesOhmic(regions: ToneReading['regions']): { words: string; share: number } | null {
  const found = [
    { words: 'saturates for', share: regions.saturated },
    { words: 'gate conducts for', share: regions.gateOn },
  ];
  const most = found.reduce((best, each) => (each.share > best.share ? each : best));
  return most.share > 0.0005 ? most : null;
}
