/**
 * A sine that loops without a seam.
 *
 * Law      peak·sin(2π·c·n/N), n 0 … N−1, where c whole cycles in N samples come nearest to the frequency, N between one and two seconds
 * Error    the frequency by under 1/(2N) Hz·s⁻¹ of a cycle a loop, 1e-5 Hz at 48 kHz (test/model/chain/testTone.test.ts)
 * Valid    1 Hz to half the rate
 */
import { sinTurns } from '../device/math.ts';

/** @returns one loop of samples, 1.0 being full scale. Throws a RangeError for a frequency that the rate cannot hold. */
export function testTone(hz: number, peak: number, sampleRateHz: number): Float32Array<ArrayBuffer> {
  if (!(hz >= 1 && hz < sampleRateHz / 2)) {
    throw new RangeError(`the test tone is ${hz} Hz; expected 1 Hz to under ${sampleRateHz / 2} Hz, half the sample rate`);
  }
  const frames = seamlessFrames(hz, sampleRateHz);
  const cycles = Math.round((hz * frames) / sampleRateHz);
  return Float32Array.from({ length: frames }, (_, n) => peak * sinTurns(((n * cycles) % frames) / frames));
}

function seamlessFrames(hz: number, sampleRateHz: number): number {
  let best = sampleRateHz;
  let least = 1;
  for (let frames = sampleRateHz; frames <= 2 * sampleRateHz && least > 0; frames++) {
    const cycles = (hz * frames) / sampleRateHz;
    const off = Math.abs(cycles - Math.round(cycles));
    if (off >= least) continue;
    least = off;
    best = frames;
  }
  return best;
}
