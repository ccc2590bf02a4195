import type { ToneReading } from '../../model/study/tone.ts';

/** Harmonic n over the fundamental, with the sign of its cosine against the input's; null when the reading does not hold it. */
export function signedHarmonic(reading: ToneReading, n: number): number | null {
  const harmonic = reading.harmonics.find((each) => each.n === n);
  if (harmonic === undefined) return null;
  const sign = Math.cos(harmonic.phaseRad) >= 0 ? 1 : -1;
  return (sign * harmonic.amplitudeV) / reading.fundamentalV;
}

/** Which region the shadow tone leaves the ohmic one for, in words with the share of the period; null while it stays ohmic. */
export function leavesOhmic(regions: ToneReading['regions']): { words: string; share: number } | null {
  const found = [
    { words: 'saturates for', share: regions.saturated },
    { words: 'is cut off for', share: regions.cutoff },
    { words: 'gate conducts for', share: regions.gateOn },
  ];
  const most = found.reduce((best, each) => (each.share > best.share ? each : best));
  return most.share > 0.0005 ? most : null;
}
