/**
 * Chooses what is heard: one of several sources, each with a gain of its own that brings it to the loudness of the others.
 *
 * Law      y = Σ wᵢ·gᵢ·xᵢ;  at a change the weights go from where they are to 1 for the chosen one and 0 for the rest in a straight line of FADE_SEC,
 *          so that they add up to one at every sample; gains move in straight lines too
 * Error    at rest with gain 1 the output is the chosen source, bit for bit
 * Valid    gain 0 to HIGHEST_GAIN; any block length; a sample that is no finite number leaves as silence and is counted
 */
const FADE_SEC = 0.01;
/** A gain crosses 0 to 1 in this time. */
const GAIN_SEC = 0.03;
/** 80 dB: what a cell adds may be that far down. */
export const HIGHEST_GAIN = 10000;

export interface Mix {
  readonly weight: Float64Array;
  readonly from: Float64Array;
  readonly gain: Float64Array;
  readonly gainTo: Float64Array;
  readonly fadeFrames: number;
  readonly gainStep: number;
  /** What is chosen, and how far the fade to it is, in frames. */
  chosen: number;
  done: number;
  broken: number;
}

export function createMix(sources: number, chosen: number, sampleRateHz: number): Mix {
  const fadeFrames = Math.round(FADE_SEC * sampleRateHz);
  const mix: Mix = {
    weight: new Float64Array(sources),
    from: new Float64Array(sources),
    gain: new Float64Array(sources).fill(1),
    gainTo: new Float64Array(sources).fill(1),
    fadeFrames,
    gainStep: 1 / (GAIN_SEC * sampleRateHz),
    chosen,
    done: fadeFrames,
    broken: 0,
  };
  mix.weight[chosen] = 1;
  return mix;
}

/** Sets out for another source from whatever is heard now. */
export function choose(mix: Mix, source: number): void {
  if (source === mix.chosen) return;
  mix.chosen = source;
  mix.from.set(mix.weight);
  mix.done = 0;
}

/** One gain for each source. Throws a RangeError and changes nothing where one is no gain. */
export function setGains(mix: Mix, gains: readonly number[]): void {
  if (gains.length !== mix.gain.length) throw new RangeError(`There are ${gains.length} gains; expected ${mix.gain.length}`);
  const bad = gains.find((gain) => !(gain >= 0 && gain <= HIGHEST_GAIN));
  if (bad !== undefined) throw new RangeError(`A gain is ${bad}; expected 0 to ${HIGHEST_GAIN}`);
  mix.gainTo.set(gains);
}

/** A block. Sources of no weight are not read; while `wait` is set a fade that has been asked for does not begin. */
export function processMix(mix: Mix, sources: readonly (readonly Float32Array[])[], lines: readonly Float32Array[], wait: boolean): void {
  const { weight, from, gain, gainTo, gainStep, fadeFrames, chosen } = mix;
  const frames = lines[0].length;
  for (let n = 0; n < frames; n++) {
    if (mix.done < fadeFrames && !(wait && mix.done === 0)) {
      mix.done++;
      const part = mix.done / fadeFrames;
      for (let i = 0; i < weight.length; i++) {
        const to = i === chosen ? 1 : 0;
        weight[i] = mix.done === fadeFrames ? to : from[i] + part * (to - from[i]);
      }
    }
    for (let c = 0; c < lines.length; c++) lines[c][n] = 0;
    for (let i = 0; i < weight.length; i++) {
      const gap = gainTo[i] - gain[i];
      // A gain of many times moves in as much time as one of 1.
      const step = gainStep * Math.max(1, gain[i], gainTo[i]);
      if (gap !== 0) gain[i] = Math.abs(gap) <= step ? gainTo[i] : gain[i] + (gap > 0 ? step : -step);
      if (weight[i] === 0) continue;
      const factor = weight[i] * gain[i];
      for (let c = 0; c < lines.length; c++) lines[c][n] += factor * sources[i][c][n];
    }
    for (let c = 0; c < lines.length; c++) {
      // As stored: rounded to a Float32 it may have become infinite.
      const x = lines[c][n];
      if (!(x - x === 0)) {
        lines[c][n] = 0;
        mix.broken++;
      }
    }
  }
}
