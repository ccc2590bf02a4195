/** What is put through the chain: a clip that loops, or what a device hears now. */
import type { Clip } from './clip.ts';
import type { LiveInput } from './input.ts';

export type Source =
  | { readonly kind: 'phrase' | 'file' | 'tone'; readonly clip: Clip }
  | { readonly kind: 'live'; readonly input: LiveInput };

/** How sound is opened for a source: a recording may wait for a wide buffer, which has fewer gaps; what is live must not. */
export interface SourceForm {
  readonly title: string;
  readonly sampleRateHz: number;
  readonly channels: number;
  readonly latency: 'playback' | 'interactive';
}

/** What the players are given. `atSec` is where in the clip it begins. */
export type Feed =
  | { readonly kind: 'clip'; readonly clip: Clip; readonly atSec: number }
  | { readonly kind: 'live'; readonly stream: MediaStream };

export function formOf(source: Source): SourceForm {
  if (source.kind === 'live') {
    const { title, sampleRateHz, channels } = source.input;
    return { title, sampleRateHz, channels, latency: 'interactive' };
  }
  const { title, sampleRateHz, channels } = source.clip;
  return { title, sampleRateHz, channels: channels.length, latency: 'playback' };
}
