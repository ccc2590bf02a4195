/**
 * A delay of whole samples, one line for each channel: it keeps the bypass in step with the chain.
 *
 * Law      y[n] = x[n − delay]
 * Valid    delay 0 to any; any block length
 */
export interface Delay {
  readonly rings: readonly Float32Array[];
  /** The delayed block, as long as the last block written. */
  lines: Float32Array[];
  at: number;
}

export function createDelay(channels: number, delaySamples: number): Delay {
  const rings = Array.from({ length: channels }, () => new Float32Array(Math.max(0, Math.round(delaySamples))));
  return { rings, lines: Array.from({ length: channels }, () => new Float32Array(128)), at: 0 };
}

/** Allocates only where the block's length differs from the last one's, which it does at most once in a context's life. */
export function processDelay(delay: Delay, inputs: readonly Float32Array[]): void {
  const frames = inputs[0].length;
  if (delay.lines[0].length !== frames) delay.lines = delay.rings.map(() => new Float32Array(frames));
  const length = delay.rings[0].length;
  let at = delay.at;
  for (let c = 0; c < inputs.length; c++) {
    const ring = delay.rings[c];
    const line = delay.lines[c];
    at = delay.at;
    for (let n = 0; n < frames; n++) {
      const x = inputs[c][n];
      if (length === 0) {
        line[n] = x;
      } else {
        line[n] = ring[at];
        ring[at] = x;
        at = at + 1 === length ? 0 : at + 1;
      }
    }
  }
  delay.at = at;
}
