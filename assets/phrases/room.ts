import { LOOP_SAMPLES, SAMPLE_RATE_HZ } from './loop.ts';

/**
 * A small live room: eight delay lines fed back through a Householder matrix, with a loss filter in each.
 *
 * Source  J.-M. Jot and A. Chaigne, «Digital delay networks for designing artificial reverberators», AES 90th Convention, 1991;
 *         from memory
 */
const LINES = [557, 683, 797, 911, 1049, 1181, 1303, 1429];
const DECAY_SEC = 0.42;
/** One-pole loss per pass: treble dies first. */
const DAMPING = 0.32;
const ROUNDS = 2;

/** The room's answer to a loop that has been going round for ever, left and right. */
export function renderRoom(left: Float64Array, right: Float64Array): [Float64Array, Float64Array] {
  const lines = LINES.map((length) => new Float64Array(length));
  const gains = LINES.map((length) => 10 ** ((-3 * length) / (DECAY_SEC * SAMPLE_RATE_HZ)));
  const damped = new Float64Array(LINES.length);
  const outLeft = new Float64Array(LOOP_SAMPLES);
  const outRight = new Float64Array(LOOP_SAMPLES);
  for (let n = 0; n < LOOP_SAMPLES * ROUNDS; n++) {
    const at = n % LOOP_SAMPLES;
    let sum = 0;
    for (let i = 0; i < lines.length; i++) {
      damped[i] += (1 - DAMPING) * (gains[i] * lines[i][n % LINES[i]] - damped[i]);
      sum += damped[i];
    }
    outLeft[at] = damped[0] - damped[2] + damped[4] - damped[6];
    outRight[at] = damped[1] - damped[3] + damped[5] - damped[7];
    for (let i = 0; i < lines.length; i++) {
      lines[i][n % LINES[i]] = damped[i] - (2 / lines.length) * sum + (i % 2 === 0 ? left[at] : right[at]);
    }
  }
  return [outLeft, outRight];
}
