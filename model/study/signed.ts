/**
 * A harmonic with the sign that tells which way to turn.
 *
 * Law      plus where the harmonic peaks with the drain's own fundamental: the sign of cos(φₙ − n·φ₁). A p-channel part is an n-channel one
 *          mirrored, v → −v, which turns the even harmonics over, so their sign is counted in the part's own polarity
 *          For the second: plus asks for more drain feedback, minus for less
 */
import type { Channel } from '../design/types.ts';
import { cosTurns } from '../device/math.ts';
import type { ToneReading } from './tone.ts';

const TURN = 6.283185307179586;

/** Harmonic n over the fundamental, a ratio with its sign; null where the reading does not hold it. */
export function signedHarmonic(
  { harmonics, fundamentalV }: Pick<ToneReading, 'harmonics' | 'fundamentalV'>,
  n: number,
  channel: Channel,
): number | null {
  const first = harmonics.find((each) => each.n === 1);
  const wanted = harmonics.find((each) => each.n === n);
  if (first === undefined || wanted === undefined) return null;
  const together = cosTurns((wanted.phaseRad - n * first.phaseRad) / TURN) >= 0;
  const mirrored = channel === 'p' && n % 2 === 0;
  return ((together === mirrored ? -1 : 1) * wanted.amplitudeV) / fundamentalV;
}
