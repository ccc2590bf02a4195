/** Files to clips, at the file's own rate. */
import { readWav } from '../../model/chain/wav.ts';
import type { Clip } from './clip.ts';
import { isWave, readFileRate } from './fileRate.ts';

const RATE_IF_UNKNOWN_HZ = 48000;

/**
 * PCM and float WAV go through our own reader, so that every bit is kept; everything else through the browser's decoder.
 * Throws an Error whose message names the file and says what is wrong.
 */
export async function decodeAudio(bytes: ArrayBuffer, title: string): Promise<Clip> {
  const view = new Uint8Array(bytes);
  if (view.length === 0) throw new Error(`“${title}” is empty; expected a sound file.`);
  let reason = 'this browser knows no such sound file';
  if (isWave(view)) {
    try {
      const { sampleRateHz, channels } = readWav(view);
      return checkClip({ title, sampleRateHz, channels: channels as Float32Array<ArrayBuffer>[] });
    } catch (error) {
      if (error instanceof ClipError) throw error;
      reason = error instanceof Error ? error.message : String(error);
    }
  }
  const rateHz = readFileRate(view) ?? RATE_IF_UNKNOWN_HZ;
  const { OfflineAudioContext } = await import('standardized-audio-context');
  const buffer = await new OfflineAudioContext(1, 1, rateHz).decodeAudioData(bytes).catch(() => {
    throw new Error(`“${title}” could not be read: ${reason}.`);
  });
  const channels = Array.from({ length: buffer.numberOfChannels }, (_, c) => new Float32Array(buffer.getChannelData(c)));
  return checkClip({ title, sampleRateHz: buffer.sampleRate, channels });
}

class ClipError extends Error {}

function checkClip(clip: Clip): Clip {
  const { title, channels } = clip;
  if (channels.length < 1 || channels.length > 2) throw new ClipError(`“${title}” has ${channels.length} channels; expected 1 or 2.`);
  if (channels[0].length === 0) throw new ClipError(`“${title}” holds no samples.`);
  return clip;
}
