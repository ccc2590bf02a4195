/** Files to clips, at the file's own rate. */
import { LARGEST_SAMPLE } from '../../model/chain/chain.ts';
import { HIGHEST_RATE_HZ, LOWEST_RATE_HZ } from '../../model/chain/compile.ts';
import { readWav, UnknownCodingError } from '../../model/chain/wav.ts';
import type { Clip } from './clip.ts';
import { isWave, readFileRate } from './fileRate.ts';

const RATE_IF_UNKNOWN_HZ = 48000;

/**
 * PCM and float WAV go through our own reader, so that every bit is kept; other coding through the browser's decoder. A WAV that our reader finds
 * faulty is refused, since the browser would mend it in silence. Throws an Error whose message names the file and says what is wrong.
 */
export async function decodeAudio(bytes: ArrayBuffer, title: string): Promise<Clip> {
  const view = new Uint8Array(bytes);
  if (view.length === 0) throw new Error(`“${title}” is empty; expected a sound file.`);
  let reason = 'this browser knows no such sound file';
  if (isWave(view)) {
    const read = readKnown(view);
    if (!(read instanceof RangeError)) return checkClip({ title, ...read });
    reason = read.message;
    if (!(read instanceof UnknownCodingError)) throw new Error(`“${title}” could not be read: ${reason}.`);
  }
  const rateHz = readFileRate(view) ?? RATE_IF_UNKNOWN_HZ;
  if (!(rateHz >= LOWEST_RATE_HZ && rateHz <= HIGHEST_RATE_HZ)) {
    throw new Error(`“${title}” states a sample rate of ${rateHz} Hz; expected ${LOWEST_RATE_HZ} to ${HIGHEST_RATE_HZ} Hz.`);
  }
  const { OfflineAudioContext } = await import('standardized-audio-context');
  const buffer = await new OfflineAudioContext(1, 1, rateHz).decodeAudioData(bytes).catch(() => {
    throw new Error(`“${title}” could not be read: ${reason}.`);
  });
  const channels = Array.from({ length: buffer.numberOfChannels }, (_, c) => new Float32Array(buffer.getChannelData(c)));
  return checkClip({ title, sampleRateHz: buffer.sampleRate, channels });
}

function readKnown(view: Uint8Array): Omit<Clip, 'title'> | RangeError {
  try {
    const { sampleRateHz, channels } = readWav(view);
    return { sampleRateHz, channels: channels as Float32Array<ArrayBuffer>[] };
  } catch (error) {
    if (error instanceof RangeError) return error;
    throw error;
  }
}

function checkClip(clip: Clip): Clip {
  const { title, channels } = clip;
  if (channels.length < 1 || channels.length > 2) throw new Error(`“${title}” has ${channels.length} channels; expected 1 or 2.`);
  if (channels[0].length === 0) throw new Error(`“${title}” holds no samples.`);
  for (const samples of channels) {
    const frame = samples.findIndex((sample) => !(Math.abs(sample) <= LARGEST_SAMPLE));
    if (frame < 0) continue;
    throw new Error(
      `“${title}”: frame ${frame + 1} holds a sample of ${samples[frame]}; expected at most ${LARGEST_SAMPLE} times full scale.`,
    );
  }
  return clip;
}
