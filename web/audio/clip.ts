/** Sound in memory: one or two channels at the rate they were made at, 1.0 being full scale. */
export interface Clip {
  readonly title: string;
  readonly sampleRateHz: number;
  readonly channels: readonly Float32Array<ArrayBuffer>[];
}

export function clipSeconds(clip: Clip): number {
  return clip.channels[0].length / clip.sampleRateHz;
}
