/**
 * Lines that begin anew without a click: what was there last falls to nothing while the new one finds its state unheard, then the new one rises.
 *
 * Law      for LEAD_SEC after `joinAnew`  y = last·(1 − p), p in a straight line; then for FADE_SEC  y = p·x; then y = x
 */
const LEAD_SEC = 0.02;
const FADE_SEC = 0.01;

export interface Join {
  /** The last sample of each channel, and that at the last new beginning. */
  readonly latest: Float32Array;
  readonly last: Float32Array;
  readonly leadFrames: number;
  readonly fadeFrames: number;
  done: number;
}

export function createJoin(channels: number, sampleRateHz: number): Join {
  const leadFrames = Math.round(LEAD_SEC * sampleRateHz);
  const fadeFrames = Math.round(FADE_SEC * sampleRateHz);
  return { latest: new Float32Array(channels), last: new Float32Array(channels), leadFrames, fadeFrames, done: leadFrames + fadeFrames };
}

export function joinAnew(join: Join): void {
  join.last.set(join.latest);
  join.done = 0;
}

/** One block, in place. */
export function processJoin(join: Join, lines: readonly Float32Array[]): void {
  const { latest, last, leadFrames, fadeFrames } = join;
  const frames = lines[0].length;
  for (let n = 0; n < frames && join.done < leadFrames + fadeFrames; n++) {
    join.done++;
    for (let c = 0; c < lines.length; c++) {
      if (join.done < leadFrames) lines[c][n] = last[c] * (1 - join.done / leadFrames);
      else lines[c][n] *= (join.done - leadFrames) / fadeFrames;
    }
  }
  for (let c = 0; c < lines.length; c++) latest[c] = lines[c][frames - 1];
}
