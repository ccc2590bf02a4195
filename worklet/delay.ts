/**
 * A delay of whole samples, one line for each channel: it keeps chains and bypass in step. Another length is crossfaded into, so that there is no click.
 *
 * Law      y[n] = x[n − delay];  for FADE_SEC after a change (1 − p)·x[n − old] + p·x[n − new], p in a straight line
 * Valid    delay 0 to LONGEST_DELAY; any block length; output may be input
 */
export const LONGEST_DELAY = 2047;
const MASK = LONGEST_DELAY;
const FADE_SEC = 0.03;

export interface Delay {
  readonly rings: readonly Float32Array[];
  readonly fadeFrames: number;
  at: number;
  from: number;
  to: number;
  /** Where it shall be once the present fade is over. */
  wanted: number;
  done: number;
}

/** Throws a RangeError for a delay that it cannot hold. */
export function createDelay(channels: number, delaySamples: number, sampleRateHz: number): Delay {
  const samples = Math.round(delaySamples);
  if (!(samples >= 0 && samples <= LONGEST_DELAY)) {
    throw new RangeError(`The delay is ${delaySamples} samples; expected 0 to ${LONGEST_DELAY}`);
  }
  const rings = Array.from({ length: channels }, () => new Float32Array(LONGEST_DELAY + 1));
  const fadeFrames = Math.round(FADE_SEC * sampleRateHz);
  return { rings, fadeFrames, at: 0, from: samples, to: samples, wanted: samples, done: fadeFrames };
}

/** Aims at another delay, whole and within range. */
export function setDelay(delay: Delay, samples: number): void {
  delay.wanted = samples;
}

export function processDelay(delay: Delay, inputs: readonly Float32Array[], outputs: readonly Float32Array[]): void {
  if (delay.done >= delay.fadeFrames && delay.wanted !== delay.to) {
    delay.from = delay.to;
    delay.to = delay.wanted;
    delay.done = 0;
  }
  const { rings, from, to, done, fadeFrames, at } = delay;
  const frames = inputs[0].length;
  for (let c = 0; c < inputs.length; c++) {
    const ring = rings[c];
    const input = inputs[c];
    const output = outputs[c];
    for (let n = 0; n < frames; n++) {
      const here = (at + n) & MASK;
      ring[here] = input[n];
      let y = ring[(here - to) & MASK];
      if (done + n < fadeFrames) {
        const old = ring[(here - from) & MASK];
        y = old + ((done + n + 1) / fadeFrames) * (y - old);
      }
      output[n] = y;
    }
  }
  delay.at = (at + frames) & MASK;
  if (done < fadeFrames) delay.done = done + frames;
}
